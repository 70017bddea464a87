package pdf

import (
	"sort"
	"strconv"
	"strings"
	"time"
	"unicode"
	"unicode/utf8"

	"lastdrop/report"
)

// whole prints a count, from five digits on in groups parted by a space that
// no line ends at: a comma would be a decimal mark to some readers.
//
// Source: ISO 80000-1, 7.3.1 (from memory).
func whole(n int) string {
	s := strconv.Itoa(n)
	if n > -10000 && n < 10000 {
		return s
	}
	for i := len(s) - 3; i > 0 && s[i-1] != '-'; i -= 3 {
		s = s[:i] + "\u00a0" + s[i:]
	}
	return s
}

// capital makes the first letter a capital.
func capital(s string) string {
	r, size := utf8.DecodeRuneInString(s)
	if size == 0 {
		return s
	}
	return string(unicode.ToUpper(r)) + s[size:]
}

func orDash(s string) string {
	if strings.TrimSpace(s) == "" {
		return report.Dash
	}
	return s
}

// day prints 2031-04-03 as people do; what is no date stays as it is.
func day(date string) string {
	t, err := time.Parse(time.DateOnly, date)
	if err != nil {
		return date
	}
	return t.Format("2 January 2006")
}

// days prints a range of days with what they share once.
func days(first, last string) string {
	a, err1 := time.Parse(time.DateOnly, first)
	b, err2 := time.Parse(time.DateOnly, last)
	switch {
	case first == last || last == "":
		return day(first)
	case first == "":
		return day(last)
	case err1 != nil || err2 != nil || a.Year() != b.Year():
		return day(first) + " to " + day(last)
	case a.Month() != b.Month():
		return a.Format("2 January") + " to " + day(last)
	}
	return a.Format("2") + " to " + day(last)
}

// moment prints a start: 2 April 2031, 08:14 +02:00.
func moment(started string) string {
	for _, layout := range [...]string{time.RFC3339, "2006-01-02T15:04:05", "2006-01-02T15:04"} {
		t, err := time.Parse(layout, started)
		if err != nil {
			continue
		}
		out := t.Format("2 January 2006, 15:04")
		if t.Second() != 0 {
			out = t.Format("2 January 2006, 15:04:05")
		}
		if layout == time.RFC3339 {
			out += t.Format(" -07:00")
			out = strings.Replace(out, " -", " "+report.Minus, 1)
		}
		return out
	}
	return day(started)
}

// place is a place in a dump as errors print it.
func place(dump string, line, column int) string {
	if line > 0 {
		dump += ":" + strconv.Itoa(line)
		if column > 0 {
			dump += ":" + strconv.Itoa(column)
		}
	}
	return dump
}

// look is the command that shows a dump on the terminal. A member of an
// archive is looked at through its archive.
func look(dump string) string {
	if i := strings.Index(strings.ToLower(dump), ".zip/"); i >= 0 {
		dump = dump[:i+len(".zip")]
	}
	return "lastdrop look " + quoted(dump)
}

// quoted makes a path one word of a command line.
func quoted(path string) string {
	for _, r := range path {
		if !(r >= 'a' && r <= 'z' || r >= 'A' && r <= 'Z' || r >= '0' && r <= '9' || strings.ContainsRune("/._-+,:@%=", r)) {
			return "'" + strings.ReplaceAll(path, "'", `'\''`) + "'"
		}
	}
	return path
}

// pageRange is "page 2", "pages 2 to 5", or "" for none.
func pageRange(from, to int) string {
	switch {
	case from == 0:
		return ""
	case from == to:
		return "page " + whole(from)
	}
	return "pages " + whole(from) + " to " + whole(to)
}

// median of differences in %; ok is false for none.
func median(v []float64) (m float64, ok bool) {
	if len(v) == 0 {
		return 0, false
	}
	v = append([]float64(nil), v...)
	sort.Float64s(v)
	half := len(v) / 2
	if len(v)%2 == 1 {
		return v[half], true
	}
	return (v[half-1] + v[half]) / 2, true
}
