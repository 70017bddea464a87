package report

import (
	"math"
	"sort"
)

// Urgent returns the evaluations that somebody must look at, most urgent
// first: disputed before doubtful; then those whose refit and indicated
// endpoint differ by more than the limit, the most first; then by the concern
// of the heaviest flag; then in the night's own order.
func (n *Night) Urgent() []*Evaluation {
	var urgent []*Evaluation
	for i := range n.Evaluations {
		if n.Evaluations[i].Verdict != VerdictSound {
			urgent = append(urgent, &n.Evaluations[i])
		}
	}
	sort.SliceStable(urgent, func(i, j int) bool { return urgent[i].MoreUrgent(urgent[j]) })
	return urgent
}

// MoreUrgent is the order of Urgent for two evaluations; sound ones and
// unknown verdicts have their place in it too.
func (e *Evaluation) MoreUrgent(than *Evaluation) bool {
	if a, b := rank(e.Verdict), rank(than.Verdict); a != b {
		return a > b
	}
	if a, b := e.apart(), than.apart(); a != b && (a > 1 || b > 1) {
		return a > b
	}
	return e.concern() < than.concern()
}

// rank orders verdicts; an unknown one counts as disputed.
func rank(v Verdict) int {
	switch v {
	case VerdictSound:
		return 0
	case VerdictDoubtful:
		return 1
	}
	return 2
}

// apart is the largest difference of like kinds in agreement limits, 0
// without one.
func (e *Evaluation) apart() float64 {
	most := 0.0
	for i := range e.Endpoints {
		if d := e.Endpoints[i].Differs; d != nil && d.LimitML > 0 {
			most = math.Max(most, math.Abs(d.ML)/d.LimitML)
		}
	}
	return most
}

func (e *Evaluation) concern() int {
	if f := e.Heaviest(); f != nil {
		return Concern(f.Flag)
	}
	return len(flagWords)
}

// Heaviest returns the flag that heads a run's page; nil without flags.
func (e *Evaluation) Heaviest() *Flag {
	if len(e.Flags) == 0 {
		return nil
	}
	return &e.Flags[0]
}

// ProcedureCount counts the runs of one procedure by verdict.
type ProcedureCount struct {
	Procedure                 string // "" for runs that state none
	Disputed, Doubtful, Sound int
}

// Runs is the number of runs of the procedure.
func (p ProcedureCount) Runs() int { return p.Disputed + p.Doubtful + p.Sound }

// Procedures counts by procedure, in the order of their names; runs that
// state none come last.
func (n *Night) Procedures() []ProcedureCount {
	at, counts := map[string]int{}, []ProcedureCount(nil)
	for i := range n.Evaluations {
		e := &n.Evaluations[i]
		k, known := at[e.Facts.Procedure]
		if !known {
			k = len(counts)
			at[e.Facts.Procedure] = k
			counts = append(counts, ProcedureCount{Procedure: e.Facts.Procedure})
		}
		counts[k].add(e.Verdict)
	}
	sort.Slice(counts, func(i, j int) bool {
		a, b := counts[i].Procedure, counts[j].Procedure
		if a == "" || b == "" {
			return b == "" && a != ""
		}
		return a < b
	})
	return counts
}

func (p *ProcedureCount) add(v Verdict) {
	switch v {
	case VerdictDisputed:
		p.Disputed++
	case VerdictDoubtful:
		p.Doubtful++
	default:
		p.Sound++
	}
}
