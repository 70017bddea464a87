// Package lines writes what a sweep publishes for programs: JSON Lines (one
// object a line, UTF-8, LF) in the order given, and checks such lines.
//
// A float is printed with the fewest digits that read back to the same value;
// absent values are left out; no line holds a clock time, a host or a user.
// The fields are those of the record's types in package report.
//
// Sources: [json] RFC 8259; JSON Lines, jsonlines.org (from memory).
package lines

import (
	"bufio"
	"encoding/json"
	"fmt"
	"io"

	"lastdrop/report"
)

// Evaluations writes evaluations.jsonl. A NaN or an infinite figure is an
// error that names the dump and the run.
func Evaluations(w io.Writer, evaluations []report.Evaluation) error {
	return each(w, evaluations, func(e *report.Evaluation) (any, string) {
		full := *e
		full.Endpoints = withEstimates(notNull(full.Endpoints))
		full.Flags = notNull(full.Flags)
		return &full, fmt.Sprintf("%s: run %d", e.Dump, e.Run)
	})
}

// Unread writes unread.jsonl.
func Unread(w io.Writer, unread []report.Unread) error {
	return each(w, unread, func(u *report.Unread) (any, string) { return u, u.Dump })
}

// Waiting writes waiting.jsonl.
func Waiting(w io.Writer, waiting []report.Waiting) error {
	return each(w, waiting, func(u *report.Waiting) (any, string) { return u, u.Dump })
}

// each writes one line an object; object returns what is written and the name
// that an error gives it.
func each[T any](w io.Writer, all []T, object func(*T) (any, string)) error {
	buffered := bufio.NewWriterSize(w, 1<<16)
	encoder := json.NewEncoder(buffered) // ends each object with one LF
	encoder.SetEscapeHTML(false)
	for i := range all {
		o, name := object(&all[i])
		if err := encoder.Encode(o); err != nil {
			return fmt.Errorf("%s: %w", name, err)
		}
	}
	return buffered.Flush()
}

// notNull keeps an empty list a list: null would be a second form of absent.
func notNull[T any](s []T) []T {
	if s == nil {
		return []T{}
	}
	return s
}

// withEstimates returns endpoints whose estimates are not null; the given ones
// stay as they are.
func withEstimates(endpoints []report.Endpoint) []report.Endpoint {
	for i := range endpoints {
		if endpoints[i].Estimates != nil {
			continue
		}
		copied := append([]report.Endpoint(nil), endpoints...)
		for k := range copied {
			copied[k].Estimates = notNull(copied[k].Estimates)
		}
		return copied
	}
	return endpoints
}
