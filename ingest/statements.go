package ingest

import (
	"bytes"
	"fmt"
	"slices"
	"strings"
	"unicode"

	"lastdrop/ingest/cells"
	"lastdrop/ingest/match"
	"lastdrop/schemas"
)

// statement is one key with its value, wherever the dump has it: in a
// preamble, in the row that ends a run, in a footer.
type statement struct {
	key, value []byte
	line       int
	start, at  int  // offsets of the line and of the value
	mark       bool // belongs to the layout; not a fact of its own
	used       bool
}

// maxStatements is how many statements of one run are kept.
const maxStatements = 200

func (d *draft) addStatement(s statement) {
	if d.statements == nil {
		d.statements = make([]statement, 0, 16) // a run has a dozen
	}
	if len(d.statements) < maxStatements {
		d.statements = append(d.statements, s)
		return
	}
	d.repairs.Add(s.line, fmt.Sprintf("more than %d facts, not used", maxStatements))
}

// cellStatement reads a row of key and value. A value that holds the delimiter
// is taken whole.
func (d *draft) cellStatement() {
	if d.row.DropEmptyTail(2) {
		d.repairs.Add(d.row.Line, trailingDropped)
	}
	row := d.row.Cells
	if len(row) < 2 || row[0].Empty() {
		d.restOfNumber(d.text.Body[d.row.From:d.row.To])
		d.repairs.Add(d.row.Line, fmt.Sprintf("%s has no key and value, not used", cells.Quoted(d.text.Body[d.row.From:d.row.To])))
		return
	}
	value := row[1]
	if key := d.scan.Bytes(row[0]); value.Empty() {
		d.remark(key, d.schema.Dialect.Delimiter)
		if d.endsNumber(key) {
			d.repairs.Add(d.row.Line, fmt.Sprintf("%s has no value, not used; it may be the rest of the line above", cells.Quoted(key)))
		} else if !d.knownKey(key) {
			d.repairs.Add(d.row.Line, fmt.Sprintf("%s has no value, not used", cells.Quoted(key)))
		}
	}
	d.strayQuote(d.row.Line, value)
	if len(row) > 2 {
		value.To, value.Quoted = row[len(row)-1].To, false
		d.repairs.Add(d.row.Line, "the value holds the delimiter and was taken whole")
	}
	d.state(row[0], value, false)
}

// endsNumber reports whether a text could be the end of a number: digits, the
// decimal mark or what stands behind it.
func (d *draft) endsNumber(b []byte) bool {
	if len(b) > 0 && (b[0]-'0' < 10 || b[0] == d.schema.Dialect.DecimalChar) {
		return true
	}
	ends := false
	for i := range d.schema.Facts {
		ends = ends || slices.Contains(d.schema.Facts[i].Suffixes, string(b))
	}
	for i := range d.schema.Indicated {
		ends = ends || slices.Contains(d.schema.Indicated[i].Suffixes, string(b))
	}
	return ends
}

// restOfNumber refuses a line that goes on with the number that ends the line
// above: a number cut in two is another number.
func (d *draft) restOfNumber(rest []byte) {
	if len(d.statements) == 0 || len(rest) == 0 {
		return
	}
	s := d.statements[len(d.statements)-1]
	digit := func(c byte) bool { return c-'0' < 10 || c == d.schema.Dialect.DecimalChar }
	if n := len(s.value); s.line == d.row.Line-1 && n > 0 && digit(s.value[n-1]) && digit(rest[0]) && d.knownKey(s.key) {
		d.refuseRow(d.row.From, "", cells.Quoted(rest)+" may be the rest of the number in the line above", "a line is broken in two; export the dump again")
	}
}

// strayQuote tells a quote within an unquoted text, which is kept: it may be
// the rest of a damaged pair.
func (d *draft) strayQuote(line int, c cells.Cell) {
	if q := d.schema.Dialect.QuoteChar; q != 0 && !c.Quoted && bytes.IndexByte(d.scan.Bytes(c), q) >= 0 {
		d.repairs.Add(line, "a quote within a text kept as it is")
	}
}

// commentStatement reads a comment line of key, separator and value. One
// without separator is a remark and no fact.
func (d *draft) commentStatement() {
	from := d.row.From
	line := bytes.TrimRight(d.text.Body[from:d.row.To], " ")
	if bare := bytes.TrimRight(line, " "+string(rune(d.schema.Dialect.Delimiter))); len(bare) < len(line) {
		d.repairs.Add(d.row.Line, trailingDropped) // a spreadsheet adds them when it saves the dump
		line = bare
	}
	open := bytes.IndexByte(line, d.schema.Dialect.CommentChar) + 1
	at := bytes.IndexByte(line[open:], d.schema.Preamble.Separator)
	if at < 0 {
		text := bytes.TrimSpace(line[open:])
		if !d.remark(text, d.schema.Preamble.Separator) && bytes.ContainsFunc(text, unicode.IsLetter) {
			d.repairs.Add(d.row.Line, fmt.Sprintf("%s has no key and value, not used", cells.Quoted(text)))
		}
		return
	}
	key, value := bytes.TrimSpace(line[open:open+at]), line[open+at+1:]
	rest := bytes.TrimLeft(bytes.TrimPrefix(value, []byte{'\t'}), " ") // a further tab may be a damaged digit
	begin := from + open + at + 1
	if i := d.secondFact(value); i >= 0 {
		d.refuseRow(begin+i, "", cells.Quoted(value[i:])+" stands in the line of another fact", "a line end is lost; export the dump again")
	}
	d.tellKeys(value)
	d.addStatement(statement{key: key, value: rest, line: d.row.Line, start: from, at: begin + len(value) - len(rest)})
}

// textStatement reads a line of key, separator and value, whatever delimiters
// stand in it.
func (d *draft) textStatement() {
	from := d.row.From
	line := bytes.TrimRight(d.text.Body[from:d.row.To], " ")
	if bare := bytes.TrimRight(line, " "+string(rune(d.schema.Dialect.Delimiter))); len(bare) < len(line) {
		d.repairs.Add(d.row.Line, trailingDropped)
		line = bare
	}
	at := bytes.IndexByte(line, d.schema.Preamble.Separator)
	if at < 1 {
		d.restOfNumber(line)
		d.repairs.Add(d.row.Line, fmt.Sprintf("%s has no key and value, not used", cells.Quoted(line)))
		return
	}
	value := bytes.TrimLeft(bytes.TrimPrefix(line[at+1:], []byte{'\t'}), " ") // a further tab may be a damaged digit
	d.tellKeys(line[at:])
	if i, n := bytes.IndexByte(value, d.schema.Preamble.Separator), bytes.Count(value, []byte{d.schema.Preamble.Separator}); i >= 0 && (i+1 == len(value) || value[i+1]-'0' >= 10) { // a time of day has some too
		d.repairs.Add(d.row.Line, fmt.Sprintf("the value of %s holds %q (%d) and was taken whole", cells.Quoted(bytes.TrimSpace(line[:at])), string(d.schema.Preamble.Separator), n))
	}
	d.addStatement(statement{key: bytes.TrimSpace(line[:at]), value: value, line: d.row.Line, start: from, at: from + len(line) - len(value)})
}

// tellKeys tells a key with its separator, as the schema writes it, within a
// text: a line end may be lost. It may be part of the text too.
func (d *draft) tellKeys(b []byte) {
	d.eachKey(func(title string) {
		if i := keyAt(b, title, d.schema.Preamble.Separator); i > 0 && (!partOfWord(b[i-1]) || len(title) > 3) {
			d.repairs.Add(d.row.Line, fmt.Sprintf("%q stands in the line of something else, not used", title))
		}
	})
}

// keyAt is where a key with its separator stands in a text, -1 for nowhere.
// Blanks may stand between them.
func keyAt(b []byte, title string, separator byte) int {
	for from := 0; ; {
		i := bytes.Index(b[from:], []byte(title))
		if i < 0 {
			return -1
		}
		from += i + len(title)
		if rest := bytes.TrimLeft(b[from:], " "); len(rest) > 0 && rest[0] == separator {
			return from - len(title)
		}
	}
}

// splitKey is a known key within which the separator of a statement seems to
// stand, "" for none.
func (d *draft) splitKey(s *statement) string {
	joined, split := strings.ToLower(string(s.key)+string(s.value)), ""
	d.eachKey(func(title string) {
		for n := len(title) - 2; n <= len(title)+1 && len(title) > 3; n++ {
			if len(s.key) < len(title) && n <= len(joined) && changes(joined[:n], strings.ToLower(title)) <= 1+len(title)/8 {
				split = title
			}
		}
	})
	return split
}

// remark tells a line without separator that begins with a known key.
func (d *draft) remark(b []byte, separator byte) (told bool) {
	d.eachKey(func(title string) {
		n := len(title)
		if len(b) > n && match.Equal(b[:n], title) && !partOfWord(b[n]) {
			d.repairs.Add(d.row.Line, fmt.Sprintf("no %q behind %s, the fact is not used", string(separator), cells.Quoted(b[:n])))
			told = true
		}
	})
	return told
}

func partOfWord(c byte) bool {
	return c-'0' < 10 || (c|0x20)-'a' < 26 || c == '_' || c >= 0x80
}

// mergedFirst notes a known key in the first line: it has taken the next one in.
func (r *reader) mergedFirst() {
	s := &r.schema.Recognise
	stated := max(len(s.FirstLine), len(s.Begins))
	text := r.text.Body[r.row.From:r.row.To]
	if len(text) <= stated {
		return
	}
	mark := r.schema.Dialect.Delimiter
	if r.schema.Preamble.Lines != schemas.CellLines {
		mark = r.schema.Preamble.Separator
	}
	d := &draft{reader: r}
	d.eachKey(func(title string) {
		if keyAt(text[stated:], title, mark) >= 0 {
			r.merged, r.first = fmt.Sprintf("%q stands in the first line, not used", title), r.row.Line
		}
	})
}

// heldKey is a known key that stands in another one as a word, "" for none.
func (d *draft) heldKey(key []byte) string {
	held := ""
	d.eachKey(func(title string) {
		i := bytes.Index(key, []byte(title))
		if i >= 0 && (i == 0 || !partOfWord(key[i-1])) && (i+len(title) == len(key) || !partOfWord(key[i+len(title)]) || key[i+len(title)]-'0' < 10) && len(title) > len(held) {
			held = title
		}
	})
	return held
}

// secondFact returns where in a value another comment line with a known key
// begins, -1 for nowhere: two lines have become one.
func (d *draft) secondFact(value []byte) int {
	for i, c := range value {
		if c != d.schema.Dialect.CommentChar {
			continue
		}
		key, _, found := bytes.Cut(value[i+1:], []byte{d.schema.Preamble.Separator})
		if found && d.knownKey(bytes.TrimSpace(key)) {
			return i
		}
	}
	return -1
}

func (d *draft) knownKey(key []byte) bool {
	known := false
	d.eachKey(func(title string) { known = known || match.Equal(key, title) })
	return known
}

// eachKey calls f with every key that the schema maps.
func (d *draft) eachKey(f func(title string)) {
	each := func(titles []string) {
		for _, t := range titles {
			f(t)
		}
	}
	for i := range d.schema.Facts {
		each(d.schema.Facts[i].Titles)
		each(d.schema.Facts[i].Times)
	}
	for i := range d.schema.Results {
		each(d.schema.Results[i].Titles)
	}
	for i := range d.schema.Indicated {
		each(d.schema.Indicated[i].Titles)
		each(d.schema.Indicated[i].KindTitles)
	}
}

// nearKey returns the known key that a text most likely was meant to be, ""
// for none: one change in every eight letters.
func (d *draft) nearKey(key string) string {
	near, least := "", 0
	d.eachKey(func(title string) {
		n := changes(strings.ToLower(key), strings.ToLower(title))
		if n <= 1+len(title)/8 && (near == "" || n < least) {
			near, least = title, n
		}
	})
	return near
}

// changes is the least number of bytes to put in, take out or replace to make
// b of a (Levenshtein distance).
func changes(a, b string) int {
	row := make([]int, len(b)+1)
	for j := range row {
		row[j] = j
	}
	for i := range len(a) {
		diagonal := row[0]
		row[0] = i + 1
		for j := range len(b) {
			replaced := diagonal
			if a[i] != b[j] {
				replaced++
			}
			diagonal = row[j+1]
			row[j+1] = min(replaced, diagonal+1, row[j]+1)
		}
	}
	return row[len(b)]
}
