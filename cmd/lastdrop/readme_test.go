package main

import (
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
)

// filledIn puts something that is there in the place of each placeholder.
func filledIn(command string) string {
	return strings.NewReplacer("SCHEMA FILE", "plain plain.csv", "FOLDER…", "testdata/tern-island/dumps", "OUT", "night",
		"FILE", "testdata/tern-island/dumps/bench-a/0417.csv", "DIR", "island").Replace(command)
}

// Every lastdrop command of the README runs, in its order, in a folder that
// has the shipped dumps.
func TestCommandsOfTheReadme(t *testing.T) {
	root, err := filepath.Abs("../..")
	if err != nil {
		t.Fatal(err)
	}
	readme, err := os.ReadFile(filepath.Join(root, "README.md"))
	if err != nil {
		t.Fatal(err)
	}
	work := t.TempDir()
	if err := os.CopyFS(filepath.Join(work, "testdata/tern-island"), os.DirFS(filepath.Join(root, "testdata/tern-island"))); err != nil {
		t.Fatal(err)
	}
	plain := filepath.Join(work, "plain.csv")
	if err := os.WriteFile(plain, []byte(aCurve), 0o666); err != nil {
		t.Fatal(err)
	}
	t.Chdir(work)
	commands := commandsIn(string(readme))
	if len(commands) < 4 {
		t.Errorf("got %d commands in the README, want at least 4: %q", len(commands), commands)
	}
	for _, c := range commands {
		if r := try(t, strings.Fields(filledIn(c)), nil); r.exit != 0 || r.stderr != "" && !saidWhenDone.MatchString(r.stderr) {
			t.Errorf("lastdrop %s: exit %d, stderr %s", c, r.exit, r.stderr)
		}
	}
}

// saidWhenDone is what stderr says of commands that are done: the next step of
// a sweep, and why a draft is as it is.
var saidWhenDone = regexp.MustCompile(`(?m)\Alastdrop: try: lastdrop look |^lastdrop: the draft reads \d+ run`)

// commandsIn returns the arguments of every lastdrop command in the fenced
// blocks of a text, without comments.
func commandsIn(text string) (commands []string) {
	for i, block := range strings.Split(text, "```") {
		if i%2 == 0 {
			continue
		}
		for line := range strings.Lines(block) {
			line, _, _ = strings.Cut(strings.TrimSpace(line), " #")
			for _, start := range []string{"go run ./cmd/lastdrop ", "./lastdrop ", "lastdrop "} {
				if args, ok := strings.CutPrefix(line, start); ok {
					commands = append(commands, args)
				}
			}
		}
	}
	return commands
}
