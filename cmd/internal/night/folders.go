package night

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"

	"lastdrop/cmd/internal/night/publish"
	"lastdrop/ingest/archive"
)

// folder is a swept folder, or one of which only some files were named. Its
// name begins the name of each of its dumps.
type folder struct {
	path  string // as the user named it
	name  string // its last path element
	files fs.FS  // nil when only files of it were named
	only  []dump // files that were named
}

// folders are the swept folders, opened.
type folders struct {
	all    []folder
	places map[string]string   // absolute path by name
	roots  map[string]*os.Root // by resolved path
}

// openFolders names and opens what is to be swept: folders and single files.
// What cannot be named, two folders of equal names, and OUT lying in a swept
// folder or the other way round are bad requests: the next sweep would read
// what this one wrote.
func openFolders(paths []string, into string) (*folders, error) {
	f := &folders{places: map[string]string{}, roots: map[string]*os.Root{}}
	for _, path := range paths {
		if err := f.open(path, into); err != nil {
			f.close()
			return nil, err
		}
	}
	return f, nil
}

func (f *folders) open(path, into string) error {
	info, err := os.Stat(path)
	switch {
	case err != nil:
		return unreadable(path, err)
	case info.IsDir():
		return f.openFolder(path, into)
	case info.Mode().IsRegular():
		return f.openFile(path, into)
	}
	return &Error{Kind: BadRequest, Msg: path + " is neither a folder nor a regular file", Try: "name a folder or a dump"}
}

// openFolder opens one folder.
func (f *folders) openFolder(path, into string) error {
	in, err := f.at(path, path, true)
	if err != nil {
		return err
	}
	if err := apart(path, into); err != nil {
		return err
	}
	root, err := f.root(path)
	if err != nil {
		return unreadable(path, err)
	}
	in.files = root.FS()
	return nil
}

// openFile takes one file. Its folder's name begins its own, as if the folder
// had been swept. A link that the user names is followed.
func (f *folders) openFile(path, into string) error {
	in, err := f.at(path, filepath.Dir(path), false)
	if err != nil {
		return err
	}
	if inside(filepath.Dir(path), into) {
		return &Error{Kind: BadRequest, Msg: fmt.Sprintf("the dump %s lies in OUT %s", path, into), Try: "name another folder with --into"}
	}
	at := real(path)
	root, err := f.root(filepath.Dir(at))
	if err != nil {
		return unreadable(path, err)
	}
	in.only = append(in.only, dump{name: in.name + "/" + filepath.Base(path), files: root.FS(), path: filepath.Base(at), archive: archive.Is(path), named: true})
	return nil
}

// at returns the folder for a path that was named, a new one or, for further
// files, the one that is there.
func (f *folders) at(path, dir string, whole bool) (*folder, error) {
	abs, err := filepath.Abs(dir)
	if err != nil {
		return nil, unreadable(path, err)
	}
	name := filepath.Base(abs)
	if name == string(filepath.Separator) || name == "." {
		return nil, &Error{Kind: BadRequest, Msg: path + " has no folder name that could begin the name of its dumps",
			Try: "sweep a folder below it"}
	}
	for i := range f.all {
		if in := &f.all[i]; in.name == name {
			if f.places[name] == abs && !(whole && in.files != nil) {
				return in, nil
			}
			return nil, &Error{Kind: BadRequest,
				Msg: fmt.Sprintf("%s and %s have the same last name %q, which begins the name of their dumps in the record", in.path, dir, name),
				Try: "sweep the folder above both, or one of them at a time into its own OUT"}
		}
	}
	f.all, f.places[name] = append(f.all, folder{path: dir, name: name}), abs
	return &f.all[len(f.all)-1], nil
}

// root opens a folder once. What is read through it cannot leave it by
// symbolic links, also not by those made while the sweep runs.
func (f *folders) root(dir string) (*os.Root, error) {
	if r, open := f.roots[dir]; open {
		return r, nil
	}
	r, err := os.OpenRoot(dir)
	if err == nil {
		f.roots[dir] = r
	}
	return r, err
}

func (f *folders) close() {
	for _, r := range f.roots {
		r.Close() // opened for reading: nothing to lose
	}
}

func unreadable(path string, err error) *Error {
	if errors.Is(err, fs.ErrNotExist) {
		return &Error{Kind: Unfinished, Msg: path + ": there is no such folder or file",
			Try: "check its spelling, and that the disk or share it lies on is there"}
	}
	return &Error{Kind: Unfinished, Msg: path + ": cannot be read", Err: cause(err),
		Try: "check its permissions, and that the disk or share it lies on is there"}
}

// apart checks that neither folder lies in the other.
func apart(swept, into string) error {
	switch {
	case inside(into, swept):
		return &Error{Kind: BadRequest, Msg: fmt.Sprintf("OUT %s lies in the swept folder %s", into, swept),
			Try: "name a folder outside it with --into"}
	case inside(swept, into):
		return &Error{Kind: BadRequest, Msg: fmt.Sprintf("the swept folder %s lies in OUT %s", swept, into),
			Try: "name another folder with --into"}
	}
	return nil
}

// inside is true when path is dir or lies below it. It asks the file system
// whether two folders are the same one, so that links, upper case and mounts
// deceive it less than a comparison of names. path may be missing.
func inside(path, dir string) bool {
	is, err := os.Stat(dir)
	if err != nil {
		return false
	}
	for at := real(path); ; at = filepath.Dir(at) {
		if info, err := os.Stat(at); err == nil && os.SameFile(info, is) {
			return true
		}
		if filepath.Dir(at) == at {
			return false
		}
	}
}

// real returns the absolute path with links resolved as far as it exists.
func real(path string) string {
	abs, err := filepath.Abs(path)
	if err != nil {
		return path
	}
	if resolved, err := filepath.EvalSymlinks(abs); err == nil {
		return resolved
	}
	if parent := filepath.Dir(abs); parent != abs {
		return filepath.Join(real(parent), filepath.Base(abs))
	}
	return abs
}

// claim makes OUT when it is missing and keeps other sweeps out of it.
func claim(o Options) (*publish.Place, error) {
	place, err := publish.Open(o.Into)
	switch {
	case errors.Is(err, publish.ErrInUse):
		return nil, &Error{Kind: InUse, Msg: "another sweep writes into " + o.Into, Try: "wait until it is done"}
	case err != nil:
		return nil, &Error{Kind: Unfinished, Msg: o.Into + ": OUT cannot be written", Err: cause(err),
			Try: "check that it is a folder, its permissions, and the room on its disk"}
	}
	if err := begin(o); err != nil {
		place.Close() // nothing is in it
		return nil, &Error{Kind: Unfinished, Msg: o.Into + ": OUT cannot be written", Err: cause(err),
			Try: "check its permissions, and the room on its disk"}
	}
	if place.Unlocked != nil {
		o.Log.Warn("this file system has no locks; let only one sweep at a time write here", "folder", o.Into, "cause", place.Unlocked)
	}
	return place, nil
}

// cause strips the path from an error of the file system: the message names
// it already, in the user's own words.
func cause(err error) error {
	if p, ok := errors.AsType[*fs.PathError](err); ok {
		return p.Err
	}
	return err
}
