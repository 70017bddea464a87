// Package pdf lays a night out as pages for people: what must be done first,
// one page for each run that cannot be taken as it is, small pictures of the
// sound ones, what could not be read.
//
// It places blocks and computes nothing: every figure on a page is a field of
// the record in its one printed form (package report), drawn by package
// figure. Same night, same options: same bytes.
package pdf

import (
	"fmt"
	"io"
	"runtime/debug"
	"strings"

	"lastdrop/report"
	"lastdrop/report/figure"
	"lastdrop/report/pdf/paper"
)

// Options choose the sheet, which runs get a page of their own, and the mark
// in figures.
type Options struct {
	Letter  bool   // US Letter; A4 without
	Pages   string // "flagged" (also when ""): disputed and doubtful runs; "all": every run
	Decimal report.Decimal
}

// Result tells what was written.
type Result struct {
	Pages    int
	Failed   []Failed // pages that could not be drawn; each is replaced by one that says so
	Replaced []string // lines in which characters stand replaced by a visible sign
}

// Failed is a page that could not be drawn.
type Failed struct {
	Page int
	What string // the run's id, dump and sample, or the name of the page
	Says string
}

// OptionError says which option has a value that it cannot have.
type OptionError struct{ Option, Value, Want string }

func (e *OptionError) Error() string {
	return fmt.Sprintf("%s: %q is not known; use %s", e.Option, e.Value, e.Want)
}

// Write lays out one volume of the book, from 1, and writes it as one PDF
// document. A page that cannot be drawn does not stop it: see Result.Failed.
// Volumes may be written at the same time.
func (b *Book) Write(w io.Writer, volume int) (Result, error) {
	d := b.volumes[volume-1]
	file := paper.New(b.width, b.height, d.about())
	res := Result{Pages: len(d.pages)}
	s := figure.NewSheet(b.width, b.height)
	for i := range d.pages {
		p := &d.pages[i]
		if says := attempt(s, func() { p.draw(s, i+1) }); says != "" {
			res.Failed = append(res.Failed, Failed{Page: i + 1, What: p.what, Says: says})
			if says = attempt(s, func() { d.drawFailure(s, i+1, p, says) }); says != "" {
				return res, fmt.Errorf("page %d: %s: %s", i+1, p.what, says)
			}
		}
		if err := file.Page(s, p.bookmarks...); err != nil {
			return res, err
		}
		res.Replaced = append(res.Replaced, s.Replaced...)
	}
	_, err := file.WriteTo(w)
	return res, err
}

func (d *document) about() paper.About {
	n := d.n
	title := "Night of " + day(n.Date)
	if n.Laboratory != "" {
		title += ", " + n.Laboratory
	}
	if len(d.volumes) > 1 {
		title += ", volume " + whole(d.volume)
	}
	return paper.About{Title: title, Creator: "lastdrop " + n.Lastdrop, Subject: report.Caution, Date: n.Date}
}

// attempt draws on an empty sheet and returns why that went wrong, "" when it
// did not.
func attempt(s *figure.Sheet, draw func()) (says string) {
	defer func() {
		if r := recover(); r != nil {
			says = fmt.Sprint(r) + " at " + origin(string(debug.Stack()))
		}
	}()
	s.Reset()
	draw()
	if err := s.Err(); err != nil {
		return err.Error()
	}
	return ""
}

// origin picks the function of this program that panicked out of a stack:
// the first of the module below the call of panic.
func origin(stack string) string {
	_, below, _ := strings.Cut(stack, "panic(")
	for _, line := range strings.Split(below, "\n") {
		if name, args, ok := strings.Cut(line, "("); ok && strings.HasPrefix(line, "lastdrop/") {
			_ = args
			return name
		}
	}
	return "an unknown place"
}
