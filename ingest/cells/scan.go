package cells

import "bytes"

// The scanner cuts text into rows of cells. It is not encoding/csv, because
// that one hides the lines that it skips, merges the rows after a quote that
// is not closed, and loses where a cell stood.

// Cell is one cell of a row: offsets into the text of what stands between the
// delimiters, without blanks around it and without its quotes.
type Cell struct {
	From, To int
	Quoted   bool
	doubled  bool // has doubled quotes inside
	escaped  bool // has escapes inside
}

// Empty reports whether nothing stands in the cell; "" in quotes is something.
func (c Cell) Empty() bool { return c.To == c.From && !c.Quoted }

// Row is one line of the dump.
type Row struct {
	Line     int
	From, To int  // offsets of the line without its end
	Ended    bool // it has a line end
	Comment  bool // a comment line; it has no cells
	Cells    []Cell

	Fault   string // why the line cannot be cut into cells, "" when it can
	FaultAt int    // offset
}

// Blank reports whether nothing stands in the row.
func (r *Row) Blank() bool {
	if r.Comment || r.Fault != "" {
		return false
	}
	for _, c := range r.Cells {
		if !c.Empty() {
			return false
		}
	}
	return true
}

// DropEmptyTail takes away the empty cells at the end of the row beyond the
// first n and reports whether there were any.
func (r *Row) DropEmptyTail(n int) bool {
	before := len(r.Cells)
	for len(r.Cells) > n && r.Cells[len(r.Cells)-1].Empty() {
		r.Cells = r.Cells[:len(r.Cells)-1]
	}
	return len(r.Cells) < before
}

// Scanner yields rows. Line ends are CR, LF and CRLF, in any mixture. A char
// of 0 means that the dialect has none.
type Scanner struct {
	Body                      []byte
	Delimiter, Quote, Comment byte
	Escape                    byte // takes its meaning from the character behind it
	Repeated                  bool // several delimiters part two cells once; those at the ends of a line none
	pos, line                 int
}

// Next scans one row into r, whose cells it overwrites; ok is false at the end. A text that ends in a line end has no row after it.
func (s *Scanner) Next(r *Row) (ok bool) {
	if s.pos >= len(s.Body) {
		return false
	}
	s.line++
	r.Line, r.From, r.Ended, r.Comment, r.Cells = s.line, s.pos, false, false, r.Cells[:0]
	if r.Fault != "" {
		r.Fault, r.FaultAt = "", 0
	}
	if s.Comment != 0 && s.Body[s.skipBlanks(s.pos)] == s.Comment {
		r.Comment = true
		s.endLine(r, s.lineEnd(s.pos))
		return true
	}
	s.scanCells(r)
	return true
}

// skipBlanks returns the offset of the first byte from i on that is no blank,
// or of the last byte of the text.
func (s *Scanner) skipBlanks(i int) int {
	for i < len(s.Body)-1 && s.isBlank(s.Body[i]) {
		i++
	}
	return i
}

// isBlank: a tab is none, for a damaged digit may be one.
func (s *Scanner) isBlank(c byte) bool { return c == ' ' && c != s.Delimiter }

// lineEnd returns the offset of the next line end, or of the end of the text.
func (s *Scanner) lineEnd(from int) int {
	if i := bytes.IndexAny(s.Body[from:], "\r\n"); i >= 0 {
		return from + i
	}
	return len(s.Body)
}

// endLine closes the row at the offset of its line end and steps over that.
func (s *Scanner) endLine(r *Row, at int) {
	r.To, s.pos = at, at
	if at == len(s.Body) {
		return
	}
	r.Ended = true
	s.pos++
	if s.Body[at] == '\r' && s.pos < len(s.Body) && s.Body[s.pos] == '\n' {
		s.pos++
	}
}

// scanCells is the inner loop: one pass over the bytes of the line.
func (s *Scanner) scanCells(r *Row) {
	body, delimiter := s.Body, s.Delimiter
	i := s.pos
	for {
		for i < len(body) && s.isBlank(body[i]) {
			i++
		}
		if s.Repeated {
			if i = s.skipRepeated(i); len(r.Cells) > 0 && (i == len(body) || body[i] == '\n' || body[i] == '\r') {
				s.endLine(r, i)
				return
			}
		}
		if i < len(body) && s.Quote != 0 && body[i] == s.Quote {
			if i = s.quotedCell(r, i); r.Fault != "" {
				s.endLine(r, s.lineEnd(i))
				return
			}
		} else {
			from, escaped := i, false
			for i < len(body) && body[i] != delimiter && body[i] != '\n' && body[i] != '\r' {
				if body[i] == s.Escape && s.escapes(i) {
					escaped = true
					i++
				}
				i++
			}
			to := i
			for to > from && s.isBlank(body[to-1]) {
				to--
			}
			r.Cells = append(r.Cells, Cell{From: from, To: to, escaped: escaped})
		}
		if i == len(body) || body[i] != delimiter {
			s.endLine(r, i)
			return
		}
		i++
	}
}

// skipRepeated returns the offset of the first byte from i on that is neither
// delimiter nor blank.
func (s *Scanner) skipRepeated(i int) int {
	for i < len(s.Body) && (s.isBlank(s.Body[i]) || s.Body[i] == s.Delimiter) {
		i++
	}
	return i
}

// quotedCell reads a cell that begins with a quote at i and returns the offset
// of what follows it: a delimiter or the end of the line. A quote must close
// on its line: one that does not would swallow the rows after it.
func (s *Scanner) quotedCell(r *Row, i int) int {
	body := s.Body
	c := Cell{From: i + 1, Quoted: true}
	for j := i + 1; ; j++ {
		if j == len(body) || body[j] == '\n' || body[j] == '\r' {
			r.Fault, r.FaultAt = "a quote that is not closed on its line", i
			return j
		}
		if body[j] == s.Escape && s.escapes(j) {
			c.escaped = true
			j++
			continue
		}
		if body[j] != s.Quote {
			continue
		}
		if j+1 < len(body) && body[j+1] == s.Quote {
			c.doubled = true
			j++
			continue
		}
		c.To = j
		r.Cells = append(r.Cells, c)
		return s.afterQuote(r, j+1)
	}
}

// afterQuote accepts blanks only between a closing quote and the next
// delimiter.
func (s *Scanner) afterQuote(r *Row, j int) int {
	for j < len(s.Body) && s.isBlank(s.Body[j]) {
		j++
	}
	if j < len(s.Body) && s.Body[j] != s.Delimiter && s.Body[j] != '\n' && s.Body[j] != '\r' {
		r.Fault, r.FaultAt = "text after a closing quote", j
	}
	return j
}

// escapes reports whether the escape character at i has a character of its
// line behind it.
func (s *Scanner) escapes(i int) bool {
	return s.Escape != 0 && i+1 < len(s.Body) && s.Body[i+1] != '\n' && s.Body[i+1] != '\r'
}

// Bytes returns the content of a cell. It copies only when quotes are doubled
// inside or characters escaped.
func (s *Scanner) Bytes(c Cell) []byte {
	b := s.Body[c.From:c.To]
	if c.doubled && !c.escaped {
		return bytes.ReplaceAll(b, []byte{s.Quote, s.Quote}, []byte{s.Quote})
	}
	if !c.escaped {
		return b
	}
	plain := make([]byte, 0, len(b))
	for i := 0; i < len(b); i++ {
		if i+1 < len(b) && (b[i] == s.Escape || c.doubled && b[i] == s.Quote && b[i+1] == s.Quote) {
			i++
		}
		plain = append(plain, b[i])
	}
	return plain
}
