package night

import (
	"maps"
	"slices"
	"sort"
	"strings"

	"lastdrop/report"
)

// assemble makes the night: evaluations and unread in the order of dump, then
// run; the days of the runs; the schemas that read them; what was passed over.
func assemble(found *findings, all *yield, o Options) *report.Night {
	outcomes := all.outcomes
	n := &report.Night{
		Lastdrop: o.Lastdrop, Date: o.Date, Laboratory: o.Laboratory, Estimator: o.Estimator,
		Evaluations: join(outcomes), Limits: o.Limits, OtherFiles: found.others + all.others,
		Excluded: found.excluded + all.excluded, Links: found.links, Specials: found.specials,
	}
	dumps := map[string]string{}
	for i := range outcomes {
		if !outcomes[i].dump.named { // who picks files leaves others out
			dumps[outcomes[i].dump.name] = outcomes[i].sha
		}
	}
	n.Gaps = gaps(dumps, slices.Sorted(maps.Keys(named(dumps, found.names, all.names))))
	for i := range outcomes {
		out := &outcomes[i]
		n.Unread = append(n.Unread, out.unread...)
		if out.waits != "" {
			n.Waiting = append(n.Waiting, report.Waiting{Record: report.Record, Dump: out.dump.name, Says: out.waits})
		}
	}
	for i := range n.Evaluations {
		stamp(&n.Evaluations[i], o)
	}
	sort.SliceStable(n.Unread, func(i, j int) bool { return before(&n.Unread[i], &n.Unread[j]) })
	n.FirstDay, n.LastDay = days(n.Evaluations)
	n.Schemas = schemasUsed(n.Evaluations, o.Origins)
	n.Invented = invented(n.Schemas)
	return n
}

// named are all names that were met, each once.
func named(dumps map[string]string, others ...[]string) map[string]bool {
	all := map[string]bool{}
	for name := range dumps {
		all[name] = true
	}
	for _, names := range others {
		for _, name := range names {
			all[name] = true
		}
	}
	return all
}

// stamp fills what belongs to the publication. Without a ledger every run is
// new, and every dispute is open.
func stamp(e *report.Evaluation, o Options) {
	e.Record, e.Revision, e.State, e.Lastdrop = report.Record, 1, "new", o.Lastdrop
	e.Open = e.Verdict == report.VerdictDisputed
	if e.Endpoints == nil {
		e.Endpoints = []report.Endpoint{}
	}
}

func before(a, b *report.Unread) bool {
	switch {
	case a.Dump != b.Dump:
		return a.Dump < b.Dump
	case a.Run != b.Run:
		return a.Run < b.Run
	case a.Line != b.Line:
		return a.Line < b.Line
	}
	return a.Column < b.Column
}

// settle orders the flags, heaviest first, then by concern, then by endpoint,
// and gives the verdict.
func settle(e *report.Evaluation) {
	sort.SliceStable(e.Flags, func(i, j int) bool {
		a, b := &e.Flags[i], &e.Flags[j]
		if weigh(a.Weight) != weigh(b.Weight) {
			return weigh(a.Weight) > weigh(b.Weight)
		}
		if ca, cb := report.Concern(a.Flag), report.Concern(b.Flag); ca != cb {
			return ca < cb
		}
		return a.Endpoint < b.Endpoint
	})
	e.Verdict = verdict(e.Flags)
}

func verdict(flags []report.Flag) report.Verdict {
	heaviest := 0
	for i := range flags {
		heaviest = max(heaviest, weigh(flags[i].Weight))
	}
	switch heaviest {
	case 2:
		return report.VerdictDisputed
	case 1:
		return report.VerdictDoubtful
	}
	return report.VerdictSound
}

func weigh(w report.Weight) int {
	switch w {
	case report.Disputed:
		return 2
	case report.Doubtful:
		return 1
	}
	return 0
}

// days returns the first and the last day on which a run began, "" when none
// says so.
func days(evaluations []report.Evaluation) (first, last string) {
	const length = len("2031-04-02")
	for i := range evaluations {
		started := evaluations[i].Facts.Started
		if len(started) < length {
			continue
		}
		day := started[:length]
		if first == "" || day < first {
			first = day
		}
		if day > last {
			last = day
		}
	}
	return first, last
}

func schemasUsed(evaluations []report.Evaluation, origins map[string]string) []report.SchemaUse {
	runs := map[report.SchemaUse]int{}
	for i := range evaluations {
		runs[report.SchemaUse{Name: evaluations[i].Schema, SHA256: evaluations[i].SchemaSHA256}]++
	}
	used := make([]report.SchemaUse, 0, len(runs))
	for s, n := range runs {
		s.Runs, s.From = n, origins[s.SHA256]
		used = append(used, s)
	}
	sort.Slice(used, func(i, j int) bool {
		a, b := used[i], used[j]
		return a.Name < b.Name || a.Name == b.Name && a.SHA256 < b.SHA256
	})
	return used
}

// invented is true when a shipped schema of the demonstration laboratory's
// benches read a run. Those instruments are invented, so are their figures.
func invented(used []report.SchemaUse) bool {
	for _, s := range used {
		if strings.HasPrefix(s.Name, "bench-") && (s.From == "" || s.From == report.Shipped) {
			return true
		}
	}
	return false
}
