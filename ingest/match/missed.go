package match

import (
	"fmt"
	"strings"

	"lastdrop/ingest/cells"
	"lastdrop/schemas"
)

// miss is how nearly a schema fits a dump that none fits.
type miss struct {
	near      bool
	line, col int
	why       string
}

// noneFits names the schemas that nearly fit, and the next command.
func noneFits(all *texts, path string, set []*schemas.Schema) *schemas.Problem {
	p := &schemas.Problem{Path: path, Line: 1, Col: 1, Field: "schema", Hint: "export it as a schema expects, or write a schema for it", Next: "lastdrop schema draft " + shellWord(path)}
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
			return miss{true, n, 1, Wanted(s)}
		}
		if headerLine(text, s) > 0 || alike(line, want) {
			return miss{true, n, 1, fmt.Sprintf("line %d is %s where it expects %q", n, cells.Quoted(line), want)}
		}
		return miss{}
	}
	if want := s.Recognise.Begins; want != "" {
		line, n := firstLine(text, s)
		switch begins := strings.HasPrefix(string(line), want); {
		case begins && s.Recognise.Header && headerLine(text, s) == 0:
			return miss{true, n, 1, Wanted(s)}
		case !begins && (headerLine(text, s) > 0 || alike(line, want)):
			return miss{true, n, 1, fmt.Sprintf("line %d is %s where it expects one that begins with %q", n, cells.Quoted(line), want)}
		case !begins:
			return miss{}
		}
	}
	for _, unwanted := range s.Recognise.Absent {
		if hasLine(text.Body, unwanted) && headerLine(text, s) > 0 {
			return miss{true, 1, 1, fmt.Sprintf("a line begins with %q", unwanted)}
		}
	}
	for _, want := range s.Recognise.Lines {
		if !hasLine(text.Body, want) && headerLine(text, s) > 0 {
			return miss{true, 1, 1, fmt.Sprintf("no line begins with %q", want)}
		}
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
	scan := Scanner(t, s)
	var row cells.Row
	for n := 0; n < maxHeaderSearch && scan.Next(&row); n++ {
		if !row.Comment && FitOf(s, &scan, &row).Meant() {
			return miss{true, row.Line, 1, fmt.Sprintf("the header is %s (%s)", cells.Quoted(t.Body[row.From:row.To]), Wanted(s))}
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
