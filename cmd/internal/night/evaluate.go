package night

import (
	"context"
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"runtime"
	"sort"

	"golang.org/x/sync/errgroup"

	"lastdrop/report"
)

// outcome is what one dump gave: evaluations and unread runs, or a reason to
// wait.
type outcome struct {
	dump        dump
	sha         string // of its bytes; "" when they were not read
	evaluations []report.Evaluation
	readings    []digest // of each evaluation
	unread      []report.Unread
	waits       string // "" when it was read
}

// yield is what a file gave: one outcome, or of an archive one for each dump
// in it.
type yield struct {
	outcomes         []outcome
	others, excluded int      // of the members of an archive
	names            []string // of all its members
}

// evaluate reads and refits every dump, several at once. Outcomes stand in
// the byte order of the names, whoever finished first. The raw bytes are
// dropped dump by dump.
func evaluate(ctx context.Context, dumps []dump, o Options) (all yield, err error) {
	yields := make([]yield, len(dumps))
	var g errgroup.Group
	g.SetLimit(workers(o))
	for i := range dumps {
		if ctx.Err() != nil {
			break
		}
		g.Go(func() error {
			if dumps[i].archive {
				yields[i] = dumps[i].unpack(ctx, o)
			} else {
				yields[i].outcomes = []outcome{evaluateOne(dumps[i], o)}
			}
			return nil
		})
	}
	if err := g.Wait(); err != nil {
		return yield{}, err
	}
	if ctx.Err() != nil {
		return yield{}, context.Cause(ctx)
	}
	for i := range yields {
		all.add(&yields[i])
	}
	sort.SliceStable(all.outcomes, func(i, j int) bool { return all.outcomes[i].dump.name < all.outcomes[j].dump.name })
	return all, nil
}

func (y *yield) add(more *yield) {
	y.outcomes = append(y.outcomes, more.outcomes...)
	y.others += more.others
	y.excluded += more.excluded
	y.names = append(y.names, more.names...)
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
	out.sha = sha
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
