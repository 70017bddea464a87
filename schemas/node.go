package schemas

import (
	"fmt"
	"math"
	"slices"
	"sort"
	"strconv"
	"strings"
	"time"
)

// maxProblems is how many problems of one file are told; the rest is counted.
const maxProblems = 20

// source is one TOML file while it is checked.
type source struct {
	path     string
	places   map[string]place
	problems []*Problem
}

// node is one table of the file. Every key that is asked for is an allowed
// one; done reports the others.
type node struct {
	src   *source
	path  string // "facts[3]"; "" for the whole file
	table map[string]any
	asked []string
}

// problem notes what is wrong with the value of a key; key "" means the table
// itself.
func (n *node) problem(key, msg, hint string) {
	full := n.path
	if key != "" {
		full = join(n.path, key)
	}
	at := n.src.place(full)
	line, col := at.valueLine, at.valueCol
	n.src.problems = append(n.src.problems, &Problem{Path: n.src.path, Line: line, Col: col, Field: full, Msg: msg, Hint: hint})
}

// place is where a path stands, or the nearest table above it; line 1 when
// the file has none of them.
func (s *source) place(path string) place {
	for path != "" {
		if at, ok := s.places[path]; ok {
			return at
		}
		path = path[:max(strings.LastIndexAny(path, ".["), 0)]
	}
	return place{1, 1, 1, 1}
}

func (n *node) has(key string) bool {
	_, ok := n.table[key]
	return ok
}

// text returns the text of key, "" when it is absent.
func (n *node) text(key string) string {
	n.asked = append(n.asked, key)
	v, ok := n.table[key]
	if !ok {
		return ""
	}
	s, ok := v.(string)
	if !ok {
		n.problem(key, "found "+describe(v), "a text in quotes is allowed")
	}
	return s
}

// word is text that must be one of a set when it is there.
func (n *node) word(key string, allowed ...string) string {
	s := n.text(key)
	if n.has(key) && n.isText(key) && !slices.Contains(allowed, s) {
		n.problem(key, fmt.Sprintf("found %q", s), "allowed: "+quoteAll(allowed))
		return ""
	}
	return s
}

func (n *node) isText(key string) bool {
	_, ok := n.table[key].(string)
	return ok
}

// char is a text of one ASCII character, 0 when it is absent or "".
func (n *node) char(key string, otherwise byte) byte {
	s := n.text(key)
	switch {
	case !n.has(key):
		return otherwise
	case !n.isText(key) || s == "":
		return 0
	case len(s) != 1 || s[0] >= 0x80 || s[0] < ' ' && s[0] != '\t':
		n.problem(key, fmt.Sprintf("found %q", s), `one ASCII character is allowed, for a tab "\t"`)
		return 0
	}
	return s[0]
}

// texts returns the texts of a list, or of a single text.
func (n *node) texts(key string) []string {
	n.asked = append(n.asked, key)
	switch v := n.table[key].(type) {
	case nil:
		return nil
	case string:
		return []string{v}
	case []any:
		list := make([]string, 0, len(v))
		for i, one := range v {
			s, ok := one.(string)
			if !ok {
				n.problem(item(key, i), "found "+describe(one), "a text in quotes is allowed")
				continue
			}
			list = append(list, s)
		}
		return list
	default:
		n.problem(key, "found "+describe(v), "a list of texts is allowed")
		return nil
	}
}

// titles returns a list of texts that are neither empty nor surrounded by
// blanks, for dumps are compared without those.
func (n *node) titles(key string) []string {
	list := n.texts(key)
	for i, s := range list {
		if s == "" || strings.TrimSpace(s) != s {
			n.problem(key, fmt.Sprintf("found %q", s), "a text without blanks around it is allowed")
			return nil
		}
		for _, earlier := range list[:i] {
			if strings.EqualFold(earlier, s) {
				n.problem(key, fmt.Sprintf("%q is stated twice", s), "upper and lower case count alike; keep one")
			}
		}
	}
	return list
}

func (n *node) flag(key string) bool {
	n.asked = append(n.asked, key)
	v, ok := n.table[key]
	if !ok {
		return false
	}
	b, ok := v.(bool)
	if !ok {
		n.problem(key, "found "+describe(v), "true or false is allowed")
	}
	return b
}

// day is a date without time, as TOML writes one or as text.
func (n *node) day(key string) string {
	n.asked = append(n.asked, key)
	v, ok := n.table[key]
	if !ok {
		return ""
	}
	text, isText := v.(string)
	if t, isTime := v.(time.Time); isTime {
		text, isText = t.Format(time.DateOnly), t.Location().String() == "date-local"
	}
	if _, err := time.Parse(time.DateOnly, text); err != nil || !isText {
		n.problem(key, "found "+describe(v), "a date such as 2031-04-02 is allowed")
	}
	return text
}

// rows is a list of row numbers, counted up from 1.
func (n *node) rows(key string) []int {
	n.asked = append(n.asked, key)
	v, ok := n.table[key]
	if !ok {
		return nil
	}
	list, _ := v.([]any)
	var rows []int
	for _, one := range list {
		row, _ := one.(int64)
		if last := len(rows) - 1; row < 1 || row > maxHeaderRows || last < 0 && row != 1 || last >= 0 && int(row) <= rows[last] {
			n.problem(key, "found "+describe(one)+" in the list", fmt.Sprintf("numbers from 1 up to %d are allowed, the first of them 1", maxHeaderRows))
			return nil
		}
		rows = append(rows, int(row))
	}
	if rows == nil {
		n.problem(key, "found "+describe(v), "a list of numbers is allowed, e.g. [1, 2]")
	}
	return rows
}

// maxHeaderRows is how many rows a header may have.
const maxHeaderRows = 9

// number is a number of a unit, in the project's unit; nil when it is absent.
func (n *node) number(key string, u Unit) *float64 {
	n.asked = append(n.asked, key)
	v, ok := n.table[key]
	if !ok {
		return nil
	}
	var text string
	switch v := v.(type) {
	case int64:
		text = strconv.FormatInt(v, 10)
	case float64:
		text = strconv.FormatFloat(v, 'e', -1, 64)
	}
	mantissa, exponent, _ := strings.Cut(text, "e")
	e, _ := strconv.Atoi(exponent)
	value, err := strconv.ParseFloat(fmt.Sprintf("%se%d", mantissa, e+u.Shift), 64)
	if err != nil || math.IsInf(value, 0) || math.IsNaN(value) || text == "" {
		n.problem(key, "found "+describe(v), "a number is allowed")
		return nil
	}
	value = value*u.Times + u.Plus
	return &value
}

// child returns the table of key; one without keys when it is absent.
func (n *node) child(key string) *node {
	n.asked = append(n.asked, key)
	c := &node{src: n.src, path: join(n.path, key)}
	v, ok := n.table[key]
	if !ok {
		return c
	}
	if c.table, ok = v.(map[string]any); !ok {
		n.problem(key, "found "+describe(v), "a table is allowed")
	}
	return c
}

// children returns the tables of a list.
func (n *node) children(key string) []*node {
	n.asked = append(n.asked, key)
	v, ok := n.table[key]
	if !ok {
		return nil
	}
	list, ok := v.([]any)
	if tables, isTables := v.([]map[string]any); isTables {
		for _, t := range tables {
			list = append(list, t)
		}
		ok = true
	}
	if !ok {
		n.problem(key, "found "+describe(v), "a list of tables is allowed")
		return nil
	}
	var nodes []*node
	for i, one := range list {
		table, ok := one.(map[string]any)
		if !ok {
			n.problem(item(key, i), "found "+describe(one), "a table in braces is allowed")
			continue
		}
		nodes = append(nodes, &node{src: n.src, path: item(join(n.path, key), i), table: table})
	}
	return nodes
}

// values returns a table of texts, sorted by key.
func (n *node) values(key string) []Value {
	c := n.child(key)
	var list []Value
	for text, v := range c.table {
		means, ok := v.(string)
		if !ok {
			c.problem(text, "found "+describe(v), "a text in quotes is allowed")
		}
		list = append(list, Value{text, means})
	}
	sort.Slice(list, func(i, j int) bool { return list[i].Text < list[j].Text })
	return list
}

// done reports every key that nobody asked for.
func (n *node) done() {
	slices.Sort(n.asked)
	n.asked = slices.Compact(n.asked)
	for key := range n.table {
		if slices.Contains(n.asked, key) {
			continue
		}
		full := join(n.path, key)
		at := n.src.place(full)
		n.src.problems = append(n.src.problems, &Problem{Path: n.src.path, Line: at.line, Col: at.col, Field: full,
			Msg: "unknown key", Hint: "allowed here: " + strings.Join(n.asked, ", ")})
	}
}

// describe names a TOML value for a message.
func describe(v any) string {
	switch v := v.(type) {
	case string:
		return fmt.Sprintf("the text %q", v)
	case bool:
		return fmt.Sprintf("%t", v)
	case int64, float64:
		return fmt.Sprintf("the number %v", v)
	case time.Time:
		return "a date"
	case []any, []map[string]any:
		return "a list"
	}
	return "a table"
}

func quoteAll(list []string) string {
	quoted := make([]string, len(list))
	for i, s := range list {
		quoted[i] = fmt.Sprintf("%q", s)
	}
	return strings.Join(quoted, ", ")
}
