// Package repairs lists what was changed or doubted to read a run, each with
// its line.
package repairs

import (
	"cmp"
	"fmt"
	"slices"
)

// Max is how many repairs of one run are listed; the rest is counted.
const Max = 40

// List is the repairs of one run, neighbouring lines with the same repair
// together. The zero List is empty.
type List struct {
	list []repair
	more int
}

type repair struct {
	from, to int // lines
	text     string
}

// Add notes a repair; line 0 means the name of the dump.
func (r *List) Add(line int, text string) {
	for i := range r.list {
		if last := &r.list[i]; last.text == text && (last.to == line-1 || last.to == line) {
			last.to = line
			return
		}
	}
	if len(r.list) == Max {
		r.more++
		return
	}
	r.list = append(r.list, repair{line, line, text})
}

// Lines returns the repairs in the order of the dump, nil when there are none.
func (r *List) Lines() []string {
	var lines []string
	slices.SortStableFunc(r.list, func(a, b repair) int { return cmp.Compare(a.from, b.from) })
	for _, one := range r.list {
		switch {
		case one.to == 0:
			lines = append(lines, "file name: "+one.text)
		case one.from == one.to:
			lines = append(lines, fmt.Sprintf("line %d: %s", one.from, one.text))
		default:
			lines = append(lines, fmt.Sprintf("lines %d to %d: %s", one.from, one.to, one.text))
		}
	}
	if r.more > 0 {
		lines = append(lines, fmt.Sprintf("and %d more", r.more))
	}
	return lines
}

// Copy returns a list of its own with the same repairs.
func (r *List) Copy() List { return List{list: slices.Clone(r.list), more: r.more} }

// Join takes the repairs of another list.
func (r *List) Join(other *List) {
	for _, one := range other.list {
		if len(r.list) < Max {
			r.list = append(r.list, one)
		} else {
			r.more++
		}
	}
	r.more += other.more
}
