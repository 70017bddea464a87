package cells

import (
	"strings"
	"testing"
)

func TestCleanedText(t *testing.T) {
	for _, c := range []struct {
		in, want      string
		replaced, cut bool
	}{
		{" plain ", "plain", false, false},
		{"Süßwasser – 日本 😀", "Süßwasser – 日本 😀", false, false},
		{"a\tb\x00c\x7f", "a b\ufffdc\ufffd", true, false},
		{"a\u0085b\u2028c\u2029d\u202ee\ufefff\ue000g", "a\ufffdb\ufffdc\ufffdd\ufffde\ufffdf\ufffdg", true, false},
		{"\u0645\u06cc\u200c\u062e", "\u0645\u06cc\u200c\u062e", false, false},
		{"bad\xffbyte", "bad\ufffdbyte", true, false},
	} {
		got, replaced, cut := Clean([]byte(c.in))
		if got != c.want || replaced != c.replaced || cut != c.cut {
			t.Errorf("%q: %q %t %t, want %q %t %t", c.in, got, replaced, cut, c.want, c.replaced, c.cut)
		}
	}
}

func TestLongTextIsCut(t *testing.T) {
	for _, letter := range []string{"a", "ä"} {
		if got, _, cut := Clean([]byte(strings.Repeat(letter, 200))); cut || got != strings.Repeat(letter, 200) {
			t.Errorf("200 times %s was cut", letter)
		}
		if got, _, cut := Clean([]byte(strings.Repeat(letter, 201))); !cut || got != strings.Repeat(letter, 200) {
			t.Errorf("201 times %s: %q, cut %t", letter, got, cut)
		}
	}
}

func TestQuoted(t *testing.T) {
	for in, want := range map[string]string{"7,42": `"7,42"`, "a\tb\x1b\"": `"a\tb\x1b\""`, strings.Repeat("ä", 41): `"` + strings.Repeat("ä", 40) + `…"`} {
		if got := Quoted([]byte(in)); got != want {
			t.Errorf("%q: %s, want %s", in, got, want)
		}
	}
}
