package main

import (
	"context"
	"errors"
	"fmt"
	"log/slog"
	"strings"

	"lastdrop/cmd/internal/night"
	"lastdrop/report"
)

// tell prints an error and what to do next on stderr. That is all that can be
// done with it, so a stderr that refuses it is ignored.
func (p *program) tell(err error) {
	if err == nil {
		return
	}
	lines := []error{err}
	if f, ok := errors.AsType[*faults](err); ok {
		lines = f.all
	}
	for _, line := range lines {
		fmt.Fprintf(p.stderr, "lastdrop: %s\n", oneLine(line.Error()))
	}
	if try := nextStep(err); try != "" {
		fmt.Fprintf(p.stderr, "lastdrop: try: %s\n", oneLine(try))
	}
}

func nextStep(err error) string {
	if e, ok := errors.AsType[*usageError](err); ok {
		return e.try
	}
	if e, ok := errors.AsType[*failure](err); ok {
		return e.try
	}
	if e, ok := errors.AsType[*faults](err); ok {
		return e.try
	}
	if e, ok := errors.AsType[*night.Error](err); ok {
		return e.Try
	}
	return ""
}

// oneLine keeps names of files and texts of dumps from making lines of their
// own on stderr. Several causes are joined by line breaks, which may become
// commas.
func oneLine(s string) string {
	return report.Visible(strings.ReplaceAll(s, "\n", ", "))
}

// shellWord quotes a path that a shell would take apart.
func shellWord(s string) string {
	if strings.ContainsAny(s, " \t'\"\\$&;()<>|*?[]#~`!") {
		return "'" + strings.ReplaceAll(s, "'", `'\''`) + "'"
	}
	return s
}

// warnings is a log handler that prints "lastdrop: warning: message, key
// value, …".
type warnings struct {
	p     *program
	quiet bool
	attrs []slog.Attr
}

func (w warnings) Enabled(_ context.Context, l slog.Level) bool {
	return !w.quiet && l >= slog.LevelWarn
}

func (w warnings) Handle(_ context.Context, r slog.Record) error {
	var b strings.Builder
	b.WriteString(r.Message)
	add := func(a slog.Attr) bool {
		fmt.Fprintf(&b, ", %s: %s", a.Key, a.Value)
		return true
	}
	for _, a := range w.attrs {
		add(a)
	}
	r.Attrs(add)
	_, err := fmt.Fprintf(w.p.stderr, "lastdrop: warning: %s\n", oneLine(b.String()))
	return err
}

func (w warnings) WithAttrs(attrs []slog.Attr) slog.Handler {
	w.attrs = append(append([]slog.Attr{}, w.attrs...), attrs...)
	return w
}

// WithGroup has nothing to do: keys are for people here.
func (w warnings) WithGroup(string) slog.Handler { return w }
