package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"log/slog"
	"os"
	"path/filepath"
	"strings"
	"syscall"
	"testing"
	"time"

	"lastdrop/cmd/internal/night/publish"
	"lastdrop/report/pdf"
)

// The cases in testdata/cmd hold the exit codes 0, 1, 2, 4 and 6; those that
// need another process or a signal are here.

// aCurve is a plain dump of a strong acid with a jump between 9.5 and 10.5 mL.
const aCurve = `# sample: V-12
# titrant: NaOH
volume_mL,pH
0,1.30
2,1.48
4,1.70
6,1.98
8,2.40
9,2.78
9.5,3.12
9.9,3.84
10.1,10.15
10.5,10.84
11,11.14
12,11.43
14,11.71
`

// laboratory is a folder with dumps/ in it.
func laboratory(t *testing.T) (dumps, into string) {
	t.Helper()
	dir := t.TempDir()
	dumps, into = filepath.Join(dir, "dumps"), filepath.Join(dir, "out")
	if err := os.Mkdir(dumps, 0o777); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(filepath.Join(dumps, "1.csv"), []byte(aCurve), 0o666); err != nil {
		t.Fatal(err)
	}
	return dumps, into
}

func TestStoppedBySignal(t *testing.T) {
	for signal, want := range map[os.Signal]int{os.Interrupt: 130, syscall.SIGTERM: 143} {
		dumps, into := laboratory(t)
		if r := try(t, []string{"sweep", dumps, "--into", into}, nil); r.exit != 0 {
			t.Fatalf("first sweep: exit %d, %s", r.exit, r.stderr)
		}
		night := tree(t, into)
		ctx, cancel := context.WithCancelCause(t.Context())
		cancel(stopped{signal})
		var stderr strings.Builder
		p := &program{stdout: io.Discard, stderr: &stderr, now: func() time.Time { return moment }, getenv: func(string) string { return "" }}
		if got := p.run(ctx, []string{"sweep", dumps, "--into", into}); got != want {
			t.Errorf("%v: got exit %d, want %d", signal, got, want)
		}
		if got, want := stderr.String(), "lastdrop: stopped by the signal "+signal.String()+"\n"; got != want {
			t.Errorf("%v: stderr\n got %q\nwant %q", signal, got, want)
		}
		for name, was := range night {
			now, err := os.ReadFile(filepath.Join(into, name))
			if err != nil {
				t.Error(err)
			}
			if name != "last-sweep.txt" && !strings.HasSuffix(was, "\n"+string(now)) {
				t.Errorf("%v: %s has changed", signal, name)
			}
		}
		last, _ := os.ReadFile(filepath.Join(into, "last-sweep.txt"))
		if !strings.Contains(string(last), fmt.Sprintf("exit: %d\n", want)) {
			t.Errorf("%v: last-sweep.txt: got %s", signal, last)
		}
	}
}

func TestAnotherSweepIsAtWork(t *testing.T) {
	dumps, into := laboratory(t)
	other, err := publish.Open(into)
	if err != nil {
		t.Fatal(err)
	}
	defer other.Close()
	r := try(t, []string{"sweep", dumps, "--into", into}, nil)
	if r.exit != 75 || !strings.HasPrefix(r.stderr, "lastdrop: another sweep writes into ") {
		t.Errorf("got exit %d, %s, want 75", r.exit, r.stderr)
	}
}

// A stdout that refuses the summary is not a success, though the night stands.
func TestStdoutRefuses(t *testing.T) {
	dumps, into := laboratory(t)
	for _, args := range [][]string{
		{"sweep", dumps, "--into", into},
		{"sweep", dumps, "--into", into, "--json"},
		{"look", filepath.Join(dumps, "1.csv")},
		{"--help"},
	} {
		p := &program{stdout: refuses{}, stderr: io.Discard, now: func() time.Time { return moment }, getenv: func(string) string { return "" }}
		if got := p.run(t.Context(), args); got != 1 {
			t.Errorf("%v: got exit %d, want 1", args, got)
		}
	}
}

type refuses struct{}

func (refuses) Write([]byte) (int, error) { return 0, errors.New("broken pipe") }

func TestDayOfThePublication(t *testing.T) {
	for epoch, want := range map[string]string{
		"":           "2031-04-03",
		"0":          "1970-01-01",
		"1932940799": "2031-04-02", // date -u -d @1932940799
	} {
		p := &program{now: func() time.Time { return moment }, getenv: func(string) string { return epoch }}
		if got, err := p.publicationDate(); err != nil || got != want {
			t.Errorf("SOURCE_DATE_EPOCH %q: got %q, %v, want %q", epoch, got, err, want)
		}
	}
	dumps, into := laboratory(t)
	for _, epoch := range []string{"yesterday", "-1", "99999999999999"} {
		r := try(t, []string{"sweep", dumps, "--into", into}, map[string]string{"SOURCE_DATE_EPOCH": epoch})
		if r.exit != 2 || !strings.Contains(r.stderr, "is not a count of seconds since 1970") {
			t.Errorf("SOURCE_DATE_EPOCH %q: got exit %d, %s", epoch, r.exit, r.stderr)
		}
	}
}

// What a file is named must not make a line or a colour of its own.
func TestNamesStayOnTheirLine(t *testing.T) {
	r := try(t, []string{"look", "a\nlastdrop: \x1b[31mred"}, nil)
	if r.exit != 1 || strings.Count(r.stderr, "\n") != 2 || strings.Contains(r.stderr, "\x1b") {
		t.Errorf("got exit %d, stderr %q", r.exit, r.stderr)
	}
}

func TestWarningsOfThePages(t *testing.T) {
	var stderr strings.Builder
	p := &program{stderr: &stderr}
	pages := []pdf.Result{{Replaced: []string{"V-12 \U0001F9EA"}},
		{Failed: []pdf.Failed{{Page: 3, What: "run 9f31c07a52de of dumps/1.csv", Says: "no number\nhere"}}, Replaced: []string{"V-13"}}}
	tellPages(slog.New(warnings{p: p}), pages)
	tellPages(slog.New(warnings{p: p, quiet: true}), pages)
	want := "lastdrop: warning: a page could not be drawn; one that says so stands in its place, file: summary-2.pdf, page: 3, of: run 9f31c07a52de of dumps/1.csv, cause: no number, here\n" +
		"lastdrop: warning: signs that the font has not were replaced, texts: 2, first: V-12 \U0001F9EA\n"
	if stderr.String() != want {
		t.Errorf("stderr:\n got %q\nwant %q", stderr.String(), want)
	}
}
