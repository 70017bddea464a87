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
	s.checkEvidence(root.child("recognise"))
	s.checkPreamble(root.child("preamble"))
	s.checkStack(root)
	s.checkFooter(root)
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
	}{{"delimiter", d.Delimiter}, {"decimalChar", d.DecimalChar}, {"quoteChar", d.QuoteChar}, {"commentChar", d.CommentChar}}
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

func (s *Schema) checkEvidence(n *node) {
	if s.Recognise.FirstLine == "" && !s.Recognise.Header {
		n.problem("", "no evidence is stated", "state firstLine, header = true or both, or every dump would fit")
	}
	if strings.TrimSpace(s.Recognise.FirstLine) != s.Recognise.FirstLine {
		n.problem("firstLine", fmt.Sprintf("found %q", s.Recognise.FirstLine), "a text without blanks around it is allowed")
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
	default:
		if n.has("separator") {
			n.problem("separator", "only comment lines have a separator", "leave it out; other lines are cut by the delimiter")
		}
	}
}

func (s *Schema) checkStack(root *node) {
	n := root.child("stack")
	if s.Layout == Stacked && s.Stack.Begin == "" {
		n.problem("", "begin is missing", "state the first cell of the row that begins each run")
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
	switch {
	case s.Layout != Long:
		n.problem("", fmt.Sprintf("found in the layout %q", s.Layout), `only the layout "long" has it`)
	case s.Footer.Begin == "":
		n.problem("", "begin is missing", "state the first cell of the row that begins the footer")
	case len(s.Footer.Titles) == 0:
		n.problem("", "titles is missing", "give a title to each cell of a footer row")
	case !s.footerNamesRun():
		n.problem("titles", "none of them is the fact \"run\"", "state in facts which title names the run that a footer row is about")
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
		if seen[f.Role] && f.Role != RoleUnused {
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
	if !seen[RoleVolume] {
		root.problem("fields", "no column is the volume", `give one the name "volume"`)
	}
	if readings == 0 {
		root.problem("fields", "no column is a reading", `give one the name "pH", "potential" or "conductivity"`)
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
		if seen[f.Name] {
			(&node{src: root.src, path: item("facts", i)}).problem("name", fmt.Sprintf("a second %q", f.Name), "put all keys of one fact into its titles")
		}
		seen[f.Name] = true
	}
	for i, in := range s.Indicated {
		keys.claim(join(item("indicated", i), "titles"), in.Titles)
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
	if s.Preamble.Lines != NoPreamble {
		return
	}
	reach := map[string]bool{}
	for _, t := range append([]string{s.Stack.Begin, s.Stack.End}, s.Footer.Titles...) {
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
}
