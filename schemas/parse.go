package schemas

import (
	"bytes"
	"cmp"
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"fmt"
	"slices"
	"strings"
	"unicode/utf8"

	"github.com/BurntSushi/toml"
)

// MaxBytes is the largest schema file that is read.
const MaxBytes = 1 << 20

// Parse reads and checks one schema file; path is used in messages only. The
// error joins a *Problem for everything that is wrong, in the order of the
// file, at most 20 and then one that counts the rest.
func Parse(path string, src []byte) (*Schema, error) {
	if len(src) > MaxBytes {
		return nil, &Problem{Path: path, Msg: fmt.Sprintf("%d bytes", len(src)), Hint: fmt.Sprintf("a schema has at most %d", MaxBytes)}
	}
	table := map[string]any{}
	if _, err := toml.Decode(string(src), &table); err != nil {
		return nil, syntaxProblem(path, src, err)
	}
	file := &source{path: path, places: places(src)}
	root := &node{src: file, table: table}
	sum := sha256.Sum256(src)
	s := &Schema{SHA256: hex.EncodeToString(sum[:]), TOML: string(src)}
	s.read(root)
	if len(file.problems) == 0 {
		s.check(root)
	}
	if err := file.err(); err != nil {
		return nil, err
	}
	s.Indicated = numbered(s.Indicated, s.Layout)
	return s, nil
}

// syntaxProblem puts the library's error into our form.
func syntaxProblem(path string, src []byte, err error) error {
	var syntax toml.ParseError
	if !errors.As(err, &syntax) {
		return &Problem{Path: path, Line: 1, Col: 1, Msg: err.Error()}
	}
	before := src[:min(max(syntax.Position.Start, 0), len(src))]
	p := &Problem{Path: path, Line: 1 + bytes.Count(before, []byte{'\n'}), Col: len(before) - bytes.LastIndexByte(before, '\n'),
		Field: syntax.LastKey, Msg: strings.TrimSuffix(syntax.Message, "."), Hint: "the file must be TOML"}
	if strings.Contains(syntax.Message, "already been defined") {
		p.Field, p.Msg, p.Hint = "", "stated twice: "+repeatedKey(syntax.Message), "keep one"
	}
	return p
}

// repeatedKey takes the key out of the library's sentence about it.
func repeatedKey(message string) string {
	if parts := strings.SplitN(message, "'", 3); len(parts) == 3 {
		return parts[1]
	}
	return message
}

// err joins the problems in the order of the file.
func (s *source) err() error {
	slices.SortStableFunc(s.problems, func(a, b *Problem) int {
		return cmp.Or(cmp.Compare(a.Line, b.Line), cmp.Compare(a.Col, b.Col), cmp.Compare(a.Field, b.Field))
	})
	var list []error
	for i, p := range s.problems {
		if i == maxProblems {
			list = append(list, &Problem{Path: s.path, Msg: fmt.Sprintf("and %d more", len(s.problems)-i)})
			break
		}
		list = append(list, p)
	}
	return errors.Join(list...)
}

// read takes every key of the file, each value checked by itself.
func (s *Schema) read(root *node) {
	s.Name, s.Title = root.text("name"), root.text("title")
	if root.has("name") && !isName(s.Name) {
		root.problem("name", fmt.Sprintf("found %q", s.Name), "small letters, digits and hyphens are allowed, e.g. bench-a")
	}
	s.Layout = Layout(root.word("layout", string(Single), string(Stacked), string(Long), string(Wide)))
	s.ValidFrom = root.day("valid_from")
	s.Dialect.read(root.child("dialect"))
	s.Recognise.read(root.child("recognise"))
	s.Preamble.read(root.child("preamble"))
	stack := root.child("stack")
	s.Stack = Stack{Begin: stack.text("begin"), End: stack.text("end"), Blank: stack.flag("blank")}
	stack.done()
	wide := root.child("wide")
	s.Wide = wide.titles("titles")
	wide.done()
	s.Footer.read(root.child("footer"))
	s.readLists(root)
	s.SameVolume = SameVolume(root.word("sameVolume", "all", string(SameLast)))
	if s.SameVolume == "all" {
		s.SameVolume = SameAll
	}
	s.RepeatedHeader = root.flag("repeatedHeader")
	s.KeepUnterminated = root.flag("keepUnterminatedRow")
	for _, key := range []string{"name", "layout", "recognise", "fields"} {
		if !root.has(key) {
			root.problem("", key+" is missing", "every schema states it")
		}
	}
	root.done()
}

// readLists takes the lists of columns, facts, endpoints and results.
func (s *Schema) readLists(root *node) {
	for _, n := range root.children("fields") {
		s.Fields = append(s.Fields, readField(n))
	}
	for _, n := range root.children("facts") {
		s.Facts = append(s.Facts, readFact(n))
	}
	for _, n := range root.children("indicated") {
		s.Indicated = append(s.Indicated, readIndicated(n))
	}
	for _, n := range root.children("results") {
		s.Results = append(s.Results, readResult(n))
	}
}

func isName(s string) bool {
	return s != "" && strings.Trim(s, "abcdefghijklmnopqrstuvwxyz0123456789-") == ""
}

func (d *Dialect) read(n *node) {
	d.Encoding = Encoding(n.word("encoding", string(UTF8), string(UTF16), string(UTF16LE), string(UTF16BE), string(Windows1252), string(Latin1), string(Auto)))
	if d.Encoding == "" {
		d.Encoding = UTF8 // [csvw] encoding: default
	}
	d.Delimiter = n.char("delimiter", ',')
	d.QuoteChar = n.char("quoteChar", '"')
	d.CommentChar = n.char("commentChar", 0)
	d.EscapeChar = n.char("escapeChar", 0)
	d.Repeated = n.flag("delimiterRepeated")
	d.GroupChar = n.text("groupChar")
	if d.GroupChar != "" && (utf8.RuneCountInString(d.GroupChar) != 1 || strings.ContainsAny(d.GroupChar, "0123456789+-eE\r\n")) {
		n.problem("groupChar", fmt.Sprintf("found %q", d.GroupChar), "one character that no number has is allowed, for any blank \" \"")
	}
	d.HeaderRows, d.HeaderJoin = n.rows("headerRows"), " "
	n.asked = append(n.asked, "headerJoin")
	if n.has("headerJoin") {
		d.HeaderJoin = n.text("headerJoin")
	}
	d.DecimalChar = '.' // [table] decimalChar: default
	if w := n.word("decimalChar", ".", ","); w != "" {
		d.DecimalChar = w[0]
	}
	d.MissingValues = n.texts("missingValues")
	if n.has("delimiter") && d.Delimiter == 0 && n.isText("delimiter") && n.text("delimiter") == "" {
		n.problem("delimiter", `found ""`, `one ASCII character is allowed, for a tab "\t"`)
	}
	n.done()
}

func (r *Recognise) read(n *node) {
	r.FirstLine, r.Begins, r.Header = n.text("firstLine"), n.text("firstLineBegins"), n.flag("header")
	r.Lines, r.Absent = n.titles("lines"), n.titles("absent")
	n.done()
}

func (p *Preamble) read(n *node) {
	p.Lines = Lines(n.word("lines", string(CommentLines), string(CellLines), string(TextLines)))
	p.Separator = n.char("separator", ':')
	n.done()
}

func (f *Footer) read(n *node) {
	f.Begin, f.Blank, f.Row, f.Titles = n.text("begin"), n.flag("blank"), n.text("row"), n.titles("titles")
	f.Lines = Lines(n.word("lines", string(CommentLines), string(CellLines), string(TextLines), string(UnusedLines)))
	n.done()
}
