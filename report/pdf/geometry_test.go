package pdf

import "testing"

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
			faults := b.Faults()
			for _, f := range faults[:min(len(faults), most)] {
				t.Errorf("%s, letter %v, %s", name, o.Letter, f)
			}
			if len(faults) > most {
				t.Errorf("%s, letter %v: %d faults in all", name, o.Letter, len(faults))
			}
		}
	}
}
