package schemaview

import (
	"fmt"
	"io"
	"strconv"
	"strings"

	"lastdrop/schemas"
)

// Show writes in words what one schema expects of a dump, and what it takes
// from it.
func Show(w io.Writer, s *schemas.Schema, from string) error {
	p := &page{}
	p.hang("schema "+s.Name+": ", len("schema "+s.Name+": "), s.Title)
	p.row("from", from)
	p.row("layout", layoutWords(s.Layout))
	if s.ValidFrom != "" {
		p.row("in force", "from "+s.ValidFrom)
	}
	p.hang("  SHA-256", width-len(s.SHA256), s.SHA256)
	p.evidence(&s.Recognise)
	p.text(s)
	p.columns(s.Fields)
	p.facts(s.Facts)
	p.statements(s)
	return p.writeTo(w)
}

func layoutWords(l schemas.Layout) string {
	switch l {
	case schemas.Stacked:
		return "stacked: one run below the other, each with its own header"
	case schemas.Long:
		return "long: one table; a column names the run"
	case schemas.Wide:
		return "wide: one table; each run has columns of its own"
	}
	return "single: one run a dump"
}

func (p *page) evidence(r *schemas.Recognise) {
	p.heading("RECOGNISED BY (all of it)")
	if r.FirstLine != "" {
		p.row("first line", strconv.Quote(r.FirstLine))
	}
	if r.Begins != "" {
		p.row("first line begins", strconv.Quote(r.Begins))
	}
	for _, l := range r.Lines {
		p.row("a line begins", strconv.Quote(l))
	}
	for _, l := range r.Absent {
		p.row("no line begins", strconv.Quote(l))
	}
	if r.Header {
		p.row("header", "a row with the volume and a reading")
	}
}

func (p *page) text(s *schemas.Schema) {
	d := &s.Dialect
	p.heading("TEXT")
	p.row("encoding", string(d.Encoding))
	p.row("delimiter", delimiter(d.Delimiter))
	p.row("decimal mark", strconv.QuoteRune(rune(d.DecimalChar)))
	if d.CommentChar != 0 {
		p.row("comments begin", strconv.QuoteRune(rune(d.CommentChar)))
	}
	if len(d.MissingValues) > 0 {
		p.row("not given is", quoted(d.MissingValues))
	}
	if s.Stack.Begin != "" {
		p.row("a run begins", "with "+strconv.Quote(s.Stack.Begin))
	}
	if s.Footer.Begin != "" {
		p.row("footer begins", "with "+strconv.Quote(s.Footer.Begin))
	}
}

func (p *page) columns(fields []schemas.Field) {
	p.heading("COLUMNS")
	for i := range fields {
		f := &fields[i]
		says := quoted(f.Titles)
		if f.Unit.Code != "" {
			says += ", in " + f.Unit.Code
		}
		if f.Clock.Text() != "" {
			says += ", written as " + f.Clock.Text()
		}
		p.row(string(f.Role), says)
	}
}

func (p *page) facts(facts []schemas.Fact) {
	if len(facts) == 0 {
		return
	}
	p.heading("FACTS")
	for i := range facts {
		p.row(string(facts[i].Name), factWords(&facts[i]))
	}
}

// factWords says where a fact stands, and in which unit.
func factWords(f *schemas.Fact) string {
	var said []string
	if len(f.Titles) > 0 {
		said = append(said, quoted(f.Titles))
	}
	if len(f.Columns) > 0 {
		said = append(said, "column "+quoted(f.Columns))
	}
	for _, v := range f.Values {
		said = append(said, fmt.Sprintf("%q means %s", v.Text, v.Means))
	}
	if f.Default != "" {
		said = append(said, strconv.Quote(f.Default)+" when nothing is stated")
	}
	if f.Number != nil {
		said = append(said, shortest(*f.Number)+" when nothing is stated")
	}
	if f.Unit.Code != "" {
		said = append(said, "in "+f.Unit.Code)
	}
	if f.Format.Text() != "" {
		said = append(said, "written as "+f.Format.Text())
	}
	if len(said) == 0 {
		return "from the name of the file or folder"
	}
	return strings.Join(said, "; ")
}

// statements are what the instrument itself found.
func (p *page) statements(s *schemas.Schema) {
	if len(s.Indicated)+len(s.Results) == 0 {
		return
	}
	p.heading("WHAT THE INSTRUMENT FOUND")
	for i := range s.Indicated {
		in := &s.Indicated[i]
		says := quoted(in.Titles) + ", in " + in.Unit.Code
		if in.Kind != "" {
			says += ", " + in.Kind
		}
		if len(in.KindTitles) > 0 {
			says += ", its kind by " + quoted(in.KindTitles)
		}
		p.row("endpoint", says)
	}
	for i := range s.Results {
		p.row("result", quoted(s.Results[i].Titles))
	}
}

func delimiter(b byte) string {
	switch b {
	case '\t':
		return "tab"
	case ' ':
		return "blank"
	}
	return strconv.QuoteRune(rune(b))
}

func quoted(all []string) string {
	words := make([]string, len(all))
	for i, s := range all {
		words[i] = strconv.Quote(s)
	}
	return strings.Join(words, " or ")
}

func shortest(v float64) string { return strconv.FormatFloat(v, 'g', -1, 64) }
