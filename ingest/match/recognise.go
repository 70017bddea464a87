package match

import (
	"bytes"
	"fmt"
	"slices"
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

// Found is what a dump was recognised as: the versions of one schema, mostly
// one.
type Found struct {
	Versions []*schemas.Schema
	all      *texts
}

// Text is the dump as text of a schema's encoding.
func (f *Found) Text(s *schemas.Schema) *cells.Text {
	text, _ := f.all.of(s.Dialect.Encoding)
	return text
}

// Recognise finds the schema whose evidence the dump has. When several fit,
// one must lead by schemas.Margin points.
func Recognise(data []byte, path string, set []*schemas.Schema) (Found, *schemas.Problem) {
	all := &texts{data: data}
	var fitting []*schemas.Schema
	for _, s := range set {
		text, fault := all.of(s.Dialect.Encoding)
		if fault == nil && fits(text, s) {
			fitting = append(fitting, s)
		}
	}
	if len(fitting) == 0 {
		return Found{}, noneFits(all, path, set)
	}
	if len(fitting) == 1 {
		return Found{fitting, all}, nil
	}
	return compete(fitting, all, path)
}

// compete chooses among several schemas that fit. Versions of one schema do
// not compete with each other.
func compete(fitting []*schemas.Schema, all *texts, path string) (Found, *schemas.Problem) {
	slices.SortStableFunc(fitting, func(a, b *schemas.Schema) int { return b.Recognise.Points() - a.Recognise.Points() })
	first := fitting[0]
	var versions []*schemas.Schema
	for _, s := range fitting {
		if s.Name == first.Name {
			versions = append(versions, s)
			continue
		}
		if first.Recognise.Points()-s.Recognise.Points() >= schemas.Margin {
			continue
		}
		return Found{}, &schemas.Problem{Path: path, Line: 1, Col: 1, Field: "schema",
			Msg:  fmt.Sprintf("the schemas %s (%s) and %s (%s) both fit", first.Name, points(first), s.Name, points(s)),
			Hint: fmt.Sprintf("one must lead by %d: state firstLine or lines in [recognise] of the right one", schemas.Margin)}
	}
	return Found{versions, all}, nil
}

func points(s *schemas.Schema) string {
	if n := s.Recognise.Points(); n != 1 {
		return fmt.Sprintf("%d points", n)
	}
	return "1 point"
}

// Fits reports whether a dump has the evidence of a schema; why names what is
// missing.
func Fits(data []byte, s *schemas.Schema) (text *cells.Text, fault *cells.Fault, why string) {
	all := &texts{data: data}
	text, fault = all.of(s.Dialect.Encoding)
	if fault == nil && !fits(text, s) {
		why = missed(all, s).why
		if why == "" {
			why = "the evidence in [recognise] is not there"
		}
	}
	return text, fault, why
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
	if s.Recognise.Begins != "" {
		if line, _ := firstLine(t, s); !bytes.HasPrefix(line, []byte(s.Recognise.Begins)) {
			return false
		}
	}
	for _, want := range s.Recognise.Lines {
		if !hasLine(t.Body, want) {
			return false
		}
	}
	for _, unwanted := range s.Recognise.Absent {
		if hasLine(t.Body, unwanted) {
			return false
		}
	}
	return !s.Recognise.Header || headerLine(t, s) > 0
}

// hasLine reports whether some line begins with a text.
func hasLine(body []byte, text string) bool {
	for at := 0; ; {
		i := bytes.Index(body[at:], []byte(text))
		if i < 0 {
			return false
		}
		if i += at; i == 0 || body[i-1] == '\n' || body[i-1] == '\r' {
			return true
		}
		at = i + 1
	}
}

// preambleRows reports whether rows that are no comments may stand above the
// header.
func preambleRows(s *schemas.Schema) bool {
	return s.Preamble.Lines == schemas.CellLines || s.Preamble.Lines == schemas.TextLines || s.Recognise.FirstLine != "" || s.Recognise.Begins != "" || s.Wide != nil
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
	scan := Scanner(t, s)
	var row cells.Row
	for n := 0; n < maxHeaderSearch && scan.Next(&row); {
		if row.Comment || row.Blank() {
			continue
		}
		n++
		if FitOf(s, &scan, &row).Complete() {
			return row.Line
		}
		if !preambleRows(s) {
			return 0
		}
	}
	return 0
}
