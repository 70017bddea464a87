package main

import (
	"errors"
	"strings"

	"lastdrop/schemas"
)

// faults are several things that are wrong, each with a line of its own on
// stderr.
type faults struct {
	all  []error
	code int
	try  string
}

func (f *faults) Error() string {
	texts := make([]string, len(f.all))
	for i, err := range f.all {
		texts[i] = err.Error()
	}
	return strings.Join(texts, ", ")
}

// parted takes joined errors apart, however deep they are joined.
func parted(err error) []error {
	if _, ok := err.(*schemas.Problem); ok {
		return []error{err}
	}
	if joined, ok := err.(interface{ Unwrap() []error }); ok {
		var all []error
		for _, e := range joined.Unwrap() {
			all = append(all, parted(e)...)
		}
		return all
	}
	if inner := errors.Unwrap(err); inner != nil {
		return parted(inner)
	}
	return []error{err}
}
