package pdf

import (
	"io"
	"testing"

	"lastdrop/report"
	"lastdrop/report/figure"
)

// BenchmarkRunPage is one large page with everything on it, from the record to
// the compressed stream: a document of b.N such pages, so that what a document
// costs once is spread.
func BenchmarkRunPage(b *testing.B) {
	n := emptyNight()
	for range b.N {
		n.Evaluations = append(n.Evaluations, overshot())
	}
	b.ReportAllocs()
	b.ResetTimer()
	written := &counter{}
	res, err := writeAll(written, n, Options{})
	if err != nil || len(res.Failed) > 0 {
		b.Fatal(err, res.Failed)
	}
	b.ReportMetric(float64(written.n)/float64(res.Pages), "B/page")
}

// BenchmarkFrontPage is a whole document of one front page: fonts and all.
func BenchmarkFrontPage(b *testing.B) {
	n := demoNight()
	for i := range n.Evaluations {
		n.Evaluations[i].Verdict, n.Evaluations[i].Picture = report.VerdictSound, nil
	}
	b.ReportAllocs()
	for b.Loop() {
		if _, err := writeAll(io.Discard, n, Options{}); err != nil {
			b.Fatal(err)
		}
	}
}

// BenchmarkSmallPicture is one small picture, drawn and written.
func BenchmarkSmallPicture(b *testing.B) {
	n := soundNight(b.N)
	b.ReportAllocs()
	b.ResetTimer()
	if _, err := writeAll(io.Discard, n, Options{}); err != nil {
		b.Fatal(err)
	}
}

// BenchmarkDrawRunPage is the drawing alone, before any file format.
func BenchmarkDrawRunPage(b *testing.B) {
	n := emptyNight()
	n.Evaluations = []report.Evaluation{overshot()}
	d, err := firstVolume(n, Options{})
	if err != nil {
		b.Fatal(err)
	}
	s := figure.NewSheet(d.width, d.height)
	b.ReportAllocs()
	for b.Loop() {
		if says := attempt(s, func() { d.pages[1].draw(s, 2) }); says != "" {
			b.Fatal(says)
		}
	}
}

type counter struct{ n int }

func (c *counter) Write(p []byte) (int, error) { c.n += len(p); return len(p), nil }
