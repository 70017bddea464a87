package main

import (
	"io"

	"github.com/urfave/cli/v2"

	"lastdrop/cmd/internal/schemaview"
)

func (p *program) schemaShowCommand() *command {
	return &command{
		name: "schema show", use: "NAME",
		says:    "say in words what a schema expects, or print its file",
		more:    "Of a schema with several versions every one is shown. The quickest way to a new one is to copy the one whose dumps look most alike: with --toml its file stands on stdout as it was written. Exit: 0 done; 1 DIR cannot be read; 2 usage, also a NAME that is not there.",
		example: []string{"lastdrop schema show plain", "lastdrop schema show bench-a --toml > bench-d.toml"},
		options: []option{schemasOption(),
			{flag: &cli.BoolFlag{Name: "toml"}, says: "print the file itself, to be copied and changed"},
		},
		action: p.schemaShow,
	}
}

func (p *program) schemaShow(c *cli.Context) error {
	if c.Args().Len() != 1 {
		return usage("lastdrop schema list", "schema show takes one name, there are %d", c.Args().Len())
	}
	set, err := schemaSet(c.String("schemas"))
	if err != nil {
		return err
	}
	found := byName(set, c.Args().First())
	if len(found) == 0 {
		return usage("lastdrop schema list", "there is no schema %q", c.Args().First())
	}
	from := schemaview.Origins(set)
	for i, s := range found {
		if i > 0 {
			if _, err := io.WriteString(p.stdout, "\n"); err != nil {
				return err
			}
		}
		if c.Bool("toml") {
			if _, err := io.WriteString(p.stdout, s.TOML); err != nil {
				return err
			}
			continue
		}
		if err := schemaview.Show(p.stdout, s, from[s.SHA256]); err != nil {
			return err
		}
	}
	return nil
}
