package main

import (
	"errors"
	"io/fs"
	"os"

	"github.com/urfave/cli/v2"

	"lastdrop/cmd/internal/demo"
)

func (p *program) demoCommand() *command {
	return &command{
		name: "demo", use: "DIR",
		says: "write the demonstration laboratory: invented dumps, known faults",
		more: "Writes the dumps of one night of Tern Island Preserves, an invented maker of pickles and vinegar, into DIR, a new or empty folder, with a README that tells every fault. " +
			"Exit: 0 done; 1 DIR cannot be written; 2 usage, also a DIR that is not empty.",
		example: []string{"lastdrop demo tern-island", "lastdrop sweep tern-island/dumps --into out"},
		options: []option{
			{flag: &cli.Uint64Flag{Name: "seed", Value: demo.DefaultSeed}, value: "N", says: "whole number from 0 on; another one gives other curves with the same faults", without: "20310402", example: "--seed 7"},
		},
		action: p.demo,
	}
}

func (p *program) demo(c *cli.Context) error {
	if c.Args().Len() != 1 {
		return usage("lastdrop demo DIR", "demo takes one folder, there are %d", c.Args().Len())
	}
	dir := c.Args().First()
	entries, err := os.ReadDir(dir)
	switch {
	case len(entries) > 0:
		return usage("lastdrop demo NEW-FOLDER", "%s is not empty, and the demonstration overwrites nothing", dir)
	case err != nil && !errors.Is(err, fs.ErrNotExist):
		return &failure{err: err, try: "name a folder that can be written"}
	}
	if err := demo.Write(dir, c.Uint64("seed")); err != nil {
		return &failure{err: err, try: "name a folder that can be written"}
	}
	return nil
}
