package pdf

import (
	"fmt"
	"strings"
	"testing"

	"lastdrop/report/figure"
)

// TestGeometry walks what is drawn on every page of every sort of night: no
// text leaves its block or the paper's live part, crosses another text, a mark
// or a reading, or holds a character that its font lacks.
func TestGeometry(t *testing.T) {
	for name, c := range nights() {
		for _, o := range []Options{{Pages: c.pages}, {Pages: c.pages, Letter: true}} {
			b, err := Plan(c.night, o)
			if err != nil {
				t.Fatal(err)
			}
			const most = 12
			faults := b.faults()
			for _, f := range faults[:min(len(faults), most)] {
				t.Errorf("%s, letter %v, %s", name, o.Letter, f)
			}
			if len(faults) > most {
				t.Errorf("%s, letter %v: %d faults in all", name, o.Letter, len(faults))
			}
		}
	}
}

// faults draws every page of every volume and lists what is wrong with it.
func (b *Book) faults() (all []string) {
	s := figure.NewSheet(b.width, b.height)
	for _, d := range b.volumes {
		for i := range d.pages {
			page := fmt.Sprintf("volume %d, page %d: ", d.volume, i+1)
			if says := attempt(s, func() { d.pages[i].draw(s, i+1) }); says != "" {
				all = append(all, page+says)
				continue
			}
			for _, f := range geometryFaults(s) {
				all = append(all, page+f)
			}
		}
	}
	return all
}

// slack is how far boxes may overlap, mm: boxes are as high as the highest
// letters, whatever the text holds.
const slack = 0.15

// geometryFaults lists what is wrong with a sheet.
func geometryFaults(s *figure.Sheet) []string {
	var out []string
	for i, a := range s.Boxes {
		if a.Kind != figure.AText {
			continue
		}
		if !a.Box.Within(figure.Box{Left: 10, Top: 8, Right: s.WidthMM - 10, Bottom: s.HeightMM - 8}, 0) {
			out = append(out, fmt.Sprintf("%q stands in the margin: %.1f", a.Name, a.Box))
		}
		if a.Block < 0 {
			out = append(out, fmt.Sprintf("%q belongs to no block", a.Name))
		} else if b := s.Boxes[a.Block]; !a.Box.Within(b.Box, slack) {
			out = append(out, fmt.Sprintf("%q at %.1f leaves the block %q %.1f", a.Name, a.Box, b.Name, b.Box))
		}
		if strings.TrimSpace(a.Name) != a.Name {
			out = append(out, fmt.Sprintf("%q begins or ends with a space", a.Name))
		}
		small := a.Box
		small.Left, small.Right, small.Top, small.Bottom = small.Left+slack, small.Right-slack, small.Top+slack, small.Bottom-slack
		for k, b := range s.Boxes {
			if b.Kind == figure.ABlock || k == i || b.Kind == figure.AText && k < i {
				continue
			}
			if small.Crosses(b.Box) {
				out = append(out, fmt.Sprintf("%q at %.1f crosses %q at %.1f", a.Name, a.Box, b.Name, b.Box))
			}
		}
	}
	return out
}

// TestGeometryFindsFaults shows that the walk sees what it looks for.
func TestGeometryFindsFaults(t *testing.T) {
	s := figure.NewSheet(210, 297)
	end := s.Block("narrow", figure.Box{Left: 20, Top: 20, Right: 30, Bottom: 30})
	s.Text(21, 25, bodyStyle, "wider than its block")
	end()
	s.Text(22, 25.5, bodyStyle, "over it")
	s.Filled(figure.Disc, 23, 25, 2, figure.Blue)
	faults := strings.Join(geometryFaults(s), "\n")
	for _, want := range []string{`leaves the block "narrow"`, `"over it" belongs to no block`, `crosses "over it"`, `crosses "shape"`} {
		if !strings.Contains(faults, want) {
			t.Errorf("no fault told %q in:\n%s", want, faults)
		}
	}
}
