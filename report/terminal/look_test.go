package terminal

import (
	"bytes"
	"flag"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
	"unicode"

	"lastdrop/ingest"
	"lastdrop/report"
)

var update = flag.Bool("update", false, "write the golden pages anew")

func look(t *testing.T, evs []report.Evaluation, unread []report.Unread, o Options) string {
	t.Helper()
	var b bytes.Buffer
	if err := Look(&b, evs, unread, o); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

func golden(t *testing.T, name, got string) {
	t.Helper()
	path := filepath.Join("testdata", name)
	if *update {
		if err := os.WriteFile(path, []byte(got), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	want, err := os.ReadFile(path)
	if err != nil {
		t.Fatalf("%v; write it with -update and look at it", err)
	}
	g, w := strings.Split(got, "\n"), strings.Split(string(want), "\n")
	for i := range g {
		if i >= len(w) || g[i] != w[i] {
			t.Fatalf("%s, line %d:\n got %s\nwant %s", name, i+1, g[i], append(w, "")[min(i, len(w))])
		}
	}
	if len(g) != len(w) {
		t.Fatalf("%s: %d lines, want %d", name, len(g), len(w))
	}
}

func TestLookPages(t *testing.T) {
	n := inventedNight()
	golden(t, "look.txt", look(t, n.Evaluations, n.Unread, Options{}))
	golden(t, "look-colour.txt", look(t, n.Evaluations[:1], nil, Options{Colour: true}))
	golden(t, "look-narrow.txt", look(t, n.Evaluations[2:3], n.Unread[:1], Options{Width: 46}))
}

var escape = regexp.MustCompile("\x1b\\[[0-9;]*m")

// Colours only support: without them the page is the same.
func TestColourTellsNothingAlone(t *testing.T) {
	n := inventedNight()
	coloured := look(t, n.Evaluations, n.Unread, Options{Colour: true})
	if !strings.Contains(coloured, "\x1b[38;5;32m") || !strings.Contains(coloured, "\x1b[1;38;5;166m") {
		t.Error("blue and warm are missing")
	}
	if got, want := escape.ReplaceAllString(coloured, ""), look(t, n.Evaluations, n.Unread, Options{}); got != want {
		t.Error("the page without colours differs")
	}
}

// hostile has texts of a dump that a terminal would obey or that are too wide.
func hostile() report.Evaluation {
	e := overshot()
	bad := "A\x1b]0;title\x07\x1b[2J\u202Eevil\r\n\u009b31m" + strings.Repeat("山long", 40)
	e.Facts = ingest.Facts{Sample: bad, Procedure: bad, Instrument: bad, Operator: bad, Purpose: bad, Started: bad, Titrant: bad, Reaction: bad,
		Other: []ingest.Fact{{Key: bad, Value: bad}}}
	e.Dump, e.Schema, e.ID, e.DumpSHA256, e.Lastdrop, e.Also, e.Repairs = bad, bad, bad, bad, bad, []string{bad}, []string{bad}
	e.Indicated[0].Kind, e.Endpoints[0].Kind, e.Endpoints[0].Estimator, e.Endpoints[0].Differs.Kind = bad, bad, bad, bad
	e.Endpoints[0].Estimates[0] = report.Estimate{Estimator: bad, Kind: bad}
	e.Flags[0].Flag, e.Flags[0].Says = bad, bad
	e.Picture.XName, e.Picture.YName, e.Picture.SlopeName = bad, bad, bad
	return e
}

func TestEveryLineFits(t *testing.T) {
	unread := []report.Unread{{Dump: "\x1b[2J" + strings.Repeat("x", 200), Line: 3, Field: "\x00", Says: strings.Repeat("says ", 50), Hint: strings.Repeat("do ", 50)}}
	for width := 40; width <= 160; width += 7 {
		for i, e := range append(inventedNight().Evaluations, hostile()) {
			for n, l := range strings.Split(look(t, []report.Evaluation{e, e}, unread, Options{Width: width}), "\n") {
				if got := cells(l); got > width {
					t.Errorf("run %d, width %d, line %d has %d columns: %s", i, width, n+1, got, l)
				}
				if at := strings.IndexFunc(l, func(r rune) bool { return unicode.In(r, unicode.Cc, unicode.Cf) }); at >= 0 {
					t.Errorf("run %d, width %d, line %d lets a control through: %q", i, width, n+1, l)
				}
			}
		}
	}
}

// A run that cannot be drawn is told all the same.
func TestNothingToDraw(t *testing.T) {
	for name, spoil := range map[string]func(*report.Evaluation){
		"no picture":   func(e *report.Evaluation) { e.Picture = nil },
		"no reading":   func(e *report.Evaluation) { e.Picture = &report.Picture{} },
		"one reading":  func(e *report.Evaluation) { e.Picture.Dots = e.Picture.Dots[:1] },
		"NaN":          func(e *report.Evaluation) { e.Picture.Dots[3].Value = math.NaN() },
		"infinite":     func(e *report.Evaluation) { e.Picture.Dots[3].VolumeML = math.Inf(1) },
		"absurd range": func(e *report.Evaluation) { e.Picture.Dots[3].Value = 1e308; e.Picture.Dots[4].Value = -1e308 },
	} {
		e := overshot()
		spoil(&e)
		got := look(t, []report.Evaluation{e}, nil, Options{})
		if !strings.Contains(got, "There is no curve to draw.") || !strings.Contains(got, e.Endpoints[0].Volume()+" mL, inflection by derivative") {
			t.Errorf("%s: the curve is drawn or the figures are lost", name)
		}
	}
	e := overshot()
	e.Endpoints[0].VolumeML, e.Picture.Curve[7].Y, e.Picture.Slope[3].Y = math.NaN(), math.Inf(-1), math.NaN()
	if got := look(t, []report.Evaluation{e}, nil, Options{}); !strings.Contains(got, "mL of sodium hydroxide") {
		t.Error("a figure that is no number hides the curve")
	}
}
