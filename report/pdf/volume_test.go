package pdf

import (
	"bytes"
	"fmt"
	"runtime"
	"slices"
	"strings"
	"testing"

	"lastdrop/report"
)

// manyNight has so many disputed and doubtful runs, and a few sound ones.
func manyNight(disputed, doubtful int) *report.Night {
	n := soundNight(5)
	for i := range disputed + doubtful {
		e := overshot()
		e.ID, e.Facts.Sample = fmt.Sprintf("%012x", i), fmt.Sprintf("MANY-%04d", i)
		if i >= disputed {
			e = caustic()
			e.ID = fmt.Sprintf("%012x", i)
		}
		n.Evaluations = append(n.Evaluations, e)
	}
	return n
}

// TestVolumes: 450 runs of a page each are volumes of 200, 200 and 50; page
// one tells where in which volume each stands.
func TestVolumes(t *testing.T) {
	b, err := Plan(manyNight(250, 200), Options{})
	if err != nil {
		t.Fatal(err)
	}
	var large []int
	for _, d := range b.volumes {
		large = append(large, len(d.large))
		if d.volume > 1 && len(d.small) > 0 && d.smallAt.volume != 3 {
			t.Errorf("small pictures stand in volume %d, want the last", d.smallAt.volume)
		}
	}
	if fmt.Sprint(large) != "[200 200 50]" || b.Volumes() != 3 {
		t.Errorf("got volumes of %v large pages, want 200, 200, 50", large)
	}
	first := b.volumes[0]
	for i, at := range b.runAt {
		if b.n.Evaluations[i].Verdict == report.VerdictSound {
			continue
		}
		d := b.volumes[at.volume-1]
		if what := d.pages[at.page-1].what; !strings.Contains(what, b.n.Evaluations[i].ID) {
			t.Fatalf("run %s should stand on page %d of volume %d, there is %q", b.n.Evaluations[i].ID, at.page, at.volume, what)
		}
	}
	if got := first.totals(); got[0].where != "page "+whole(b.runAt[5].page)+" to volume 2, page "+whole(b.runAt[254].page) {
		t.Errorf("disputed runs stand on %q", got[0].where)
	} else if want := "volume 3, page " + whole(b.smallAt.page); got[2].where != want {
		t.Errorf("sound runs stand on %q, want %q", got[2].where, want)
	}
}

// TestVolumesTell: front page and page numbers name the volumes.
func TestVolumesTell(t *testing.T) {
	b, err := Plan(manyNight(201, 0), Options{})
	if err != nil {
		t.Fatal(err)
	}
	for volume, want := range [][]string{
		{"The pages fill two volumes: this one and summary-2.pdf.", ", volume 1 of 2", "volume 2", "volume 2, page 3"},
		{"Volume 2 of 2: further runs of the night.", "Runs of this volume", "page 2 of 3, volume 2 of 2"},
	} {
		all := strings.Join(drawnTexts(t, b.volumes[volume]), " ")
		for _, w := range want {
			if !strings.Contains(all, w) {
				t.Errorf("volume %d does not tell %q", volume+1, w)
			}
		}
	}
	for _, d := range b.volumes { // the pages of runs are as in other nights
		d.pages = slices.DeleteFunc(d.pages, func(p page) bool { return p.what != "front page" })
	}
	for _, f := range b.Faults() {
		t.Error(f)
	}
}

func TestFileNames(t *testing.T) {
	for v, want := range map[int]string{1: "summary.pdf", 2: "summary-2.pdf", 12: "summary-12.pdf"} {
		if got := FileName(v); got != want || IsFurtherVolume(got) != (v > 1) {
			t.Errorf("volume %d: got %s, further %v, want %s", v, got, IsFurtherVolume(got), want)
		}
	}
	for _, other := range []string{"summary-1.pdf", "summary-0.pdf", "summary-02.pdf", "summary-.pdf", "summary-2.xlsx", "summary-x.pdf", "summary--2.pdf", "my summary-2.pdf", "summary-2.pdf.pdf", "summary-+2.pdf", ""} {
		if IsFurtherVolume(other) {
			t.Errorf("%q is taken for a volume", other)
		}
	}
	for n, want := range map[int]string{2: " and summary-2.pdf", 3: ", summary-2.pdf and summary-3.pdf", 9: " and summary-2.pdf to summary-9.pdf"} {
		if got := furtherNames(n); got != want {
			t.Errorf("%d volumes: got %q, want %q", n, got, want)
		}
	}
}

// TestMemoryOfAVolume: what is alive when a volume of 200 large pages has been
// laid out and begins to be written, less what the night itself takes.
func TestMemoryOfAVolume(t *testing.T) {
	const mostMB = 60
	n := manyNight(200, 0)
	before := aliveMB()
	b, err := Plan(n, Options{})
	if err != nil {
		t.Fatal(err)
	}
	w := &weighing{}
	if _, err := b.Write(w, 1); err != nil {
		t.Fatal(err)
	}
	if took := w.aliveMB - before; took > mostMB {
		t.Errorf("a volume of %d pages takes %.1f MB, at most %d", len(b.volumes[0].pages), took, mostMB)
	} else {
		t.Logf("%.1f MB", took)
	}
	runtime.KeepAlive(n)
}

// weighing notes what is alive at the first byte.
type weighing struct {
	bytes.Buffer
	aliveMB float64
}

func (w *weighing) Write(p []byte) (int, error) {
	if w.aliveMB == 0 {
		w.aliveMB = aliveMB()
	}
	return len(p), nil
}

func aliveMB() float64 {
	var m runtime.MemStats
	runtime.GC()
	runtime.ReadMemStats(&m)
	return float64(m.HeapAlloc) / 1e6
}
