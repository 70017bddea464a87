package xlsx

import (
	"lastdrop/report"
)

var unreadColumns = []column{
	{"state", 12, ink, false}, {"dump", 36, ink, false}, {"run", 6, ink, true}, {"line", 7, ink, true}, {"column", 8.5, ink, true}, {"field", 14, ink, false},
	{"what was found", 50, ink, false}, {"what to do", 44, ink, false}, {"next command", 46, ink, false}, {"schema", 14, ink, false}, {"SHA-256 of the dump", 70, ink, false},
}

func layUnread(b *book, p *places) error {
	unread := p.night.Unread
	s := b.open(layout{name: unreadSheet, columns: unreadColumns, table: true, frozen: 2, pagesWide: 2, rows: len(unread) + passedRows(p.night), tab: second}, p.footer)
	for i := range unread {
		u := &unread[i]
		s.put(0, cell{unreadMark + " " + u.State, plain()}, wrapped(u.Dump), countIf(u.Run), countIf(u.Line), countIf(u.Column), text(u.Field),
			wrapped(u.Says), wrapped(u.Hint), wrapped(u.Next), text(u.Schema), text(u.DumpSHA256))
	}
	if len(unread)+passedRows(p.night) == 0 {
		s.put(0, text("Every dump was read."))
	}
	layPassed(s, p.night)
	return s.finish()
}

// position is where in a dump the trouble is: dump, line and column as far as
// they are known.
func position(u *report.Unread) string {
	p := u.Dump
	if u.Line > 0 {
		p += ":" + report.Fixed(float64(u.Line), 0)
		if u.Column > 0 {
			p += ":" + report.Fixed(float64(u.Column), 0)
		}
	}
	return p
}
