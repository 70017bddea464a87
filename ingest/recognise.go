package ingest

import (
	"bytes"
	"fmt"
	"strings"

	"lastdrop/ingest/cells"
	"lastdrop/schemas"
)

// maxHeaderSearch is how many rows, comments and blank lines aside, are
// searched for a header when a schema is to be recognised by it.
const maxHeaderSearch = 200

// texts decodes a dump once for each encoding.
type texts struct {
	data  []byte
	done  []decoded
	loose *cells.Text
}

type decoded struct {
	encoding schemas.Encoding
	text     *cells.Text
	fault    *cells.Fault
}

func (t *texts) of(e schemas.Encoding) (*cells.Text, *cells.Fault) {
	for _, d := range t.done {
		if d.encoding == e {
			return d.text, d.fault
		}
	}
	text, fault := cells.Decode(t.data, e)
	t.done = append(t.done, decoded{e, text, fault})
	return text, fault
}

// loosely is the dump as whatever text can be made of it, for diagnosis only.
func (t *texts) loosely() *cells.Text {
	if t.loose == nil {
		t.loose = cells.Loose(t.data)
	}
	return t.loose
}

// recognise returns the one schema of the set whose evidence the dump has.
func recognise(data []byte, path string, set []*schemas.Schema) (*schemas.Schema, *cells.Text, *schemas.Problem) {
	all := &texts{data: data}
	var fitting []*schemas.Schema
	for _, s := range set {
		text, fault := all.of(s.Dialect.Encoding)
		if fault == nil && fits(text, s) {
			fitting = append(fitting, s)
		}
	}
	switch len(fitting) {
	case 1:
		text, _ := all.of(fitting[0].Dialect.Encoding)
		return fitting[0], text, nil
	case 0:
		return nil, nil, noneFits(all, path, set)
	}
	return nil, nil, &schemas.Problem{Path: path, Line: 1, Col: 1, Field: "schema", Msg: "the schemas " + names(fitting) + " both fit",
		Hint: "state narrower evidence in [recognise] of one of them"}
}

func names(set []*schemas.Schema) string {
	list := make([]string, len(set))
	for i, s := range set {
		list[i] = s.Name
	}
	return strings.Join(list, " and ")
}

// fits reports whether all evidence that the schema states is there.
func fits(t *cells.Text, s *schemas.Schema) bool {
	if s.Recognise.FirstLine != "" {
		if line, _ := firstLine(t, s); string(line) != s.Recognise.FirstLine {
			return false
		}
	}
	return !s.Recognise.Header || headerLine(t, s) > 0
}

// firstLine returns the first line that is not blank, without blanks around it
// and delimiters behind it, and its number.
func firstLine(t *cells.Text, s *schemas.Schema) (line []byte, number int) {
	body := t.Body
	for number = 1; len(body) > 0; number++ {
		end := bytes.IndexAny(body, "\r\n")
		if end < 0 {
			end = len(body)
		}
		line = bytes.Trim(body[:end], " \t")
		line = bytes.TrimRight(line, " \t"+string(rune(s.Dialect.Delimiter)))
		if len(line) > 0 {
			return line, number
		}
		if bytes.HasPrefix(body[end:], []byte("\r\n")) {
			end++
		}
		body = body[min(end+1, len(body)):]
	}
	return nil, 1
}

// headerLine returns the line of the header row, 0 when there is none. Where
// facts stand in comment lines or nowhere, it must be the first row.
func headerLine(t *cells.Text, s *schemas.Schema) int {
	scan := scannerOf(t, s)
	var row cells.Row
	for n := 0; n < maxHeaderSearch && scan.Next(&row); {
		if row.Comment || row.Blank() {
			continue
		}
		n++
		if fitHeader(s, &scan, &row).complete() {
			return row.Line
		}
		if s.Preamble.Lines != schemas.CellLines && s.Recognise.FirstLine == "" {
			return 0
		}
	}
	return 0
}

// miss is how nearly a schema fits a dump that none fits.
type miss struct {
	near      bool
	line, col int
	why       string
}

// noneFits names the schemas that nearly fit, and the next command.
func noneFits(all *texts, path string, set []*schemas.Schema) *schemas.Problem {
	p := &schemas.Problem{Path: path, Line: 1, Col: 1, Field: "schema", Hint: "look at it with: lastdrop look " + shellWord(path)}
	var near []string
	for _, s := range set {
		m := missed(all, s)
		if !m.near {
			continue
		}
		if near == nil {
			p.Line, p.Col = m.line, m.col
		}
		near = append(near, fmt.Sprintf("%s nearly does, but %s", s.Name, m.why))
	}
	p.Msg = "no schema fits"
	switch {
	case len(set) == 0:
		p.Msg += "; there is none"
	case near == nil:
		line, _ := firstLine(all.loosely(), set[0])
		p.Msg += fmt.Sprintf("; it begins with %s (tried %s)", cells.Quoted(line), strings.ReplaceAll(names(set), " and ", ", "))
	default:
		p.Msg += ": " + strings.Join(near, "; ")
	}
	return p
}

// missed looks for the evidence of a schema that does not fit, in the text of
// any encoding.
func missed(all *texts, s *schemas.Schema) miss {
	text, fault := all.of(s.Dialect.Encoding)
	if fault != nil {
		near := fits(all.loosely(), s)
		return miss{near, fault.Line, fault.Col, fmt.Sprintf("%s (%s)", fault.Msg, fault.Hint)}
	}
	if want := s.Recognise.FirstLine; want != "" {
		line, n := firstLine(text, s)
		if string(line) == want { // so the header is lacking
			return miss{true, n, 1, headerWanted(s)}
		}
		if headerLine(text, s) > 0 || alike(line, want) {
			return miss{true, n, 1, fmt.Sprintf("line %d is %s where it expects %q", n, cells.Quoted(line), want)}
		}
		return miss{}
	}
	return missedHeader(text, s)
}

// missedHeader looks whether the header would be there with another delimiter
// or further down.
func missedHeader(t *cells.Text, s *schemas.Schema) miss {
	for _, delimiter := range []byte{',', ';', '\t', '|'} {
		try := *s
		try.Dialect.Delimiter = delimiter
		try.Preamble.Lines = schemas.CellLines
		n := headerLine(t, &try)
		switch {
		case n == 0:
		case delimiter != s.Dialect.Delimiter:
			return miss{true, n, 1, fmt.Sprintf("the header in line %d has %q between its columns, not %q", n, string(delimiter), string(s.Dialect.Delimiter))}
		default:
			line, at := firstLine(t, &schemas.Schema{Dialect: s.Dialect})
			return miss{true, at, 1, fmt.Sprintf("%s in line %d is neither a fact nor the header", cells.Quoted(line), at)}
		}
	}
	return meantHeader(t, s)
}

// meantHeader looks for a header that lacks a column.
func meantHeader(t *cells.Text, s *schemas.Schema) miss {
	scan := scannerOf(t, s)
	var row cells.Row
	for n := 0; n < maxHeaderSearch && scan.Next(&row); n++ {
		if !row.Comment && fitHeader(s, &scan, &row).meant() {
			return miss{true, row.Line, 1, fmt.Sprintf("the header is %s (%s)", cells.Quoted(t.Body[row.From:row.To]), headerWanted(s))}
		}
	}
	return miss{}
}

// alike reports whether a first line is the wanted one but for upper and lower
// case or its last cells, such as a version.
func alike(line []byte, want string) bool {
	cut := func(s string) string {
		if i := strings.IndexAny(s, ",;\t|"); i >= 0 {
			s = s[:i]
		}
		return s
	}
	a, b := cut(string(line)), cut(want)
	return a != "" && strings.EqualFold(a, b)
}

// shellWord quotes a path for a command line where it needs to be.
func shellWord(s string) string {
	if s != "" && !strings.ContainsFunc(s, func(r rune) bool {
		return !strings.ContainsRune("abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ0123456789._-/:\\", r)
	}) {
		return s
	}
	return "'" + strings.ReplaceAll(s, "'", `'\''`) + "'"
}
