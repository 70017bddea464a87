package main

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"strings"

	"lastdrop/cmd/internal/night"
	"lastdrop/ingest"
	"lastdrop/ingest/archive"
)

// readDump returns the bytes of one dump: a file, or a member of an archive
// named archive.zip/member. An archive with one dump in it may be named alone.
func readDump(path string) ([]byte, error) {
	info, err := os.Stat(path)
	if err != nil {
		if at, member, ok := inArchive(path); ok {
			return readMember(at, member)
		}
	}
	if err == nil && info.Mode().IsRegular() && archive.Is(path) {
		return readMember(path, "")
	}
	return readLimited(path, ingest.MaxBytes)
}

// readLimited reads a regular file of at most so many bytes.
func readLimited(path string, most int64) ([]byte, error) {
	info, err := os.Stat(path)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return nil, &failure{err: errors.New(path + ": there is no such file"), try: "check its spelling"}
	case err != nil:
		return nil, &failure{err: err, try: "check its permissions"}
	case info.IsDir():
		return nil, usage("lastdrop sweep "+shellWord(path)+" --into OUT", "%s is a folder, a dump is a file", path)
	case !info.Mode().IsRegular():
		return nil, usage("lastdrop look FILE", "%s is no regular file", path)
	case info.Size() > most:
		return nil, &failure{err: fmt.Errorf("%s: %d bytes, at most %d are read", path, info.Size(), most), try: "name a smaller file"}
	}
	data, err := os.ReadFile(path)
	if err != nil {
		return nil, &failure{err: err, try: "check its permissions"}
	}
	return data, nil
}

// inArchive parts a path that leads into an archive.
func inArchive(path string) (at, member string, ok bool) {
	path = filepath.Clean(path)
	for at = filepath.Dir(path); ; at = filepath.Dir(at) {
		if info, err := os.Stat(at); err == nil {
			member = strings.TrimPrefix(filepath.ToSlash(path[len(at):]), "/")
			return at, member, info.Mode().IsRegular() && archive.Is(at) && strings.HasPrefix(path, at)
		}
		if filepath.Dir(at) == at {
			return "", "", false
		}
	}
}

// readMember returns a member of an archive; member "" is the only one.
func readMember(at, member string) ([]byte, error) {
	f, err := os.Open(at)
	if err != nil {
		return nil, &failure{err: err, try: "check its permissions"}
	}
	defer f.Close() // opened for reading: nothing to lose
	info, err := f.Stat()
	if err != nil {
		return nil, &failure{err: err, try: "check its permissions"}
	}
	return memberOf(f, info.Size(), at, member)
}

func memberOf(r io.ReaderAt, size int64, at, member string) ([]byte, error) {
	var data []byte
	var names []string
	keep := func(name string) bool {
		name = night.MemberName(name)
		return member == "" && night.IsDump(name) || name == member
	}
	_, problems := archive.Read(r, size, at, archive.Default(), keep, func(m archive.Member) bool {
		names = append(names, m.Name)
		if len(names) == 1 {
			data = m.Data
		}
		return len(names) < 2
	})
	switch {
	case len(names) > 1 && member == "":
		return nil, usage("lastdrop look "+shellWord(names[0]), "%s holds several dumps; name one of them", at)
	case len(names) > 0:
		return data, nil
	case len(problems) > 0:
		return nil, &faults{all: []error{problems[0]}, code: exitUnfinished, try: "check that the archive is whole"}
	case member == "":
		return nil, &failure{err: errors.New(at + ": the archive holds no dump"), try: "name another file"}
	}
	return nil, &failure{err: fmt.Errorf("%s: the archive has no member %q", at, member), try: "check its spelling"}
}
