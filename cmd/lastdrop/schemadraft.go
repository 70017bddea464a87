package main

import (
	"bytes"
	"errors"
	"fmt"

	"github.com/urfave/cli/v2"

	"lastdrop/ingest"
	"lastdrop/ingest/draft"
)

func (p *program) schemaDraftCommand() *command {
	return &command{
		name: "schema draft", use: "FILE",
		says: "propose a schema for a dump that none reads",
		more: "The schema stands on stdout, a commented TOML file to be looked through; stderr says why each thing in it was chosen, what came next to it, and what is unsure. Nothing is used before somebody has accepted it. " +
			"Exit: 0 the draft reads the dump; 1 FILE cannot be read, holds no table, or the draft does not read it yet; 2 usage.",
		example: []string{"lastdrop schema draft bench-d/0402.dat > bench-d.toml", "lastdrop schema try bench-d.toml bench-d/0402.dat"},
		options: []option{schemasOption()},
		action:  p.schemaDraft,
	}
}

func (p *program) schemaDraft(c *cli.Context) error {
	if c.Args().Len() != 1 {
		return usage("lastdrop schema draft FILE", "schema draft takes one file, there are %d", c.Args().Len())
	}
	path := c.Args().First()
	set, err := schemaSet(c.String("schemas"))
	if err != nil {
		return err
	}
	data, err := readDump(path)
	if err != nil {
		return err
	}
	if runs, s, _ := ingest.Read(data, path, set); len(runs) > 0 {
		p.say("warning: schema %s reads this dump already; see lastdrop schema try %s %s", s.Name, s.Name, shellWord(path))
	}
	toml, report, err := draft.Propose(data, path)
	if err != nil {
		return &failure{err: fmt.Errorf("%s: %w", path, err), try: "check that it is the export of a titration"}
	}
	if !bytes.HasSuffix(toml, []byte("\n")) {
		toml = append(toml, '\n')
	}
	if _, err := p.stdout.Write(toml); err != nil {
		return err
	}
	return p.tellDraft(path, &report)
}

// tellDraft says why the draft is as it is, and whether it reads the dump.
func (p *program) tellDraft(path string, r *draft.Report) error {
	for _, c := range r.Choices {
		next := ""
		if c.RunnerUp != "" {
			next = "; next came " + c.RunnerUp
		}
		p.say("%s: %s (%s)%s", c.What, c.Chosen, c.Why, next)
	}
	for _, u := range r.Unsure {
		p.say("warning: unsure: %s", u)
	}
	if len(r.Problems) == 0 && r.Runs > 0 {
		p.say("the draft reads %d %s with %d readings", r.Runs, some(r.Runs, "run", "runs"), r.Readings)
		p.say("try: save it as DRAFT.toml, then lastdrop schema try DRAFT.toml %s", shellWord(path))
		return nil
	}
	f := &faults{code: exitUnfinished, try: "complete the draft, then lastdrop schema try DRAFT.toml " + shellWord(path)}
	for _, problem := range r.Problems {
		f.all = append(f.all, problem)
	}
	f.all = append(f.all, errors.New("the draft does not read all of the dump yet"))
	return f
}

// say prints one line on stderr.
func (p *program) say(form string, args ...any) {
	fmt.Fprintf(p.stderr, "lastdrop: %s\n", oneLine(fmt.Sprintf(form, args...)))
}

func some(n int, one, many string) string {
	if n == 1 {
		return one
	}
	return many
}
