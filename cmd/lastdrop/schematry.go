package main

import (
	"fmt"
	"strings"

	"github.com/urfave/cli/v2"

	"lastdrop/cmd/internal/schemaview"
	"lastdrop/ingest"
	"lastdrop/schemas"
)

func (p *program) schemaTryCommand() *command {
	return &command{
		name: "schema try", use: "SCHEMA FILE",
		says: "show what a schema makes of a dump",
		more: "Tells which column became what, facts, endpoints and repairs. SCHEMA is the name of a schema or a schema file (*.toml). Each row stands as written and as read, in mL and the unit of the readings. What is wrong stands on stderr with file, line and column. " +
			"Exit: 0 every run is read; 1 a file cannot be read, or the schema does not read the dump; 2 usage, also a schema that is wrong.",
		example: []string{"lastdrop schema try plain 0417.csv", "lastdrop schema try bench-d.toml bench-d/0402.dat"},
		options: []option{
			schemasOption(),
			{flag: &cli.BoolFlag{Name: "all"}, says: "every run and every repair", without: "the first 3 and 8"},
		},
		action: p.schemaTry,
	}
}

func (p *program) schemaTry(c *cli.Context) error {
	if c.Args().Len() != 2 {
		return usage("lastdrop schema try SCHEMA FILE", "schema try takes a schema and a dump, there are %d", c.Args().Len())
	}
	name, path := c.Args().Get(0), c.Args().Get(1)
	s, err := oneSchema(name, c.String("schemas"))
	if err != nil {
		return err
	}
	data, err := readDump(path)
	if err != nil {
		return err
	}
	e := ingest.Explain(data, path, s)
	if err := schemaview.Try(p.stdout, &e, c.Bool("all")); err != nil {
		return err
	}
	return notRead(&e, name)
}

// notRead is the error of a schema that does not read the dump.
func notRead(e *ingest.Explanation, name string) error {
	f := &faults{code: exitUnfinished, try: "correct " + name + ", then try it again"}
	for _, p := range e.Problems {
		f.all = append(f.all, p)
	}
	if e.Missing != "" && len(e.Problems) == 0 {
		f.all = append(f.all, fmt.Errorf("a sweep would not choose schema %s for %s: %s", e.Schema, e.Path, e.Missing))
	}
	if len(f.all) == 0 {
		return nil
	}
	if !isSchemaFile(name) {
		f.try = "" // the schema is none of the user's; the problem says what to do
		if e.Missing != "" {
			f.try = "lastdrop schema draft " + shellWord(e.Path)
		}
	}
	return f
}

// oneSchema finds a schema by its name, else by its file.
func oneSchema(name, dir string) (*schemas.Schema, error) {
	if isSchemaFile(name) {
		return schemaFile(name)
	}
	set, err := schemaSet(dir)
	if err != nil {
		return nil, err
	}
	switch found := byName(set, name); len(found) {
	case 1:
		return found[0], nil
	case 0:
		return nil, usage("lastdrop schema list", "%q is neither a schema nor a schema file (*.toml)", name)
	default:
		return nil, usage("lastdrop schema try FILE.toml DUMP", "schema %s has %d versions; name the file of one", name, len(found))
	}
}

func isSchemaFile(name string) bool { return strings.HasSuffix(strings.ToLower(name), ".toml") }

func schemaFile(path string) (*schemas.Schema, error) {
	src, err := readLimited(path, schemas.MaxBytes)
	if err != nil {
		return nil, err
	}
	s, err := schemas.Parse(path, src)
	if err != nil {
		return nil, &faults{all: parted(err), code: exitUsage, try: "correct " + path + ", then try it again"}
	}
	return s, nil
}
