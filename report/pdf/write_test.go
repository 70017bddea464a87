package pdf

import (
	"bytes"
	"errors"
	"flag"
	"fmt"
	"io"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"lastdrop/report"
	"lastdrop/report/figure"
)

var update = flag.Bool("update", false, "rewrite the golden text of the pages")

func write(t *testing.T, n *report.Night, o Options) ([]byte, Result) {
	t.Helper()
	var b bytes.Buffer
	res, err := writeAll(&b, n, o)
	if err != nil {
		t.Fatal(err)
	}
	return b.Bytes(), res
}

// writeAll writes every volume, one behind the other.
func writeAll(w io.Writer, n *report.Night, o Options) (all Result, err error) {
	b, err := Plan(n, o)
	if err != nil {
		return all, err
	}
	for v := 1; v <= b.Volumes(); v++ {
		res, err := b.Write(w, v)
		if err != nil {
			return all, err
		}
		all.Pages += res.Pages
		all.Failed, all.Replaced = append(all.Failed, res.Failed...), append(all.Replaced, res.Replaced...)
	}
	return all, nil
}

func firstVolume(n *report.Night, o Options) (*document, error) {
	b, err := Plan(n, o)
	if err != nil {
		return nil, err
	}
	return b.volumes[0], nil
}

// texts draws a night and returns the texts of each page in the order of
// drawing.
func texts(t *testing.T, n *report.Night, o Options) [][]string {
	t.Helper()
	d, err := firstVolume(n, o)
	if err != nil {
		t.Fatal(err)
	}
	return pageTexts(t, d)
}

func pageTexts(t *testing.T, d *document) [][]string {
	t.Helper()
	var out [][]string
	s := figure.NewSheet(d.width, d.height)
	for i := range d.pages {
		if says := attempt(s, func() { d.pages[i].draw(s, i+1) }); says != "" {
			t.Fatalf("page %d: %s", i+1, says)
		}
		var page []string
		for _, b := range s.Boxes {
			if b.Kind == figure.AText {
				page = append(page, b.Name)
			}
		}
		out = append(out, page)
	}
	return out
}

// drawnTexts are the texts of all pages of a volume.
func drawnTexts(t *testing.T, d *document) (all []string) {
	t.Helper()
	for _, page := range pageTexts(t, d) {
		all = append(all, page...)
	}
	return all
}

// TestSameBytes: two writes of one night are the same file.
func TestSameBytes(t *testing.T) {
	for name, c := range nights() {
		if name == "large" { // has nothing that the others lack
			continue
		}
		a, _ := write(t, c.night, Options{Pages: c.pages})
		b, _ := write(t, c.night, Options{Pages: c.pages})
		if !bytes.Equal(a, b) {
			t.Errorf("%s: two writes differ", name)
		}
	}
}

// Which dumps wait depends on the clock, and a published file does not.
func TestWaitingIsNotPublished(t *testing.T) {
	n := demoNight()
	n.Waiting = nil
	a, _ := write(t, n, Options{})
	n.Waiting = []report.Waiting{{Record: 1, Dump: "bench-c/0007.csv", Says: "12 s old"}}
	b, _ := write(t, n, Options{})
	if !bytes.Equal(a, b) {
		t.Error("a dump that waits changes the pages")
	}
}

// TestGolden compares the words and figures of the demo's pages, not the file.
func TestGolden(t *testing.T) {
	var b strings.Builder
	for i, page := range texts(t, demoNight(), Options{}) {
		fmt.Fprintf(&b, "== page %d\n%s\n", i+1, strings.Join(page, "\n"))
	}
	path := filepath.Join("testdata", "pages.txt")
	if *update {
		if err := os.WriteFile(path, []byte(b.String()), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	want, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	if got := b.String(); got != string(want) {
		g, w := strings.Split(got, "\n"), strings.Split(string(want), "\n")
		for i := range min(len(g), len(w)) {
			if g[i] != w[i] {
				t.Fatalf("line %d: got %q, want %q", i+1, g[i], w[i])
			}
		}
		t.Fatalf("%d lines, want %d", len(g), len(w))
	}
}

// TestPlaces: who gets a page, and in which order: by verdict, then by the
// order of concern, whatever the night's own order.
func TestPlaces(t *testing.T) {
	n := demoNight()
	d, err := firstVolume(n, Options{})
	if err != nil {
		t.Fatal(err)
	}
	var order []string
	for _, i := range d.large {
		order = append(order, n.Evaluations[i].ID)
	}
	// disagrees and overshoot, whose endpoints lie apart, then no-endpoint; then wide-interval twice, dilution-unknown
	want := "51ad90c2b8f4 9f31c07a52de 0d4f6c28a1b5 77aa01b2c3d4 77aa01b2c3d4 c4d80b1e77a3"
	if got := strings.Join(order, " "); got != want {
		t.Errorf("order %s, want %s", got, want)
	}
}

// TestHeadlines: one sentence of what happened, one of what to do.
func TestHeadlines(t *testing.T) {
	night := func(settle, doubt, sounds, unread int) *report.Night {
		n := emptyNight()
		add := func(k int, v report.Verdict) {
			for range k {
				n.Evaluations = append(n.Evaluations, report.Evaluation{ID: "0123456789ab", Verdict: v, Dump: "bench-a/0001.csv"})
			}
		}
		add(settle, report.VerdictDisputed)
		add(doubt, report.VerdictDoubtful)
		add(sounds, report.VerdictSound)
		n.Unread = make([]report.Unread, unread)
		return n
	}
	for _, c := range []struct {
		night        *report.Night
		want, second string
	}{
		{night(4, 6, 50, 3), "Four runs must be settled, six need a look, three are unread.", "50 of 60 runs carry no objection, which is not an approval. What is unread has no result. Begin with run 0123456789ab."},
		{night(1, 0, 0, 0), "One run must be settled.", "No run is without objection. Begin with run 0123456789ab."},
		{night(0, 0, 9, 0), "Nothing to settle: all nine runs are sound.", "All nine runs carry no objection, which is not an approval."},
		{night(0, 0, 0, 0), "There was no run to read.", "Nothing is to be done."},
		{night(0, 0, 0, 2), "No run could be read, two are unread.", "What is unread has no result."},
	} {
		d, err := firstVolume(c.night, Options{})
		if err != nil {
			t.Fatal(err)
		}
		if got, second, _ := d.headline(); got != c.want || second != c.second {
			t.Errorf("headline %q, %q, want %q, %q", got, second, c.want, c.second)
		}
	}
}

// TestEmptyNight is one page that says so.
func TestEmptyNight(t *testing.T) {
	pages := texts(t, emptyNight(), Options{})
	if len(pages) != 1 || !strings.Contains(strings.Join(pages[0], "\n"), "There was no run to read.") {
		t.Errorf("%q", pages)
	}
}

// TestCautionsEverywhere: each page carries the caution, its number, what is
// invented, and the pages of a run their identity.
func TestCautionsEverywhere(t *testing.T) {
	for name, c := range nights() {
		if name == "large" {
			continue
		}
		pages := texts(t, c.night, Options{Pages: c.pages})
		for i, page := range pages {
			all := "\n" + strings.Join(page, "\n") + "\n"
			for _, want := range []string{report.Caution, fmt.Sprintf("page %d of %d", i+1, len(pages))} {
				if !strings.Contains(all, "\n"+want+"\n") {
					t.Errorf("%s, page %d lacks %q", name, i+1, want)
				}
			}
			if c.night.Invented != strings.Contains(all, "\n"+report.InventedNote+"\n") {
				t.Errorf("%s, page %d: the note on invented data is wrong", name, i+1)
			}
		}
	}
}

// TestOneForm: volume, interval and indicated endpoint of a run stand on its
// page in their one printed form, and nowhere in another. The figures are
// those of the fixture, rounded by hand.
func TestOneForm(t *testing.T) {
	n := emptyNight()
	n.Evaluations = []report.Evaluation{caustic()}
	pages := texts(t, n, Options{})
	all := strings.Join(pages[1], "\n")
	for _, want := range []string{"9.175", "9.163 to 9.187", "9.20", "−0.025", "−0.27 % of refit; limit 0.046 mL"} {
		if !strings.Contains(all, want) {
			t.Errorf("no %q on the page", want)
		}
	}
	for _, other := range regexp.MustCompile(`9\.1[678]\d*|9\.2\d*`).FindAllString(all, -1) {
		switch other {
		case "9.175", "9.163", "9.187", "9.20", "9.16", "9.17", "9.18", "9.19": // the last four are ticks
		default:
			t.Errorf("another form: %q", other)
		}
	}
	if front := strings.Join(pages[0], "\n"); !strings.Contains(front, "−0.27") {
		t.Error("the front page has another difference")
	}
}

// TestABrokenRunSpoilsOnePage: a curve that is not a number is replaced by a
// page with the run's facts; the others are as without it.
func TestABrokenRunSpoilsOnePage(t *testing.T) {
	for name, spoil := range map[string]func(*report.Evaluation){
		"reading":   func(e *report.Evaluation) { e.Picture.Dots[3].Value = math.NaN() },
		"volume":    func(e *report.Evaluation) { e.Picture.Dots[3].VolumeML = math.Inf(1) },
		"curve":     func(e *report.Evaluation) { e.Picture.Curve[100].Y = math.NaN() },
		"slope":     func(e *report.Evaluation) { e.Picture.Slope[100].Y = math.NaN() },
		"residual":  func(e *report.Evaluation) { e.Picture.Residuals[3].Y = math.Inf(-1) },
		"endpoint":  func(e *report.Evaluation) { e.Endpoints[0].VolumeML = math.NaN() },
		"interval":  func(e *report.Evaluation) { e.Endpoints[0].High95ML = math.NaN() },
		"indicated": func(e *report.Evaluation) { e.Indicated[0].VolumeML = math.NaN() },
		"absurd":    func(e *report.Evaluation) { e.Endpoints[0].VolumeML = 1e300 },
	} {
		n := demoNight()
		spoil(&n.Evaluations[0])
		file, res := write(t, n, Options{})
		if len(res.Failed) != 1 || !strings.Contains(res.Failed[0].What, "9f31c07a52de") || res.Failed[0].Says == "" {
			t.Errorf("%s: failed pages %v", name, res.Failed)
			continue
		}
		if bytes.Contains(file, []byte("NaN")) {
			t.Errorf("%s: NaN in the file", name)
		}
	}
}

// TestPanicIsKept: a page that panics is named with the place.
func TestPanicIsKept(t *testing.T) {
	s := figure.NewSheet(210, 297)
	says := attempt(s, func() { _ = (*document)(nil).n.Date })
	if !strings.Contains(says, "nil pointer") || !strings.Contains(says, " at lastdrop/report/pdf.") {
		t.Errorf("says %q", says)
	}
}

// TestFailurePage tells the run's facts.
func TestFailurePage(t *testing.T) {
	d, err := firstVolume(demoNight(), Options{})
	if err != nil {
		t.Fatal(err)
	}
	s := figure.NewSheet(d.width, d.height)
	p := page{what: "run x of y", facts: runFacts(&d.n.Evaluations[0])}
	if says := attempt(s, func() { d.drawFailure(s, 3, &p, strings.Repeat("because ", 200)) }); says != "" {
		t.Fatal(says)
	}
	all := ""
	for _, b := range s.Boxes {
		all += b.Name + "\n"
	}
	for _, want := range []string{"This page could not be drawn.", "sample VIN-0417, spirit vinegar", "run 9f31c07a52de, verdict disputed", report.Caution} {
		if !strings.Contains(all, want) {
			t.Errorf("no %q in %s", want, all)
		}
	}
}

// TestUnknownPages is refused before anything is written.
func TestUnknownPages(t *testing.T) {
	var b bytes.Buffer
	var option *OptionError
	if _, err := writeAll(&b, emptyNight(), Options{Pages: "some"}); !errors.As(err, &option) || b.Len() > 0 {
		t.Errorf("%v, %d bytes", err, b.Len())
	}
}

// TestReplacedSigns: what the fonts lack is shown as a sign and told.
func TestReplacedSigns(t *testing.T) {
	_, res := write(t, demoNight(), Options{})
	if len(res.Replaced) == 0 || !strings.Contains(strings.Join(res.Replaced, "\n"), "\uFFFD") {
		t.Errorf("replaced: %q", res.Replaced)
	}
	n := emptyNight()
	n.Evaluations = []report.Evaluation{overshot()}
	if _, res := write(t, n, Options{}); len(res.Replaced) > 0 {
		t.Errorf("replaced without a reason: %q", res.Replaced)
	}
}

// TestBytesAPage: no more than 12 kB a page with one set of fonts, also of a
// short night.
func TestBytesAPage(t *testing.T) {
	for name, n := range map[string]*report.Night{"40 runs": seedNight(), "demo": demoNight()} {
		file, res := write(t, n, Options{})
		if per := len(file) / res.Pages; per > 12_000 {
			t.Errorf("%s: %d bytes a page", name, per)
		}
	}
}

// TestNothingToDoIsOnePage: a night without anything to do is one page, with
// the pictures of its runs as long as they fit there.
func TestNothingToDoIsOnePage(t *testing.T) {
	for _, o := range []Options{{}, {Letter: true}} {
		for runs, pages := range map[int]int{0: 1, 9: 1, 60: 4} {
			n := emptyNight()
			if runs > 0 {
				n = soundNight(runs)
			}
			d, err := firstVolume(n, o)
			if err != nil {
				t.Fatal(err)
			}
			if got := len(d.pages); got != pages {
				t.Errorf("%d sound runs: %d pages, want %d", runs, got, pages)
			}
			all := strings.Join(drawnTexts(t, d), " ")
			if want := "Nothing"; !strings.Contains(all, want) {
				t.Errorf("%d sound runs: the page does not say %q", runs, want)
			}
			if runs > 0 && strings.Count(all, "VIN-") != runs {
				t.Errorf("%d sound runs: %d have a picture", runs, strings.Count(all, "VIN-"))
			}
		}
	}
}

// TestManyUnread: a folder of the wrong files does not bury the runs.
func TestManyUnread(t *testing.T) {
	n := demoNight()
	for i := range 200 {
		n.Unread = append(n.Unread, report.Unread{State: "new", Dump: fmt.Sprintf("wrong/%03d.csv", i), Says: "no schema fits"})
	}
	d, err := firstVolume(n, Options{})
	if err != nil {
		t.Fatal(err)
	}
	all := strings.Join(drawnTexts(t, d), " ")
	if want := "And 143 more, in the sheet Unread"; !strings.Contains(all, want) || strings.Count(all, "wrong/") != unreadMost-3 {
		t.Errorf("%d of the wrong files are listed, %q is told: %v", strings.Count(all, "wrong/"), want, strings.Contains(all, want))
	}
}
