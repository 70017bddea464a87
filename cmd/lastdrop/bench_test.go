package main

import (
	"fmt"
	"io"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"lastdrop/cmd/internal/demo"
)

// manyDumps writes the dumps of one demonstration night after the other into
// a folder, each night in a folder of its own, until there are count files.
func manyDumps(tb testing.TB, folder string, count int) {
	tb.Helper()
	for seed := uint64(1); count > 0; seed++ {
		files, _, err := demo.Files(seed)
		if err != nil {
			tb.Fatal(err)
		}
		for _, f := range files {
			ext := filepath.Ext(f.Path)
			if count == 0 || !strings.HasPrefix(f.Path, "dumps/") || ext == ".md" || ext == ".bmp" {
				continue
			}
			writeDemonstration(tb, filepath.Join(folder, fmt.Sprint("night-", seed)), f)
			count--
		}
	}
}

// BenchmarkSweep1000Dumps is the whole command with every output.
func BenchmarkSweep1000Dumps(b *testing.B) {
	dumps, into := filepath.Join(b.TempDir(), "dumps"), filepath.Join(b.TempDir(), "out")
	manyDumps(b, dumps, 1000)
	b.ReportAllocs()
	for b.Loop() {
		p := &program{stdout: io.Discard, stderr: io.Discard, now: time.Now, getenv: func(string) string { return "" }}
		if exit := p.run(b.Context(), []string{"sweep", dumps, "--into", into}); exit != 0 {
			b.Fatalf("exit %d", exit)
		}
	}
}
