// Package archive reads the dumps inside .zip and .gz files in place. It
// writes nothing and follows no path of an archive.
//
// A small file can unpack to more than a disk holds. Every size is therefore
// counted while it is unpacked, never taken from the archive's own word.
package archive

import (
	"archive/zip"
	"bytes"
	"compress/gzip"
	"errors"
	"fmt"
	"io"
	"path"
	"strings"

	"lastdrop/schemas"
)

// Limits bound what one archive may unpack to.
type Limits struct {
	MemberBytes int64 // of one member
	TotalBytes  int64 // of all of them
	Members     int   // how many, folders and others counted too
	Ratio       int64 // unpacked bytes for each packed one, beyond the first MiB
}

// Default are the limits of a sweep: a member is as large as a dump may be,
// and text packs to a hundredth at best. Source: this project.
func Default() Limits {
	return Limits{MemberBytes: 64 << 20, TotalBytes: 1 << 30, Members: 20_000, Ratio: 200}
}

// ratioFree is what an archive may unpack to whatever it measures: small
// tables of one number pack very well.
const ratioFree = 1 << 20

// Member is one dump inside an archive.
type Member struct {
	Name string // archive.zip/member, with the slashes of the archive
	Data []byte
}

// Is reports whether a file is an archive by its name.
func Is(name string) bool {
	ext := strings.ToLower(path.Ext(name))
	return ext == ".zip" || ext == ".gz"
}

// Read calls yield with each member whose own name keep accepts, in the order
// of the archive, until yield returns false. name is the path of the archive,
// size its length. Members that are archives themselves are not opened.
// skipped counts the members that keep does not accept. The problems name the
// member and say why it could not be read; one that breaks a limit of the
// whole archive ends the reading.
func Read(r io.ReaderAt, size int64, name string, limits Limits, keep func(member string) bool, yield func(Member) bool) (skipped int, problems []*schemas.Problem) {
	u := &unpacker{limits: limits, name: name, packed: size, keep: keep, yield: yield}
	if strings.EqualFold(path.Ext(name), ".gz") {
		u.gzip(io.NewSectionReader(r, 0, size))
	} else {
		u.zip(r, size)
	}
	return u.skipped, u.problems
}

// unpacker reads one archive.
type unpacker struct {
	limits   Limits
	name     string
	packed   int64
	total    int64
	keep     func(string) bool
	yield    func(Member) bool
	skipped  int
	problems []*schemas.Problem
}

func (u *unpacker) problem(member, msg, hint string) {
	p := u.name
	if member != "" {
		p += "/" + member
	}
	u.problems = append(u.problems, &schemas.Problem{Path: p, Msg: msg, Hint: hint})
}

const (
	damaged = "the archive is damaged; copy it again"
	bomb    = "unpack it by hand and look at it"
)

func (u *unpacker) zip(r io.ReaderAt, size int64) {
	z, err := zip.NewReader(r, size)
	if err != nil && !errors.Is(err, zip.ErrInsecurePath) {
		u.problem("", "is no zip archive: "+reason(err), damaged)
		return
	}
	if len(z.File) > u.limits.Members {
		u.problem("", fmt.Sprintf("%d members, the limit is %d", len(z.File), u.limits.Members), "part it into several")
		return
	}
	for _, f := range z.File {
		if strings.HasSuffix(f.Name, "/") {
			continue
		}
		if Is(f.Name) || !u.keep(f.Name) {
			u.skipped++
			continue
		}
		if !u.zipMember(f) {
			return
		}
	}
}

// zipMember reads one member; more is false when the rest is not to be read.
func (u *unpacker) zipMember(f *zip.File) (more bool) {
	member, ok := cleanName(f.Name)
	switch {
	case !ok:
		u.problem(member, "its name leaves the archive", "no honest program writes that; look where the archive comes from")
		return true
	case f.Flags&1 != 0:
		u.problem(member, "is encrypted", "unpack it with its password")
		return true
	}
	in, err := f.Open()
	if err != nil {
		u.problem(member, "cannot be unpacked: "+reason(err), damaged)
		return true
	}
	defer in.Close()
	return u.member(member, in, int64(f.CompressedSize64))
}

func (u *unpacker) gzip(r io.Reader) {
	member := strings.TrimSuffix(path.Base(strings.ReplaceAll(u.name, `\`, "/")), path.Ext(u.name))
	if Is(member) || !u.keep(member) || member == "" {
		u.skipped++
		return
	}
	in, err := gzip.NewReader(r)
	if err != nil {
		u.problem("", "is no gzip archive: "+reason(err), damaged)
		return
	}
	defer in.Close()
	u.member(member, in, u.packed)
}

// member unpacks one member within the limits.
func (u *unpacker) member(name string, in io.Reader, packed int64) (more bool) {
	byRatio := max(ratioFree, u.limits.Ratio*min(packed, u.packed))
	allowed := min(u.limits.MemberBytes, byRatio, u.limits.TotalBytes-u.total)
	var out bytes.Buffer
	n, err := io.Copy(&out, io.LimitReader(in, allowed+1))
	u.total += n
	switch {
	case n <= allowed && err != nil:
		u.problem(name, "cannot be unpacked: "+reason(err), damaged)
	case n <= allowed:
		return u.yield(Member{Name: u.name + "/" + name, Data: out.Bytes()})
	case allowed == u.limits.TotalBytes-(u.total-n):
		u.problem("", fmt.Sprintf("its members unpack to more than %d bytes", u.limits.TotalBytes), bomb)
		return false
	case allowed == byRatio:
		u.problem(name, fmt.Sprintf("unpacks to more than %d times its size", u.limits.Ratio), bomb)
	default:
		u.problem(name, fmt.Sprintf("more than %d bytes", u.limits.MemberBytes), fmt.Sprintf("a dump has at most %d bytes", u.limits.MemberBytes))
	}
	return true
}

// cleanName is the name of a member with plain slashes; ok is false for one
// that leaves the archive.
func cleanName(name string) (clean string, ok bool) {
	clean = strings.ReplaceAll(name, `\`, "/")
	if path.IsAbs(clean) || len(clean) > 1 && clean[1] == ':' || strings.ContainsRune(clean, 0) {
		return strings.ToValidUTF8(clean, "\ufffd"), false
	}
	for part := range strings.SplitSeq(clean, "/") {
		if part == ".." {
			return clean, false
		}
	}
	return strings.ToValidUTF8(path.Clean(clean), "\ufffd"), true
}

// reason is the library's word for what is wrong, without its own name.
func reason(err error) string {
	for _, prefix := range []string{"zip: ", "gzip: ", "flate: "} {
		if text, found := strings.CutPrefix(err.Error(), prefix); found {
			return text
		}
	}
	return err.Error()
}
