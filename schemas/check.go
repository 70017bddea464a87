package schemas

import (
	"fmt"
	"slices"
	"strings"
)

// check reports combinations that cannot work, each value being allowed by
// itself.
func (s *Schema) check(root *node) {
	s.checkChars(root.child("dialect"))
	s.checkGroup(root.child("dialect"))
	s.checkEvidence(root.child("recognise"))
	s.checkPreamble(root.child("preamble"))
	s.checkStack(root)
	s.checkFooter(root)
	s.checkWide(root)
	s.checkFields(root)
	s.checkTitles(root)
	s.checkReach(root)
}

// checkChars: the characters of a dialect must differ, or cells cannot be
// told apart.
func (s *Schema) checkChars(n *node) {
	d := s.Dialect
	chars := []struct {
		key  string
		char byte
	}{{"delimiter", d.Delimiter}, {"decimalChar", d.DecimalChar}, {"quoteChar", d.QuoteChar}, {"commentChar", d.CommentChar}, {"escapeChar", d.EscapeChar}}
	for i, a := range chars {
		if a.char != 0 && strings.IndexByte("0123456789+-eE", a.char) >= 0 {
			n.problem(a.key, fmt.Sprintf("found %q", string(a.char)), "a character that no number has is allowed")
		}
		for _, b := range chars[:i] {
			if a.char != 0 && a.char == b.char {
				key, other := a.key, b.key
				if !n.has(key) {
					key, other = other, key
				}
				n.problem(key, fmt.Sprintf("%q is the %s too", string(a.char), other), "state two different characters")
			}
		}
	}
}

// checkGroup: a number with groups must have one meaning.
func (s *Schema) checkGroup(n *node) {
	d := s.Dialect
	if d.GroupChar == "" {
		return
	}
	for _, other := range []struct {
		key  string
		char byte
	}{{"decimalChar", d.DecimalChar}, {"delimiter", d.Delimiter}, {"quoteChar", d.QuoteChar}, {"commentChar", d.CommentChar}} {
		if d.GroupChar == string(rune(other.char)) {
			n.problem("groupChar", fmt.Sprintf("%q is the %s too", d.GroupChar, other.key), "state two different characters")
		}
	}
}

func (s *Schema) checkEvidence(n *node) {
	r := &s.Recognise
	if r.FirstLine == "" && r.Begins == "" && r.Lines == nil && !r.Header {
		n.problem("", "no evidence is stated", "state firstLine, header = true or both, or every dump would fit")
	}
	if strings.TrimSpace(r.FirstLine) != r.FirstLine {
		n.problem("firstLine", fmt.Sprintf("found %q", r.FirstLine), "a text without blanks around it is allowed")
	}
	if strings.TrimSpace(r.Begins) != r.Begins {
		n.problem("firstLineBegins", fmt.Sprintf("found %q", r.Begins), "a text without blanks around it is allowed")
	}
	if r.FirstLine != "" && r.Begins != "" {
		n.problem("firstLineBegins", "found beside firstLine", "state one of them")
	}
}

func (s *Schema) checkPreamble(n *node) {
	switch s.Preamble.Lines {
	case CommentLines:
		if s.Dialect.CommentChar == 0 {
			n.problem("lines", `"comments" without a commentChar in [dialect]`, "state the character that begins a comment line")
		}
		if s.Preamble.Separator == 0 {
			n.problem("separator", `found ""`, "state the character between key and value")
		}
	case TextLines:
		if s.Preamble.Separator == 0 {
			n.problem("separator", `found ""`, "state the character between key and value")
		}
	default:
		if n.has("separator") && s.Footer.Lines != TextLines && s.Footer.Lines != CommentLines {
			n.problem("separator", "only comment lines have a separator", "leave it out; other lines are cut by the delimiter")
		}
	}
}

func (s *Schema) checkStack(root *node) {
	n := root.child("stack")
	if s.Layout == Stacked && s.Stack.Begin == "" && !s.Stack.Blank {
		n.problem("", "begin is missing", "state the first cell of the row that begins each run")
	}
	if s.Stack.Blank && (s.Stack.Begin != "" || s.Stack.End != "") {
		n.problem("blank", "found beside begin or end", "runs have marks of their own or are parted by blank lines")
	}
	if s.Layout != Stacked && root.has("stack") {
		n.problem("", fmt.Sprintf("found in the layout %q", s.Layout), `only the layout "stacked" has it`)
	}
	if s.Stack.Begin != "" && s.Stack.Begin == s.Stack.End {
		n.problem("end", fmt.Sprintf("%q is begin too", s.Stack.End), "state two different texts, or leave end out")
	}
}

func (s *Schema) checkFooter(root *node) {
	n := root.child("footer")
	if !root.has("footer") {
		return
	}
	f := &s.Footer
	switch {
	case s.Layout == Wide:
		n.problem("", fmt.Sprintf("found in the layout %q", s.Layout), "the other layouts have it")
	case s.Layout != Long:
		s.checkFooterLines(n)
	case f.Begin == "":
		n.problem("", "begin is missing", "state the first cell of the row that begins the footer")
	case n.has("lines") || f.Blank:
		n.problem("", fmt.Sprintf("lines or blank found in the layout %q", s.Layout), "its footer has rows; state row and titles")
	case len(f.Titles) == 0:
		n.problem("", "titles is missing", "give a title to each cell of a footer row")
	case !s.footerNamesRun():
		n.problem("titles", "none of them is the fact \"run\"", "state in facts which title names the run that a footer row is about")
	}
}

// checkFooterLines: a footer below the table of one run has lines of facts.
func (s *Schema) checkFooterLines(n *node) {
	f := &s.Footer
	n.refuse("row", "only the layout \"long\" has it")
	n.refuse("titles", "only the layout \"long\" has it")
	switch {
	case f.Lines == NoPreamble:
		n.problem("", "lines is missing", `state how its facts stand: "comments", "cells", "text" or "unused"`)
	case f.Lines == CommentLines && s.Dialect.CommentChar == 0:
		n.problem("lines", `"comments" without a commentChar in [dialect]`, "state the character that begins a comment line")
	case f.Lines != CommentLines && f.Begin == "" && !f.Blank:
		n.problem("", "neither begin nor blank", "state the first cell of the row that begins the footer, or blank = true when a blank line does")
	case f.Begin != "" && f.Blank:
		n.problem("blank", "found beside begin", "state one of them")
	case f.Blank && s.Stack.Blank:
		n.problem("blank", "found in stack too", "a blank line cannot begin both")
	}
}

// checkWide: keys of the layout wide stand nowhere else.
func (s *Schema) checkWide(root *node) {
	if s.Layout == Wide {
		return
	}
	if root.has("wide") {
		root.child("wide").problem("", fmt.Sprintf("found in the layout %q", s.Layout), `only the layout "wide" has it`)
	}
	for i, f := range s.Fields {
		n := &node{src: root.src, path: item("fields", i)}
		if f.Shared {
			n.problem("shared", fmt.Sprintf("found in the layout %q", s.Layout), `only in the layout "wide" runs share columns`)
		}
		for _, t := range f.Titles {
			if strings.Contains(t, Numbered) {
				n.problem("titles", fmt.Sprintf("%q in the layout %q", t, s.Layout), `only in the layout "wide" the columns of runs are numbered`)
			}
		}
	}
}

func (s *Schema) footerNamesRun() bool {
	for _, f := range s.Facts {
		if f.Name != FactRun {
			continue
		}
		return slices.ContainsFunc(f.Titles, func(title string) bool {
			return slices.ContainsFunc(s.Footer.Titles, func(t string) bool { return strings.EqualFold(t, title) })
		})
	}
	return false
}

// checkFields: one volume, at least one reading, the run column where the
// layout needs it, no role twice but unused ones.
func (s *Schema) checkFields(root *node) {
	seen := map[Role]bool{}
	readings := 0
	for i, f := range s.Fields {
		n := &node{src: root.src, path: item("fields", i)}
		if f.Role == RoleIncrement && seen[RoleVolume] || f.Role == RoleVolume && seen[RoleIncrement] {
			n.problem("name", fmt.Sprintf("%q beside the other kind of volume", f.Role), `give one of them the name "unused"`)
		}
		if seen[f.Role] && f.Role != RoleUnused && f.Role != RoleRemark {
			n.problem("name", fmt.Sprintf("a second %q", f.Role), "put all header texts of one column into its titles")
		}
		seen[f.Role] = true
		if f.Role.IsReading() {
			readings++
		}
		if f.Role == RoleRun && s.Layout != Long {
			n.problem("name", fmt.Sprintf("%q in the layout %q", f.Role, s.Layout), `only in the layout "long" a column names the run`)
		}
	}
	if !seen[RoleVolume] && !seen[RoleIncrement] {
		root.problem("fields", "no column is the volume", `give one the name "volume" or "increment"`)
	}
	if readings == 0 {
		root.problem("fields", "no column is a reading", `give one the name "pH", "potential", "conductivity" or "conductance"`)
	}
	if s.Layout == Long && !seen[RoleRun] {
		root.problem("fields", "no column names the run", `the layout "long" needs one of the name "run"`)
	}
}

// checkTitles: no header text and no key may mean two things, and no fact may
// be mapped twice.
func (s *Schema) checkTitles(root *node) {
	columns := claims{root.src, map[string]string{}, func(t string) string { return t }} // t and T may be two columns
	keys := claims{root.src, map[string]string{}, strings.ToLower}
	for i, f := range s.Fields {
		columns.claim(join(item("fields", i), "titles"), f.Titles)
	}
	seen := map[FactName]bool{}
	for i, f := range s.Facts {
		keys.claim(join(item("facts", i), "titles"), f.Titles)
		columns.claim(join(item("facts", i), "columns"), f.Columns)
		if seen[f.Name] {
			(&node{src: root.src, path: item("facts", i)}).problem("name", fmt.Sprintf("a second %q", f.Name), "put all keys of one fact into its titles")
		}
		seen[f.Name] = true
	}
	for i, in := range s.Indicated {
		keys.claim(join(item("indicated", i), "titles"), in.Titles)
	}
	for i, r := range s.Results {
		keys.claim(join(item("results", i), "titles"), r.Titles)
	}
	for i, in := range s.Indicated { // one line of the kind may serve several endpoints
		keys.free(join(item("indicated", i), "kindTitles"), in.KindTitles)
	}
}

// claims remembers which key of the schema claimed a text of the dump.
type claims struct {
	src  *source
	by   map[string]string
	fold func(string) string // texts that are alike become equal
}

func (c claims) claim(path string, titles []string) {
	c.free(path, titles)
	for _, t := range titles {
		c.by[c.fold(t)] = path
	}
}

// free reports the titles that another key has claimed.
func (c claims) free(path string, titles []string) {
	for _, t := range titles {
		if by, ok := c.by[c.fold(t)]; ok && by != path {
			(&node{src: c.src, path: path}).problem("", fmt.Sprintf("%q is in %s too", t, by), "a text may mean one thing only")
		}
	}
}

// checkReach reports keys of facts that no part of a dump can state: a
// misspelt one would leave a fact out in silence.
func (s *Schema) checkReach(root *node) {
	if s.Preamble.Lines != NoPreamble || s.Footer.Lines != NoPreamble && s.Footer.Lines != UnusedLines {
		return
	}
	reach := map[string]bool{}
	for _, t := range slices.Concat([]string{s.Stack.Begin, s.Stack.End}, s.Footer.Titles, s.Wide) {
		reach[strings.ToLower(t)] = true
	}
	try := func(path string, titles []string) {
		for _, t := range titles {
			if !reach[strings.ToLower(t)] {
				(&node{src: root.src, path: path}).problem("", fmt.Sprintf("no line of a dump can state %q", t), "there is no [preamble], and footer.titles does not have it")
			}
		}
	}
	for i, f := range s.Facts {
		try(join(item("facts", i), "titles"), f.Titles)
	}
	for i, in := range s.Indicated {
		try(join(item("indicated", i), "titles"), in.Titles)
		try(join(item("indicated", i), "kindTitles"), in.KindTitles)
	}
	for i, r := range s.Results {
		try(join(item("results", i), "titles"), r.Titles)
	}
}
