// Package match finds out which schema a dump is of, and which field of it a
// header text is. It looks at texts and places and reads no number.
package match

import (
	"bytes"
	"fmt"
	"slices"
	"strings"

	"lastdrop/ingest/cells"
	"lastdrop/schemas"
)

// Scanner is the scanner of a schema's dialect.
func Scanner(t *cells.Text, s *schemas.Schema) cells.Scanner {
	d := &s.Dialect
	return cells.Scanner{Body: t.Body, Delimiter: d.Delimiter, Quote: d.QuoteChar, Comment: d.CommentChar, Escape: d.EscapeChar}
}

// Equal reports whether a text of a dump is a title, upper and lower case
// alike. The empty text is none.
func Equal(b []byte, title string) bool {
	return len(b) > 0 && bytes.EqualFold(b, []byte(title))
}

// FieldOf returns the field that a header text names, nil for none. Upper and
// lower case count only where they alone tell two fields apart (t and T).
func FieldOf(s *schemas.Schema, b []byte) *schemas.Field {
	var alike *schemas.Field
	ambiguous := false
	for i := range s.Fields {
		f := &s.Fields[i]
		for _, t := range f.Titles {
			if string(b) == t {
				return f
			}
			if Equal(b, t) || s.Layout == schemas.Wide && isNumbered(b, t) {
				ambiguous = ambiguous || alike != nil && alike != f
				alike = f
			}
		}
	}
	if ambiguous {
		return nil
	}
	return alike
}

// Fit is how a row stands to the fields of a schema.
type Fit struct {
	volume, reading bool
	known           int  // cells that are header texts
	numbers         bool // some cell is a number
}

// Complete: a row by which a dump can be recognised.
func (h Fit) Complete() bool { return h.volume && h.reading && !h.numbers }

// Meant: a row that can only have been meant as the header, even when a
// column that the run needs is missing.
func (h Fit) Meant() bool { return !h.numbers && (h.known >= 2 || h.volume) }

// FitOf says how the row at hand stands to the fields of a schema.
func FitOf(s *schemas.Schema, scan *cells.Scanner, row *cells.Row) Fit {
	var h Fit
	if len(row.Cells) < 2 || row.Fault != "" {
		return h
	}
	if s.Dialect.HeaderRows != nil {
		titles, _ := Titles(s, scan, row)
		for _, b := range titles {
			h.see(s, b)
		}
		return h
	}
	for _, c := range row.Cells {
		h.see(s, scan.Bytes(c))
	}
	return h
}

// see takes one text of the row.
func (h *Fit) see(s *schemas.Schema, b []byte) {
	f := FieldOf(s, b)
	if f == nil {
		if FactOf(s, b) != nil {
			h.known++
		} else if _, fault := cells.ParseNumber(b, s.Dialect.DecimalChar, 0); fault == cells.NumberOK {
			h.numbers = true
		}
		return
	}
	h.known++
	h.volume = h.volume || f.Role.IsVolume()
	h.reading = h.reading || f.Role.IsReading()
}

// FactOf returns the fact whose column has this header text, nil for none.
func FactOf(s *schemas.Schema, b []byte) *schemas.Fact {
	for i := range s.Facts {
		for _, t := range s.Facts[i].Columns {
			if Equal(b, t) {
				return &s.Facts[i]
			}
		}
	}
	return nil
}

// Titles returns the header texts of the columns when the row at hand is the
// first of the header, and how many rows the header has. scan is not moved.
func Titles(s *schemas.Schema, scan *cells.Scanner, row *cells.Row) (titles [][]byte, rows int) {
	titles = make([][]byte, len(row.Cells))
	for i, c := range row.Cells {
		titles[i] = scan.Bytes(c)
	}
	d := &s.Dialect
	if d.HeaderRows == nil {
		return titles, 1
	}
	ahead := *scan
	var next cells.Row
	rows = d.HeaderRows[len(d.HeaderRows)-1]
	for n := 2; n <= rows && ahead.Next(&next); n++ {
		if !slices.Contains(d.HeaderRows, n) {
			continue
		}
		for i, c := range next.Cells {
			b := ahead.Bytes(c)
			switch {
			case len(b) == 0:
			case i >= len(titles):
				titles = append(titles, b)
			case len(titles[i]) == 0:
				titles[i] = b
			default:
				titles[i] = slices.Concat(titles[i], []byte(d.HeaderJoin), b)
			}
		}
	}
	return titles, rows
}

// isNumbered reports whether a text is the title with a number for {n}.
func isNumbered(b []byte, title string) bool {
	before, after, found := strings.Cut(title, schemas.Numbered)
	n := len(b) - len(before) - len(after)
	if !found || n < 1 || !bytes.EqualFold(b[:len(before)], []byte(before)) || !bytes.EqualFold(b[len(before)+n:], []byte(after)) {
		return false
	}
	return len(bytes.Trim(b[len(before):len(before)+n], "0123456789")) == 0
}

// Wanted says which header texts a schema needs.
func Wanted(s *schemas.Schema) string {
	var volume, reading, run []string
	for _, f := range s.Fields {
		for _, t := range f.Titles {
			switch {
			case f.Role.IsVolume():
				volume = append(volume, cells.Quoted([]byte(t)))
			case f.Role.IsReading():
				reading = append(reading, cells.Quoted([]byte(t)))
			case f.Role == schemas.RoleRun:
				run = append(run, cells.Quoted([]byte(t)))
			}
		}
	}
	wanted := []string{strings.Join(volume, " or "), strings.Join(reading, " or ")}
	if run != nil {
		wanted = append(wanted, strings.Join(run, " or "))
	}
	return fmt.Sprintf("schema %s needs a header with %s", s.Name, strings.Join(wanted, " and "))
}
