package terminal

import (
	"io"
	"strconv"
	"strings"

	"lastdrop/report"
)

const (
	mailWidth  = 72 // leaves room for the marks that an answer puts before it
	urgentMost = 12 // what one reads on a phone
	unreadMost = 12
)

// SummaryOptions are what the summary tells besides the night.
type SummaryOptions struct {
	Files   []string // paths of what was written
	Volumes int      // that the pages fill; more than one is told
	Decimal report.Decimal
}

// Summary writes the short summary of a night that a timer mails: plain text,
// short lines, the most urgent first, readable without a table's alignment.
func Summary(w io.Writer, n *report.Night, o SummaryOptions) error {
	p := newPage(Options{Width: mailWidth, Decimal: o.Decimal})
	p.headline(n)
	p.totals(n)
	p.urgent(n)
	p.unreadShort(n)
	p.waiting(n)
	p.passed(n)
	p.files(o)
	p.blank()
	p.sentence(plain, "", report.Caution)
	if n.Invented {
		p.sentence(plain, "", report.InventedNote)
	}
	return p.writeTo(w)
}

func (p *page) headline(n *report.Night) {
	must, rest := n.Headline()
	p.sentence(strong, "", must)
	if rest != "" {
		p.sentence(plain, "", rest)
	}
	about := "Published " + report.Day(n.Date)
	if n.Laboratory != "" {
		about = Clean(n.Laboratory) + ", published " + report.Day(n.Date)
	}
	if days := n.Days(); days != "" {
		about += ", " + days
	}
	p.sentence(plain, "", about+".")
}

func (p *page) totals(n *report.Night) {
	if len(n.Evaluations)+len(n.Unread) == 0 {
		return
	}
	p.blank()
	for _, t := range [...]struct {
		mark, word string
		count      int
		means      string
	}{
		{verdictMark(report.VerdictDisputed), "disputed", n.Count(report.VerdictDisputed), "a second person must settle it"},
		{verdictMark(report.VerdictDoubtful), "doubtful", n.Count(report.VerdictDoubtful), "look before use"},
		{verdictMark(report.VerdictSound), "sound", n.Count(report.VerdictSound), report.SoundMeans},
		{unreadMark, "unread", len(n.Unread), "not read, no result"},
	} {
		p.line(piece{plain, t.mark + " " + padLeft(strconv.Itoa(t.count), 4) + " " + pad(t.word+",", 10) + t.means})
	}
}

func (p *page) urgent(n *report.Night) {
	urgent := n.Urgent()
	if len(urgent) == 0 {
		return
	}
	p.blank()
	p.line(piece{strong, "LOOK AT THESE FIRST"})
	for _, e := range urgent[:min(len(urgent), urgentMost)] {
		p.blank()
		p.urgentRun(e)
	}
	if len(urgent) > urgentMost {
		p.blank()
		p.line(piece{plain, "And " + moreRuns(urgent[urgentMost:]) + "; the files below have all."})
	}
}

// moreRuns counts what is not listed: "31 more (12 disputed, 19 doubtful)".
func moreRuns(left []*report.Evaluation) string {
	disputed := 0
	for _, e := range left {
		if e.Verdict == report.VerdictDisputed {
			disputed++
		}
	}
	s, doubtful := strconv.Itoa(len(left))+" more", len(left)-disputed
	switch {
	case disputed == 0:
		return s + " (doubtful)"
	case doubtful == 0:
		return s + " (disputed)"
	}
	return s + " (" + strconv.Itoa(disputed) + " disputed, " + strconv.Itoa(doubtful) + " doubtful)"
}

// urgentRun tells one run in a few short lines: which, why, the figures,
// where.
func (p *page) urgentRun(e *report.Evaluation) {
	name := Shorten(e.Facts.Sample, 40)
	if name == "" {
		name = "no sample stated"
	}
	lead := verdictMark(e.Verdict) + " "
	if e.Facts.Procedure != "" {
		name += ", " + Shorten(e.Facts.Procedure, 40)
	}
	for _, l := range wrap(name, p.width-4) {
		p.line(piece{strong, lead + l})
		lead = "    "
	}
	if f := e.Heaviest(); f != nil {
		w, _ := report.Words(f.Flag)
		p.sentence(plain, "    ", Clean(report.Upper(w.Headline))+"."+alsoFlagged(e))
		p.sentence(plain, "    ", Clean(p.mark.Says(f.Says)))
	}
	if !saysFigures(e) {
		p.sentence(plain, "    ", p.figuresOf(e))
	}
	p.sentence(plain, "    ", runPlace(e))
}

// saysFigures is true where the first flag's sentence has all the figures.
func saysFigures(e *report.Evaluation) bool {
	f, pairs := e.Heaviest(), e.Pairs()
	if f == nil || len(pairs) != 1 || pairs[0].Refit == nil || pairs[0].Indicated == nil {
		return false
	}
	return strings.Contains(f.Says, pairs[0].Refit.Volume()+" mL") && strings.Contains(f.Says, pairs[0].Indicated.Volume()+" mL")
}

// alsoFlagged names the other flags that are more than a note.
func alsoFlagged(e *report.Evaluation) string {
	var others []string
	for _, f := range e.Flags[1:] {
		if f.Weight != report.Note && !contains(others, f.Flag) && f.Flag != e.Flags[0].Flag {
			others = append(others, f.Flag)
		}
	}
	if len(others) == 0 {
		return ""
	}
	return " Also: " + Clean(strings.Join(others, ", ")) + "."
}

func contains(all []string, one string) bool {
	for _, s := range all {
		if s == one {
			return true
		}
	}
	return false
}

// figuresOf is refit and indicated endpoint in one sentence; unlike kinds are
// named, not compared.
func (p *page) figuresOf(e *report.Evaluation) string {
	var said []string
	for _, pair := range e.Pairs() {
		said = append(said, p.pairSays(pair))
	}
	if len(said) == 0 {
		return "No endpoint; the instrument indicates none either."
	}
	if len(e.Endpoints) == 0 {
		said[0] = "no refit; " + said[0]
	}
	return report.Upper(strings.Join(said, "; ")) + "."
}

func (p *page) pairSays(pair report.Pair) string {
	r, in := pair.Refit, pair.Indicated
	if r == nil {
		return "indicated " + p.mark.Of(in.Volume()) + " mL (" + Clean(in.Kind) + ")"
	}
	s := "refit " + p.mark.Of(r.Volume()) + " mL (" + Clean(r.Kind) + ")"
	switch {
	case in == nil:
		s += ", indicated none"
	case r.Differs != nil && in.Kind == r.Differs.Kind:
		s += ", indicated " + p.mark.Of(in.Volume()) + " mL, difference " + p.mark.Of(r.Difference()) + " mL"
	default:
		s += ", indicated " + p.mark.Of(in.Volume()) + " mL (" + Clean(in.Kind) + ")"
	}
	return s
}

func runPlace(e *report.Evaluation) string {
	return Clean(e.Dump) + ", run " + strconv.Itoa(e.Run) + ", id " + Clean(e.ID)
}

func (p *page) unreadShort(n *report.Night) {
	if len(n.Unread) == 0 {
		return
	}
	p.blank()
	p.line(piece{strong, "UNREAD"})
	for i := range n.Unread[:min(len(n.Unread), unreadMost)] {
		p.blank()
		p.oneUnread(&n.Unread[i], p.width)
	}
	if more := len(n.Unread) - unreadMost; more > 0 {
		p.blank()
		p.line(piece{plain, "And " + strconv.Itoa(more) + " more; the files below have all."})
	}
}

// waiting tells what is left for the next sweep, and what is no dump.
func (p *page) waiting(n *report.Night) {
	if len(n.Waiting) > 0 {
		p.blank()
		p.sentence(plain, "", report.Upper(report.Some(len(n.Waiting), "dump waits", "dumps wait"))+" for the next sweep: "+waitingNames(n.Waiting)+".")
	}
	if n.OtherFiles > 0 {
		p.blank()
		p.sentence(plain, "", report.Upper(report.Some(n.OtherFiles, "other file is no dump and was", "other files are no dumps and were"))+" left alone.")
	}
}

func waitingNames(waiting []report.Waiting) string {
	const most = 4
	var names []string
	for _, w := range waiting[:min(len(waiting), most)] {
		names = append(names, Shorten(w.Dump, 40)+" ("+Clean(w.Says)+")")
	}
	if more := len(waiting) - most; more > 0 {
		names = append(names, "and "+strconv.Itoa(more)+" more")
	}
	return strings.Join(names, ", ")
}

// files are not wrapped: a path that is broken can be neither copied nor
// tapped.
func (p *page) files(o SummaryOptions) {
	if len(o.Files) == 0 {
		return
	}
	p.blank()
	p.line(piece{strong, "FILES"})
	for _, f := range o.Files {
		p.line(piece{plain, Clean(f)})
	}
	if o.Volumes > 1 {
		p.sentence(plain, "", "The pages fill "+report.Number(o.Volumes)+" volumes; the most urgent runs stand in summary.pdf.")
	}
}
