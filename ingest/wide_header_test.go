package ingest

import (
	"bytes"
	"fmt"
	"strings"
	"testing"
)

// sheet is a wide table: a run of each length, three columns each, the names
// of the runs above the first of them. Every number tells its run, so that a
// column in another run is seen.
func sheet(titles [3]string, lengths []int) (dump string, header int) {
	names, head := make([]string, 0, 9), make([]string, 0, 9)
	rows := make([][]string, 12)
	for n, length := range lengths {
		names = append(names, fmt.Sprintf("RUN-%d", n+1), "", "")
		for _, t := range titles {
			head = append(head, strings.ReplaceAll(t, "{n}", fmt.Sprint(n+1)))
		}
		for i := range rows {
			cells := []string{"", "", ""}
			if i < length {
				cells = []string{fmt.Sprintf("%d,%d", i, n), fmt.Sprintf("%d,%d", 3+n, i), fmt.Sprintf("2%d,%d", n, i%10)}
			}
			rows[i] = append(rows[i], cells...)
		}
	}
	dump = strings.Join(names, ";") + "\n"
	header = len(dump)
	dump += strings.Join(head, ";") + "\n"
	for _, row := range rows {
		if text := strings.Join(row, ";"); strings.Trim(text, ";") != "" {
			dump += text + "\n"
		}
	}
	return dump, header
}

// One byte of the header changed into any other: each run that is read is a
// true one to the last number and name. Source of the truth: the whole dump.
func TestAnyByteOfAWideHeader(t *testing.T) {
	facts := "wide.titles = \"Sample\"\nfacts = [{name=\"sample\", titles=\"Sample\"}]"
	numbered, plain := [3]string{"V{n} ml", "pH{n}", "T{n}"}, [3]string{"vol", "pH", "temp"}
	for _, c := range []struct {
		name, fields string
		titles       [3]string
		lengths      []int
	}{
		{"numbered, equal", "volume|V{n} ml|mL\npH|pH{n}\ntemperature|T{n}|Cel", numbered, []int{6, 6, 6}},
		{"numbered, unequal", "volume|V{n} ml|mL\npH|pH{n}\ntemperature|T{n}|Cel", numbered, []int{6, 8, 7}},
		{"numbered, runs of two figures", "volume|V{n} ml|mL\npH|pH{n}\ntemperature|T{n}|Cel", numbered, []int{6, 6, 6, 6, 6, 6, 6, 6, 6, 6, 6}},
		{"not numbered, equal", "volume|vol|mL\npH|pH\ntemperature|temp|Cel", plain, []int{6, 6, 6}},
		{"not numbered, unequal", "volume|vol|mL\npH|pH\ntemperature|temp|Cel", plain, []int{8, 6, 7}},
	} {
		t.Run(c.name, func(t *testing.T) {
			set := made(t, wideSchema(c.fields, facts))
			dump, header := sheet(c.titles, c.lengths)
			runs, _, problems := Read([]byte(dump), "x.csv", set)
			if len(problems) > 0 || len(runs) != len(c.lengths) {
				t.Fatal(len(runs), problems)
			}
			truth := map[string]bool{}
			for i := range runs {
				truth[columnsOf(&runs[i])] = true
			}
			end := header + strings.IndexByte(dump[header:], '\n')
			read, refused := 0, 0
			damage := func(place string, damaged []byte) {
				runs, _, problems := Read(damaged, "x.csv", set)
				refused += len(problems)
				for i := range runs {
					read++
					if got := columnsOf(&runs[i]); !truth[got] {
						t.Errorf("%s: run %d misread: %s", place, runs[i].Number, got)
					}
				}
				if len(runs)+len(problems) == 0 || len(problems) == 0 && len(runs) != len(c.lengths) {
					t.Errorf("%s: %d runs of %d, no problem", place, len(runs), len(c.lengths))
				}
			}
			for at := header; at <= end; at++ {
				for b := range 256 {
					damaged := []byte(dump)
					damaged[at] = byte(b)
					damage(fmt.Sprintf("byte %d as %q", at-header, string(rune(b))), damaged)
				}
				damage(fmt.Sprintf("byte %d lost", at-header), append([]byte(dump[:at]), dump[at+1:]...))
				damage(fmt.Sprintf("no-break space at byte %d", at-header), bytes.Join([][]byte{[]byte(dump[:at]), []byte(dump[at+1:])}, []byte("\u00a0")))
			}
			t.Logf("%d runs read, %d problems", read, refused)
			if read == 0 || refused == 0 {
				t.Error("the test tests nothing")
			}
		})
	}
}

// columnsOf is all that the columns of a run and the names above them say.
func columnsOf(r *Run) string {
	return fmt.Sprintf("%s|%s|%v", r.Facts.Sample, points(r), r.TemperaturesC)
}

// The title of the first volume damaged by a no-break space: before, run 1 had
// the pH of run 1 over the volumes of run 2.
func TestDamagedTitleShiftsNothing(t *testing.T) {
	schema := wideSchema("number|no|| shared = true\nvolume|V{n} l|L\npH|pH{n}")
	dump := "no;V1 l;pH1;V2 l;pH2\n" + "1;0,000;3;0,000;5\n2;0,001;3,1;0,002;5,1\n3;0,002;3,2;0,004;5,2\n4;0,003;3,3;0,006;5,3\n5;0,004;3,4;0,008;5,4\n"
	for _, c := range []struct{ name, from, to, want string }{
		{"no-break space", "V1 l", "V1\u00a0l", `x.csv:1:4: column "V1\u00a0l" is not in schema made; a column without meaning could be a damaged title of one with; export the dump again, or state it in fields, as "unused" if it is of no use`},
		{"another number", "V2 l", "V7 l", `x.csv:1:13: reading: the columns of run 2, from "V7 l" on: no such column in the header (has "no", "V1 l", "pH1", "V7 l", "pH2"); schema made needs a header with "V{n} l" and "pH{n}"`},
		{"one run twice", "V2 l;pH2", "V01 l;pH1", `x.csv:1:13: the columns of run 1 stand in two places; a title is damaged, or the columns of two runs are mixed; export the dump again`},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := wideListing(strings.Replace(dump, c.from, c.to, 1), schema, t); got != c.want {
				t.Errorf("\ngot  %s\nwant %s", got, c.want)
			}
		})
	}
}
