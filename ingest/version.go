package ingest

import (
	"fmt"

	"lastdrop/ingest/match"
	"lastdrop/schemas"
)

// Versions of a schema have one name and different first days. The start of a
// run says which one holds; nothing else does.

// readVersions reads a dump that several versions of one schema fit. The
// version is that of the day on which the runs were started; where that cannot
// be told the dump is unread.
func readVersions(found match.Found, path string) ([]Run, *schemas.Schema, []*schemas.Problem) {
	var valid *reader
	days := ""
	for i, s := range found.Versions {
		next := ""
		for _, other := range found.Versions { // the first day of the version after this one
			if other.ValidFrom > s.ValidFrom && (next == "" || other.ValidFrom < next) {
				next = other.ValidFrom
			}
		}
		if i > 0 {
			days += " and "
		}
		days += dayOf(s)
		r := readWith(s, found.Text(s), path)
		if len(r.runs) == 0 || !r.startsIn(s.ValidFrom, next) {
			continue
		}
		if valid != nil {
			valid = nil
			break
		}
		valid = r
	}
	if valid == nil {
		return nil, nil, []*schemas.Problem{{Path: path, Line: 1, Col: 1, Field: "schema",
			Msg:  fmt.Sprintf("which version of schema %s holds cannot be told (%s)", found.Versions[0].Name, days),
			Hint: "every run of the dump must state when it was started, and all in the time of one version"}}
	}
	return valid.runs, valid.schema, valid.problems
}

func dayOf(s *schemas.Schema) string {
	if s.ValidFrom == "" {
		return "always"
	}
	return "from " + s.ValidFrom
}

// startsIn reports whether every run was started on or after one day and, when
// next is not "", before another. Days are those of the dump's own clock.
func (r *reader) startsIn(first, next string) bool {
	for i := range r.runs {
		day := r.runs[i].Facts.Started
		if day == "" || day[:len("2006-01-02")] < first || next != "" && day[:len("2006-01-02")] >= next {
			return false
		}
	}
	return true
}

// checkVersion refuses runs that were started before the schema holds.
func (r *reader) checkVersion() {
	first := r.schema.ValidFrom
	if first == "" {
		return
	}
	kept := r.runs[:0]
	for _, run := range r.runs {
		day := run.Facts.Started
		if day == "" || day[:len(first)] >= first {
			kept = append(kept, run)
			continue
		}
		p := &schemas.Problem{Path: r.path, Line: run.Line, Field: "started", Msg: fmt.Sprintf("%s, before schema %s holds (from %s)", day, r.schema.Name, first), Hint: "add the version of the schema for that time"}
		if r.schema.Layout != schemas.Single {
			p.Run = run.Number
		}
		r.problems = append(r.problems, p)
	}
	r.runs = kept
}
