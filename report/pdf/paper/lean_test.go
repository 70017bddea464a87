package paper

import (
	"reflect"
	"testing"

	"golang.org/x/image/font/sfnt"
	"golang.org/x/image/math/fixed"

	"lastdrop/report/figure"
)

// TestLeanKeepsOutlines reads both fonts with golang.org/x/image/font/sfnt:
// every glyph keeps its outline and its advance.
func TestLeanKeepsOutlines(t *testing.T) {
	for _, face := range figure.Faces() {
		whole, err := sfnt.Parse(face.TTF())
		if err != nil {
			t.Fatal(err)
		}
		cut, err := sfnt.Parse(lean(face.TTF()))
		if err != nil {
			t.Fatalf("face %d: %v", face, err)
		}
		if 3*len(lean(face.TTF())) > 2*len(face.TTF()) {
			t.Errorf("face %d: %d bytes of %d left", face, len(lean(face.TTF())), len(face.TTF()))
		}
		var a, b sfnt.Buffer
		for i := range whole.NumGlyphs() {
			g := sfnt.GlyphIndex(i)
			want, err1 := whole.LoadGlyph(&a, g, fixed.I(2048), nil)
			got, err2 := cut.LoadGlyph(&b, g, fixed.I(2048), nil)
			if err1 != nil || err2 != nil || !reflect.DeepEqual(want, got) {
				t.Fatalf("face %d, glyph %d: %v, %v: outlines differ", face, i, err1, err2)
			}
			w1, _ := whole.GlyphAdvance(&a, g, fixed.I(2048), 0)
			w2, _ := cut.GlyphAdvance(&b, g, fixed.I(2048), 0)
			if w1 != w2 {
				t.Fatalf("face %d, glyph %d: advance %v, want %v", face, i, w2, w1)
			}
		}
	}
}

// TestLeanLeavesOddFonts: what is no font in the expected layout stays whole.
func TestLeanLeavesOddFonts(t *testing.T) {
	ttf := figure.Regular.TTF()
	for _, odd := range [][]byte{nil, ttf[:11], ttf[:100], ttf[:len(ttf)/2]} {
		if got := lean(odd); len(got) != len(odd) {
			t.Errorf("%d bytes of a font became %d", len(odd), len(got))
		}
	}
}
