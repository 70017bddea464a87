package ingest

import (
	"bytes"
	"encoding/csv"
	"fmt"
	"strconv"
	"strings"
	"testing"

	"lastdrop/schemas"
)

// plain200 is a plain dump of 200 rows with its usual facts.
func plain200() []byte {
	var b strings.Builder
	b.WriteString("# sample: HCL-0051\n# procedure: hydrochloric acid strength\n# instrument: Bench A\n# operator: Analyst 1\n# started: 2031-04-02T08:14:00+02:00\n# titrant: NaOH\n# titrant_mol_per_l: 0.1\n# aliquot_ml: 10.00\nvolume_mL,pH\n")
	for i := range 200 {
		fmt.Fprintf(&b, "%.3f,%.2f\n", float64(i)*0.1, 3+float64(i)*0.04)
	}
	return []byte(b.String())
}

func BenchmarkRead200Rows(b *testing.B) {
	set := schemas.Shipped()
	for _, name := range []string{"plain", "bench-a", "bench-b", "bench-c"} {
		data := rowsOf(name, 200)
		if name == "plain" {
			data = plain200()
		}
		b.Run(name, func(b *testing.B) {
			b.SetBytes(int64(len(data)))
			b.ReportAllocs()
			for b.Loop() {
				runs, _, problems := Read(data, "x.csv", set)
				if len(runs) == 0 || len(problems) > 0 {
					b.Fatal(problems)
				}
			}
		})
	}
	b.Run("encoding-csv", func(b *testing.B) {
		data := plain200()
		b.SetBytes(int64(len(data)))
		b.ReportAllocs()
		for b.Loop() {
			readWithStandardLibrary(b, data)
		}
	})
}

// readWithStandardLibrary is the least that a script would do, for comparison.
func readWithStandardLibrary(b *testing.B, data []byte) {
	r := csv.NewReader(bytes.NewReader(data))
	r.Comment, r.ReuseRecord = '#', true
	var readings []Reading
	for {
		record, err := r.Read()
		if err != nil {
			break
		}
		x, err1 := strconv.ParseFloat(record[0], 64)
		y, err2 := strconv.ParseFloat(record[1], 64)
		if err1 == nil && err2 == nil {
			readings = append(readings, Reading{VolumeML: x, Value: y})
		}
	}
	if len(readings) != 200 {
		b.Fatal(len(readings))
	}
}
