package figure

import (
	"strings"
	"testing"
)

// TestFaults shows that the walk sees what it looks for, and nothing on a
// sheet that is in order.
func TestFaults(t *testing.T) {
	st := Style{Face: Regular, SizePt: 8, Ink: Black}
	s := NewSheet(210, 297)
	end := s.Block("narrow", Box{Left: 20, Top: 20, Right: 30, Bottom: 30})
	s.Text(21, 25, st, "wider than its block")
	end()
	s.Text(22, 25.5, st, "over it")
	s.Filled(Disc, 23, 25, 2, Blue)
	s.Text(4, 100, st, "near the edge")
	faults := strings.Join(s.Faults(), "\n")
	for _, want := range []string{`leaves the block "narrow"`, `"over it" belongs to no block`, `crosses "over it"`, `crosses "shape"`, `"near the edge" stands in the margin`} {
		if !strings.Contains(faults, want) {
			t.Errorf("no fault told %q in:\n%s", want, faults)
		}
	}
	s.Reset()
	end = s.Block("wide", Box{Left: 20, Top: 20, Right: 90, Bottom: 40})
	s.Text(21, 25, st, "one")
	s.Text(21, 28.7, st, "below the other")
	s.Filled(Disc, 60, 25, 2, Blue)
	end()
	if faults := s.Faults(); len(faults) > 0 {
		t.Errorf("faults of a sheet that has none: %q", faults)
	}
}
