package main

import (
	"crypto/sha256"
	"encoding/hex"

	"github.com/urfave/cli/v2"

	"lastdrop/cmd/internal/night"
	"lastdrop/cmd/internal/refit"
	"lastdrop/report"
	"lastdrop/report/terminal"
)

func (p *program) lookCommand() *command {
	return &command{
		name: "look", use: "FILE",
		says: "show one dump on the terminal: facts, curve, endpoints, flags",
		more: "Reads and refits every run of one dump as a sweep does, also of one inside an archive (archive.zip/member), and writes nothing. Volumes are in mL; an endpoint stands with its standard uncertainty from the readings (k = 1) and its 95 % interval. " +
			"Exit: 0 done, also when the dump is unread; 1 the file cannot be read; 2 usage.",
		example: []string{"lastdrop look bench-a/0417.csv", "lastdrop look bench-a/2031-03.zip/0231.csv", "lastdrop look bench-a/0417.csv --estimator derivative | less"},
		options: []option{
			{flag: &cli.StringFlag{Name: "estimator"}, value: "NAME", says: "use this estimator, see lastdrop sweep --help", without: "each run has the usual one for its readings", example: "--estimator two-line"},
			schemasOption(),
			{flag: &cli.BoolFlag{Name: "no-colour"}, says: "no colours; there are none either when NO_COLOR is set, TERM is dumb, or stdout is no terminal"},
			decimalOption("what is shown"),
		},
		action: p.look,
	}
}

func (p *program) look(c *cli.Context) error {
	if c.Args().Len() != 1 {
		return usage("lastdrop look FILE", "look takes one file, there are %d", c.Args().Len())
	}
	path, estimator := c.Args().First(), c.String("estimator")
	if err := checkEstimator(estimator); err != nil {
		return err
	}
	decimal, err := decimalOf(c)
	if err != nil {
		return err
	}
	set, err := schemaSet(c.String("schemas"))
	if err != nil {
		return err
	}
	data, err := readDump(path)
	if err != nil {
		return err
	}
	sum := sha256.Sum256(data)
	done, unread := refit.Dump(data, path, hex.EncodeToString(sum[:]), set, refit.Options{Estimator: estimator, Lastdrop: version})
	for i := range done {
		done[i].ID = night.Identify(&done[i])
	}
	for i := range unread {
		unread[i].Record, unread[i].State, unread[i].Dump = report.Record, "new", path
	}
	return terminal.Look(p.stdout, done, unread, terminal.Options{Colour: p.colours() && !c.Bool("no-colour"), Decimal: decimal})
}
