package main

import (
	"strings"
	"testing"
)

func TestHoist(t *testing.T) {
	p := &program{}
	for _, c := range []struct{ args, want string }{
		{"a --into out", "--into out -- a"},
		{"--into out a", "--into out -- a"},
		{"a b --quiet --into=out", "--quiet --into=out -- a b"},
		{"a -into out c", "-into out -- a c"},
		{"--into out -- --json -x", "--into out -- --json -x"},
		{"a -- b --quiet", "-- a b --quiet"},
		{"a --min-age -5s", "--min-age -5s -- a"},
		{"-", "-- -"},
	} {
		got, _, err := p.sweepCommand().hoist(strings.Fields(c.args))
		if err != nil || strings.Join(got, " ") != c.want {
			t.Errorf("%s:\n got %v, %v\nwant %s", c.args, got, err, c.want)
		}
	}
}

func TestHoistRefuses(t *testing.T) {
	p := &program{}
	for args, want := range map[string]string{
		"a --estimatr gran":  `sweep has no option "--estimatr"`,
		"a --into":           "option --into needs OUT behind it",
		"a --into --json":    "option --into needs OUT behind it",
		"a --pages -quiet":   "option --pages needs WHICH behind it",
		"a --into out --yes": `sweep has no option "--yes"`,
	} {
		_, _, err := p.sweepCommand().hoist(strings.Fields(args))
		if err == nil || err.Error() != want || exitCode(err) != 2 {
			t.Errorf("%s:\n got %v\nwant %s", args, err, want)
		}
	}
}

// Folders that are named like options or like what the library knows by
// itself are folders.
func TestFoldersWithNamesOfTheLibrary(t *testing.T) {
	for _, name := range []string{"help", "h", "into", "quiet", "sweep"} {
		r := try(t, []string{"sweep", name, "--into", t.TempDir()}, nil)
		if want := "lastdrop: " + name + ": there is no such folder or file\n"; r.exit != 1 || !strings.HasPrefix(r.stderr, want) {
			t.Errorf("%s: got exit %d, %s", name, r.exit, r.stderr)
		}
	}
}

func TestHelpFitsATerminal(t *testing.T) {
	for _, about := range []string{"", "sweep", "look", "demo", "schema", "schema list", "schema show", "schema try", "schema draft"} {
		r := try(t, strings.Fields("help "+about), nil)
		for _, line := range strings.Split(r.stdout, "\n") {
			if n := len([]rune(line)); n > helpWidth {
				t.Errorf("help %s: %d columns: %s", about, n, line)
			}
		}
	}
}
