package report

import (
	"strings"
	"testing"
)

func told(id, procedure string, v Verdict, flags ...string) Evaluation {
	e := Evaluation{ID: id, Verdict: v}
	e.Facts.Procedure = procedure
	for _, f := range flags {
		e.Flags = append(e.Flags, Flag{Flag: f})
	}
	return e
}

// The order of concern is that of the flags: disagrees before stops-short
// before overshoot; disputed before doubtful; equals in the night's order.
func TestUrgent(t *testing.T) {
	n := Night{Evaluations: []Evaluation{
		told("a", "", VerdictDoubtful, "wide-bracket"), told("b", "", VerdictSound), told("c", "", VerdictDisputed, "overshoot"), told("d", "", VerdictDisputed, "overshoot"),
		told("e", "", VerdictDisputed, "disagrees", "overshoot"), told("f", "", VerdictDisputed, "stops-short"), told("g", "", VerdictDoubtful, "overshoot"), told("h", "", VerdictDisputed, "unknown"),
	}}
	var got []string
	for _, e := range n.Urgent() {
		got = append(got, e.ID)
	}
	if s := strings.Join(got, ""); s != "efcdhga" {
		t.Errorf("got %s, want efcdhga", s)
	}
}

func TestProcedures(t *testing.T) {
	n := Night{Evaluations: []Evaluation{told("a", "", VerdictSound), told("b", "vinegar", VerdictDisputed), told("c", "brine", VerdictDoubtful), told("d", "vinegar", VerdictSound), told("e", "vinegar", VerdictSound)}}
	got := n.Procedures()
	want := []ProcedureCount{{"brine", 0, 1, 0}, {"vinegar", 1, 0, 2}, {"", 0, 0, 1}}
	if len(got) != 3 || got[0] != want[0] || got[1] != want[1] || got[2] != want[2] {
		t.Errorf("got %+v, want %+v", got, want)
	}
	if got[1].Runs() != 3 {
		t.Errorf("vinegar has %d runs, want 3", got[1].Runs())
	}
}

func TestHeadline(t *testing.T) {
	night := func(disputed, doubtful, sound, unread int) *Night {
		n := &Night{Unread: make([]Unread, unread)}
		for verdict, count := range map[Verdict]int{VerdictDisputed: disputed, VerdictDoubtful: doubtful, VerdictSound: sound} {
			for i := 0; i < count; i++ {
				n.Evaluations = append(n.Evaluations, Evaluation{Verdict: verdict})
			}
		}
		return n
	}
	for _, c := range []struct {
		n          *Night
		must, rest string
	}{
		{night(4, 6, 50, 3), "Four runs must be settled, six need a look, three are unread.", "50 of 60 runs carry no objection, which is not an approval. What is unread has no result."},
		{night(1, 1, 1, 1), "One run must be settled, one needs a look, one is unread.", "One of three runs carries no objection, which is not an approval. What is unread has no result."},
		{night(13, 0, 0, 0), "13 runs must be settled.", "No run is without objection."},
		{night(0, 1, 1, 0), "One run needs a look.", "One of two runs carries no objection, which is not an approval."},
		{night(0, 0, 12, 0), "Nothing to settle: all twelve runs are sound.", "All twelve runs carry no objection, which is not an approval."},
		{night(0, 0, 1, 0), "Nothing to settle: the one run is sound.", "The run carries no objection, which is not an approval."},
		{night(0, 0, 1, 1), "One dump or run is unread.", "The run carries no objection, which is not an approval. What is unread has no result."},
		{night(0, 0, 0, 2), "No run could be read, two are unread.", "What is unread has no result."},
		{night(0, 0, 0, 0), "There was no run to read.", "Nothing is to be done."},
	} {
		if must, rest := c.n.Headline(); must != c.must || rest != c.rest {
			t.Errorf("got %q, %q\nwant %q, %q", must, rest, c.must, c.rest)
		}
	}
}

func TestDaysAndMoments(t *testing.T) {
	for _, c := range [][2]string{
		{Day("2031-04-02"), "2 April 2031"}, {Day("yesterday"), "yesterday"}, {Day(""), ""},
		{Moment("2031-04-02T08:14:00+02:00"), "2 April 2031, 08:14 +02:00"}, {Moment("2031-04-02T09:40:12"), "2 April 2031, 09:40:12"}, {Moment("soon"), "soon"},
		{(&Night{}).Days(), ""}, {(&Night{FirstDay: "2031-04-02", LastDay: "2031-04-02"}).Days(), "runs of 2 April 2031"},
		{(&Night{FirstDay: "2031-03-31", LastDay: "2031-04-02"}).Days(), "runs of 31 March 2031 to 2 April 2031"},
	} {
		if c[0] != c[1] {
			t.Errorf("got %q, want %q", c[0], c[1])
		}
	}
}

func TestLineList(t *testing.T) {
	for want, lines := range map[string][]int{
		"": nil, "line 42": {42}, "lines 42 and 43": {43, 42}, "lines 18 to 21": {18, 19, 20, 21}, "lines 18 to 20, 31 and 40": {40, 18, 19, 20, 31}, "line 7": {7, 7},
	} {
		given := append([]int(nil), lines...)
		if got := LineList(lines); got != want {
			t.Errorf("%v: got %q, want %q", lines, got, want)
		}
		for i := range lines {
			if lines[i] != given[i] {
				t.Errorf("%v was sorted in place", given)
			}
		}
	}
}

func TestKindMarks(t *testing.T) {
	for _, k := range Kinds() {
		if f, o := KindMark(k.Kind, true), KindMark(k.Kind, false); f != k.Filled || o != k.Open || f == o {
			t.Errorf("%s: got %s and %s", k.Kind, f, o)
		}
	}
	if got := KindMark("new kind", true); got != "×" {
		t.Errorf("unknown kind: got %s", got)
	}
}
