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

// VolumePages is how many large run pages a volume holds.
const VolumePages = 200

// Options choose the sheet and which runs get a page of their own.
type Options struct {
	Letter bool   // US Letter; A4 without
	Pages  string // "flagged" (also when ""): disputed and doubtful runs; "all": every run
	Volume int    // which volume to write, from 1; 0 writes everything into one document
}

// Result tells what was written.
type Result struct {
	Pages    int
	Volumes  int      // that the night fills at VolumePages large pages each
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

// Write lays out the night and writes one PDF document. A page that cannot be
// drawn does not stop it: see Result.Failed. Nothing is written when it
// returns an OptionError.
func Write(w io.Writer, n *report.Night, o Options) (Result, error) {
	d, err := newDocument(n, o)
	if err != nil {
		return Result{}, err
	}
	file := paper.New(d.width, d.height, about(n))
	res := Result{Volumes: d.volumes}
	s := figure.NewSheet(d.width, d.height)
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
	res.Pages = len(d.pages)
	_, err = file.WriteTo(w)
	return res, err
}

func about(n *report.Night) paper.About {
	title := "Night of " + day(n.Date)
	if n.Laboratory != "" {
		title += ", " + n.Laboratory
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
