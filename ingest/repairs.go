package ingest

import (
	"cmp"
	"fmt"
	"slices"
)

const trailingDropped = "trailing delimiter dropped"

// maxRepairs is how many repairs of one run are listed; the rest is counted.
const maxRepairs = 40

// repairs lists each change made to read a run, neighbouring lines with the
// same repair together.
type repairs struct {
	list []repair
	more int
}

type repair struct {
	from, to int // lines
	text     string
}

func (r *repairs) add(line int, text string) {
	for i := range r.list {
		if last := &r.list[i]; last.text == text && (last.to == line-1 || last.to == line) {
			last.to = line
			return
		}
	}
	if len(r.list) == maxRepairs {
		r.more++
		return
	}
	r.list = append(r.list, repair{line, line, text})
}

// lines returns the repairs in the order of the dump, nil when there are none.
func (r *repairs) lines() []string {
	var lines []string
	slices.SortStableFunc(r.list, func(a, b repair) int { return cmp.Compare(a.from, b.from) })
	for _, one := range r.list {
		if one.from == one.to {
			lines = append(lines, fmt.Sprintf("line %d: %s", one.from, one.text))
		} else {
			lines = append(lines, fmt.Sprintf("lines %d to %d: %s", one.from, one.to, one.text))
		}
	}
	if r.more > 0 {
		lines = append(lines, fmt.Sprintf("and %d more", r.more))
	}
	return lines
}
