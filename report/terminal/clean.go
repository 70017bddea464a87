package terminal

import (
	"strings"
	"unicode"

	"golang.org/x/text/width"

	"lastdrop/report"
)

// Clean makes text from a dump fit for a terminal or a mail: whatever would
// act there instead of being seen (escape sequences, control characters, line
// breaks, direction overrides) is replaced by U+FFFD.
func Clean(s string) string { return report.Visible(s) }

// cells is how many columns of a terminal a cleaned text takes.
//
// Source: Unicode Standard Annex 11, wide and full-width characters; the
// ambiguous ones count one (from memory).
func cells(s string) int {
	n := 0
	for _, r := range s {
		n += runeCells(r)
	}
	return n
}

func runeCells(r rune) int {
	switch {
	case r < 0x300:
		return 1
	case unicode.In(r, unicode.Mn, unicode.Me, unicode.Cf):
		return 0
	}
	switch width.LookupRune(r).Kind() {
	case width.EastAsianWide, width.EastAsianFullwidth:
		return 2
	}
	return 1
}

// Shorten returns a cleaned text in at most so many columns, cut in the
// middle with an ellipsis: both ends of a sample's name tell it apart.
func Shorten(s string, most int) string {
	s = Clean(s)
	if cells(s) <= most {
		return s
	}
	if most < 1 {
		return ""
	}
	runes := []rune(s)
	head, tail := (most-1+1)/2, (most-1)/2
	from, to := 0, len(runes)
	for n := 0; from < len(runes) && n+runeCells(runes[from]) <= head; from++ {
		n += runeCells(runes[from])
	}
	for n := 0; to > from && n+runeCells(runes[to-1]) <= tail; to-- {
		n += runeCells(runes[to-1])
	}
	for to < len(runes) && runeCells(runes[to]) == 0 { // an accent whose letter was cut
		to++
	}
	return string(runes[:from]) + "…" + string(runes[to:])
}

// pad fills a text with spaces up to so many columns.
func pad(s string, to int) string {
	return s + strings.Repeat(" ", max(to-cells(s), 0))
}

// padLeft is pad with the spaces before.
func padLeft(s string, to int) string {
	return strings.Repeat(" ", max(to-cells(s), 0)) + s
}

// wrap breaks a cleaned text into lines of so many columns at most. A number
// and its unit stay together; a word that no line holds is broken.
func wrap(s string, most int) (lines []string) {
	most = max(most, 8)
	line := ""
	for _, word := range together(strings.Fields(s)) {
		switch {
		case line == "":
			line = word
		case cells(line)+1+cells(word) <= most:
			line += " " + word
		default:
			lines = append(lines, line)
			line = word
		}
		for cells(line) > most {
			head := firstCells(line, most)
			lines = append(lines, head)
			line = line[len(head):]
		}
	}
	if line != "" {
		lines = append(lines, line)
	}
	return lines
}

func firstCells(s string, most int) string {
	n := 0
	for i, r := range s {
		if n += runeCells(r); n > most {
			return s[:i]
		}
	}
	return s
}

// units are what follows a number in our sentences.
const units = " mL % mV mS/cm sd K °C mol/L s pH "

// together joins each number with the unit behind it, and pH with its number.
func together(words []string) (joined []string) {
	for _, w := range words {
		if n := len(joined); n > 0 && belong(joined[n-1], w) {
			joined[n-1] += " " + w
			continue
		}
		joined = append(joined, w)
	}
	return joined
}

func belong(before, w string) bool {
	if strings.TrimLeft(before, "(") == "pH" {
		return w[0] >= '0' && w[0] <= '9'
	}
	last, bare := before[len(before)-1], strings.TrimRight(w, ".,;:)")
	return last >= '0' && last <= '9' && bare != "" && strings.Contains(units, " "+bare+" ")
}
