package xlsx

import (
	"lastdrop/report"
)

// words are those that the workbook itself uses, one thing each.
var words = [...][2]string{
	{"run", "one titration: one curve with its facts. A dump may hold many"},
	{"dump", "a file that an instrument wrote; the raw record. Never changed"},
	{"reading", "one measured value: pH, potential in mV, or conductivity in mS/cm"},
	{"indicated", "what the instrument itself says"},
	{"refit", "what lastdrop computes from the readings"},
	{"difference", "refit minus indicated endpoint. Only like kinds are compared; empty where they are unlike"},
	{"agreement limit", "a difference of like kinds above it disputes the run; an inflection must also lie outside the bracket of the refit"},
	{"u", "standard uncertainty (k = 1) of the refit from the readings only; burette, titrant and aliquot are not included"},
	{"95 % low, high", "the interval that holds the endpoint in 95 of 100 cases, from the readings only"},
	{"bracket", "the two readings on either side of an endpoint"},
	{"estimator", "the way in which an endpoint was computed"},
	{"schema", "a file that maps an instrument's columns and preamble to the fields of a run"},
	{"procedure", "one kind of determination, as the dump names it"},
	{"facts", "what a dump says about a run besides readings"},
	{"repair", "a change made to read a run; each one is listed"},
	{"flag", "one named reason for doubt, with its figure, its limit and its weight"},
	{"open", "said of a dispute that no decision settles"},
	{"unread", "a dump, or a run in it, that could not be read; it has no result"},
	{"id", "the identity of a run, the same in every file and on every page"},
}

func layGlossary(b *book, p *places) error {
	s := b.open(layout{name: glossarySheet, columns: []column{{width: 20}, {width: 46}, {width: 90}}, tab: second}, p.footer)
	s.put(0, heading("Words, marks and flags"))
	s.skip(1)
	layMarks(s)
	s.skip(1)
	s.put(0, title2("Kinds of endpoint"))
	s.put(0, head("kind"), head("what it is"), head(""))
	for _, k := range report.Kinds() {
		s.put(0, text(k.Kind), text(k.Means))
	}
	s.skip(1)
	layFlagWords(s)
	s.skip(1)
	s.put(0, title2("Words"))
	s.put(0, head("word"), head("meaning"), head(""))
	for _, w := range words {
		s.put(0, text(w[0]), text(w[1]))
	}
	return s.finish()
}

func layMarks(s *sheet) {
	s.put(0, title2("Verdicts"))
	s.put(0, head("verdict"), head("meaning"), head(""))
	s.put(0, verdictCell(report.VerdictDisputed), text("a second person must settle it"))
	s.put(0, verdictCell(report.VerdictDoubtful), text("look before use"))
	s.put(0, verdictCell(report.VerdictSound), text(report.SoundMeans))
	s.put(0, cell{unreadMark + " unread", plain()}, text("not read, no result"))
	s.put(0, weightCell(report.Note), text("a flag that is worth telling and no doubt"))
	s.put(0, cell{"blue", plain().in(blue)}, text("what lastdrop computed; black is what the instrument wrote"))
}

func layFlagWords(s *sheet) {
	s.put(0, title2("Flags, those of most concern first; their limits stand in the sheet "+provenanceSheet))
	s.put(0, head("flag"), head("what happened"), head("what to do"))
	for _, f := range report.Flags() {
		s.put(0, text(f.Flag), wrapped(f.Headline), wrapped(f.Do))
	}
}
