package demo

import (
	"bytes"
	"strconv"
	"strings"
	"testing"
)

// dump returns the bytes of a dump of the default laboratory.
func dump(t *testing.T, files []File, path string) []byte {
	t.Helper()
	for _, f := range files {
		if f.Path == "dumps/"+path {
			return f.Data
		}
	}
	t.Fatalf("no dump %s", path)
	return nil
}

// Every dump that can be read names its operator, and every dump that cannot
// be read has the damage that the README tells.
func TestDamagedAndWholeDumps(t *testing.T) {
	for _, seed := range []uint64{DefaultSeed, 1, 2, 3} {
		files, planted, err := Files(seed)
		if err != nil {
			t.Fatal(err)
		}
		for _, p := range planted {
			data := dump(t, files, p.Dump)
			text := string(data)
			rows := strings.Count(text, "\r\n") - strings.Count(text[:strings.Index(text, "\r\n\r\n")+1], "\r\n") - 3
			switch p.Fault {
			case Truncated:
				if strings.HasSuffix(text, "\n") || strings.Contains(text, "Readings;"+strconv.Itoa(rows)) || rows < 20 {
					t.Errorf("%s: %d rows, ends %q", p.Dump, rows, text[len(text)-20:])
				}
			case SwappedMark, SwappedMarks:
				points := strings.Count(text[strings.Index(text, "Volume mL;pH"):], ".")
				if want := swapped(p.Fault, rows) + 1; points != want { // one more in the heading
					t.Errorf("%s: %d points in the table, want %d", p.Dump, points, want)
				}
			case CutOff:
				log := strings.ReplaceAll(text, "\x00", "")
				if starts, ends := strings.Count(log, "> curve"), strings.Count(log, "< curve"); starts != 3 || ends != 2 {
					t.Errorf("%s: %d runs begin and %d end", p.Dump, starts, ends)
				}
			}
			if p.Expect != ExpectUnread && p.Expect != ExpectCounted {
				checkOperator(t, p, parse(t, File{p.Dump, data})[p.Run-1])
			}
		}
	}
}

// swapped returns how many marks are swapped in a table of so many rows.
func swapped(f Fault, rows int) int {
	if f == SwappedMark {
		return 1
	}
	return rows
}

func checkOperator(t *testing.T, p Planted, r parsed) {
	t.Helper()
	if r.facts["operator"]+r.facts["Person"] == "" {
		t.Errorf("%s names no operator", where(p))
	}
	if sample := r.facts["sample"] + r.facts["Sample name"]; sample != p.Sample {
		t.Errorf("%s: sample %q, want %q", where(p), sample, p.Sample)
	}
}

// Second exports hold the readings of the first one, digit by digit.
func TestSecondExports(t *testing.T) {
	files, planted, err := Files(5)
	if err != nil {
		t.Fatal(err)
	}
	first := map[string]parsed{}
	for _, p := range planted {
		if p.Expect == ExpectUnread || p.Expect == ExpectCounted || !strings.HasPrefix(p.Dump, "bench-a/") && p.Expect != ExpectAlso {
			continue
		}
		r := parse(t, File{p.Dump, dump(t, files, p.Dump)})[0]
		if p.Expect != ExpectAlso {
			first[p.Sample] = r
			continue
		}
		if !equal(r.volumes, first[p.Sample].volumes) || !equal(r.readings, first[p.Sample].readings) {
			t.Errorf("%s has other readings than the first export", p.Dump)
		}
		if same := equal(r.indicated, first[p.Sample].indicated); same == (p.Fault == ExportedAgain) {
			t.Errorf("%s: indicated %v and %v", p.Dump, r.indicated, first[p.Sample].indicated)
		}
	}
	if !bytes.Equal(dump(t, files, "bench-a/0443.csv"), dump(t, files, "incoming/0443.csv")) {
		t.Error("incoming/0443.csv is no copy of bench-a/0443.csv")
	}
	a, b := first["VIN-0218"], first["VIN-0219"]
	if !equal(a.volumes, b.volumes) || !equal(a.readings, b.readings) || a.facts["Begun"] == b.facts["Begun"] {
		t.Error("VIN-0218 and VIN-0219 must have the same readings and other starts")
	}
}

// equal compares numbers that were read from text.
func equal(a, b []float64) bool {
	if len(a) != len(b) || len(a) == 0 {
		return false
	}
	for i := range a {
		if a[i] != b[i] {
			return false
		}
	}
	return true
}
