package main

import (
	"github.com/urfave/cli/v2"

	"lastdrop/cmd/internal/schemaview"
)

func (p *program) schemaListCommand() *command {
	return &command{
		name: "schema list", use: "[--schemas DIR]",
		says:    "list the schemas in force: name, layout, where from, title",
		more:    "Where from: shipped with the program, of the laboratory, or of the laboratory in the place of a shipped one. Exit: 0 done; 1 DIR cannot be read; 2 usage, also a schema in DIR that is wrong.",
		example: []string{"lastdrop schema list", "lastdrop schema list --schemas /srv/schemas"},
		options: []option{schemasOption()},
		action:  p.schemaList,
	}
}

func (p *program) schemaList(c *cli.Context) error {
	if c.Args().Len() != 0 {
		return usage("lastdrop schema show "+shellWord(c.Args().First()), "schema list takes no path, there are %d", c.Args().Len())
	}
	set, err := schemaSet(c.String("schemas"))
	if err != nil {
		return err
	}
	return schemaview.List(p.stdout, set)
}
