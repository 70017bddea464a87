package figure

import (
	"strings"
	"sync"
	"unicode"

	"golang.org/x/image/font/gofont/gobold"
	"golang.org/x/image/font/gofont/goitalic"
	"golang.org/x/image/font/gofont/gomedium"
	"golang.org/x/image/font/gofont/gomono"
	"golang.org/x/image/font/gofont/goregular"
	"golang.org/x/image/font/sfnt"
	"golang.org/x/image/math/fixed"
	"golang.org/x/text/unicode/norm"
)

// Face is one of the Go fonts.
type Face uint8

// The faces.
const (
	Regular Face = iota + 1
	Medium
	Bold
	Italic
	Mono // what is typed or is an identity
)

// Faces lists all faces.
func Faces() []Face { return []Face{Regular, Medium, Bold, Italic, Mono} }

// TTF returns the font file of the face.
func (f Face) TTF() []byte {
	switch f {
	case Medium:
		return gomedium.TTF
	case Bold:
		return gobold.TTF
	case Italic:
		return goitalic.TTF
	case Mono:
		return gomono.TTF
	}
	return goregular.TTF
}

// Replacement is set where a font lacks a character.
const Replacement = '\uFFFD'

// The Go fonts are 2048 units high and have no character beyond lastRune but
// a few ligatures and Replacement, whose width stands in slot 0.
const (
	unitsPerEm = 2048
	lastRune   = 0x25FF
)

// widths holds, for each face, the advance of each rune in font units; 0 for
// a rune that the face lacks.
type widths [Mono + 1][lastRune + 1]uint16

// metrics reads the five fonts once, on first use.
var metrics = sync.OnceValue(readWidths)

func readWidths() *widths {
	w := new(widths)
	var buf sfnt.Buffer
	for _, face := range Faces() {
		font, err := sfnt.Parse(face.TTF())
		if err != nil {
			panic("figure: a font inside the program is damaged: " + err.Error())
		}
		for r := rune(' '); r <= lastRune; r++ {
			if r >= 0x0600 && r < 0x1E00 { // scripts that these fonts do not have
				r = 0x1E00
			}
			w[face][r] = advance(font, &buf, r)
		}
		w[face][0] = advance(font, &buf, Replacement)
	}
	return w
}

func advance(font *sfnt.Font, buf *sfnt.Buffer, r rune) uint16 {
	glyph, err := font.GlyphIndex(buf, r)
	if err != nil || glyph == 0 {
		return 0
	}
	a, err := font.GlyphAdvance(buf, glyph, fixed.I(unitsPerEm), 0)
	if err != nil {
		return 0
	}
	return uint16(a.Round())
}

// has tells whether the face can set the rune.
func (w *widths) has(f Face, r rune) bool {
	return r == Replacement || r >= ' ' && r <= lastRune && w[f][r] > 0
}

// TextWidth returns the width in mm of one line of text; a character that the
// face lacks counts as the Replacement that Sheet sets for it.
func TextWidth(s Style, text string) float64 {
	w, sum := metrics(), 0
	for _, r := range text {
		if w.has(s.Face, r) && r != Replacement {
			sum += int(w[s.Face][r])
		} else {
			sum += int(w[s.Face][0])
		}
	}
	return MM(s.SizePt) * float64(sum) / unitsPerEm
}

// Clean makes text settable: without space at its ends, composed (NFC), controls and line breaks as
// spaces, every character that the fonts lack as Replacement. ok is false
// when something was replaced.
func Clean(text string) (clean string, ok bool) {
	if text = strings.TrimSpace(text); plain(text) {
		return text, true
	}
	w, ok := metrics(), true
	clean = strings.Map(func(r rune) rune {
		switch {
		case unicode.IsControl(r) || r == '\u2028' || r == '\u2029':
			return ' '
		case r == '\u2009' || r == '\u202F': // thin spaces, which the fonts lack
			return '\u00A0'
		case w.has(Regular, r) && r != Replacement && !unicode.Is(unicode.Cf, r):
			return r
		}
		ok = false
		return Replacement
	}, norm.NFC.String(text))
	return strings.TrimSpace(clean), ok
}

// plain tells whether text is printable ASCII, which needs no cleaning.
func plain(text string) bool {
	for i := 0; i < len(text); i++ {
		if text[i] < ' ' || text[i] > '~' {
			return false
		}
	}
	return true
}
