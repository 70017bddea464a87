package ingest

import (
	"bytes"
	"slices"
	"strings"
	"testing"
	"unicode/utf16"

	"lastdrop/schemas"
)

// A dump cut off after any byte is read as far as it is whole: each run that
// is read is the true one, or the true one without its last rows where the
// dialect states no count and no row was cut within. Source of the truth: the
// whole dump.
func TestCutOffAnywhere(t *testing.T) {
	set := schemas.Shipped()
	for name, data := range dialectDumps(t) {
		whole := map[int]string{}
		runs, _, _ := Read(data, "x.csv", set)
		for i := range runs {
			whole[runs[i].Number] = factsAndReadings(&runs[i])
		}
		read, refused := 0, 0
		for n := 1; n < len(data); n++ {
			runs, _, problems := Read(data[:n], "x.csv", set)
			if len(runs)+len(problems) == 0 {
				t.Errorf("%s cut after %d bytes: nothing said", name, n)
			}
			refused += len(problems)
			for i := range runs {
				read++
				got, want := factsAndReadings(&runs[i]), whole[runs[i].Number]
				if got != want && (name != "plain" || !strings.HasPrefix(want, got)) {
					t.Errorf("%s cut after %d bytes:\ngot  %s\nwant %s", name, n, got, want)
				}
				cutInRow := data[n-1] != '\n' && data[n-1] != '\r'
				if name == "plain" && cutInRow && !strings.Contains(strings.Join(runs[i].Repairs, "|"), "last row without line end dropped") {
					t.Errorf("%s cut after %d bytes: the cut is not told", name, n)
				}
			}
		}
		t.Logf("%s: %d runs read rightly, %d refused", name, read, refused)
		if read == 0 || refused == 0 {
			t.Errorf("%s: %d runs read, %d refused; the test tests nothing", name, read, refused)
		}
	}
}

// factsAndReadings is a run as text, the readings last.
func factsAndReadings(r *Run) string {
	var b strings.Builder
	short := *r
	short.Repairs = nil
	listRun(&b, &short)
	_, text, _ := strings.Cut(b.String(), "\n") // without the count of readings
	return text
}

// Any one byte changed into a character of structure: each run that is read is
// a true one, or its repairs tell what is not. (The last character of a text
// or whole number cut off by a line end cannot be seen by anyone, nor can a
// character without meaning in the dialect within a text.)
func TestStructuralByteAnywhere(t *testing.T) {
	set := schemas.Shipped()
	for name, data := range dialectDumps(t) {
		text, numbers := map[string]bool{}, map[string]bool{}
		repairs := 0
		runs, _, _ := Read(data, "x.csv", set)
		for i := range runs {
			all, figures := content(&runs[i])
			text[all], numbers[figures] = true, true
			repairs += len(runs[i].Repairs)
		}
		text16 := name == "bench-b" // one byte of UTF-16 is no character: damage the text and encode it
		if text16 {
			data = fromUTF16(data)
		}
		for n := range data {
			for _, c := range []byte(",;\t\"\n\r#\x00\xff") {
				if text16 && (c == 0xff || data[n] >= 0x80) {
					continue
				}
				damaged := bytes.Clone(data)
				damaged[n] = c
				if text16 {
					damaged = append([]byte("\xff\xfe"), asUTF16(string(damaged))...)
				}
				runs, _, _ := Read(damaged, "x.csv", set)
				for i := range runs {
					all, figures := content(&runs[i])
					cut := n+1 < len(data) && (c == '\n' || c == '\r') && (data[n+1] == '\n' || data[n+1] == '\r')
					if len(runs[i].Repairs) > repairs || cut {
						continue
					}
					if !numbers[figures] || structural(name, c) && !text[all] {
						t.Errorf("%s: byte %d as %q, untold:\n%s", name, n, c, all)
					}
				}
			}
		}
	}
}

func structural(name string, c byte) bool {
	switch c {
	case ',':
		return name == "bench-c"
	case ';':
		return name == "bench-a"
	case '\t':
		return name == "bench-b"
	case '"':
		return name != "plain" // its facts stand in comments
	}
	return c == '\n' || c == '\r' || c == 0
}

// content is a run as text without its place in the dump, and the part of it
// that is numbers.
func content(r *Run) (all, numbers string) {
	short := *r
	short.Readings, short.Indicated = slices.Clone(r.Readings), slices.Clone(r.Indicated)
	for i := range short.Readings {
		short.Readings[i].Line = 0
	}
	for i := range short.Indicated {
		short.Indicated[i].Line = 0
	}
	all = factsAndReadings(&short)
	f := r.Facts
	short.Facts = Facts{TitrantMolPerL: f.TitrantMolPerL, AliquotML: f.AliquotML, SolventML: f.SolventML, EndReading: f.EndReading, TemperatureC: f.TemperatureC}
	return all, factsAndReadings(&short)
}

// fromUTF16 is the text of a UTF-16 dump with its mark.
func fromUTF16(data []byte) []byte {
	var units []uint16
	for i := 2; i < len(data); i += 2 {
		units = append(units, uint16(data[i])|uint16(data[i+1])<<8)
	}
	return []byte(string(utf16.Decode(units)))
}

// A row of the table lost, doubled or (where rows are counted up) moved: the
// dialects that state a count refuse the run and read the others.
func TestRowLostDoubledMoved(t *testing.T) {
	set := schemas.Shipped()
	dumps := dialectDumps(t)
	for name, first := range map[string][]int{"bench-a": {18}, "bench-b": {16, 40}, "bench-c": {3, 10}} {
		data := dumps[name]
		if name == "bench-b" {
			data = fromUTF16(data)
		}
		lines := bytes.SplitAfter(data, []byte{'\n'})
		runs, _, _ := Read(dumps[name], "x.csv", set)
		for i := range runs {
			for _, r := range runs[i].Readings {
				n := r.Line - 1
				damages := map[string][][]byte{
					"lost":    slices.Concat(lines[:n], lines[n+1:]),
					"doubled": slices.Concat(lines[:n], [][]byte{lines[n]}, lines[n:]),
				}
				if name != "bench-a" && n >= first[i] {
					damages["moved"] = slices.Concat(lines[:n-1], [][]byte{lines[n], lines[n-1]}, lines[n+1:])
				}
				for what, damaged := range damages {
					joined := bytes.Join(damaged, nil)
					if name == "bench-b" {
						joined = append([]byte("\xff\xfe"), asUTF16(string(joined))...)
					}
					got, _, problems := Read(joined, "x.csv", set)
					if len(got) != len(runs)-1 || len(problems) != 1 {
						t.Errorf("%s, line %d %s: %d runs, problems %v", name, r.Line, what, len(got), problems)
					}
				}
			}
		}
	}
}
