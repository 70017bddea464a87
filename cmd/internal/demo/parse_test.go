package demo

import (
	"fmt"
	"strconv"
	"strings"
	"testing"
	"unicode/utf16"
)

// parsed is a run as these tests read it out of a dump: by the words of the
// dialect alone, apart from the project's reader.
type parsed struct {
	facts     map[string]string
	volumes   []float64
	readings  []float64
	indicated []float64
}

// number reads a number with a decimal point or comma.
func number(t *testing.T, s string) float64 {
	t.Helper()
	v, err := strconv.ParseFloat(strings.Replace(s, ",", ".", 1), 64)
	if err != nil {
		t.Fatalf("%q is not a number", s)
	}
	return v
}

// parse reads all runs of a dump that was not spoiled.
func parse(t *testing.T, f File) []parsed {
	t.Helper()
	text := string(f.Data)
	switch {
	case strings.HasPrefix(text, "# sample"):
		return []parsed{parseKeyed(t, text, "# ", ": ", ",", "indicated_endpoint")}
	case strings.HasPrefix(text, "Bench A"):
		return []parsed{parseKeyed(t, text, "", ";", ";", "ndpoint seen mL")}
	case strings.HasPrefix(text, "bench C"):
		return parseBenchC(t, text)
	case strings.HasPrefix(text, "\xff\xfe"):
		var units []uint16
		for i := 2; i+1 < len(text); i += 2 {
			units = append(units, uint16(text[i])|uint16(text[i+1])<<8)
		}
		var runs []parsed
		for _, part := range strings.Split(string(utf16.Decode(units)), "> curve\t")[1:] {
			runs = append(runs, parseBenchB(t, part))
		}
		return runs
	}
	t.Fatalf("%s: unknown start %.20q", f.Path, text)
	return nil
}

// parseKeyed reads one run of keys and a table of numbers.
func parseKeyed(t *testing.T, text, mark, colon, comma, seen string) parsed {
	p := parsed{facts: map[string]string{}}
	for _, line := range strings.Split(text, "\n") {
		line = strings.TrimSuffix(line, "\r")
		if cells := strings.Split(line, comma); len(cells) > 1 && line[0] >= '0' && line[0] <= '9' {
			p.volumes, p.readings = append(p.volumes, number(t, cells[0])), append(p.readings, number(t, cells[1]))
		} else if key, value, ok := strings.Cut(strings.TrimPrefix(line, mark), colon); ok {
			p.facts[key] = value
			if strings.Contains(key, seen) {
				p.indicated = append(p.indicated, number(t, value))
			}
		}
	}
	return p
}

// parseBenchB reads one run of a stacked dump.
func parseBenchB(t *testing.T, text string) parsed {
	p := parsed{facts: map[string]string{}}
	for _, line := range strings.Split(text, "\r\n") {
		cells := strings.Split(line, "\t")
		switch {
		case len(cells) == 4 && cells[0] != "no.":
			p.volumes, p.readings = append(p.volumes, number(t, cells[1])), append(p.readings, number(t, cells[2]))
		case len(cells) == 2:
			p.facts[cells[0]] = cells[1]
			if cells[0] == "end mL" || cells[0] == "end 2 mL" {
				p.indicated = append(p.indicated, number(t, cells[1]))
			}
		}
	}
	return p
}

// parseBenchC reads the long table; volumes in mL, readings in mS/cm.
func parseBenchC(t *testing.T, text string) []parsed {
	byRun, order := map[string]*parsed{}, []string{}
	for _, line := range strings.Split(text, "\n")[2:] {
		cells := strings.Split(line, ",")
		switch {
		case len(cells) == 6:
			p := byRun[cells[0]]
			if p == nil {
				p = &parsed{facts: map[string]string{}}
				byRun[cells[0]], order = p, append(order, cells[0])
			}
			p.volumes, p.readings = append(p.volumes, number(t, cells[3])/1000), append(p.readings, number(t, cells[4])/1000)
		case len(cells) == 13:
			p := byRun[cells[1]]
			for i, key := range []string{"total", "run", "rows", "seen", "sample", "determination", "operator", "start"} {
				p.facts[key] = cells[i]
			}
			if cells[3] != "" {
				p.indicated = []float64{number(t, cells[3]) / 1000}
			}
			if p.facts["rows"] != fmt.Sprint(len(p.volumes)) {
				t.Errorf("run %s states %s rows and has %d", cells[1], p.facts["rows"], len(p.volumes))
			}
		}
	}
	runs := make([]parsed, 0, len(order))
	for _, name := range order {
		runs = append(runs, *byRun[name])
	}
	return runs
}
