package night

import (
	"context"
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"runtime"

	"golang.org/x/sync/errgroup"

	"lastdrop/report"
)

// outcome is what one dump gave: evaluations and unread runs, or a reason to
// wait.
type outcome struct {
	dump        dump
	evaluations []report.Evaluation
	readings    []digest // of each evaluation
	unread      []report.Unread
	waits       string // "" when it was read
}

// evaluate reads and refits every dump, several at once. Outcomes stand in
// the order of the dumps, whoever finished first. The raw bytes are dropped
// dump by dump.
func evaluate(ctx context.Context, dumps []dump, o Options) ([]outcome, error) {
	outcomes := make([]outcome, len(dumps))
	var g errgroup.Group
	g.SetLimit(workers(o))
	for i := range dumps {
		if ctx.Err() != nil {
			break
		}
		g.Go(func() error {
			outcomes[i] = evaluateOne(dumps[i], o)
			return nil
		})
	}
	if err := g.Wait(); err != nil {
		return nil, err
	}
	if ctx.Err() != nil {
		return nil, context.Cause(ctx)
	}
	return outcomes, nil
}

func workers(o Options) int {
	if o.Workers > 0 {
		return o.Workers
	}
	return runtime.GOMAXPROCS(0)
}

func evaluateOne(d dump, o Options) outcome {
	out := outcome{dump: d}
	data, waits, problem := d.read(o)
	switch {
	case waits != "":
		out.waits = waits
	case problem != nil:
		out.unread = stampedUnread([]report.Unread{*problem}, d.name, "")
	default:
		out.refit(data, o)
	}
	return out
}

// refit fills the outcome from the bytes of its dump.
func (out *outcome) refit(data []byte, o Options) {
	sha := sha(data)
	evaluations, unread := safely(o.Refit, data, out.dump.name, sha)
	if len(evaluations)+len(unread) == 0 {
		unread = []report.Unread{{Says: "holds no run", Hint: "check that it is the export of a titration"}}
	}
	out.unread = stampedUnread(unread, out.dump.name, sha)
	out.readings = make([]digest, len(evaluations))
	for i := range evaluations {
		e := &evaluations[i]
		e.ID, out.readings[i] = identify(e)
		e.AsRead = nil
	}
	out.evaluations = evaluations
}

func sha(data []byte) string {
	sum := sha256.Sum256(data)
	return hex.EncodeToString(sum[:])
}

// safely keeps a mistake of this program that one dump brings to light from
// taking the other dumps of the night with it: the dump is unread.
func safely(refit Refit, data []byte, name, sha string) (evaluations []report.Evaluation, unread []report.Unread) {
	defer func() {
		if p := recover(); p != nil {
			evaluations = nil
			unread = []report.Unread{{Says: fmt.Sprintf("this program made a mistake on it: %v", p),
				Hint: "keep the dump and report the mistake with it; titrate nothing again for it"}}
		}
	}()
	return refit(data, name, sha)
}

// stampedUnread fills what a dump's own reading cannot know.
func stampedUnread(unread []report.Unread, name, sha string) []report.Unread {
	for i := range unread {
		u := &unread[i]
		u.Record, u.State, u.Dump, u.DumpSHA256 = report.Record, "new", name, sha
	}
	return unread
}
