// Package draft proposes a schema for a dump that none fits: a complete
// commented TOML file, why each thing in it was chosen, what came next to it
// and what a person must look at. It guesses; nothing that it finds is used
// before somebody has accepted the file.
package draft

import (
	"errors"
	"fmt"
	"strings"

	"lastdrop/ingest"
	"lastdrop/schemas"
)

// Report is what a person should know before accepting a draft.
type Report struct {
	Choices  []Choice
	Unsure   []string // what must be checked, in the order of the file
	Runs     int      // read with the draft
	Readings int      // of all of them
	Problems []*schemas.Problem
}

// Choice is one thing that was found out.
type Choice struct{ What, Chosen, Why, RunnerUp string } // RunnerUp is "" when nothing else came near

// ErrNoTable means that nothing in the dump looks like readings in columns.
var ErrNoTable = errors.New("no table of at least 5 rows of numbers in 2 columns; a dump needs a volume and a reading in each row")

// draft is one proposal while it is made.
type draft struct {
	data      []byte
	name      string // of the dump
	report    Report
	encoding  schemas.Encoding
	dialect   schemas.Dialect
	lines     []line
	tables    []table // those with the same header as the first
	layout    schemas.Layout
	fields    []field
	facts     []fact
	ends      []fact // indicated endpoints
	kindKey   string // that states the kind of the endpoints, or a kind itself
	kindTexts []string
	preamble  schemas.Lines
	sep       byte
	stack     schemas.Stack
	wide      []string
	footer    schemas.Footer
	firstLn   string
	evidence  []string
	rows      []int // of the header
}

// Propose makes a draft for the dump; name is its path. The TOML always
// parses; report says whether it reads the dump. The error is ErrNoTable, or
// tells why the bytes are no text.
func Propose(data []byte, name string) (toml []byte, report Report, err error) {
	d := &draft{data: data, name: name}
	if err := d.decode(); err != nil {
		return nil, Report{}, err
	}
	if !d.chooseDialect() {
		return nil, Report{}, ErrNoTable
	}
	d.findLayout()
	d.nameColumns()
	d.findFacts()
	d.findFooter()
	d.findEvidence()
	toml, err = d.settle()
	return toml, d.report, err
}

// settle writes the draft and reads the dump with it. A fact that keeps the
// dump from being read is taken out and left to the person.
func (d *draft) settle() ([]byte, error) {
	for range 1 + len(d.facts) + len(d.ends) {
		toml := d.write()
		s, err := schemas.Parse("draft.toml", toml)
		if err != nil {
			return nil, fmt.Errorf("the dump has no volume and reading that could be told apart: %w", err)
		}
		runs, _, problems := ingest.Read(d.data, d.name, []*schemas.Schema{s})
		d.report.Runs, d.report.Readings, d.report.Problems = len(runs), 0, problems
		for i := range runs {
			d.report.Readings += len(runs[i].Readings)
		}
		if len(problems) == 0 || !d.dropFact(problems[0]) {
			return toml, nil
		}
	}
	return d.write(), nil
}

// dropFact takes out the fact that a problem is about.
func (d *draft) dropFact(p *schemas.Problem) bool {
	for _, list := range []*[]fact{&d.facts, &d.ends} {
		for i := range *list {
			f := &(*list)[i]
			if f.out != "" || f.name != p.Field && !(f.name == "indicated" && strings.HasPrefix(p.Field, "indicated")) {
				continue
			}
			f.out = p.Msg
			d.unsure("%s (%q) was left out: %s", f.name, f.key, p.Msg)
			return true
		}
	}
	return false
}

func (d *draft) unsure(format string, values ...any) {
	d.report.Unsure = append(d.report.Unsure, fmt.Sprintf(format, values...))
}

func (d *draft) choose(what, chosen, why, runnerUp string) {
	d.report.Choices = append(d.report.Choices, Choice{what, chosen, why, runnerUp})
}
