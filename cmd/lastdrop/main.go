// Command lastdrop refits the endpoints of titrations, night by night. This
// package holds arguments and exit codes only, one file per command; the work
// is done by cmd/internal.
//
//	sweep.go   the night: folders of dumps become one published night
//	look.go    one dump on the terminal
//	schema.go  the mappings of instruments; schemalist.go and so on, its parts
//	demo.go    the demonstration laboratory
//	exit.go    the exit codes, all of them
//
// stdout carries data and nothing else; all the rest goes to stderr as
// "lastdrop: …", "lastdrop: warning: …" and "lastdrop: try: …".
package main

import (
	"context"
	"io"
	"os"
	"runtime/debug"
	"time"

	"golang.org/x/term"
)

// version of the program; every record and report carries it.
const version = "0.1.0"

// memoryTarget lets the heap grow by half before it is collected, not by as
// much again: a sweep shares a laboratory's computer, and a third less memory
// costs it a tenth more time (measured 2026: 1,394 runs, 159 to 117 MB, 0.98
// to 1.13 s). GOGC in the environment has the last word.
const memoryTarget = 50

func main() {
	if os.Getenv("GOGC") == "" {
		debug.SetGCPercent(memoryTarget)
	}
	os.Exit(run(untilSignal(context.Background()), os.Args[1:], os.Stdin, os.Stdout, os.Stderr))
}

// run does what the arguments say and returns the exit code. Nothing else in
// the program exits.
func run(ctx context.Context, args []string, stdin io.Reader, stdout, stderr io.Writer) int {
	p := &program{stdin: stdin, stdout: stdout, stderr: stderr, now: time.Now, getenv: os.Getenv}
	return p.run(ctx, args)
}

// program is what a run has of the world.
type program struct {
	stdin          io.Reader
	stdout, stderr io.Writer
	now            func() time.Time
	getenv         func(string) string
}

func (p *program) run(ctx context.Context, args []string) int {
	err := p.execute(ctx, args)
	p.tell(err)
	return exitCode(err)
}

// colours is true when stdout is a terminal that may be given colours.
func (p *program) colours() bool {
	f, ok := p.stdout.(*os.File)
	return ok && term.IsTerminal(int(f.Fd())) && p.getenv("NO_COLOR") == "" && p.getenv("TERM") != "dumb"
}
