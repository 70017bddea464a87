package schemaview

import (
	"fmt"
	"strings"
	"testing"
	"unicode/utf8"

	"lastdrop/ingest"
	"lastdrop/report"
	"lastdrop/schemas"
)

// broad is a schema and a dump with texts longer than any column of a page.
func broad(t *testing.T) (*schemas.Schema, string) {
	t.Helper()
	column := strings.Repeat("volume of titrant ", 6) + "(uL)"
	s, err := schemas.Parse("broad.toml", []byte(`name = "broad"
title = "`+strings.Repeat("many words ", 20)+`"
layout = "single"
[dialect]
delimiter = ";"
[recognise]
header = true
[[fields]]
name = "volume"
titles = ["`+column+`"]
unit = "uL"
[[fields]]
name = "pH"
titles = ["pH"]
unit = "[pH]"
`))
	if err != nil {
		t.Fatal(err)
	}
	dump := column + ";pH;" + strings.Repeat("x", 120) + "\n"
	for i := range 9 {
		dump += fmt.Sprintf("%d;%d.25;\x1b[31mred\n", 1250*i, 3+i/2)
	}
	return s, dump
}

func TestPagesFitAndAreHarmless(t *testing.T) {
	s, dump := broad(t)
	e := ingest.Explain([]byte(dump), strings.Repeat("far/", 30)+"dump.csv", s)
	for name, write := range map[string]func(*strings.Builder) error{
		"list": func(b *strings.Builder) error { return List(b, append(schemas.Shipped(), s)) },
		"show": func(b *strings.Builder) error { return Show(b, s, report.Laboratory) },
		"try":  func(b *strings.Builder) error { return Try(b, &e, false) },
	} {
		var b strings.Builder
		if err := write(&b); err != nil {
			t.Fatal(err)
		}
		if strings.Contains(b.String(), "\x1b") {
			t.Errorf("%s: an escape of the dump reaches the terminal", name)
		}
		for line := range strings.Lines(b.String()) {
			if n := utf8.RuneCountInString(strings.TrimSuffix(line, "\n")); n > width {
				t.Errorf("%s: %d columns: %s", name, n, line)
			}
		}
	}
}

// 1250 uL are 1.25 mL: the prefix micro, and 1 L = 1000 mL.
func TestTryShowsConvertedRows(t *testing.T) {
	s, dump := broad(t)
	e := ingest.Explain([]byte(dump), "dump.csv", s)
	var b strings.Builder
	if err := Try(&b, &e, false); err != nil {
		t.Fatal(err)
	}
	got := ""
	for line := range strings.Lines(b.String()) {
		got += strings.Join(strings.Fields(line), " ") + "\n"
	}
	for _, want := range []string{
		"dump.csv with schema broad: 1 of 1 run read.\n",
		"\n3 1250 1.25 3.25 3.25\n",
		"\n10 10000 10 7.25 7.25\n",
		"not used",
	} {
		if !strings.Contains(got, want) {
			t.Errorf("want %q in\n%s", want, b.String())
		}
	}
}

func TestTryShowsThreeRuns(t *testing.T) {
	e := ingest.Explanation{Schema: "x", Path: "y", Encoding: "utf-8"}
	for i := range 5 {
		e.Runs = append(e.Runs, ingest.Explained{Run: ingest.Run{Number: i + 1, Line: 9 * i}})
	}
	for all, want := range map[bool]int{false: 3, true: 5} {
		var b strings.Builder
		if err := Try(&b, &e, all); err != nil {
			t.Fatal(err)
		}
		if got := strings.Count(b.String(), "RUN "); got != want {
			t.Errorf("all %v: got %d runs, want %d", all, got, want)
		}
		if got := strings.Contains(b.String(), "And 2 more; --all shows every run."); got == all {
			t.Errorf("all %v: says that there are more: %v", all, got)
		}
	}
}
