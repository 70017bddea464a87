package schemaview

import (
	"io"

	"lastdrop/report"
	"lastdrop/schemas"
)

// Origins says of each schema of a set, by its SHA-256, where it comes from.
func Origins(set []*schemas.Schema) map[string]string {
	shipped := map[string]bool{}
	for _, s := range schemas.Shipped() {
		shipped[s.SHA256] = true
	}
	from := map[string]string{}
	for _, s := range set {
		switch {
		case s.Replaces:
			from[s.SHA256] = report.ReplacesShipped
		case shipped[s.SHA256]:
			from[s.SHA256] = report.Shipped
		default:
			from[s.SHA256] = report.Laboratory
		}
	}
	return from
}

// List writes a line for each schema: name, layout, where from, title.
func List(w io.Writer, set []*schemas.Schema) error {
	p, from := &page{}, Origins(set)
	name := len("name")
	for _, s := range set {
		name = max(name, len(s.Name))
	}
	name = min(name, 24) + 2
	head := func(n, layout, origin string) string { return pad(n, name) + pad(layout, 9) + pad(origin, 18) }
	p.line(head("name", "layout", "from") + "title")
	for _, s := range set {
		title := s.Title
		if s.ValidFrom != "" {
			title += " (in force from " + s.ValidFrom + ")"
		}
		p.hang(head(s.Name, string(s.Layout), from[s.SHA256]), len(head("", "", "")), title)
	}
	return p.writeTo(w)
}
