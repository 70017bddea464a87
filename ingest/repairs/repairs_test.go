package repairs

import (
	"slices"
	"testing"
)

func TestListJoinsNeighbours(t *testing.T) {
	var a, b List
	a.Add(5, "x")
	a.Add(4, "y")
	a.Add(6, "x")
	a.Add(8, "x")
	b.Add(0, "z")
	c := a.Copy()
	c.Add(9, "x")
	a.Join(&b)
	if want := []string{"file name: z", "line 4: y", "lines 5 to 6: x", "line 8: x"}; !slices.Equal(a.Lines(), want) {
		t.Errorf("%q, want %q", a.Lines(), want)
	}
	if want := []string{"line 4: y", "lines 5 to 6: x", "lines 8 to 9: x"}; !slices.Equal(c.Lines(), want) {
		t.Errorf("%q, want %q", c.Lines(), want)
	}
}

func TestListIsLimited(t *testing.T) {
	var a, b List
	for i := range Max {
		a.Add(2*i+1, "x")
	}
	b.Add(1, "y")
	b.Add(3, "y")
	a.Join(&b)
	lines := a.Lines()
	if len(lines) != Max+1 || lines[Max] != "and 2 more" {
		t.Errorf("%d lines, last %q; want %d, \"and 2 more\"", len(lines), lines[len(lines)-1], Max+1)
	}
}
