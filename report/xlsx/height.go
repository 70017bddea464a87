package xlsx

import (
	"strings"
	"unicode"
)

// lineHeight is that of one line of the text size, in points.
const lineHeight = 12.75

// boldWider is how much more room bold letters take.
const boldWider = 1.08

// indentWidth is the room of a cell's indent and margins, in digits.
const indentWidth = 1.5

// tallest is a little less than the most that a row may have, in points.
const tallest = 400

// heightOf returns the height in points of a row in which a wrapped text
// needs more than one line, else 0.
func (s *sheet) heightOf(cells []cell) float64 {
	lines := 1
	for i, c := range cells {
		words, isText := c.value.(string)
		if isText && c.look.wrap && i < len(s.columns) {
			width := s.columns[i].width
			if c.look.bold {
				width /= boldWider
			}
			lines = max(lines, linesOf(words, width))
		}
	}
	if lines == 1 {
		return 0
	}
	return min(float64(lines)*lineHeight, tallest)
}

// linesOf returns how many lines a text takes in a column of the width, which
// counts digits. The indent of every cell takes part of it.
func linesOf(s string, width float64) int {
	if float64(len(s))*widest <= width-indentWidth {
		return 1
	}
	room, lines, used := width-indentWidth, 1, 0.0
	for _, word := range strings.SplitAfter(s, " ") {
		w := widthOf(word)
		if used > 0 && used+w-widthOf(" ") > room {
			lines, used = lines+1, 0
		}
		for ; w > room; w -= room { // a word that no line holds is broken
			lines++
		}
		used += w
	}
	return lines
}

// widest is the width of the widest letters, in digits.
const widest = 1.7

// classes are the letters of the workbook's face by width, in digits; what is
// in none is as wide as a digit or, a capital, a quarter wider. A twentieth is
// on top for programs that draw letters on whole pixels.
//
// Source: character widths of the core sans serif font, in thousandths of the
// size, over 556 for a digit (from memory).
var classes = [...]struct {
	letters string
	width   float64
}{
	{" .,:;!Itf/'", 0.525}, {"ijl|", 0.42}, {"()[]-r", 0.63}, {"ckszvxyJ", 0.945}, {"mMw", 1.575}, {"W%@", widest},
}

// widthOf is the width of a text in digits.
func widthOf(s string) float64 {
	w := 0.0
	for _, r := range s {
		w += letterWidth(r)
	}
	return w
}

func letterWidth(r rune) float64 {
	for _, c := range classes {
		if strings.ContainsRune(c.letters, r) {
			return c.width
		}
	}
	switch {
	case r > 0x2E7F: // East Asian letters
		return widest
	case unicode.IsUpper(r):
		return 1.3
	}
	return 1.05
}
