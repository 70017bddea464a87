package cells

import (
	"math"
	"strings"
	"testing"

	"lastdrop/schemas"
)

func TestParseWritten(t *testing.T) {
	group := func(char string, mark byte) schemas.Dialect {
		return schemas.Dialect{DecimalChar: mark, GroupChar: char}
	}
	for _, c := range []struct {
		text  string
		d     schemas.Dialect
		w     schemas.Written
		value float64
		bound bool
		fault NumberFault
	}{
		{"12.5", group("", '.'), schemas.Written{}, 12.5, false, NumberOK},
		{"1'234.5", group("'", '.'), schemas.Written{}, 1234.5, false, NumberOK},
		{"-1'234'567", group("'", '.'), schemas.Written{}, -1234567, false, NumberOK},
		{"1.234,5", group(".", ','), schemas.Written{}, 1234.5, false, NumberOK},
		{"1.234", group(".", ','), schemas.Written{}, 1234, false, NumberOK},
		{"1\u2009234\u202f567,25e1", group(" ", ','), schemas.Written{}, 12345672.5, false, NumberOK},
		{"−1\u00a0234", group(" ", ','), schemas.Written{}, -1234, false, NumberOK},
		{"1.23", group(".", ','), schemas.Written{}, 0, false, OtherMark},
		{"1.2345", group(".", ','), schemas.Written{}, 0, false, OtherMark},
		{".234", group(".", ','), schemas.Written{}, 0, false, OtherMark},
		{"1234.567.890", group(".", ','), schemas.Written{}, 0, false, NotNumber},
		{"1.234.56", group(".", ','), schemas.Written{}, 0, false, NotNumber},
		{"1,234.567", group(".", ','), schemas.Written{}, 0, false, NotNumber},
		{"1 234", group("", ','), schemas.Written{}, 0, false, NotNumber},
		{"12.3 mL", group("", '.'), schemas.Written{Suffixes: []string{"L", "mL"}}, 12.3, false, NumberOK},
		{"12.3mL", group("", '.'), schemas.Written{Suffixes: []string{"mL"}}, 12.3, false, NumberOK},
		{"12.3 ml", group("", '.'), schemas.Written{Suffixes: []string{"mL"}}, 0, false, NotNumber},
		{"mL", group("", '.'), schemas.Written{Suffixes: []string{"mL"}}, 0, false, NotNumber},
		{"12,3 mL", group("", '.'), schemas.Written{Suffixes: []string{"mL"}}, 0, false, OtherMark},
		{"<0.5", group("", '.'), schemas.Written{Bounds: true}, 0.5, true, NumberOK},
		{"≥ 1'000 mL", group("'", '.'), schemas.Written{Bounds: true, Suffixes: []string{"mL"}}, 1000, true, NumberOK},
		{">= 5", group("", '.'), schemas.Written{Bounds: true}, 5, true, NumberOK},
		{"<0.5", group("", '.'), schemas.Written{}, 0, true, NumberBound},
		{"<x", group("", '.'), schemas.Written{Bounds: true}, 0, true, NotNumber},
		{"<<5", group("", '.'), schemas.Written{Bounds: true}, 0, true, NotNumber},
		{strings.Repeat("1'111", 40), group("'", '.'), schemas.Written{}, 0, false, NotNumber},
		{"1'" + strings.Repeat("111'", 21) + "111", group("'", '.'), schemas.Written{}, 0, false, NotNumber},
	} {
		n, bound, fault := ParseWritten([]byte(c.text), &c.d, &c.w)
		if n.Value != c.value || bound != c.bound || fault != c.fault {
			t.Errorf("%q: %v, bound %t, fault %d; want %v, %t, %d", c.text, n.Value, bound, fault, c.value, c.bound, c.fault)
		}
	}
}

// Whatever the text, a number that is accepted is finite and has digits only
// where ParseNumber would have them.
func FuzzWritten(f *testing.F) {
	f.Add([]byte("<1 234,5 mL"), " ")
	f.Add([]byte("1'234.5"), "'")
	f.Fuzz(func(t *testing.T, b []byte, group string) {
		d := schemas.Dialect{DecimalChar: ',', GroupChar: group}
		n, _, fault := ParseWritten(b, &d, &schemas.Written{Suffixes: []string{"mL"}, Bounds: true})
		if fault == NumberOK && (math.IsNaN(n.Value) || math.IsInf(n.Value, 0) || !strings.ContainsAny(string(b), "0123456789")) {
			t.Fatalf("%q gives %v", b, n.Value)
		}
	})
}

func TestEncodingsStatedAndFound(t *testing.T) {
	little, big := "a\x00\xb5\x00", "\x00a\x00\xb5"
	for _, c := range []struct {
		name     string
		encoding schemas.Encoding
		data     string
		want     string // text, or the fault
	}{
		{"little endian without mark", schemas.UTF16LE, little, "aµ"},
		{"little endian with mark", schemas.UTF16LE, "\xff\xfe" + little, "aµ"},
		{"big endian without mark", schemas.UTF16BE, big, "aµ"},
		{"big endian with mark", schemas.UTF16BE, "\xfe\xff" + big, "aµ"},
		{"the other mark", schemas.UTF16BE, "\xff\xfe" + little, "1:1: the byte order mark of the other byte order; the schema states utf-16be"},
		{"no UTF-16", schemas.UTF16LE, "a,b", "1:1: no UTF-16; the schema states utf-16le"},
		{"auto, UTF-8", schemas.Auto, "aµ", "aµ"},
		{"auto, UTF-8 with mark", schemas.Auto, "\xef\xbb\xbfaµ", "aµ"},
		{"auto, UTF-16 little", schemas.Auto, "\xff\xfe" + little, "aµ"},
		{"auto, UTF-16 big", schemas.Auto, "\xfe\xff" + big, "aµ"},
		{"auto, one byte a character", schemas.Auto, "ok\na\xb5b", "2:2: byte B5 is not UTF-8; the dump is damaged or in an encoding that only the schema can state, such as windows-1252"},
		{"auto, NUL", schemas.Auto, "a\x00b", "1:2: a NUL byte; text has none; the dump is damaged, binary or UTF-16 without byte order mark"},
		{"mixed", schemas.Windows1252, "22 \xb0C\n5 \xc2\xb5L", "2:3: a character of UTF-8 among others that are not; the schema states windows-1252; two programs have written the dump"},
		{"mixed, three bytes", schemas.Latin1, "\xe2\x88\x925\xb0", "1:1: a character of UTF-8 among others that are not; the schema states iso-8859-1; two programs have written the dump"},
		{"capitals before a no-break space", schemas.Latin1, "VOLUME CONSOMM\xc9\xa0: 5 \xb0", "VOLUME CONSOMMÉ\u00a0: 5 °"},
	} {
		t.Run(c.name, func(t *testing.T) {
			text, fault := Decode([]byte(c.data), c.encoding)
			got := ""
			if fault != nil {
				got = at(fault)
			} else {
				got = string(text.Body)
			}
			if got != c.want {
				t.Errorf("\ngot  %s\nwant %s", got, c.want)
			}
		})
	}
}

func at(f *Fault) string {
	return strings.Join([]string{place(f.Line, f.Col), f.Msg + "; " + f.Hint}, ": ")
}

func place(line, col int) string {
	return string(rune('0'+line)) + ":" + string(rune('0'+col))
}

func TestScanEscapes(t *testing.T) {
	s := Scanner{Delimiter: ',', Quote: '"', Escape: '\\'}
	for body, want := range map[string]string{
		`a\,b,c` + "\n":      "1:a,b|c",
		`"a\"b""c",d` + "\n": `1:<a"b"c>|d`,
		`a\\,b` + "\n":       `1:a\|b`,
		"a\\\nb\n":           "1:a\\\n2:b",
		`"a\` + "\nb\n":      "1: [a quote that is not closed on its line at 0]\n2:b",
		`a\`:                 `1:a\!`,
	} {
		if got := scanned(body, s); got != want {
			t.Errorf("%q: got %s, want %s", body, got, want)
		}
	}
}

// Seconds by hand.
func TestParseClock(t *testing.T) {
	for _, c := range []struct {
		pattern, text string
		want          float64
		fault         string
	}{
		{"%H:%M:%S", "01:02:03", 3723, ""},
		{"%H:%M", "23:59", 86340, ""},
		{"%I:%M %p", "12:00 am", 0, ""},
		{"%M:%S", "75:30", 4530, ""},
		{"%M:%S.%f", "0:00.25", 0.25, ""},
		{"%Y-%m-%d %H:%M:%S", "1970-01-02 00:00:01", 86401, ""},
		{"%Y-%m-%d %H:%M:%S", "1970-02-30 00:00:01", 0, "is a date or time that does not exist"},
		{"%H:%M:%S", "24:00:00", 0, "is a time that does not exist"},
		{"%H:%M:%S", "23:60:00", 0, "is a time that does not exist"},
		{"%I:%M %p", "13:00 pm", 0, "has the hour 13 on a 12 h clock"},
		{"%H:%M:%S", "1:2:3", 0, "is no time of this form"},
	} {
		p, err := schemas.ParseClock(c.pattern)
		if err != nil {
			t.Fatal(err)
		}
		got, err := ParseClock(c.text, p)
		fault := ""
		if err != nil {
			fault = err.Error()
		}
		if got != c.want || fault != c.fault {
			t.Errorf("%q as %q: %v, %q; want %v, %q", c.text, c.pattern, got, fault, c.want, c.fault)
		}
	}
}

func FuzzClock(f *testing.F) {
	f.Add("23:59:59.5")
	pattern, err := schemas.ParseClock("%H:%M:%S.%f")
	if err != nil {
		f.Fatal(err)
	}
	f.Fuzz(func(t *testing.T, text string) {
		if v, err := ParseClock(text, pattern); err == nil && !(v >= 0 && v < 86400) {
			t.Fatalf("%q gives %v s", text, v)
		}
	})
}
