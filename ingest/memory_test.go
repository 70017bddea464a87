package ingest

import (
	"fmt"
	"runtime"
	"strings"
	"testing"

	"lastdrop/schemas"
)

// A dump of so many rows, which must not cost an allocation each.
func rowsOf(schema string, n int) []byte {
	var b strings.Builder
	switch schema {
	case "plain":
		b.WriteString("volume_mL,pH\n")
		for i := range n {
			fmt.Fprintf(&b, "%.3f,%.2f\n", float64(i)/100, 7.0)
		}
	case "bench-a":
		fmt.Fprintf(&b, "Bench A curve record;4\r\nReadings;%d\r\n\r\nVolume mL;pH;Temp. \xb0C\r\n", n)
		for i := range n {
			fmt.Fprintf(&b, "%d,%02d0;7,00;22,4\r\n", i/100, i%100)
		}
	case "bench-b":
		b.WriteString("bench B day log\r\n")
		for r := range n / 50 {
			fmt.Fprintf(&b, "> curve\t%d\r\nno.\tV/mL\tE/mV\tt/s\r\n", r+1)
			for i := range 50 {
				fmt.Fprintf(&b, "%d\t%d.000\t101.2\t%d\r\n", i+1, i, i)
			}
			b.WriteString("< curve\t50\r\n\r\n")
		}
		return append([]byte("\xff\xfe"), asUTF16(b.String())...)
	case "bench-c":
		b.WriteString(cHead)
		total := ""
		for r := range n / 50 {
			for i := range 50 {
				fmt.Fprintf(&b, "C%04d,%d,500,%d,4259.6,22.4\n", r, i, 500*i)
			}
			total += fmt.Sprintf("total,C%04d,50,9200%s", r, cTotal)
		}
		b.WriteString("totals\n" + total)
	}
	return []byte(b.String())
}

func allocated(f func()) (bytes uint64) {
	var before, after runtime.MemStats
	runtime.ReadMemStats(&before)
	f()
	runtime.ReadMemStats(&after)
	return after.TotalAlloc - before.TotalAlloc
}

// The goal is eight times the dump, the dump itself counted.
func TestMemoryIsBounded(t *testing.T) {
	set := schemas.Shipped()
	for _, s := range set {
		data := rowsOf(s.Name, 20_000)
		rows := 0
		bytes := allocated(func() {
			runs, _, problems := Read(data, "x.csv", set)
			for i := range runs {
				rows += len(runs[i].Readings)
			}
			if len(problems) > 0 {
				t.Error(problems[0])
			}
		})
		if rows != 20_000 {
			t.Errorf("%s: %d rows", s.Name, rows)
		}
		factor := 1 + float64(bytes)/float64(len(data))
		t.Logf("%s: %.1f times the dump of %d bytes", s.Name, factor, len(data))
		if factor > 8 {
			t.Errorf("%s: %.1f times the dump, want at most 8", s.Name, factor)
		}
	}
}

func TestRowsCostNoAllocation(t *testing.T) {
	set := schemas.Shipped()
	for _, name := range []string{"plain", "bench-a"} {
		count := func(rows int) float64 {
			data := rowsOf(name, rows)
			return testing.AllocsPerRun(5, func() { Read(data, "x.csv", set) })
		}
		if few, many := count(200), count(5000); many > few+5 {
			t.Errorf("%s: %v allocations for 200 rows, %v for 5000", name, few, many)
		}
	}
}
