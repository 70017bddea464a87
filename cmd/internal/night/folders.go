package night

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"

	"lastdrop/cmd/internal/night/publish"
)

// folder is a swept folder. Its name begins the name of each of its dumps.
type folder struct {
	path  string // as the user named it
	name  string // its last path element
	files fs.FS
	close func() error
}

// openFolders names and opens the swept folders. A folder that cannot be
// named, two of equal names, and OUT lying in a swept folder or the other way
// round are bad requests: the next sweep would read what this one wrote.
func openFolders(paths []string, into string) (folders []folder, err error) {
	defer func() {
		if err != nil {
			closeFolders(folders)
			folders = nil
		}
	}()
	seen := map[string]string{}
	for _, path := range paths {
		f, err := openFolder(path)
		if err != nil {
			return folders, err
		}
		folders = append(folders, f)
		if other, twice := seen[f.name]; twice {
			return folders, &Error{Kind: BadRequest,
				Msg: fmt.Sprintf("%s and %s have the same last name %q, which begins the name of their dumps in the record", other, path, f.name),
				Try: "sweep the folder above both, or one of them at a time into its own OUT"}
		}
		seen[f.name] = path
		if err := apart(path, into); err != nil {
			return folders, err
		}
	}
	return folders, nil
}

// openFolder opens one folder. What is read through it cannot leave it by
// symbolic links, also not by those made while the sweep runs.
func openFolder(path string) (folder, error) {
	abs, err := filepath.Abs(path)
	if err != nil {
		return folder{}, unreadable(path, err)
	}
	name := filepath.Base(abs)
	if name == string(filepath.Separator) || name == "." {
		return folder{}, &Error{Kind: BadRequest, Msg: path + " has no name that could begin the name of its dumps",
			Try: "sweep a folder below it"}
	}
	info, err := os.Stat(path)
	if err != nil {
		return folder{}, unreadable(path, err)
	}
	if !info.IsDir() {
		return folder{}, &Error{Kind: BadRequest, Msg: path + " is a file, a sweep takes folders",
			Try: "lastdrop look " + path}
	}
	root, err := os.OpenRoot(path)
	if err != nil {
		return folder{}, unreadable(path, err)
	}
	return folder{path: path, name: name, files: root.FS(), close: root.Close}, nil
}

func unreadable(path string, err error) *Error {
	if errors.Is(err, fs.ErrNotExist) {
		return &Error{Kind: Unfinished, Msg: path + ": there is no such folder",
			Try: "check its spelling, and that the disk or share it lies on is there"}
	}
	return &Error{Kind: Unfinished, Msg: path + ": the folder cannot be read", Err: cause(err),
		Try: "check its permissions, and that the disk or share it lies on is there"}
}

func closeFolders(folders []folder) {
	for _, f := range folders {
		f.close() // opened for reading: nothing to lose
	}
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
