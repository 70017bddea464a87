package demo

import (
	"fmt"
	"strings"
	"testing"

	"lastdrop/cmd/internal/refit"
	"lastdrop/report"
	"lastdrop/schemas"
)

// What must be reached on other seeds than the shipped one.
const (
	foundFaults = 0.95 // of the planted faults
	soundRuns   = 0.98 // of the clean runs
)

// tally counts what came out as meant.
type tally struct {
	good, all int
	wrong     []string
}

func (c *tally) add(good bool, says string) {
	c.all++
	if good {
		c.good++
	} else if len(c.wrong) < 20 {
		c.wrong = append(c.wrong, says)
	}
}

func (c *tally) part() float64 { return float64(c.good) / float64(c.all) }

// Every fault of the shipped laboratory must get the flag that its README
// names, or a clean run no objection; on further seeds nearly all. What
// depends on a second dump (same-readings, exported-again) belongs to the
// night and is not looked for here.
func TestFaultsAreFound(t *testing.T) {
	var faults, clean tally
	sweepSeed(t, DefaultSeed, &faults, &clean)
	if faults.good < faults.all || clean.good < clean.all {
		t.Errorf("shipped: %d of %d faults, %d of %d clean runs as meant:\n%s", faults.good, faults.all, clean.good, clean.all,
			strings.Join(append(faults.wrong, clean.wrong...), "\n"))
	}
	faults, clean = tally{}, tally{}
	for seed := DefaultSeed + 1; seed <= DefaultSeed+lawSeeds; seed++ {
		sweepSeed(t, seed, &faults, &clean)
	}
	t.Logf("%d further seeds: %d of %d faults, %d of %d clean runs as meant", lawSeeds, faults.good, faults.all, clean.good, clean.all)
	if faults.part() < foundFaults || clean.part() < soundRuns {
		t.Errorf("%d of %d faults, %d of %d clean runs as meant, for example:\n%s", faults.good, faults.all, clean.good, clean.all,
			strings.Join(append(faults.wrong, clean.wrong...), "\n"))
	}
}

// sweepSeed refits one laboratory.
func sweepSeed(t *testing.T, seed uint64, faults, clean *tally) {
	t.Helper()
	files, planted, err := Files(seed)
	if err != nil {
		t.Fatal(err)
	}
	done := map[string]report.Evaluation{}
	for _, f := range files {
		if dump, ok := strings.CutPrefix(f.Path, "dumps/"); ok {
			found, _ := refit.Dump(f.Data, dump, "", schemas.Shipped(), refit.Options{})
			for _, e := range found {
				done[fmt.Sprint(dump, e.Run)] = e
			}
		}
	}
	for _, p := range planted {
		e, read := done[fmt.Sprint(p.Dump, max(p.Run, 1))]
		says := fmt.Sprintf("seed %d %s: %s, flags %s", seed, where(p), e.Verdict, flagList(e))
		switch p.Expect {
		case ExpectSound:
			clean.add(read && e.Verdict == report.VerdictSound, says)
		case ExpectUnread:
			faults.add(!read, says)
		case ExpectFlagged:
			if p.Fault != SameReadings && p.Fault != ExportedAgain {
				faults.add(read && flagged(e, p), says)
			}
		}
	}
}

// flagged says whether a run has the flag meant, and stays sound if that is a
// note.
func flagged(e report.Evaluation, p Planted) bool {
	if p.Weight == report.Note && e.Verdict != report.VerdictSound {
		return false
	}
	for _, f := range e.Flags {
		if f.Flag == p.Flag {
			return f.Weight == p.Weight || f.Weight == report.Disputed
		}
	}
	return false
}

// flagList prints the flags of an evaluation.
func flagList(e report.Evaluation) string {
	words := make([]string, len(e.Flags))
	for i, f := range e.Flags {
		words[i] = fmt.Sprintf("%s (%s, %.3g against %.3g %s)", f.Flag, f.Weight, f.Figure, f.Limit, f.Unit)
	}
	return strings.Join(words, ", ")
}
