package ingest_test

import (
	"fmt"
	"math/rand/v2"
	"slices"
	"strings"

	"lastdrop/ingest"
	"lastdrop/schemas"
)

// pollution is one damaged dump.
type pollution struct {
	kind       string
	what       string // where and how, to do it again by hand
	data       []byte
	path       string // as Read gets it
	intact     bool   // the information is all there
	apart      bool   // what is left is well formed, and the dialect has nothing to show it
	oneCell    bool   // one character or the end of one line: another valid cell may be left
	cut        bool   // several characters are gone: a fact may be with them
	structural bool   // the character is one of structure: no number may become another
}

// polluter makes damage of one clean dump.
type polluter struct {
	*clean
	rng  *rand.Rand
	made func(pollution)
	eol  string
	body []string // lines without ends
	rows map[int]bool
	head int // index of the (first) header line

	runes []rune // of the text
	ends  []int  // offset in the bytes of each, and of the end
}

func newPolluter(c *clean, seed uint64, made func(pollution)) *polluter {
	p := &polluter{clean: c, rng: rand.New(rand.NewPCG(seed, 0x6c617374)), made: made, rows: map[int]bool{}}
	switch {
	case strings.Contains(c.text, "\r\n"):
		p.eol = "\r\n"
	case strings.Contains(c.text, "\r"):
		p.eol = "\r"
	default:
		p.eol = "\n"
	}
	p.body = strings.Split(c.text, p.eol)
	p.runes, p.ends = []rune(c.text), []int{len(c.coding.mark)}
	bare := coding{c.coding.encoding, "", c.coding.upper}
	for _, r := range p.runes {
		p.ends = append(p.ends, p.ends[len(p.ends)-1]+len(bare.encode(string(r))))
	}
	first := len(p.body)
	for i := range c.runs {
		for _, r := range c.runs[i].Readings {
			p.rows[r.Line-1] = true
			first = min(first, r.Line-1)
		}
	}
	p.head = first - 1
	if h := c.schema.Dialect.HeaderRows; h != nil {
		p.head = first - h[len(h)-1]
	}
	return p
}

// text makes a polluted dump of a text in the encoding of the clean one.
func (p *polluter) text(kind, what, text string, more ...func(*pollution)) {
	p.bytes(kind, what, p.encode(text), more...)
}

func (p *polluter) bytes(kind, what string, data []byte, more ...func(*pollution)) {
	one := pollution{kind: kind, what: what, data: data, path: p.path}
	for _, f := range more {
		f(&one)
	}
	p.made(one)
}

func intact(p *pollution)     { p.intact = true }
func isApart(p *pollution)    { p.apart = true }
func oneCell(p *pollution)    { p.oneCell = true }
func cut(p *pollution)        { p.oneCell, p.cut = true, true }
func structural(p *pollution) { p.oneCell, p.structural = true, true }

// lines is the dump with other lines.
func (p *polluter) lines(kind, what string, lines []string, more ...func(*pollution)) {
	p.text(kind, what, strings.Join(lines, p.eol), more...)
}

func (p *polluter) with(i int, line string) []string {
	lines := slices.Clone(p.body)
	lines[i] = line
	return lines
}

// thin reports whether one place of a dump is taken: all of a short one, some
// of a long one.
func (p *polluter) thin(oneIn int) bool { return !p.long || p.rng.IntN(oneIn) == 0 }

// all makes every kind of damage.
func (p *polluter) all() {
	p.truncations()
	p.structureAnywhere()
	p.delimiters()
	p.lineDamage()
	p.rowDamage()
	p.headerDamage()
	p.decimalMarks()
	p.columnDamage()
	p.secondTables()
	p.flips()
	p.lineEnds()
	p.encodings()
	p.harmless()
}

// truncations cut the dump off after any byte.
func (p *polluter) truncations() {
	data := p.encode(p.clean.text)
	for n := range data {
		if !p.thin(8) {
			continue
		}
		var more []func(*pollution)
		if p.seenByNobody(n) {
			more = append(more, isApart)
		}
		p.bytes("truncation", fmt.Sprintf("after %d bytes", n), data[:n], more...)
	}
}

// seenByNobody: what is left ends in a whole line, and nothing is due that is
// missing; or the dialect permits a last line without end.
func (p *polluter) seenByNobody(n int) bool {
	if p.schema.KeepUnterminated {
		return true
	}
	k, whole := slices.BinarySearch(p.ends, n)
	if !whole {
		return false // half a character shows the cut
	}
	text := string(p.runes[:k])
	begun := strings.TrimSuffix(strings.TrimSuffix(text, "\n"), "\r")
	line := strings.Count(begun, p.eol)
	atEnd := begun != text || text == ""
	if end := p.schema.Stack.End; end != "" && p.outside(line) && strings.HasSuffix(text, p.body[line]) {
		return true // with its count the end of a run is whole without line end
	}
	return atEnd && (!p.closes() || line >= p.closing() || p.schema.Stack.End != "" && p.outside(line))
}

// closing is the line that shows where the table ends: below it only facts can
// be lost.
func (p *polluter) closing() int {
	begin := p.schema.Footer.Begin
	if p.schema.Footer.Lines == schemas.CommentLines {
		return len(p.body) - len(p.footer())
	}
	if begin == "" || p.schema.Layout == schemas.Long {
		return len(p.body)
	}
	last := len(p.body)
	for i, line := range p.body {
		rest, found := strings.CutPrefix(strings.Trim(line, string(rune(p.schema.Dialect.QuoteChar))), begin)
		if found && (rest == "" || strings.ContainsRune(string([]byte{p.schema.Dialect.Delimiter, p.schema.Dialect.QuoteChar}), rune(rest[0]))) {
			last = i
		}
	}
	return last
}

// footer is the lines below the last row.
func (p *polluter) footer() []string {
	for i := len(p.body) - 1; i >= 0; i-- {
		if p.rows[i] {
			return p.body[i+1:]
		}
	}
	return p.body
}

// outside reports whether a line ends a run, or stands between runs.
func (p *polluter) outside(line int) bool {
	return strings.HasPrefix(p.body[line], p.schema.Stack.End) || p.body[line] == "" || line == 0
}

// structureAnywhere puts a character of structure before any character, or in
// its place.
func (p *polluter) structureAnywhere() {
	runes := p.runes
	d := &p.schema.Dialect
	for i := range runes {
		for _, c := range []byte{d.Delimiter, d.QuoteChar, '\n'} {
			if c == 0 || !p.thin(15) || !*thorough && p.rng.IntN(4) > 0 {
				continue
			}
			put := string(rune(c))
			if c == '\n' {
				put = p.eol
			}
			mark := structural
			if c == '\n' && (i == 0 || strings.ContainsRune("\r\n", runes[i]) || strings.ContainsRune("\r\n", runes[i-1])) {
				mark = func(*pollution) {}
			}
			p.text("put in", fmt.Sprintf("%q before character %d", put, i), string(runes[:i])+put+string(runes[i:]), mark)
			if p.rng.IntN(2) == 0 {
				p.text("put in place", fmt.Sprintf("%q for character %d", put, i), string(runes[:i])+put+string(runes[i+1:]), p.replaced(runes, i, c))
			}
		}
	}
}

// replaced: a line end or a delimiter for the last character of a line cuts it off, which
// leaves another valid number.
func (p *polluter) replaced(runes []rune, i int, c byte) func(*pollution) {
	ends := func(i int) bool { return i < 0 || i >= len(runes) || runes[i] == '\r' || runes[i] == '\n' }
	if ends(i) { // two lines become one
		return structural
	}
	if c == p.schema.Dialect.Delimiter && p.schema.Dialect.Repeated { // blanks beside a cell part nothing
		return oneCell
	}
	if c == '\n' && (ends(i+1) || ends(i-1)) || c == p.schema.Dialect.Delimiter && ends(i+1) {
		return oneCell
	}
	return structural
}

// delimiters are lost and doubled.
func (p *polluter) delimiters() {
	for i, c := range []byte(p.clean.text) {
		if c != p.schema.Dialect.Delimiter || !p.thin(6) {
			continue
		}
		p.text("delimiter lost", fmt.Sprintf("at byte %d of the text", i), p.clean.text[:i]+p.clean.text[i+1:], structural)
		p.text("delimiter doubled", fmt.Sprintf("at byte %d of the text", i), p.clean.text[:i]+p.clean.text[i:i+1]+p.clean.text[i:], structural)
	}
}

// read reads one polluted dump.
func (one *pollution) read(set []*schemas.Schema) ([]ingest.Run, *schemas.Schema, []*schemas.Problem) {
	return ingest.Read(one.data, one.path, set)
}
