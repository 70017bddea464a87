package schemas

import (
	"embed"
	"fmt"
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
