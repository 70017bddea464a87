package report

import (
	"strings"
	"testing"
	"unicode"
	"unicode/utf8"
)

// Sequences after ECMA-48 (from memory): CSI ends with a byte of 0x40 to 0x7E,
// a control string with BEL or ST.
func TestVisible(t *testing.T) {
	for _, c := range []struct{ name, give, want string }{
		{"plain", "VIN-0417, 10 %", "VIN-0417, 10 %"},
		{"letters of all sorts", "äöü 山 µ Ω −0.05 °C ½", "äöü 山 µ Ω −0.05 °C ½"},
		{"emoji with joiner", "👩\u200D🔬", "👩\u200D🔬"},
		{"colour", "a\x1b[31mred\x1b[0mb", "a\uFFFDred\uFFFDb"},
		{"title of the window", "a\x1b]0;title\x07b", "a\uFFFDb"},
		{"title, other end", "a\x1b]0;title\x1b\\b", "a\uFFFDb"},
		{"device string", "a\x1bPq#0\x1b\\b", "a\uFFFDb"},
		{"one character sequence", "a\x1bcb", "a\uFFFDb"},
		{"unfinished sequence", "a\x1b[31", "a\uFFFD"},
		{"unfinished string", "a\x1b]0;title", "a\uFFFD"},
		{"broken sequence", "a\x1b[3\nb", "a\uFFFD\uFFFDb"},
		{"lone escape", "a\x1b", "a\uFFFD"},
		{"escape before a letter that is no ASCII", "a\x1bäb", "a\uFFFDäb"},
		{"eight-bit sequence", "a\u009b31mb", "a\uFFFDb"},
		{"line breaks", "a\r\nb\u2028c\u2029d", "a\uFFFD\uFFFDb\uFFFDc\uFFFDd"},
		{"tab, bell, zero, delete", "a\tb\x07c\x00d\x7fe", "a\uFFFDb\uFFFDc\uFFFDd\uFFFDe"},
		{"direction", "a\u202Eb\u2066c\u200Fd", "a\uFFFDb\uFFFDc\uFFFDd"},
		{"invisible", "a\uFEFFb\u200Bc\u00ADd", "a\uFFFDb\uFFFDc\uFFFDd"},
		{"tag characters", "a\U000E0041b", "a\uFFFDb"},
		{"noncharacters", "a\uFFFEb\U0001FFFFc\uFDD0d", "a\uFFFDb\uFFFDc\uFFFDd"},
		{"broken UTF-8", "a\xffb\xc3", "a\uFFFDb\uFFFD"},
	} {
		if got := Visible(c.give); got != c.want {
			t.Errorf("%s: %q gave %q, want %q", c.name, c.give, got, c.want)
		}
	}
}

func FuzzVisible(f *testing.F) {
	for _, s := range []string{"", "VIN-0417", "\x1b[31m", "\x1b]0;x\x07", "\u009d\u202e\xff", "\x1b\x1b[", "a\u0301"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		got := Visible(s)
		if !utf8.ValidString(got) {
			t.Errorf("%q gave broken UTF-8 %q", s, got)
		}
		for _, r := range got {
			if unicode.IsControl(r) || unicode.In(r, unicode.Zl, unicode.Zp) || unicode.Is(unicode.Bidi_Control, r) {
				t.Errorf("%q lets %U through", s, r)
			}
		}
		if again := Visible(got); again != got {
			t.Errorf("%q changes again: %q, %q", s, got, again)
		}
		if strings.ContainsRune(got, 0x1B) {
			t.Errorf("%q lets an escape through", s)
		}
	})
}
