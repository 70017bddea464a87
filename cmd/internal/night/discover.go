package night

import (
	"context"
	"fmt"
	"io/fs"
	"log/slog"
	"path"
	"sort"
	"strings"

	"lastdrop/ingest/archive"
)

// dump is a file that an instrument wrote, or an archive of such files.
type dump struct {
	name    string // in the record: folder name / path below it, forward slashes
	files   fs.FS
	path    string // in files
	archive bool
	named   bool // by the user, one by one
}

// findings are what the folders hold.
type findings struct {
	folders  []folder
	dumps    []dump   // by name, byte order; archives among them
	others   int      // files that are no dumps
	excluded int      // dumps that the patterns leave out
	links    []string // symbolic links
	specials []string // pipes, sockets, devices
	names    []string // of all files that were met
	options  *Options
	taken    map[string]bool // names of the files that the user named
}

// discover walks the folders. Hidden files and folders (a leading dot) are
// passed over, ours among them. A symbolic link is never followed: what it
// points to inside the folder is found there, what lies outside is not the
// user's wish. A folder that cannot be read ends the sweep: nobody could say
// which dumps are missing.
func discover(ctx context.Context, folders []folder, o *Options) (*findings, error) {
	f := &findings{folders: folders, options: o, taken: map[string]bool{}}
	f.takeNamed()
	for _, in := range folders {
		if in.files == nil { // files of it only
			continue
		}
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
	sort.Strings(f.links)
	sort.Strings(f.specials)
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
		return nil
	case d.IsDir() || f.taken[name]:
		return nil
	}
	f.names = append(f.names, name)
	switch {
	case d.Type()&fs.ModeSymlink != 0:
		f.links = append(f.links, name)
	case !d.Type().IsRegular():
		f.specials = append(f.specials, name)
	case archive.Is(p) && !f.options.excludesArchive(name):
		f.dumps = append(f.dumps, dump{name: name, files: in.files, path: p, archive: true})
	case !IsDump(p) && !archive.Is(p):
		f.others++
	case f.options.excludes(name):
		f.excluded++
	default:
		f.dumps = append(f.dumps, dump{name: name, files: in.files, path: p})
	}
	return nil
}

// takeNamed takes the files that the user named, whatever their names and the
// patterns.
func (f *findings) takeNamed() {
	for _, in := range f.folders {
		for _, d := range in.only {
			if !f.taken[d.name] {
				f.dumps = append(f.dumps, d)
				f.names = append(f.names, d.name)
			}
			f.taken[d.name] = true
		}
	}
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

// warn tells of what may lead to dumps and was passed over.
func (f *findings) warn(log *slog.Logger) {
	if n := len(f.links); n > 0 {
		log.Warn("symbolic links are not followed; sweep the folder they point to", "links", n, "first", f.links[0])
	}
	if n := len(f.specials); n > 0 {
		log.Warn("pipes, sockets and devices are not opened", "files", n, "first", f.specials[0])
	}
}

// nothing is the error of folders without a dump; others and excluded count
// what archives hold too.
func (f *findings) nothing(others, excluded int) *Error {
	where := make([]string, len(f.folders))
	for i, in := range f.folders {
		where[i] = in.path
	}
	var beside []string
	for _, c := range []struct {
		n         int
		one, many string
	}{
		{others, "other file", "other files"}, {excluded, "dump left out by --include and --exclude", "dumps left out by --include and --exclude"},
		{len(f.links), "symbolic link, not followed", "symbolic links, not followed"}, {len(f.specials), "pipe, socket or device", "pipes, sockets or devices"},
	} {
		if c.n > 0 {
			beside = append(beside, fmt.Sprintf("%d %s", c.n, count(c.n, c.one, c.many)))
		}
	}
	e := &Error{Kind: NoDump, Msg: "no dump found in " + strings.Join(where, ", "),
		Try: "name the folder that instruments write *.csv, *.txt, *.tsv or *.dat files into"}
	if len(beside) > 0 {
		e.Msg += " (" + strings.Join(beside, "; ") + ")"
	}
	switch {
	case excluded > 0:
		e.Try = "look at the patterns behind --include and --exclude"
	case len(f.links) > 0:
		e.Try = "sweep the folder that the links point to"
	}
	return e
}
