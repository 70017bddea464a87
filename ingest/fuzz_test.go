package ingest

import (
	"bytes"
	"math"
	"os"
	"path/filepath"
	"slices"
	"testing"

	"lastdrop/schemas"
)

// dialectDumps are the hand-written dumps, by schema.
func dialectDumps(t testing.TB) map[string][]byte {
	t.Helper()
	dumps := map[string][]byte{}
	for name, file := range map[string]string{"plain": "plain.csv", "bench-a": "bench-a.csv", "bench-b": "bench-b.txt", "bench-c": "bench-c.csv"} {
		data, err := os.ReadFile(filepath.Join(dialects, file))
		if err != nil {
			t.Fatal(err)
		}
		dumps[name] = data
	}
	return dumps
}

// Whatever the bytes: no panic, every number finite and every place inside
// the dump.
func FuzzRead(f *testing.F) {
	for _, data := range dialectDumps(f) {
		f.Add(data)
	}
	f.Add([]byte(plainHead + plainRows))
	f.Add([]byte(longCases[1].dump))
	set := schemas.Shipped()
	f.Fuzz(func(t *testing.T, data []byte) {
		before := bytes.Clone(data)
		runs, _, problems := Read(data, "x.csv", set)
		if !bytes.Equal(before, data) {
			t.Fatal("the dump was changed")
		}
		if len(runs) == 0 && len(problems) == 0 {
			t.Fatal("neither runs nor problems")
		}
		for i := range runs {
			checkRun(t, &runs[i], lineCount(data))
		}
		for _, p := range problems {
			if p.Line < 0 || p.Line > lineCount(data) || p.Col < 0 || p.Col > longestLine(data)+1 {
				t.Fatalf("place outside the dump: %v", p)
			}
		}
	})
}

// lineCount and longestLine are upper bounds found without the scanner.
func lineCount(data []byte) int {
	return 1 + bytes.Count(data, []byte{'\n'}) + bytes.Count(data, []byte{'\r'})
}

func longestLine(data []byte) int {
	if bytes.HasPrefix(data, []byte("\xff\xfe")) || bytes.HasPrefix(data, []byte("\xfe\xff")) {
		return len(data) // a byte that looks like a line end may be half of a character
	}
	longest := 0
	for _, line := range bytes.FieldsFunc(data, func(r rune) bool { return r == '\n' || r == '\r' }) {
		longest = max(longest, len(line))
	}
	return longest + 3 // a byte order mark or half a UTF-16 line end
}

func checkRun(t *testing.T, r *Run, lines int) {
	t.Helper()
	if len(r.Readings) < MinReadings || r.TimesS != nil && len(r.TimesS) != len(r.Readings) || r.TemperaturesC != nil && len(r.TemperaturesC) != len(r.Readings) {
		t.Fatalf("%d readings, %d times, %d temperatures", len(r.Readings), len(r.TimesS), len(r.TemperaturesC))
	}
	numbers := append(slices.Clone(r.TimesS), r.TemperaturesC...)
	last := 0
	for _, p := range r.Readings {
		numbers = append(numbers, p.VolumeML, p.Value)
		if p.Line <= last || p.Line > lines {
			t.Fatalf("line %d after %d of %d", p.Line, last, lines)
		}
		last = p.Line
	}
	for _, i := range r.Indicated {
		numbers = append(numbers, i.VolumeML, i.StepML)
		if !slices.Contains(schemas.Kinds(), i.Kind) {
			t.Fatalf("kind %q", i.Kind)
		}
	}
	for _, p := range []*float64{r.Facts.TitrantMolPerL, r.Facts.AliquotML, r.Facts.SolventML, r.Facts.TemperatureC, r.Facts.EndReading} {
		if p != nil {
			numbers = append(numbers, *p)
		}
	}
	for _, v := range append(numbers, r.ReadingStep, r.VolumeStepML) {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			t.Fatalf("number %v", v)
		}
	}
}
