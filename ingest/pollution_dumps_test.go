package ingest_test

import (
	"os"
	"path/filepath"
	"strings"
	"testing"
	"unicode/utf16"

	"golang.org/x/text/encoding/charmap"

	"lastdrop/ingest"
	"lastdrop/schemas"
)

const testdata = "../testdata"

// demoDumps are dumps of the demo laboratory to pollute beside the zoo: each
// with many more rows than the hand-written ones.
var demoDumps = []struct{ path, schema string }{
	{"tern-island/dumps/bench-a/0424.csv", "plain"},
	{"tern-island/dumps/bench-a/0419.csv", "bench-a"},
	{"tern-island/dumps/bench-c/shift-9.csv", "bench-c"},
	{"tern-island/dumps/bench-b/curves-0402-10.txt", "bench-b"},
}

// clean is an undamaged dump with what is true of it. Damage is done to its
// text, which is encoded again, or to its bytes.
type clean struct {
	name, path string // path as Read gets it
	schema     *schemas.Schema
	text       string
	coding     coding
	runs       []ingest.Run
	truth      [][]datum       // of each run
	known      map[string]bool // repairs of the undamaged dump, without their lines
	long       bool            // many rows: damage is sampled more thinly
}

// coding is how the text became bytes.
type coding struct {
	encoding schemas.Encoding
	mark     string
	upper    bool
}

// encode is the dump with another text.
func (c *clean) encode(text string) []byte { return c.coding.encode(text) }

func (c coding) encode(text string) []byte {
	b := []byte(c.mark)
	switch c.encoding {
	case schemas.UTF16LE:
		for _, u := range utf16.Encode([]rune(text)) {
			if c.upper {
				b = append(b, byte(u>>8), byte(u))
			} else {
				b = append(b, byte(u), byte(u>>8))
			}
		}
		return b
	case schemas.Windows1252:
		for _, r := range text {
			one, ok := charmap.Windows1252.EncodeRune(r)
			if !ok {
				one = '?'
			}
			b = append(b, one)
		}
		return b
	}
	return append(b, text...)
}

// decodeClean finds the text of an undamaged dump.
func decodeClean(t testing.TB, data []byte, encoding schemas.Encoding) (string, coding) {
	t.Helper()
	s := string(data)
	switch encoding {
	case schemas.Windows1252, schemas.Latin1: // the same for the characters of these dumps
		text, err := charmap.Windows1252.NewDecoder().String(s)
		if err != nil {
			t.Fatal(err)
		}
		return text, coding{encoding: schemas.Windows1252}
	case schemas.UTF16, schemas.UTF16LE, schemas.UTF16BE:
		c := coding{encoding: schemas.UTF16LE, upper: encoding == schemas.UTF16BE}
		if mark := s[:2]; mark == "\xff\xfe" || mark == "\xfe\xff" {
			c.mark, c.upper, s = mark, mark == "\xfe\xff", s[2:]
		}
		var units []uint16
		for i := 0; i+1 < len(s); i += 2 {
			low, high := s[i], s[i+1]
			if c.upper {
				low, high = high, low
			}
			units = append(units, uint16(low)|uint16(high)<<8)
		}
		return string(utf16.Decode(units)), c
	}
	text := strings.TrimPrefix(s, "\xef\xbb\xbf")
	return text, coding{encoding: schemas.UTF8, mark: s[:len(s)-len(text)]}
}

// cleanDumps returns every dump that is polluted, and the schemas that compete
// for it: all of them.
func cleanDumps(t testing.TB) (dumps []*clean, set []*schemas.Schema) {
	t.Helper()
	set = schemas.Shipped()
	files, err := filepath.Glob(filepath.Join(testdata, "dialects", "*.toml"))
	if err != nil {
		t.Fatal(err)
	}
	written, err := filepath.Glob(filepath.Join(testdata, "dialects", "written", "*.toml"))
	if err != nil {
		t.Fatal(err)
	}
	for _, f := range append(files, written...) {
		src, err := os.ReadFile(f)
		if err != nil {
			t.Fatal(err)
		}
		s, err := schemas.Parse(f, src)
		if err != nil {
			t.Fatal(err)
		}
		set = append(set, s)
	}
	for _, s := range set {
		files, _ := filepath.Glob(filepath.Join(testdata, "dialects", s.Name+".*"))
		written, _ := filepath.Glob(filepath.Join(testdata, "dialects", "written", s.Name+".*"))
		for _, f := range append(files, written...) {
			if !strings.HasSuffix(f, ".toml") && !strings.HasSuffix(f, ".want.txt") && !strings.HasSuffix(f, ".truth.csv") {
				dumps = append(dumps, cleanDump(t, s.Name, f, set))
			}
		}
	}
	for _, d := range demoDumps {
		c := cleanDump(t, "demo "+d.schema, filepath.Join(testdata, d.path), set)
		if c.long = true; c.schema.Name != d.schema {
			t.Fatalf("%s is of schema %s, not %s", d.path, c.schema.Name, d.schema)
		}
		dumps = append(dumps, c)
	}
	return dumps, set
}

func cleanDump(t testing.TB, name, path string, set []*schemas.Schema) *clean {
	t.Helper()
	data, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	c := &clean{name: name, path: filepath.Base(path)}
	var problems []*schemas.Problem
	c.runs, c.schema, problems = ingest.Read(data, c.path, set)
	if len(problems) > 0 || len(c.runs) == 0 {
		t.Fatalf("%s is not clean: %v", path, problems)
	}
	c.text, c.coding = decodeClean(t, data, c.schema.Dialect.Encoding)
	if string(c.encode(c.text)) != string(data) {
		t.Fatalf("%s: text and bytes are not the same", path)
	}
	c.known = map[string]bool{}
	for i := range c.runs {
		c.truth = append(c.truth, contents(c.schema, &c.runs[i]))
		for _, line := range c.runs[i].Repairs {
			c.known[place.ReplaceAllString(line, "")] = true
		}
	}
	return c
}

// counts reports whether a row lost or doubled in the table can be seen: the
// dump counts its rows, or says how many they are.
func (c *clean) counts() bool {
	return c.has(schemas.RoleNumber) || c.states(schemas.FactReadings)
}

// closes reports whether a table that is cut off at a row end can be seen.
func (c *clean) closes() bool {
	return c.states(schemas.FactReadings) || c.schema.Footer.Begin != "" || c.schema.Stack.End != ""
}

func (c *clean) has(role schemas.Role) bool {
	for _, f := range c.schema.Fields {
		if f.Role == role {
			return true
		}
	}
	return false
}

func (c *clean) states(name schemas.FactName) bool {
	for _, f := range c.schema.Facts {
		if f.Name == name {
			return true
		}
	}
	return false
}
