package draft

import (
	"bytes"
	"errors"
	"fmt"
	"strings"

	"lastdrop/ingest/cells"
	"lastdrop/schemas"
)

// line is one line of the dump, cut by the dialect at hand.
type line struct {
	number  int
	text    string
	cells   []string
	comment bool
	faulty  bool
}

func (l *line) blank() bool { return strings.Trim(l.text, " \t,;|") == "" }

// decode finds out the encoding.
func (d *draft) decode() error {
	candidates, why := d.encodings()
	for i, e := range candidates {
		text, fault := cells.Decode(d.data, e)
		if fault != nil {
			if i+1 < len(candidates) {
				continue
			}
			return fmt.Errorf("%d:%d: %s; %s", fault.Line, fault.Col, fault.Msg, fault.Hint)
		}
		d.encoding = e
		runnerUp := ""
		if e == schemas.Windows1252 {
			runnerUp = string(schemas.Latin1)
			d.unsure("encoding: one byte a character; look whether letters beyond a to z are right")
		}
		d.choose("encoding", string(e), why, runnerUp)
		d.data = bytes.Clone(d.data)
		d.lines = []line{{text: string(text.Body)}} // cut later, by each dialect
		return nil
	}
	return errors.New("the dump is no text")
}

// encodings are those that the bytes may be, the likeliest first.
func (d *draft) encodings() (list []schemas.Encoding, why string) {
	nul := bytes.IndexByte(d.data, 0)
	switch {
	case bytes.HasPrefix(d.data, []byte("\xff\xfe")), bytes.HasPrefix(d.data, []byte("\xfe\xff")):
		return []schemas.Encoding{schemas.UTF16}, "its byte order mark"
	case nul >= 0 && nul%2 == 1:
		return []schemas.Encoding{schemas.UTF16LE}, "every second byte is 0, and no byte order mark"
	case nul >= 0:
		return []schemas.Encoding{schemas.UTF16BE}, "every second byte is 0, and no byte order mark"
	}
	if _, fault := cells.Decode(d.data, schemas.UTF8); fault == nil {
		return []schemas.Encoding{schemas.UTF8}, "all bytes are UTF-8"
	}
	return []schemas.Encoding{schemas.Windows1252, schemas.Latin1}, "not all bytes are UTF-8"
}

// cut cuts the text into lines by a dialect.
func cut(body string, dialect schemas.Dialect) []line {
	scan := cells.Scanner{Body: []byte(body), Delimiter: dialect.Delimiter, Quote: dialect.QuoteChar, Comment: dialect.CommentChar}
	var list []line
	var row cells.Row
	for scan.Next(&row) {
		l := line{number: row.Line, text: strings.TrimRight(body[row.From:row.To], " "), comment: row.Comment, faulty: row.Fault != ""}
		for _, c := range row.Cells {
			l.cells = append(l.cells, string(scan.Bytes(c)))
		}
		list = append(list, l)
	}
	return list
}

// trial is one dialect with what it finds.
type trial struct {
	dialect schemas.Dialect
	lines   []line
	blocks  []block
	score   float64
}

func (t *trial) name() string {
	return fmt.Sprintf("%s between cells, decimal mark %q", delimiterName(t.dialect.Delimiter), string(t.dialect.DecimalChar))
}

func delimiterName(c byte) string {
	if c == '\t' {
		return "tab"
	}
	return fmt.Sprintf("%q", string(c))
}

// chooseDialect tries every delimiter with every decimal mark. The best has
// the most cells that are numbers in rows of one width.
func (d *draft) chooseDialect() bool {
	body := d.lines[0].text
	var best, next *trial
	for _, delimiter := range []byte{'\t', ';', ',', '|'} {
		for _, mark := range []byte{'.', ','} {
			if mark == delimiter {
				continue
			}
			t := try(body, delimiter, mark)
			switch {
			case best == nil || t.score > best.score:
				best, next = t, best
			case next == nil || t.score > next.score:
				next = t
			}
		}
	}
	if best.score == 0 {
		return false
	}
	d.dialect, d.lines = best.dialect, best.lines
	d.dialect.Encoding = d.encoding
	runnerUp := ""
	if next != nil && next.score > 0 {
		runnerUp = fmt.Sprintf("%s, %.0f %% as good", next.name(), 100*next.score/best.score)
		if next.score == best.score && next.dialect.Delimiter == best.dialect.Delimiter {
			d.unsure("decimalChar: no number shows which mark it is")
		}
	}
	d.choose("delimiter and decimal mark", best.name(), fmt.Sprintf("%d rows of numbers in columns", rowsOf(best.blocks)), runnerUp)
	if best.dialect.CommentChar != 0 {
		d.choose("comment sign", string(best.dialect.CommentChar), "lines begin with it", "")
	}
	return d.findTables(best.blocks)
}

func rowsOf(blocks []block) int {
	n := 0
	for _, b := range blocks {
		n += b.to - b.from
	}
	return n
}

// try cuts the dump by one dialect and values the outcome.
func try(body string, delimiter, mark byte) *trial {
	t := &trial{dialect: schemas.Dialect{Delimiter: delimiter, QuoteChar: '"', DecimalChar: mark, CommentChar: commentChar(body)}}
	t.lines = cut(body, t.dialect)
	t.blocks = t.find()
	if t.blocks == nil {
		for _, group := range []string{"'", " ", ".", ","} {
			if group == string(rune(mark)) || group == string(rune(delimiter)) {
				continue
			}
			t.dialect.GroupChar = group
			if t.blocks = t.find(); t.blocks != nil {
				break
			}
		}
	} else {
		t.grouped(mark, delimiter)
	}
	for _, b := range t.blocks {
		numbers, all := 0, 0
		for _, l := range t.lines[b.from:b.to] {
			for _, c := range l.cells {
				if c == "" {
					continue
				}
				all++
				if _, ok := t.number(c); ok {
					numbers++
				}
			}
		}
		share := float64(numbers) / float64(max(all, 1))
		t.score += float64(numbers) * share * share
	}
	return t
}

// grouped finds out whether numbers have groups of digits.
func (t *trial) grouped(mark, delimiter byte) {
	before := rowsOf(t.blocks)
	for _, group := range []string{"'", " ", ".", ","} {
		if group == string(rune(mark)) || group == string(rune(delimiter)) {
			continue
		}
		with := *t
		with.dialect.GroupChar = group
		if blocks := with.find(); rowsOf(blocks) > before {
			t.dialect.GroupChar, t.blocks = group, blocks
			return
		}
	}
}

// commentChar is the sign with which several lines or the first one begin and
// that no number and no title does.
func commentChar(body string) byte {
	for _, c := range []byte("#%!*") {
		n := 0
		for l := range strings.FieldsFuncSeq(body, func(r rune) bool { return r == '\n' || r == '\r' }) {
			if l = strings.TrimLeft(l, " "); l != "" && l[0] == c {
				n++
			}
		}
		if n >= 2 || n == 1 && strings.HasPrefix(strings.TrimLeft(body, " \r\n"), string(c)) {
			return c
		}
	}
	return 0
}

// number reads a cell that may have a unit behind it.
func (t *trial) number(s string) (v float64, ok bool) { return numberOf(s, &t.dialect) }

func numberOf(s string, dialect *schemas.Dialect) (v float64, ok bool) {
	w := schemas.Written{Bounds: true}
	if i := strings.LastIndexAny(s, "0123456789"); i >= 0 && i < len(s)-1 {
		if suffix := strings.TrimSpace(s[i+1:]); unitNamed(suffix) != "" {
			w.Suffixes = []string{suffix}
		}
	}
	n, _, fault := cells.ParseWritten([]byte(s), dialect, &w)
	return n.Value, fault == cells.NumberOK
}
