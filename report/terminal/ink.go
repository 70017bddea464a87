package terminal

import "lastdrop/report"

// ink is a colour with a meaning, as on the pages: blue is what lastdrop
// computed, warm speaks against. What the instrument wrote has the terminal's
// own colour.
type ink int

const (
	plain ink = iota
	strong
	faint
	blue
	warm
)

// codes are the terminal's bold and three of its 256 colours, chosen to be
// read on a white and on a black ground (common practice, no source).
var codes = [...]string{plain: "", strong: "1", faint: "38;5;244", blue: "38;5;32", warm: "1;38;5;166"}

func (p *page) paint(one piece) string {
	if !p.colour || codes[one.ink] == "" || one.text == "" {
		return one.text
	}
	return "\x1b[" + codes[one.ink] + "m" + one.text + "\x1b[0m"
}

// verdictMark echoes the marks of the pages in characters that no mail
// program changes: square, lozenge, ring.
func verdictMark(v report.Verdict) string {
	switch v {
	case report.VerdictDisputed:
		return "[!]"
	case report.VerdictDoubtful:
		return "<!>"
	}
	return "( )"
}

const unreadMark = "[?]"

func weightMark(w report.Weight) string {
	if w == report.Note {
		return " - "
	}
	return verdictMark(report.Verdict(w))
}

func verdictInk(v report.Verdict) ink {
	if v == report.VerdictSound {
		return strong
	}
	return warm
}
