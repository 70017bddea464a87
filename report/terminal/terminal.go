// Package terminal writes for people who read plain text: the summary that a
// timer mails, and one dump with its curve drawn in characters. It computes
// nothing: every figure is a field that somebody else filled, printed by
// package report. Colours only support; marks and words tell everything.
package terminal

import (
	"bytes"
	"io"
	"strconv"
	"strings"

	"lastdrop/report"
)

// Options are how a terminal shows text.
type Options struct {
	Colour  bool // support by colours, for terminals only
	Width   int  // columns, 40 to 160; 0 means 80
	Decimal report.Decimal
}

const (
	usualWidth  = 80
	leastWidth  = 40
	mostWidth   = 160 // longer lines are hard to read
	labelColumn = 16  // where the value of a label stands
)

// page collects lines and is written at once.
type page struct {
	text   bytes.Buffer
	colour bool
	width  int
	mark   report.Decimal
}

func newPage(o Options) *page {
	width := o.Width
	if width == 0 {
		width = usualWidth
	}
	return &page{colour: o.Colour, mark: o.Decimal, width: min(max(width, leastWidth), mostWidth)}
}

func (p *page) writeTo(w io.Writer) error {
	_, err := w.Write(p.text.Bytes())
	return err
}

// piece is text in one ink.
type piece struct {
	ink  ink
	text string
}

// line writes one line without spaces at its end.
func (p *page) line(pieces ...piece) {
	for len(pieces) > 0 {
		last := &pieces[len(pieces)-1]
		if last.text = strings.TrimRight(last.text, " "); last.text != "" {
			break
		}
		pieces = pieces[:len(pieces)-1]
	}
	for _, one := range pieces {
		p.text.WriteString(p.paint(one))
	}
	p.text.WriteByte('\n')
}

func (p *page) blank() { p.text.WriteByte('\n') }

// sentence wraps words to the width, behind an indent.
func (p *page) sentence(i ink, indent, words string) {
	for _, l := range wrap(words, p.width-cells(indent)) {
		p.line(piece{plain, indent}, piece{i, l})
	}
}

// labelled writes a label and, from labelColumn on, its wrapped value. An
// absent value has no line.
func (p *page) labelled(label string, i ink, value string) {
	if value == "" {
		return
	}
	label = Shorten(label, labelColumn-2)
	for n, l := range wrap(value, p.width-labelColumn) {
		if n > 0 {
			label = ""
		}
		p.line(piece{faint, pad("  "+label, labelColumn)}, piece{i, l})
	}
}

// title begins a section.
func (p *page) title(words, note string) {
	p.blank()
	if note == "" || cells(words)+2+cells(note) > p.width {
		p.sentence(strong, "", words)
		p.sentence(faint, "", note)
		return
	}
	p.line(piece{strong, words}, piece{faint, "  " + note})
}

// Look writes the runs of one dump and what could not be read of it.
func Look(w io.Writer, evs []report.Evaluation, unread []report.Unread, o Options) error {
	p := newPage(o)
	for i := range evs {
		if i > 0 {
			p.blank()
		}
		if len(evs)+len(unread) > 1 {
			p.line(piece{faint, strings.Repeat("─", p.width)})
		}
		p.run(&evs[i])
	}
	if len(unread) > 0 {
		if len(evs) > 0 {
			p.blank()
			p.line(piece{faint, strings.Repeat("─", p.width)})
		}
		p.unread(unread)
	}
	p.blank()
	p.sentence(faint, "", report.Caution)
	return p.writeTo(w)
}

func (p *page) unread(unread []report.Unread) {
	p.sentence(strong, "", unreadMark+" "+report.Upper(report.Some(len(unread), "run or dump", "runs or dumps"))+" could not be read; no result.")
	for i := range unread {
		p.blank()
		p.oneUnread(&unread[i], p.width)
	}
}

// oneUnread tells where, what was found, and what to do next.
func (p *page) oneUnread(u *report.Unread, width int) {
	found := Clean(position(u)) + ": "
	if u.Field != "" {
		found += Clean(u.Field) + ": "
	}
	for n, l := range wrap(found+Clean(u.Says), width-4) {
		lead := unreadMark + " "
		if n > 0 {
			lead = "    "
		}
		p.line(piece{strong, lead}, piece{plain, l})
	}
	if u.Hint != "" {
		for _, l := range wrap("To do: "+Clean(u.Hint), width-4) {
			p.line(piece{plain, "    " + l})
		}
	}
	if u.Next != "" { // never wrapped: it is there to be copied
		p.line(piece{plain, "    Next: "}, piece{strong, Clean(u.Next)})
	}
}

// position is where in a dump the trouble is, as far as it is known.
func position(u *report.Unread) string {
	at := u.Dump
	if u.Line > 0 {
		at += ":" + strconv.Itoa(u.Line)
		if u.Column > 0 {
			at += ":" + strconv.Itoa(u.Column)
		}
	}
	if u.Run > 0 {
		at += ": run " + strconv.Itoa(u.Run)
	}
	return at
}
