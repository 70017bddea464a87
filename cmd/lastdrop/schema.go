package main

import (
	"errors"
	"io/fs"
	"os"

	"github.com/urfave/cli/v2"

	"lastdrop/schemas"
)

func (p *program) schemaCommand() *command {
	return &command{
		name: "schema", use: "list|show|try|draft …",
		says: "mappings of instruments: list and show them, try one, draft one",
		more: "A schema is a small text file (TOML) that says how the export of one instrument becomes runs. Some are shipped; --schemas DIR adds the laboratory's own, and one of the same name replaces the shipped one. " +
			"A new instrument: draft a schema from one of its dumps, correct it, try it, then sweep with it.",
		parts: []*command{p.schemaListCommand(), p.schemaShowCommand(), p.schemaTryCommand(), p.schemaDraftCommand()},
	}
}

func schemasOption() option {
	return option{flag: &cli.StringFlag{Name: "schemas"}, value: "DIR",
		says: "folder of the laboratory's own schemas (*.toml); one of the same name replaces the shipped one", without: "the shipped ones", example: "--schemas /srv/schemas"}
}

// schemaSet returns the schemas in force. A folder that cannot be read could
// come back; a schema that is wrong is a configuration to be mended.
func schemaSet(dir string) ([]*schemas.Schema, error) {
	if dir != "" {
		if _, err := os.ReadDir(dir); err != nil {
			return nil, &failure{err: errors.New(dir + ": the folder of schemas cannot be read: " + reason(err)), try: "check the path behind --schemas"}
		}
	}
	set, err := schemas.Load(dir)
	if err != nil {
		return nil, &faults{all: parted(err), code: exitUsage, try: "correct the schemas in " + dir}
	}
	return set, nil
}

// reason is the system's word for what is wrong, without the path.
func reason(err error) string {
	if p, ok := errors.AsType[*fs.PathError](err); ok {
		return p.Err.Error()
	}
	return err.Error()
}

// byName returns the schemas of that name, several when there are versions.
func byName(set []*schemas.Schema, name string) (found []*schemas.Schema) {
	for _, s := range set {
		if s.Name == name {
			found = append(found, s)
		}
	}
	return found
}
