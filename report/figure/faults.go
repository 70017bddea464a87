package figure

import (
	"fmt"
	"strings"
)

const (
	// faultSlack is how far boxes may overlap, mm: boxes are as high as the
	// highest letters, whatever the text holds.
	faultSlack = 0.15
	// faultMargin is how near to the left and right edge of the paper a text
	// may come, faultEdge the same above and below, mm.
	faultMargin = 10
	faultEdge   = 8
)

// Faults lists what a reader would see at once: texts in the margin, outside
// their block, without a block, or across another text, a mark or a reading.
func (s *Sheet) Faults() (out []string) {
	live := Box{Left: faultMargin, Top: faultEdge, Right: s.WidthMM - faultMargin, Bottom: s.HeightMM - faultEdge}
	for i := range s.Boxes {
		a := &s.Boxes[i]
		if a.Kind != AText {
			continue
		}
		if !a.Box.Within(live, 0) {
			out = append(out, fmt.Sprintf("%q stands in the margin: %.1f", a.Name, a.Box))
		}
		if a.Block < 0 {
			out = append(out, fmt.Sprintf("%q belongs to no block", a.Name))
		} else if b := &s.Boxes[a.Block]; !a.Box.Within(b.Box, faultSlack) {
			out = append(out, fmt.Sprintf("%q at %.1f leaves the block %q %.1f", a.Name, a.Box, b.Name, b.Box))
		}
		if strings.TrimSpace(a.Name) != a.Name {
			out = append(out, fmt.Sprintf("%q begins or ends with a space", a.Name))
		}
		out = append(out, s.crossings(i)...)
	}
	return out
}

// crossings lists what the i-th box, a text, runs across.
func (s *Sheet) crossings(i int) (out []string) {
	a := &s.Boxes[i]
	small := Box{Left: a.Box.Left + faultSlack, Top: a.Box.Top + faultSlack, Right: a.Box.Right - faultSlack, Bottom: a.Box.Bottom - faultSlack}
	for k := range s.Boxes {
		b := &s.Boxes[k]
		if b.Kind == ABlock || k == i || b.Kind == AText && k < i { // a pair of texts is told once
			continue
		}
		if small.Crosses(b.Box) {
			out = append(out, fmt.Sprintf("%q at %.1f crosses %q at %.1f", a.Name, a.Box, b.Name, b.Box))
		}
	}
	return out
}
