package schemas

import (
	"fmt"
	"strings"
)

// Problem is one thing that is wrong at one place of a dump, a schema or
// another input file. It is the only positioned error of the project: callers
// look at its fields with errors.As, never at its text.
type Problem struct {
	Path  string // as the user knows it; "" when the caller adds it later
	Line  int    // 1-based; 0 when the whole file is meant
	Col   int    // 1-based byte column; 0 when the whole line is meant
	Run   int    // 1-based in a dump that holds several runs; 0 when the whole file is meant
	Field string // the field or key concerned; "" when none
	Msg   string // what was found
	Hint  string // what was expected, or what to do; "" when nothing can be said
	Next  string // the exact next command, "" when there is none; no part of Error
}

// Error renders path:line:column: run n: field: what was found; what to do.
func (p *Problem) Error() string {
	var b strings.Builder
	b.WriteString(p.Path)
	if p.Line > 0 {
		fmt.Fprintf(&b, ":%d", p.Line)
		if p.Col > 0 {
			fmt.Fprintf(&b, ":%d", p.Col)
		}
	}
	if b.Len() > 0 {
		b.WriteString(": ")
	}
	if p.Run > 0 {
		fmt.Fprintf(&b, "run %d: ", p.Run)
	}
	if p.Field != "" {
		b.WriteString(p.Field + ": ")
	}
	b.WriteString(p.Msg)
	if p.Hint != "" {
		b.WriteString("; " + p.Hint)
	}
	return b.String()
}
