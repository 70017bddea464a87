package night

import (
	"strings"
	"testing"

	"lastdrop/report"
)

func TestSameRunUnderTwoNames(t *testing.T) {
	b := newBench(t, map[string]string{
		"b/0417.csv":      aRun("sample V-12", "started 2031-04-02T08:14:00+02:00"),
		"a/copy/0417.csv": aRun("sample V-12", "started 2031-04-02T06:14:00Z"), // the same moment
		"c/0417.csv":      aRun("sample V-12"),                                 // start absent on one side
		"d/other.csv":     aRunOf(13),
	})
	n := b.sweep().Night
	equal(t, "runs", len(n.Evaluations), 2)
	e := n.Evaluations[0]
	equal(t, "the first in byte order stands", e.Dump, "dumps/a/copy/0417.csv")
	equalLists(t, "also", e.Also, []string{"dumps/b/0417.csv", "dumps/c/0417.csv"})
	equal(t, "flags", len(e.Flags), 0)
	equal(t, "verdict", e.Verdict, report.VerdictSound)
}

func TestExportedAgainNamesEachDifference(t *testing.T) {
	b := newBench(t, map[string]string{
		"1.csv": aRun("sample V-12", "operator Analyst 1", "aliquot 50", "indicated 14.30"),
		"2.csv": aRun("sample V-12", "operator Analyst 2", "indicated 14.35"),
	})
	n := b.sweep().Night
	equal(t, "runs", len(n.Evaluations), 1)
	e := n.Evaluations[0]
	equal(t, "flags", len(e.Flags), 1)
	f := e.Flags[0]
	equal(t, "flag", f.Flag, "exported-again")
	equal(t, "figure", f.Figure, 2)
	equal(t, "says", f.Says, "dumps/2.csv, run 1, holds the same run with 2 other values (none is allowed): "+
		"indicated endpoint 14.35 mL (inflection) there, 14.30 mL (inflection) here; aliquot not stated there, 50 mL here.")
	equal(t, "verdict", e.Verdict, report.VerdictDisputed)
	equal(t, "open", e.Open, true)
}

func TestOperatorAloneIsNoDifference(t *testing.T) {
	b := newBench(t, map[string]string{
		"1.csv": aRun("sample V-12", "operator Analyst 1", "indicated 14.30"),
		"2.csv": aRun("sample V-12", "operator Analyst 2", "indicated 14.30"),
	})
	equal(t, "flags", len(b.sweep().Night.Evaluations[0].Flags), 0)
}

func TestSameReadingsStandOnBoth(t *testing.T) {
	b := newBench(t, map[string]string{
		"1.csv": aRun("sample V-12", "started 2031-04-02T08:14:00"),
		"2.csv": aRun("sample V-13", "started 2031-04-02T09:10:00"),
		"3.csv": aRunOf(14),
	})
	n := b.sweep().Night
	equal(t, "runs", len(n.Evaluations), 3)
	equal(t, "says of the first", n.Evaluations[0].Flags[0].Says,
		`All 2 readings (none may be) stand in dumps/2.csv, run 1, as sample "V-13", started 2 April 2031, 09:10 too; here they are of sample "V-12", started 2 April 2031, 08:14.`)
	equal(t, "says of the second", n.Evaluations[1].Flags[0].Says,
		`All 2 readings (none may be) stand in dumps/1.csv, run 1, as sample "V-12", started 2 April 2031, 08:14 too; here they are of sample "V-13", started 2 April 2031, 09:10.`)
	for i, want := range []report.Verdict{report.VerdictDisputed, report.VerdictDisputed, report.VerdictSound} {
		equal(t, n.Evaluations[i].Dump, n.Evaluations[i].Verdict, want)
	}
	if n.Evaluations[0].ID == n.Evaluations[1].ID {
		t.Error("two runs have one id")
	}
}

// A run without a sample belongs to the first that its readings agree with,
// and what joined it counts: V-13 cannot join a run that V-12 is in.
func TestAbsentSampleDoesNotJoinTwoSamples(t *testing.T) {
	b := newBench(t, map[string]string{
		"1.csv": aRun(),
		"2.csv": aRun("sample V-12"),
		"3.csv": aRun("sample V-13"),
	})
	n := b.sweep().Night
	equal(t, "runs", len(n.Evaluations), 2)
	equalLists(t, "also of the first", n.Evaluations[0].Also, []string{"dumps/2.csv"})
	equal(t, "the other", n.Evaluations[1].Dump, "dumps/3.csv")
	equal(t, "flag of the other", n.Evaluations[1].Flags[0].Flag, "same-readings")
}

func TestManyTwinsAreCounted(t *testing.T) {
	dumps := map[string]string{}
	for _, s := range []string{"A", "B", "C", "D", "E", "F"} {
		dumps[s+".csv"] = aRun("sample " + s)
	}
	says := newBench(t, dumps).sweep().Night.Evaluations[0].Flags[0].Says
	if !strings.Contains(says, `in dumps/D.csv, run 1, as sample "D"; and in 2 more too`) || strings.Contains(says, "dumps/E.csv") {
		t.Errorf("three are named and the rest is counted: got %s", says)
	}
}

func TestTwiceInOneDump(t *testing.T) {
	b := newBench(t, map[string]string{"1.csv": aRun("sample V-12") + aRun("sample V-12")})
	n := b.sweep().Night
	equal(t, "runs", len(n.Evaluations), 1)
	equalLists(t, "also", n.Evaluations[0].Also, []string{"dumps/1.csv"})
}

func TestMoments(t *testing.T) {
	for _, c := range []struct {
		a, b string
		want bool
	}{
		{"2031-04-02T08:14:00+02:00", "2031-04-02T06:14:00Z", true},
		{"2031-04-02T08:14:00+02:00", "2031-04-02T08:14:00Z", false},
		{"2031-04-02T08:14:00+02:00", "2031-04-02T08:14:00", true}, // one states no zone
		{"2031-04-02T08:14:00", "2031-04-02T08:15:00", false},
		{"2031-04-02T08:14:00", "", true},
	} {
		equal(t, c.a+" and "+c.b, sameMoment(c.a, c.b), c.want)
	}
}

func TestHeaviestFlagFirstGivesTheVerdict(t *testing.T) {
	b := newBench(t, map[string]string{
		"1.csv": aRunOf(1, "flag stuck note", "flag overshoot doubtful", "flag no-endpoint disputed", "flag disagrees disputed"),
		"2.csv": aRunOf(2, "flag stuck note"),
		"3.csv": aRunOf(3, "flag wide-interval doubtful"),
	})
	n := b.sweep().Night
	var flags []string
	for _, f := range n.Evaluations[0].Flags {
		flags = append(flags, f.Flag)
	}
	equalLists(t, "order", flags, []string{"disagrees", "no-endpoint", "overshoot", "stuck"})
	for i, want := range []report.Verdict{report.VerdictDisputed, report.VerdictSound, report.VerdictDoubtful} {
		equal(t, n.Evaluations[i].Dump, n.Evaluations[i].Verdict, want)
	}
}
