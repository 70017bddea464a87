package night

import (
	"context"
	"fmt"
	"io/fs"
	"log/slog"
	"path"
	"sort"
	"strings"
)

// dump is a file that an instrument wrote.
type dump struct {
	name  string // in the record: folder name / path below it, forward slashes
	files fs.FS
	path  string // in files
}

// findings are what the folders hold.
type findings struct {
	folders  []folder
	dumps    []dump   // by name, byte order
	others   int      // files that are no dumps
	archives []string // of the others, those that may hold dumps
	links    []string // of the others, symbolic links
}

// discover walks the folders. Hidden files and folders (a leading dot) are
// passed over, ours among them. A symbolic link is never followed: what it
// points to inside the folder is found there, what lies outside is not the
// user's wish. A folder that cannot be read ends the sweep: nobody could say
// which dumps are missing.
func discover(ctx context.Context, folders []folder) (*findings, error) {
	f := &findings{folders: folders}
	for _, in := range folders {
		err := fs.WalkDir(in.files, ".", func(p string, d fs.DirEntry, err error) error {
			switch {
			case ctx.Err() != nil:
				return context.Cause(ctx)
			case err != nil:
				return unreadable(path.Join(in.path, p), err)
			}
			return f.sort(in, p, d)
		})
		if err != nil {
			return nil, err
		}
	}
	sort.Slice(f.dumps, func(i, j int) bool { return f.dumps[i].name < f.dumps[j].name })
	sort.Strings(f.archives)
	sort.Strings(f.links)
	return f, nil
}

// sort puts one entry of a folder where it belongs.
func (f *findings) sort(in folder, p string, d fs.DirEntry) error {
	name := in.name + "/" + p
	switch {
	case p != "." && strings.HasPrefix(d.Name(), "."):
		if d.IsDir() {
			return fs.SkipDir
		}
	case d.IsDir():
	case d.Type().IsRegular() && IsDump(p):
		f.dumps = append(f.dumps, dump{name: name, files: in.files, path: p})
	default:
		f.others++
		if d.Type()&fs.ModeSymlink != 0 {
			f.links = append(f.links, name)
		} else if d.Type().IsRegular() && isArchive(p) {
			f.archives = append(f.archives, name)
		}
	}
	return nil
}

// IsDump reports whether a file or a member of an archive is a dump by its
// name.
func IsDump(p string) bool {
	switch strings.ToLower(path.Ext(p)) {
	case ".csv", ".txt", ".tsv", ".dat":
		return true
	}
	return false
}

// MemberName is the name of an archive's member with plain slashes.
func MemberName(name string) string { return path.Clean(strings.ReplaceAll(name, `\`, "/")) }

func isArchive(p string) bool {
	switch strings.ToLower(path.Ext(p)) {
	case ".zip", ".gz":
		return true
	}
	return false
}

// warn tells of files that may hold dumps and were passed over.
func (f *findings) warn(log *slog.Logger) {
	if n := len(f.archives); n > 0 {
		log.Warn("archives are not opened; unpack them beside the other dumps", "archives", n, "first", f.archives[0])
	}
	if n := len(f.links); n > 0 {
		log.Warn("symbolic links are not followed; sweep the folder they point to", "links", n, "first", f.links[0])
	}
}

// nothing is the error of folders without a dump.
func (f *findings) nothing() *Error {
	where := make([]string, len(f.folders))
	for i, in := range f.folders {
		where[i] = in.path
	}
	msg := "no dump found in " + strings.Join(where, ", ")
	if f.others > 0 {
		msg += fmt.Sprintf(" (%d other %s)", f.others, count(f.others, "file", "files"))
	}
	return &Error{Kind: NoDump, Msg: msg, Try: "name the folder that instruments write *.csv, *.txt, *.tsv or *.dat files into"}
}
