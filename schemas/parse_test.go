package schemas

import (
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"fmt"
	"os"
	"strings"
	"testing"
)

// good is a schema without a fault; the cases below change one line of it.
const good = `name = "mine"
title = "Mine"
layout = "single"

[dialect]
delimiter = ";"
decimalChar = ","
commentChar = "#"

[recognise]
firstLine = "mine"

[preamble]
lines = "comments"

[[fields]]
name = "volume"
titles = ["V"]
unit = "mL"

[[fields]]
name = "pH"
titles = "pH"

[[facts]]
name = "started"
titles = ["begun"]
format = "%d.%m.%Y %H:%M"
`

// In src § stands just before the place that the message must name.
func problemOf(t *testing.T, src string) (got, place string) {
	t.Helper()
	before, after, ok := strings.Cut(src, "§")
	if !ok {
		t.Fatal("no mark")
	}
	place = fmt.Sprintf("%d:%d", 1+strings.Count(before, "\n"), len(before)-strings.LastIndexByte(before, '\n'))
	s, err := Parse("mine.toml", []byte(before+after))
	if err == nil || s != nil {
		t.Fatalf("%+v, error %v", s, err)
	}
	return err.Error(), place
}

// change replaces the one place of good where old stands.
func change(t *testing.T, old, new string) string {
	t.Helper()
	if strings.Count(good, old) != 1 {
		t.Fatalf("%q stands %d times in the good schema", old, strings.Count(good, old))
	}
	return strings.Replace(good, old, new, 1)
}

func TestGoodSchema(t *testing.T) {
	s, err := Parse("mine.toml", []byte(good))
	if err != nil {
		t.Fatal(err)
	}
	if s.Name != "mine" || s.Title != "Mine" || s.Layout != Single || s.Dialect.Delimiter != ';' || s.Dialect.DecimalChar != ',' || s.Dialect.QuoteChar != '"' ||
		s.Dialect.CommentChar != '#' || s.Dialect.Encoding != UTF8 || s.Recognise.FirstLine != "mine" || s.Preamble.Separator != ':' || len(s.Fields) != 2 || s.Fields[1].Unit.Code != "[pH]" {
		t.Errorf("%+v", s)
	}
	sum := sha256.Sum256([]byte(good))
	if s.SHA256 != hex.EncodeToString(sum[:]) {
		t.Errorf("SHA-256 %s", s.SHA256)
	}
}

func TestSchemaRefusals(t *testing.T) {
	for _, c := range []struct{ name, old, new, want string }{
		{"unknown key", `title = "Mine"`, `§titel = "Mine"`, `titel: unknown key; allowed here: dialect, facts, fields, footer, indicated, keepUnterminatedRow, layout, name, preamble, recognise, repeatedHeader, results, sameVolume, stack, title, valid_from, wide`},
		{"unknown key in a list", `titles = "pH"`, "titles = \"pH\"\n§units = \"[pH]\"", `fields[1].units: unknown key; allowed here: bounds, empty, format, name, refills, shared, suffixes, titles, unit, values`},
		{"unknown table", "[recognise]", "[§recognize]", `recognise is missing; every schema states it`},
		{"repeated key", `title = "Mine"`, "title = \"Mine\"\n§title = \"Again\"", `stated twice: title; keep one`},
		{"repeated table", "[preamble]", "[§dialect]", `stated twice: dialect; keep one`},
		{"no TOML", `title = "Mine"`, `title = §Mine`, `title: expected value but found "Mine" instead; the file must be TOML`},
		{"wrong type, text", `title = "Mine"`, `title = §7`, `title: found the number 7; a text in quotes is allowed`},
		{"wrong type, list", `titles = ["V"]`, `titles = §true`, `fields[0].titles: found true; a list of texts is allowed`},
		{"wrong type in a list", `titles = ["V"]`, `titles = ["V", §2]`, `fields[0].titles[1]: found the number 2; a text in quotes is allowed`},
		{"wrong type, date", `title = "Mine"`, `title = §2031-04-02`, `title: found a date; a text in quotes is allowed`},
		{"wrong type, list for text", `title = "Mine"`, `title = §["Mine"]`, `title: found a list; a text in quotes is allowed`},
		{"wrong type, table for text", `title = "Mine"`, `title = §{ a = 1 }`, `title: found a table; a text in quotes is allowed`},
		{"wrong type, text for table", `title = "Mine"`, `stack = §"x"`, `stack: found the text "x"; a table is allowed`},
		{"wrong type of a value", `format = "%d.%m.%Y %H:%M"`, "[[facts]]\nname = \"sample\"\ntitles = \"s\"\nvalues = { A = §1 }", `facts[1].values.A: found the number 1; a text in quotes is allowed`},
		{"date ends in a sign", `format = "%d.%m.%Y %H:%M"`, `format = §"%d.%m.%Y %H:%M%"`, `facts[0].format: "%d.%m.%Y %H:%M%" ends in %; state year, month, day, hour and minute, e.g. "%d.%m.%Y %H:%M"`},
		{"directive twice", `format = "%d.%m.%Y %H:%M"`, `format = §"%d.%m.%Y %H:%M %d 100%%"`, `facts[0].format: "%d.%m.%Y %H:%M %d 100%%" states %d twice; state year, month, day, hour and minute, e.g. "%d.%m.%Y %H:%M"`},
		{"name", `name = "mine"`, `name = §"My bench"`, `name: found "My bench"; small letters, digits and hyphens are allowed, e.g. bench-a`},
		{"layout", `layout = "single"`, `layout = §"tall"`, `layout: found "tall"; allowed: "single", "stacked", "long", "wide"`},
		{"encoding", `delimiter = ";"`, "encoding = §\"ansi\"\ndelimiter = \";\"", `dialect.encoding: found "ansi"; allowed: "utf-8", "utf-16", "utf-16le", "utf-16be", "windows-1252", "iso-8859-1", "auto"`},
		{"delimiter of two", `delimiter = ";"`, `delimiter = §";;"`, `dialect.delimiter: found ";;"; one ASCII character is allowed, for a tab "\t"`},
		{"no delimiter", `delimiter = ";"`, `delimiter = §""`, `dialect.delimiter: found ""; one ASCII character is allowed, for a tab "\t"`},
		{"comment is the delimiter", `commentChar = "#"`, `commentChar = §";"`, `dialect.commentChar: ";" is the delimiter too; state two different characters`},
		{"quote is the delimiter", `commentChar = "#"`, "commentChar = \"#\"\nquoteChar = §\";\"", `dialect.quoteChar: ";" is the delimiter too; state two different characters`},
		{"delimiter of numbers", `delimiter = ";"`, `delimiter = §"e"`, `dialect.delimiter: found "e"; a character that no number has is allowed`},
		{"decimal mark", `decimalChar = ","`, `decimalChar = §"'"`, `dialect.decimalChar: found "'"; allowed: ".", ","`},
		{"evidence with blanks", `firstLine = "mine"`, `firstLine = §"mine "`, `recognise.firstLine: found "mine "; a text without blanks around it is allowed`},
		{"separator of cells", `lines = "comments"`, "lines = \"cells\"\nseparator = §\"=\"", `preamble.separator: only comment lines have a separator; leave it out; other lines are cut by the delimiter`},
		{"stack in a single layout", "[recognise]", "§[stack]\nbegin = \">\"\n\n[recognise]", `stack: found in the layout "single"; only the layout "stacked" has it`},
		{"footer in a single layout", "[recognise]", "§[footer]\nbegin = \">\"\n\n[recognise]", `footer: lines is missing; state how its facts stand: "comments", "cells", "text" or "unused"`},
		{"role", `name = "pH"`, `name = §"ph"`, `fields[1].name: found "ph"; allowed: "volume", "increment", "pH", "potential", "conductivity", "conductance", "time", "temperature", "drift", "status", "remark", "number", "run", "unused"`},
		{"unit of another quantity", `unit = "mL"`, `unit = §"mV"`, `fields[0].unit: found "mV"; allowed: "mL", "uL", "L", "g", "mg", "kg"`},
		{"unit not of UCUM", `unit = "mL"`, `unit = §"µL"`, `fields[0].unit: found "µL"; allowed: "mL", "uL", "L", "g", "mg", "kg"`},
		{"unit missing", "[[fields]]\nname = \"volume\"\ntitles = [\"V\"]\nunit = \"mL\"", "§[[fields]]\nname = \"volume\"\ntitles = [\"V\"]", `fields[0]: unit is missing; allowed: "mL", "uL", "L", "g", "mg", "kg"`},
		{"unit of nothing", `name = "pH"`, "name = \"number\"\nunit = §\"s\"", `fields[1].unit: a column "number" has no unit; leave it out`},
		{"titles missing", "[[fields]]\nname = \"pH\"\ntitles = \"pH\"", "§[[fields]]\nname = \"pH\"", `fields[1]: titles is missing; every entry here states it`},
		{"title empty", `titles = "pH"`, `titles = §""`, `fields[1].titles: found ""; a text without blanks around it is allowed`},
		{"title twice in one", `titles = ["V"]`, `titles = §["V", "v"]`, `fields[0].titles: "v" is stated twice; upper and lower case count alike; keep one`},
		{"title of two columns", `titles = "pH"`, `titles = §"V"`, `fields[1].titles: "V" is in fields[0].titles too; a text may mean one thing only`},
		{"run column in a single layout", "[[facts]]", "[[fields]]\nname = §\"run\"\ntitles = \"run\"\n\n[[facts]]", `fields[2].name: "run" in the layout "single"; only in the layout "long" a column names the run`},
		{"date order", `format = "%d.%m.%Y %H:%M"`, `format = §"%d.%m.%Y"`, `facts[0].format: "%d.%m.%Y" lacks %H or %I; state year, month, day, hour and minute, e.g. "%d.%m.%Y %H:%M"`},
		{"date directive", `format = "%d.%m.%Y %H:%M"`, `format = §"%D %H:%M"`, `facts[0].format: "%D %H:%M" has the unknown directive %D; state year, month, day, hour and minute, e.g. "%d.%m.%Y %H:%M"`},
		{"date stated twice", `format = "%d.%m.%Y %H:%M"`, `format = §"%d.%m.%Y %y %H:%M"`, `facts[0].format: "%d.%m.%Y %y %H:%M" states %Y or %y twice; state year, month, day, hour and minute, e.g. "%d.%m.%Y %H:%M"`},
		{"half a day", `format = "%d.%m.%Y %H:%M"`, `format = §"%d.%m.%Y %I:%M"`, `facts[0].format: "%d.%m.%Y %I:%M" needs %I (12 h clock) and %p (am, pm) together; state year, month, day, hour and minute, e.g. "%d.%m.%Y %H:%M"`},
		{"zone", `format = "%d.%m.%Y %H:%M"`, `zone = §"MESZ"`, `facts[0].zone: "MESZ" is no offset from UTC; allowed: "UTC", an offset such as "+02:00" or a name such as "Europe/Berlin"`},
		{"fact twice", `format = "%d.%m.%Y %H:%M"`, "[[facts]]\nname = §\"started\"\ntitles = [\"at\"]", `facts[1].name: a second "started"; put all keys of one fact into its titles`},
		{"key of two facts", `format = "%d.%m.%Y %H:%M"`, "[[facts]]\nname = \"sample\"\ntitles = §[\"Begun\"]", `facts[1].titles: "Begun" is in facts[0].titles too; a text may mean one thing only`},
		{"fact from nowhere", `format = "%d.%m.%Y %H:%M"`, "§[[facts]]\nname = \"sample\"", `facts[1]: neither titles nor default; state where the fact stands in a dump, or what it always is`},
		{"default of a number", `format = "%d.%m.%Y %H:%M"`, "[[facts]]\nname = \"aliquot_ml\"\nunit = \"mL\"\ndefault = §\"5\"", `facts[1].default: found the text "5"; a number is allowed`},
		{"default not allowed", `format = "%d.%m.%Y %H:%M"`, "[[facts]]\nname = \"reaction\"\ndefault = §\"acid\"", `facts[1].default: found "acid"; allowed: "acid-base", "precipitation", "redox", "non-aqueous"`},
		{"value not allowed", `format = "%d.%m.%Y %H:%M"`, "[[facts]]\nname = \"reaction\"\ntitles = \"r\"\nvalues = { A = \"acid-base\", B = §\"base\" }", `facts[1].values.B: found "base"; allowed: "acid-base", "precipitation", "redox", "non-aqueous"`},
		{"unit of a text", `format = "%d.%m.%Y %H:%M"`, "[[facts]]\nname = \"sample\"\ntitles = \"s\"\nunit = §\"mL\"", `facts[1].unit: only a number has a unit; leave it out`},
		{"kind", `format = "%d.%m.%Y %H:%M"`, "[[indicated]]\ntitles = \"e\"\nunit = \"mL\"\nkind = §\"steep\"", `indicated[0].kind: found "steep"; allowed: "inflection", "at-reading", "break", "equivalence"`},
		{"kind of a text", `format = "%d.%m.%Y %H:%M"`, "[[indicated]]\ntitles = \"e\"\nunit = \"mL\"\nkindTitles = \"k\"\nkindValues = { x = §\"steep\" }", `indicated[0].kindValues.x: found "steep"; allowed: "inflection", "at-reading", "break", "equivalence"`},
		{"kinds from nowhere", `format = "%d.%m.%Y %H:%M"`, "[[indicated]]\ntitles = \"e\"\nunit = \"mL\"\nkindValues = §{ x = \"break\" }", `indicated[0].kindValues: found without kindTitles; state in kindTitles which line of the dump has the kind`},
		{"endpoint is a fact", `format = "%d.%m.%Y %H:%M"`, "[[indicated]]\ntitles = §\"begun\"\nunit = \"mL\"", `indicated[0].titles: "begun" is in facts[0].titles too; a text may mean one thing only`},
		{"keep", `title = "Mine"`, `keepUnterminatedRow = §"yes"`, `keepUnterminatedRow: found the text "yes"; true or false is allowed`},
		{"list of fields", `title = "Mine"`, `indicated = §"e"`, `indicated: found the text "e"; a list of tables is allowed`},
		{"list of tables", `title = "Mine"`, `indicated = [§1]`, `indicated[0]: found the number 1; a table in braces is allowed`},
	} {
		t.Run(c.name, func(t *testing.T) {
			got, place := problemOf(t, change(t, c.old, c.new))
			first, _, _ := strings.Cut(got, "\n")
			if c.name == "unknown table" {
				place = "1:1"
			}
			if want := "mine.toml:" + place + ": " + c.want; first != want {
				t.Errorf("\ngot  %s\nwant %s", first, want)
			}
		})
	}
}

// Combinations of values that are each allowed.
func TestSchemaCombinations(t *testing.T) {
	const fields = "fields = [{name=\"volume\",titles=\"V\",unit=\"mL\"},{name=\"pH\",titles=\"pH\"}]\n"
	for _, c := range []struct{ name, src, want string }{
		{"decimal comma with comma delimiter", "name=\"x\"\nlayout=\"single\"\nrecognise.header=true\n" + fields + "[dialect]\ndelimiter = \",\"\ndecimalChar = §\",\"\n",
			`dialect.decimalChar: "," is the delimiter too; state two different characters`},
		{"decimal comma with the delimiter not stated", "name=\"x\"\nlayout=\"single\"\nrecognise.header=true\n" + fields + "[dialect]\ndecimalChar = §\",\"\n",
			`dialect.decimalChar: "," is the delimiter too; state two different characters`},
		{"quote not stated", "name=\"x\"\nlayout=\"single\"\nrecognise.header=true\n" + fields + "[dialect]\ndelimiter = §\"\\\"\"\n",
			`dialect.delimiter: "\"" is the quoteChar too; state two different characters`},
		{"no evidence", "name=\"x\"\nlayout=\"single\"\n" + fields + "§[recognise]\n", `recognise: no evidence is stated; state firstLine, header = true or both, or every dump would fit`},
		{"comments without their character", "name=\"x\"\nlayout=\"single\"\nrecognise.header=true\n" + fields + "[preamble]\nlines = §\"comments\"\n",
			`preamble.lines: "comments" without a commentChar in [dialect]; state the character that begins a comment line`},
		{"no separator", "name=\"x\"\nlayout=\"single\"\nrecognise.header=true\ndialect.commentChar=\"#\"\n" + fields + "[preamble]\nlines = \"comments\"\nseparator = §\"\"\n",
			`preamble.separator: found ""; state the character between key and value`},
		{"stacked without begin", "§name=\"x\"\nlayout=\"stacked\"\nrecognise.header=true\n" + fields, `stack: begin is missing; state the first cell of the row that begins each run`},
		{"begin is end", "name=\"x\"\nlayout=\"stacked\"\nrecognise.header=true\n" + fields + "[stack]\nbegin = \"run\"\nend = §\"run\"\n", `stack.end: "run" is begin too; state two different texts, or leave end out`},
		{"long without a run column", "name=\"x\"\nlayout=\"long\"\nrecognise.header=true\n" + strings.Replace(fields, "[", "§[", 1), `fields: no column names the run; the layout "long" needs one of the name "run"`},
		{"no volume", "name=\"x\"\nlayout=\"single\"\nrecognise.header=true\nfields = §[{name=\"pH\",titles=\"pH\"}]\n", `fields: no column is the volume; give one the name "volume" or "increment"`},
		{"no reading", "name=\"x\"\nlayout=\"single\"\nrecognise.header=true\nfields = §[{name=\"volume\",titles=\"V\",unit=\"mL\"}]\n", `fields: no column is a reading; give one the name "pH", "potential", "conductivity" or "conductance"`},
		{"second volume", "name=\"x\"\nlayout=\"single\"\nrecognise.header=true\nfields = [{name=\"volume\",titles=\"V\",unit=\"mL\"},{name=§\"volume\",titles=\"W\",unit=\"mL\"},{name=\"pH\",titles=\"pH\"}]\n",
			`fields[1].name: a second "volume"; put all header texts of one column into its titles`},
		{"footer without run", "name=\"x\"\nlayout=\"long\"\nrecognise.header=true\nfields = [{name=\"volume\",titles=\"V\",unit=\"mL\"},{name=\"run\",titles=\"run\"},{name=\"pH\",titles=\"pH\"}]\n[footer]\nbegin=\"totals\"\ntitles = §[\"run\"]\n",
			`footer.titles: none of them is the fact "run"; state in facts which title names the run that a footer row is about`},
		{"footer without begin", "name=\"x\"\nlayout=\"long\"\nrecognise.header=true\nfields = [{name=\"volume\",titles=\"V\",unit=\"mL\"},{name=\"run\",titles=\"run\"},{name=\"pH\",titles=\"pH\"}]\n§[footer]\ntitles = [\"run\"]\n",
			`footer: begin is missing; state the first cell of the row that begins the footer`},
		{"footer without titles", "name=\"x\"\nlayout=\"long\"\nrecognise.header=true\nfields = [{name=\"volume\",titles=\"V\",unit=\"mL\"},{name=\"run\",titles=\"run\"},{name=\"pH\",titles=\"pH\"}]\n§[footer]\nbegin = \"run\"\n",
			`footer: titles is missing; give a title to each cell of a footer row`},
		{"fact that nothing states", "name=\"x\"\nlayout=\"single\"\nrecognise.header=true\n" + fields + "facts = [{name=\"sample\", titles = §\"s\"}]\n", `facts[0].titles: no line of a dump can state "s"; there is no [preamble], and footer.titles does not have it`},
		{"missing keys", "§title = \"x\"\n", "name is missing; every schema states it"},
		{"empty", "§", "name is missing; every schema states it"},
	} {
		t.Run(c.name, func(t *testing.T) {
			got, place := problemOf(t, c.src)
			if c.name == "missing keys" || c.name == "empty" { // order of equal places is by text
				if !strings.Contains(got, "mine.toml:"+place+": "+c.want) || strings.Count(got, "\n") != 3 {
					t.Errorf("got %s", got)
				}
				return
			}
			if want := "mine.toml:" + place + ": " + c.want; got != want {
				t.Errorf("\ngot  %s\nwant %s", got, want)
			}
		})
	}
}

// All faults of a file are told, in its order, twenty at most.
func TestManyFaults(t *testing.T) {
	src := good
	for i := range 30 {
		src += fmt.Sprintf("x%02d = 1\n", i)
	}
	_, err := Parse("mine.toml", []byte(src))
	lines := strings.Split(err.Error(), "\n")
	if len(lines) != 21 || lines[20] != "mine.toml: and 10 more" || !strings.HasPrefix(lines[0], "mine.toml:29:1: facts[0].x00: unknown key") {
		t.Errorf("%d lines, first %s, last %s", len(lines), lines[0], lines[len(lines)-1])
	}
	var p *Problem
	if !errors.As(err, &p) || p.Line != 29 {
		t.Errorf("the first problem: %+v", p)
	}
}

func TestTooLargeSchema(t *testing.T) {
	_, err := Parse("mine.toml", []byte(strings.Repeat("#", MaxBytes+1)))
	if want := "mine.toml: 1048577 bytes; a schema has at most 1048576"; err == nil || err.Error() != want {
		t.Errorf("got %v, want %s", err, want)
	}
}

func TestProblemAsText(t *testing.T) {
	for _, c := range []struct {
		p    Problem
		want string
	}{
		{Problem{Path: "a/b.csv", Line: 14, Col: 9, Field: "pH", Msg: "found", Hint: "do"}, "a/b.csv:14:9: pH: found; do"},
		{Problem{Path: "a/b.csv", Line: 14, Run: 12, Msg: "found"}, "a/b.csv:14: run 12: found"},
		{Problem{Path: "a/b.csv", Msg: "found"}, "a/b.csv: found"},
		{Problem{Msg: "found", Hint: "do"}, "found; do"},
	} {
		if got := c.p.Error(); got != c.want {
			t.Errorf("got %s, want %s", got, c.want)
		}
	}
}

// A key is found in every form that TOML has for it.
func TestPlacesFollowEveryForm(t *testing.T) {
	src := "\ufeff# c\na.b.\"c d\" = [ 1, # x\n  { e = '''f''', \"g\" = \"\\\"\" } ]\n[[t]]\nx = 2031-04-02 08:14:00\n[[t]]\n  y = \"\"\"a\n\"\"\"\"\n[t.u]\nz = 1\n"
	got := places([]byte(src))
	for path, want := range map[string]place{
		"a.b.c d": {2, 1, 2, 13}, "a.b.c d[0]": {2, 15, 2, 15}, "a.b.c d[1]": {3, 3, 3, 3}, "a.b.c d[1].e": {3, 5, 3, 9}, "a.b.c d[1].g": {3, 18, 3, 24},
		"t[0].x": {5, 1, 5, 5}, "t[1].y": {7, 3, 7, 7}, "t[1].u.z": {10, 1, 10, 5}, "t[1]": {6, 1, 6, 1},
	} {
		if got[path] != want {
			t.Errorf("%s: %+v, want %+v", path, got[path], want)
		}
	}
}

func FuzzParseSchema(f *testing.F) {
	f.Add([]byte(good))
	f.Add([]byte("a.b = [ { c = '''x''' } ]\n[[d]]\n[d.e]\n"))
	for _, name := range []string{"plain.toml", "bench-a.toml", "bench-b.toml", "bench-c.toml"} {
		src, err := os.ReadFile(name)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(src)
	}
	f.Fuzz(func(t *testing.T, src []byte) {
		places(src)
		s, err := Parse("x.toml", src)
		if (s == nil) != (err != nil) {
			t.Fatalf("schema %v, error %v", s, err)
		}
		if err == nil {
			return
		}
		list := []error{err}
		if joined, ok := err.(interface{ Unwrap() []error }); ok {
			list = joined.Unwrap()
		}
		for _, one := range list {
			var p *Problem
			if !errors.As(one, &p) {
				t.Fatalf("no problem: %v", one)
			}
			if p.Line < 0 || p.Col < 0 || p.Line > 1+strings.Count(string(src), "\n") || p.Col > len(src)+2 {
				t.Fatalf("place outside the file: %v", p)
			}
		}
	})
}
