// Package refit turns the bytes of one dump into evaluations. It is a pure
// function of the bytes, the schemas and the options: no clock, no file, no
// other run is looked at.
//
// Data flow: dump.go reads and refits run by run, curve.go gives fit its
// numbers, evaluation.go takes its answers into the record, says.go puts
// flags into sentences, picture.go keeps what a page draws.
package refit

import (
	"fmt"

	"lastdrop/fit"
	"lastdrop/ingest"
	"lastdrop/report"
	"lastdrop/schemas"
)

// Options are what a user may ask of every refit.
type Options struct {
	Estimator string // "" for the usual choice, else one of Estimators()
	Lastdrop  string // program version, printed in each evaluation
}

// Estimators are the names that Options.Estimator may have.
func Estimators() []string { return fit.Estimators() }

// Dump reads one dump with the schemas and refits every run in it. name is
// the dump's name in the record, sha its SHA-256 in hex. Evaluations have
// everything but what depends on other dumps (ID, Also, same-readings,
// exported-again). A dump or run that cannot be read, or whose readings no
// estimator can use, is in unread.
func Dump(data []byte, name, sha string, set []*schemas.Schema, o Options) (done []report.Evaluation, unread []report.Unread) {
	runs, schema, problems := ingest.Read(data, name, set)
	for _, p := range problems {
		unread = append(unread, unreadOf(p, schema))
	}
	for i := range runs {
		run := &runs[i]
		curve := curveOf(run)
		result, err := fit.Evaluate(curve, o.Estimator, fit.Defaults())
		if err != nil {
			unread = append(unread, report.Unread{Run: run.Number, Line: run.Line, Says: err.Error(), Hint: noFitHint(o), Schema: schema.Name})
			continue
		}
		e := evaluation(run, curve, result)
		e.Record, e.Revision, e.State, e.Lastdrop = report.Record, 1, "new", o.Lastdrop
		e.Dump, e.DumpSHA256 = name, sha
		e.Schema, e.SchemaSHA256 = schema.Name, schema.SHA256
		done = append(done, e)
	}
	return done, unread
}

func noFitHint(o Options) string {
	if o.Estimator != "" {
		return fmt.Sprintf("run again without --estimator %s, or only on dumps that it applies to", o.Estimator)
	}
	return "check that the dump holds a whole titration curve"
}

func unreadOf(p *schemas.Problem, s *schemas.Schema) report.Unread {
	u := report.Unread{Run: p.Run, Line: p.Line, Column: p.Col, Field: p.Field, Says: p.Msg, Hint: p.Hint, Next: p.Next}
	if s != nil {
		u.Schema = s.Name
	}
	return u
}
