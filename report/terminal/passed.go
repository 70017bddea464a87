package terminal

import (
	"strconv"
	"strings"

	"lastdrop/report"
)

// passedNamed is how many names a sentence of the mail has before it counts.
const passedNamed = 4

// passed tells what the sweep met and did not read, and the run numbers that
// no file bears.
func (p *page) passed(n *report.Night) {
	p.passedNames(n.Links, "symbolic link was not followed", "symbolic links were not followed")
	p.passedNames(n.Specials, "pipe, socket or device was not opened", "pipes, sockets or devices were not opened")
	if n.Excluded > 0 {
		p.blank()
		p.sentence(plain, "", report.Upper(report.Some(n.Excluded, "dump was", "dumps were"))+" left out by --include and --exclude.")
	}
	p.gaps(n.Gaps)
	p.ownSchemas(n.Schemas)
}

func (p *page) passedNames(names []string, one, many string) {
	if len(names) == 0 {
		return
	}
	p.blank()
	p.sentence(plain, "", report.Upper(report.Some(len(names), one, many))+": "+someOf(names)+".")
}

// someOf names the first and counts the others.
func someOf(names []string) string {
	var said []string
	for _, name := range names[:min(len(names), passedNamed)] {
		said = append(said, Shorten(name, 60))
	}
	if more := len(names) - passedNamed; more > 0 {
		said = append(said, "and "+strconv.Itoa(more)+" more")
	}
	return strings.Join(said, ", ")
}

func (p *page) gaps(gaps []report.Gap) {
	if len(gaps) == 0 {
		return
	}
	missing, names := 0, make([]string, len(gaps))
	for i, g := range gaps {
		missing += g.Count
		names[i] = g.Name
	}
	p.blank()
	p.sentence(plain, "", report.Upper(report.Some(missing, "run number is", "run numbers are"))+" missing between the dumps: "+someOf(names)+
		". Aborted, or an export that is lost?")
}

// ownSchemas names the schemas that stand in the place of shipped ones.
func (p *page) ownSchemas(schemas []report.SchemaUse) {
	var names []string
	for _, s := range schemas {
		if s.From == report.ReplacesShipped {
			names = append(names, s.Name)
		}
	}
	if len(names) == 0 {
		return
	}
	p.blank()
	p.sentence(plain, "", "Read with the laboratory's own schema in the place of the shipped one: "+someOf(names)+".")
}
