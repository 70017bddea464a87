package schemas

import (
	"cmp"
	"embed"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"
)

//go:embed *.toml
var shipped embed.FS

// Shipped returns the schemas inside the program, sorted by name. Each call
// makes new ones. A fault in one of them is ours and panics; a test parses
// them all.
func Shipped() []*Schema {
	entries, err := shipped.ReadDir(".") // sorted by file name, which is the name
	if err != nil {
		panic(err)
	}
	var set []*Schema
	for _, e := range entries {
		src, err := shipped.ReadFile(e.Name())
		if err != nil {
			panic(err)
		}
		s, err := Parse(e.Name(), src)
		if err != nil {
			panic(fmt.Sprintf("shipped schema: %v", err))
		}
		set = append(set, s)
	}
	return set
}

// Load returns the shipped schemas joined with those of a laboratory: every
// *.toml of the folder. One of the same name replaces all shipped ones of that
// name and has Replaces set; two of one name in the folder need different
// valid_from. dir "" is the shipped set. The result is sorted by name and
// valid_from. The error joins a *Problem for everything that is wrong in any
// file, or tells why the folder cannot be read; there is no set then.
func Load(dir string) ([]*Schema, error) {
	set := Shipped()
	if dir == "" {
		return set, nil
	}
	own, err := loadFolder(dir)
	if err != nil {
		return nil, err
	}
	for _, s := range own {
		s.Replaces = slices.ContainsFunc(set, func(t *Schema) bool { return t.Name == s.Name })
	}
	set = slices.DeleteFunc(set, func(t *Schema) bool {
		return slices.ContainsFunc(own, func(s *Schema) bool { return s.Name == t.Name })
	})
	set = append(set, own...)
	slices.SortStableFunc(set, func(a, b *Schema) int {
		return cmp.Or(cmp.Compare(a.Name, b.Name), cmp.Compare(a.ValidFrom, b.ValidFrom))
	})
	return set, nil
}

// loadFolder reads every schema of a folder, in the order of file names.
func loadFolder(dir string) ([]*Schema, error) {
	entries, err := os.ReadDir(dir)
	if err != nil {
		return nil, &Problem{Path: dir, Msg: "the folder of schemas cannot be read: " + reason(err), Hint: "check the path"}
	}
	var own []*Schema
	var faults []error
	first := map[string]string{} // file of each name and day
	for _, e := range entries {
		path := filepath.Join(dir, e.Name())
		if e.IsDir() || !strings.EqualFold(filepath.Ext(path), ".toml") {
			continue
		}
		src, err := os.ReadFile(path)
		if err != nil {
			faults = append(faults, &Problem{Path: path, Msg: "cannot be read: " + reason(err), Hint: "check its permissions"})
			continue
		}
		s, err := Parse(path, src)
		if err != nil {
			faults = append(faults, err)
			continue
		}
		version := s.Name + " " + s.ValidFrom
		if other, twice := first[version]; twice {
			faults = append(faults, &Problem{Path: path, Line: 1, Col: 1, Field: "name", Msg: fmt.Sprintf("%q is the name in %s too", s.Name, other), Hint: "give it another name, or each version another valid_from"})
			continue
		}
		first[version] = path
		own = append(own, s)
	}
	return own, errors.Join(faults...)
}

// reason is the system's word for what is wrong, without the path.
func reason(err error) string {
	var p *fs.PathError
	if errors.As(err, &p) {
		return p.Err.Error()
	}
	return err.Error()
}
