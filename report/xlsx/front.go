package xlsx

import (
	"strconv"
	"strings"

	"lastdrop/report"
)

// urgentMost is how many runs the front sheet lists before it refers to the
// sheet of endpoints.
const urgentMost = 40

var frontColumns = []column{{width: 14}, {width: 21}, {width: 29}, {width: 62}, {width: 12}, {width: 12}, {width: 13}, {width: 18}}

func layNight(b *book, p *places) error {
	s := b.open(layout{name: nightSheet, columns: frontColumns, tab: ink}, p.footer)
	layHeadline(s, p.night)
	layTotals(s, p.night)
	layUrgent(s, p)
	layProcedures(s, p.night)
	layFrontUnread(s, p.night)
	layFoot(s, p)
	return s.finish()
}

func layHeadline(s *sheet, n *report.Night) {
	must, rest := n.Headline()
	s.put(24, heading(must))
	if rest != "" {
		s.put(16, cell{rest, look{colour: ink, size: 11}})
	}
	about := "published " + report.Day(n.Date)
	if n.Laboratory != "" {
		about = n.Laboratory + ", " + about
	}
	if days := n.Days(); days != "" {
		about += ", " + days
	}
	s.put(0, label(report.Upper(about)+"."))
	if n.Invented {
		s.put(0, cell{report.InventedNote, plain().strong()})
	}
}

func layTotals(s *sheet, n *report.Night) {
	s.skip(1)
	s.put(0, head("verdict"), headRight("runs"), head("meaning"))
	for _, v := range [...]struct {
		verdict report.Verdict
		means   string
	}{
		{report.VerdictDisputed, "a second person must settle it"},
		{report.VerdictDoubtful, "look before use"},
		{report.VerdictSound, report.SoundMeans},
	} {
		s.put(0, verdictCell(v.verdict), count(n.Count(v.verdict)), text(v.means))
	}
	s.put(0, cell{unreadMark + " unread", plain()}, count(len(n.Unread)), text("dumps or runs, not read, no result"))
}

// layUrgent lists what must be looked at, most urgent first, each with a link
// to its row.
func layUrgent(s *sheet, p *places) {
	urgent := p.night.Urgent()
	if len(urgent) == 0 {
		return
	}
	s.skip(1)
	s.put(0, title2("Look at these first, the most urgent on top"))
	s.put(0, head("verdict"), head("sample"), head("procedure"), head("why"), headRight("refit (mL)"), headRight("indicated (mL)"),
		headRight("difference (mL)"), head("link"))
	rows := p.rowsByRun()
	for _, e := range urgent[:min(len(urgent), urgentMost)] {
		layUrgentRun(s, e, rows[e])
	}
	if more := len(urgent) - urgentMost; more > 0 {
		s.put(0, text("And "+strconv.Itoa(more)+" more: filter the sheet "+endpointsSheet+" by its first column."))
	}
}

func (p *places) rowsByRun() map[*report.Evaluation]int {
	rows := make(map[*report.Evaluation]int, len(p.endpoint))
	for i, row := range p.endpoint {
		rows[&p.night.Evaluations[i]] = row
	}
	return rows
}

// layUrgentRun tells a run by the pair that its heaviest flag is about.
func layUrgentRun(s *sheet, e *report.Evaluation, row int) {
	why, pair := "", report.Pair{}
	pairs, about := e.Pairs(), 0
	if f := e.Heaviest(); f != nil {
		w, _ := report.Words(f.Flag)
		why, about = report.Upper(w.Headline)+". "+f.Says, f.Endpoint
	}
	for i := len(pairs) - 1; i >= 0; i-- {
		if r := pairs[i].Refit; i == 0 || r != nil && r.N == about {
			pair = pairs[i]
			break
		}
	}
	figures := figureCells(e, pair)
	refit := figures[2]
	if pair.Refit == nil {
		refit = cell{"none", look{colour: second, size: textSize, italic: true, right: true}}
	}
	s.linkTo(8, place(endpointsSheet, row), "to the endpoints of this run")
	s.put(0, verdictCell(e.Verdict), wrapped(e.Facts.Sample), wrapped(e.Facts.Procedure), wrapped(why), refit, figures[7], figures[8], link("Endpoints, row "+strconv.Itoa(row)))
}

func layProcedures(s *sheet, n *report.Night) {
	counts := n.Procedures()
	if len(counts) == 0 {
		return
	}
	s.skip(1)
	s.put(0, title2("Runs by procedure"))
	s.put(0, headRight("runs"), head("procedure"), head(""), head("one mark a run"), headRight("disputed"), headRight("doubtful"), headRight("sound"))
	for _, c := range counts {
		name := text(c.Procedure)
		if c.Procedure == "" {
			name = cell{"no procedure stated", look{colour: second, size: textSize, italic: true}}
		}
		s.put(0, count(c.Runs()), name, cell{}, text(marksOf(c)), count(c.Disputed), count(c.Doubtful), count(c.Sound))
	}
}

// marksMost is how many marks a line holds; more runs are told by figures only.
const marksMost = 40

func marksOf(c report.ProcedureCount) string {
	if c.Runs() > marksMost {
		return ""
	}
	return strings.Repeat(verdictMark(report.VerdictDisputed), c.Disputed) +
		strings.Repeat(verdictMark(report.VerdictDoubtful), c.Doubtful) +
		strings.Repeat(verdictMark(report.VerdictSound), c.Sound)
}

func layFrontUnread(s *sheet, n *report.Night) {
	if len(n.Unread) == 0 {
		return
	}
	s.skip(1)
	s.put(0, title2("Unread, without a result until it is read"))
	s.put(0, head("state"), head("place"), head(""), head("what was found, what to do"), head(""), head(""), head(""), head("link"))
	for i := range n.Unread[:min(len(n.Unread), urgentMost)] {
		u := &n.Unread[i]
		s.linkTo(8, place(unreadSheet, i+2), "to the whole entry")
		s.put(0, cell{unreadMark + " " + u.State, plain()}, text(position(u)), cell{}, wrapped(foundAndHint(u)), cell{}, cell{}, cell{},
			link("Unread, row "+strconv.Itoa(i+2)))
	}
	if more := len(n.Unread) - urgentMost; more > 0 {
		s.put(0, text("And "+strconv.Itoa(more)+" more in the sheet "+unreadSheet+"."))
	}
}

func foundAndHint(u *report.Unread) string {
	says := u.Says
	if u.Field != "" {
		says = u.Field + ": " + says
	}
	if u.Hint != "" {
		says += "; " + u.Hint
	}
	if u.Next != "" {
		says += ". Next: " + u.Next
	}
	return says
}

func layFoot(s *sheet, p *places) {
	curves := ""
	if p.curves {
		curves = curvesSheet + " has readings and computed curves; "
	}
	s.skip(1)
	s.put(0, label(report.Caution))
	s.put(0, label("Sheets: "+endpointsSheet+" has a row for each endpoint, "+flagsSheet+" one for each flag; "+curves+provenanceSheet+" tells the limits, "+glossarySheet+" the words. lastdrop "+p.night.Lastdrop))
}
