package report

import (
	"strings"
	"unicode/utf8"
)

// Decimal is the mark that parts the whole of a figure from its fraction
// where people read it. The record and the sentences in it have the point;
// pages, mail and terminal print through a Decimal. What a dump states (names,
// paths, its text) never passes through one.
type Decimal uint8

// The marks. The zero value prints the point.
const (
	DecimalPoint Decimal = iota
	DecimalComma
)

// Of returns a figure, or words made of figures that this package printed
// ("12.06 to 12.74"), with the mark.
func (d Decimal) Of(figure string) string {
	if d == DecimalComma {
		return strings.ReplaceAll(figure, ".", ",")
	}
	return figure
}

// Fixed, Signed and Short are the functions of these names with the mark.
func (d Decimal) Fixed(v float64, decimals int) string  { return d.Of(Fixed(v, decimals)) }
func (d Decimal) Signed(v float64, decimals int) string { return d.Of(Signed(v, decimals)) }
func (d Decimal) Short(v float64, figures int) string   { return d.Of(Short(v, figures)) }

// Axis returns the name of the volume axis of a run: the concentration at its
// end is ours to print, the titrant's name is not.
func (d Decimal) Axis(e *Evaluation) string {
	name := e.Picture.XName
	before, has := strings.CutSuffix(name, " mol/L")
	k := strings.LastIndexByte(before, ' ')
	if !has || e.Facts.TitrantMolPerL == nil || k < 0 {
		return name
	}
	return before[:k+1] + d.Of(before[k+1:]) + " mol/L"
}

// Says returns a sentence of the record with the mark in its figures: digits,
// one point, digits, standing by themselves. What is in quotes, and whatever
// has a letter, a slash or another sign of a name beside it, stays.
func (d Decimal) Says(sentence string) string {
	if d == DecimalPoint || !strings.Contains(sentence, ".") {
		return sentence
	}
	var b strings.Builder
	for at := 0; at < len(sentence); {
		n, figure := 1, false
		switch c := sentence[at]; {
		case c == '"':
			n = quotedLength(sentence[at:])
		case c >= '0' && c <= '9':
			n, figure = figureLength(sentence[at:])
			figure = figure && beginsFigure(sentence[:at])
		}
		if figure {
			b.WriteString(d.Of(sentence[at : at+n]))
		} else {
			b.WriteString(sentence[at : at+n])
		}
		at += n
	}
	return b.String()
}

// quotedLength is how far a text in quotes reaches, with its quotes; strconv
// put them there, so that a quote inside stands behind a backslash.
func quotedLength(s string) int {
	for i := 1; i < len(s); i++ {
		switch s[i] {
		case '\\':
			i++
		case '"':
			return i + 1
		}
	}
	return len(s)
}

// figureLength is how far digits and points reach, and whether they are a
// figure with a fraction: one point inside, and behind it the end of a word.
func figureLength(s string) (n int, ok bool) {
	for n < len(s) && (s[n] >= '0' && s[n] <= '9' || s[n] == '.') {
		n++
	}
	word := s[:n]
	if strings.HasSuffix(word, ".") { // the end of the sentence
		word = word[:n-1]
	}
	if strings.Count(word, ".") != 1 || strings.HasSuffix(word, ".") {
		return n, false
	}
	next, _ := utf8.DecodeRuneInString(s[n:])
	return len(word), n == len(s) || strings.ContainsRune(" ,;:)%\u00a0", next) && !(next != ' ' && len(word) < n)
}

// beginsFigure tells whether a figure may stand behind these words.
func beginsFigure(before string) bool {
	last, _ := utf8.DecodeLastRuneInString(before)
	return before == "" || strings.ContainsRune(" (±+-−\u00a0", last) && !inWord(before)
}

// inWord tells whether a hyphen or plus before a figure joins it to a word, as
// in "batch-1.5": then it is no sign.
func inWord(before string) bool {
	last, size := utf8.DecodeLastRuneInString(before)
	rest := before[:len(before)-size]
	return last != ' ' && last != '(' && last != '\u00a0' && rest != "" && !strings.HasSuffix(rest, " ") && !strings.HasSuffix(rest, "(")
}
