package schemas

import (
	"strconv"
	"strings"
)

// place is where a key of a TOML file and its value begin: 1-based line and
// byte column.
type place struct{ line, col, valueLine, valueCol int }

// places finds every key of a TOML text: "dialect.delimiter", "facts[2].unit",
// "facts[2].titles[0]". The TOML library gives positions of syntax errors
// only, and a chemist needs them for a wrong value too. src must have passed
// the library; on other bytes the result is unspecified, but the scan ends.
func places(src []byte) map[string]place {
	s := &keyScan{src: src, line: 1, at: map[string]place{}, items: map[string]int{}}
	if strings.HasPrefix(string(src[:min(3, len(src))]), "\ufeff") {
		s.pos = 3
	}
	table := ""
	for s.skipTo(); s.pos < len(s.src); s.skipTo() {
		from := s.pos
		if s.src[s.pos] == '[' {
			table = s.tableHeader()
		} else {
			s.keyValue(table)
		}
		if s.pos == from { // not TOML; never stand still
			s.next()
		}
	}
	return s.at
}

type keyScan struct {
	src       []byte
	pos       int
	line      int
	lineStart int
	at        map[string]place
	items     map[string]int // how often an array of tables was opened
}

func (s *keyScan) next() {
	if s.src[s.pos] == '\n' {
		s.line++
		s.lineStart = s.pos + 1
	}
	s.pos++
}

func (s *keyScan) col() int { return s.pos - s.lineStart + 1 }

func (s *keyScan) is(c byte) bool { return s.pos < len(s.src) && s.src[s.pos] == c }

// skipTo skips blanks, line ends, commas and comments.
func (s *keyScan) skipTo() {
	for s.pos < len(s.src) {
		switch s.src[s.pos] {
		case ' ', '\t', '\r', '\n', ',':
			s.next()
		case '#':
			for s.pos < len(s.src) && s.src[s.pos] != '\n' {
				s.pos++
			}
		default:
			return
		}
	}
}

// tableHeader reads [a.b] or [[a.b]] and returns the path of its keys.
func (s *keyScan) tableHeader() string {
	at := place{s.line, s.col(), s.line, s.col()}
	s.pos++
	array := s.is('[')
	if array {
		s.pos++
	}
	path := s.resolve(s.key())
	for s.pos < len(s.src) && s.src[s.pos] != '\n' {
		s.pos++
	}
	if array {
		n := s.items[path]
		s.items[path]++
		if n == 0 {
			s.at[path] = at
		}
		path = item(path, n)
	}
	s.at[path] = at
	return path
}

// resolve puts the newest index behind each part that is an array of tables,
// but for the last part.
func (s *keyScan) resolve(parts []string) string {
	path := ""
	for i, p := range parts {
		path = join(path, p)
		if n := s.items[path]; n > 0 && i < len(parts)-1 {
			path = item(path, n-1)
		}
	}
	return path
}

// key reads a dotted key of bare and quoted parts.
func (s *keyScan) key() []string {
	var parts []string
	for s.pos < len(s.src) {
		for s.is(' ') || s.is('\t') {
			s.pos++
		}
		from := s.pos
		if s.is('"') || s.is('\'') {
			parts = append(parts, s.quoted())
		} else {
			for s.pos < len(s.src) && strings.IndexByte(" \t=.]\r\n#,{}[", s.src[s.pos]) < 0 {
				s.pos++
			}
			parts = append(parts, string(s.src[from:s.pos]))
		}
		for s.is(' ') || s.is('\t') {
			s.pos++
		}
		if !s.is('.') {
			break
		}
		s.pos++
	}
	return parts
}

// keyValue reads key = value inside the table.
func (s *keyScan) keyValue(table string) {
	at := place{line: s.line, col: s.col()}
	path := table
	for _, p := range s.key() {
		path = join(path, p)
	}
	if !s.is('=') {
		return
	}
	s.pos++
	for s.is(' ') || s.is('\t') {
		s.pos++
	}
	at.valueLine, at.valueCol = s.line, s.col()
	if _, again := s.at[path]; !again {
		s.at[path] = at
	}
	s.value(path)
}

func (s *keyScan) value(path string) {
	switch {
	case s.is('"'), s.is('\''):
		s.quoted()
	case s.is('['):
		s.array(path)
	case s.is('{'):
		s.pos++
		for s.skipTo(); s.pos < len(s.src) && !s.is('}'); s.skipTo() {
			from := s.pos
			s.keyValue(path)
			if s.pos == from {
				s.next()
			}
		}
		if s.is('}') {
			s.pos++
		}
	default:
		for s.pos < len(s.src) && strings.IndexByte(",]}#\r\n", s.src[s.pos]) < 0 {
			s.pos++
		}
	}
}

func (s *keyScan) array(path string) {
	s.pos++
	n := 0
	for s.skipTo(); s.pos < len(s.src) && !s.is(']'); s.skipTo() {
		from := s.pos
		s.at[item(path, n)] = place{s.line, s.col(), s.line, s.col()}
		s.value(item(path, n))
		n++
		if s.pos == from {
			s.next()
		}
	}
	if s.is(']') {
		s.pos++
	}
}

// quoted passes a string of any of the four sorts and returns its text as
// written, which for keys is all that is needed.
func (s *keyScan) quoted() string {
	quote := s.src[s.pos]
	long := strings.HasPrefix(string(s.src[s.pos:min(s.pos+3, len(s.src))]), strings.Repeat(string(quote), 3))
	end := 1
	if long {
		end = 3
	}
	s.pos += end
	from := s.pos
	for s.pos < len(s.src) {
		if quote == '"' && s.src[s.pos] == '\\' && s.pos+1 < len(s.src) {
			s.next()
			s.next()
			continue
		}
		if s.closes(quote, end) {
			text := string(s.src[from:s.pos])
			s.pos += end
			for long && s.is(quote) { // """text""""": up to two quotes belong to the text
				s.pos++
			}
			return text
		}
		s.next()
	}
	return string(s.src[min(from, len(s.src)):])
}

func (s *keyScan) closes(quote byte, n int) bool {
	for i := range n {
		if s.pos+i >= len(s.src) || s.src[s.pos+i] != quote {
			return false
		}
	}
	return true
}

func join(path, key string) string {
	if path == "" {
		return key
	}
	return path + "." + key
}

func item(path string, n int) string { return path + "[" + strconv.Itoa(n) + "]" }
