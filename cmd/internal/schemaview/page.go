// Package schemaview lays schemas out for a terminal of 80 columns: the list of
// all, one in words, and what one makes of a dump. It reads no file and
// computes nothing.
package schemaview

import (
	"io"
	"strings"
	"unicode/utf8"

	"lastdrop/report"
	"lastdrop/report/terminal"
)

const (
	width = 80
	left  = 20 // where what stands behind a label begins
)

// page is text that is being laid out.
type page struct{ strings.Builder }

func (p *page) writeTo(w io.Writer) error {
	_, err := io.WriteString(w, p.String())
	return err
}

func (p *page) line(text string) { p.WriteString(strings.TrimRight(text, " ") + "\n") }

// heading begins a block.
func (p *page) heading(words string) { p.WriteString("\n" + words + "\n") }

// row is a label and what it says, with lines of its own when it is long.
func (p *page) row(label, says string) { p.hang("  "+report.Visible(label), left, says) }

// hang puts a text behind a head, its further lines below its first.
func (p *page) hang(head string, at int, text string) {
	if utf8.RuneCountInString(head) < at {
		head = pad(head, at)
	}
	if utf8.RuneCountInString(head) > at {
		p.line(head)
		head = strings.Repeat(" ", at)
	}
	for _, line := range wrapped(report.Visible(text), width-at) {
		p.line(head + line)
		head = strings.Repeat(" ", at)
	}
}

// pad fills a text up to a column, with one blank behind a longer one.
func pad(s string, to int) string {
	if n := utf8.RuneCountInString(s); n < to {
		return s + strings.Repeat(" ", to-n)
	}
	return s + " "
}

// padLeft is pad for figures.
func padLeft(s string, to int) string {
	if n := utf8.RuneCountInString(s); n < to {
		return strings.Repeat(" ", to-n) + s
	}
	return s
}

// cut shortens a text of the dump to a column.
func cut(s string, most int) string { return terminal.Shorten(s, most) }

// wrapped breaks a text between words; a word longer than the line is broken
// too. There is always one line.
func wrapped(s string, most int) (lines []string) {
	line := ""
	for _, word := range strings.Fields(s) {
		if line != "" && utf8.RuneCountInString(line)+1+utf8.RuneCountInString(word) > most {
			lines, line = append(lines, line), ""
		}
		if line != "" {
			line += " "
		}
		line += word
		for utf8.RuneCountInString(line) > most {
			runes := []rune(line)
			lines, line = append(lines, string(runes[:most])), string(runes[most:])
		}
	}
	return append(lines, line)
}

func count(n int, one, many string) string {
	if n == 1 {
		return one
	}
	return many
}
