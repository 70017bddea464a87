package figure

import (
	"math"
	"strings"
	"testing"
	"unicode/utf8"

	"golang.org/x/image/font"
	"golang.org/x/image/font/opentype"
	"golang.org/x/image/font/sfnt"
)

var body = Style{Face: Regular, SizePt: 8, Ink: Black}

// TestTextWidth measures with golang.org/x/image/font/opentype, unhinted, at
// 2048 units an em.
func TestTextWidth(t *testing.T) {
	for _, face := range Faces() {
		parsed, err := opentype.Parse(face.TTF())
		if err != nil {
			t.Fatal(err)
		}
		set, err := opentype.NewFace(parsed, &opentype.FaceOptions{Size: 2048, DPI: 72, Hinting: font.HintingNone})
		if err != nil {
			t.Fatal(err)
		}
		for _, text := range []string{"12.401", "refit − indicated, %", "Бочка Ωµ±×°–…", "Spirit vinegar AVAT"} {
			units := 0.0
			for _, r := range text { // without kerning, as PDF sets it
				a, _ := set.GlyphAdvance(r)
				units += float64(a) / 64
			}
			want := units / 2048 * 8 * 25.4 / 72
			if got := TextWidth(Style{Face: face, SizePt: 8}, text); math.Abs(got-want) > 1e-9 {
				t.Errorf("face %d: %q is %.6f mm wide, want %.6f", face, text, got, want)
			}
		}
	}
}

// TestEveryCharacterOfTheFonts: the widths know each character that a font
// has up to lastRune, and the figures are equally wide.
func TestEveryCharacterOfTheFonts(t *testing.T) {
	w := metrics()
	for _, face := range Faces() {
		parsed, err := sfnt.Parse(face.TTF())
		if err != nil {
			t.Fatal(err)
		}
		var buf sfnt.Buffer
		for r := rune(' '); r <= lastRune; r++ {
			g, _ := parsed.GlyphIndex(&buf, r)
			if has := w.has(face, r); has != (g != 0) {
				t.Errorf("face %d: %q known: %v, glyph %d", face, r, has, g)
			}
		}
		for r := '0'; r <= '9'; r++ {
			if w[face][r] != w[face]['0'] {
				t.Errorf("face %d: %q is not as wide as 0", face, r)
			}
		}
	}
}

func TestClean(t *testing.T) {
	for _, c := range []struct {
		in, want string
		ok       bool
	}{
		{"VIN-0417", "VIN-0417", true},
		{"  padded\t", "padded", true},
		{"Бочка µ ± – …", "Бочка µ ± – …", true},
		{"two\nlines\x00", "two lines", true},
		{"e\u0301", "\u00e9", true}, // composed
		{"salt 🧂", "salt \uFFFD", false},
		{"塩水", "\uFFFD\uFFFD", false},
		{"\u202Eesrever", "\uFFFDesrever", false}, // turns the direction of writing
		{"bad \xff byte", "bad \uFFFD byte", false},
		{"thin\u2009space", "thin\u00A0space", true},
	} {
		got, ok := Clean(c.in)
		if got != c.want || ok != c.ok {
			t.Errorf("Clean(%q) = %q, %v, want %q, %v", c.in, got, ok, c.want, c.ok)
		}
	}
}

// FuzzClean: whatever comes, every character that is left can be set.
func FuzzClean(f *testing.F) {
	for _, s := range []string{"VIN", "🧂", "\x00\xff", "e\u0301\u0323", "\u1100\u1161"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		got, _ := Clean(s)
		if !utf8.ValidString(got) {
			t.Fatalf("Clean(%q) = %q is no UTF-8", s, got)
		}
		for _, r := range got {
			if !metrics().has(Regular, r) {
				t.Fatalf("Clean(%q) = %q keeps %q", s, got, r)
			}
		}
		for _, line := range Wrap(body, s, 30) {
			if TextWidth(body, line) > 30.001 {
				t.Fatalf("Wrap(%q): %q is %.2f mm wide", s, line, TextWidth(body, line))
			}
		}
		if w := TextWidth(body, Shorten(body, s, 20)); w > 20.001 {
			t.Fatalf("Shorten(%q) is %.2f mm wide", s, w)
		}
	})
}

func TestWrap(t *testing.T) {
	text := "The dose after line 42 was 0.724 mL, 5.8 % of the endpoint (limit 8 %), and the bracket is 12.285 to 13.009 mL."
	whole := strings.Join(Wrap(body, text, 1000), " ")
	if whole != text {
		t.Errorf("one long line: %q", whole)
	}
	for width := 12.0; width < 90; width += 0.7 {
		lines := Wrap(body, text, width)
		if got := strings.Join(lines, " "); got != text {
			t.Fatalf("at %.1f mm: %q", width, got)
		}
		for _, line := range lines {
			if TextWidth(body, line) > width {
				t.Fatalf("at %.1f mm: %q is %.1f mm wide", width, line, TextWidth(body, line))
			}
			if width < 30 {
				continue
			}
			for _, bad := range []string{"line", "0.724", "5.8", "(limit", "12.285", "13.009", "8"} {
				if strings.HasSuffix(line, " "+bad) || line == bad {
					t.Errorf("at %.1f mm a line ends between a number and its word: %q", width, line)
				}
			}
		}
	}
}

// TestWrapCutsLongWords: a path without a space is cut after a slash or
// hyphen; nothing of it is lost.
func TestWrapCutsLongWords(t *testing.T) {
	path := strings.Repeat("a-long-folder/", 12) + "dump.csv"
	lines := Wrap(body, path, 40)
	if got := strings.Join(lines, ""); got != path {
		t.Errorf("lost something: %q", got)
	}
	for _, l := range lines[:len(lines)-1] {
		if !strings.HasSuffix(l, "/") && !strings.HasSuffix(l, "-") {
			t.Errorf("cut inside a word: %q", l)
		}
	}
	if got := Wrap(body, " \n ", 40); len(got) != 0 {
		t.Errorf("blank text has lines %q", got)
	}
}

func TestWrapAtMost(t *testing.T) {
	text := strings.Repeat("word ", 60)
	lines := WrapAtMost(body, text, 40, 3)
	if len(lines) != 3 || !strings.HasSuffix(lines[2], "…") || TextWidth(body, lines[2]) > 40 {
		t.Errorf("got %q", lines)
	}
	if lines := WrapAtMost(body, "short", 40, 3); len(lines) != 1 || lines[0] != "short" {
		t.Errorf("got %q", lines)
	}
}

// TestShorten: what is left out is the middle; both ends stay.
func TestShorten(t *testing.T) {
	name := "Spirit vinegar from vat seventeen, second drawing, bottled for the harbour shop"
	got := Shorten(body, name, 40)
	head, tail, ok := strings.Cut(got, "…")
	if !ok || !strings.HasPrefix(name, head) || !strings.HasSuffix(name, tail) || len(head) < 8 || len(tail) < 8 || TextWidth(body, got) > 40 || TextWidth(body, got) < 36 {
		t.Errorf("Shorten gives %q, %.1f mm", got, TextWidth(body, got))
	}
	if got := Shorten(body, "VIN-0417", 40); got != "VIN-0417" {
		t.Errorf("a name that fits became %q", got)
	}
}
