package cells

import (
	"bytes"
	"strings"
	"testing"

	"golang.org/x/text/encoding/charmap"
	"lastdrop/schemas"
)

func TestDecode(t *testing.T) {
	for _, c := range []struct {
		name     string
		data     string
		encoding schemas.Encoding
		body     string
		cut      bool
	}{
		{"UTF-8", "a;ä\r\n", schemas.UTF8, "a;ä\r\n", false},
		{"UTF-8 with mark", "\xef\xbb\xbfa", schemas.UTF8, "a", false},
		{"UTF-8 cut in a character", "a\xe2\x88", schemas.UTF8, "a", true},
		{"UTF-16, low byte first", "\xff\xfea\x00\xe4\x00\x12\x22\x3d\xd8\x00\xde", schemas.UTF16, "aä−😀", false},
		{"UTF-16, high byte first", "\xfe\xff\x00a\x00\xe4\x22\x12\xd8\x3d\xde\x00", schemas.UTF16, "aä−😀", false},
		{"UTF-16 with an odd byte", "\xff\xfea\x00b", schemas.UTF16, "a", true},
		{"UTF-16 with half a character", "\xff\xfea\x00\x3d\xd8", schemas.UTF16, "a", true},
		{"windows-1252", "22,4 \xb0C \x80 \x96", schemas.Windows1252, "22,4 °C € –", false},
		{"windows-1252, ASCII only", "22,4", schemas.Windows1252, "22,4", false},
		{"Latin-1", "\xb0C", schemas.Latin1, "°C", false},
	} {
		text, fault := Decode([]byte(c.data), c.encoding)
		if fault != nil || string(text.Body) != c.body || text.Cut != c.cut {
			t.Errorf("%s: %+v, fault %+v; want %q", c.name, text, fault, c.body)
		}
	}
}

func TestDecodeRefusals(t *testing.T) {
	for _, c := range []struct {
		name     string
		data     string
		encoding schemas.Encoding
		want     Fault
	}{
		{"NUL", "a\nbc\x00", schemas.UTF8, Fault{2, 3, "a NUL byte", "text has none; the dump is damaged, binary or UTF-16 without byte order mark"}},
		{"not UTF-8, mark counts", "\xef\xbb\xbfa\xfc", schemas.UTF8, Fault{1, 5, "byte FC is not UTF-8", "the dump is damaged or in another encoding"}},
		{"not UTF-8, CRLF", "a\r\nb\rc\xff\n", schemas.UTF8, Fault{3, 2, "byte FF is not UTF-8", "the dump is damaged or in another encoding"}},
		{"no mark", "a\x00", schemas.UTF16, Fault{1, 1, "no UTF-16 byte order mark", "the schema states utf-16"}},
		{"UTF-16 for UTF-8", "\xff\xfea\x00", schemas.UTF8, Fault{1, 1, "a UTF-16 byte order mark", "the schema states utf-8"}},
		{"UTF-16 for one byte a character", "\xfe\xff\x00a", schemas.Windows1252, Fault{1, 1, "a UTF-16 byte order mark", "the schema states windows-1252"}},
		{"NUL in UTF-16", "\xff\xfea\x00\n\x00b\x00\x00\x00", schemas.UTF16, Fault{2, 3, "a NUL character", "text has none; the dump is damaged or binary"}},
		{"half a character", "\xff\xfea\x00\x3d\xd8b\x00", schemas.UTF16, Fault{1, 5, "D83D is half a character of UTF-16", "the dump is damaged"}},
		{"second half first", "\xff\xfe\x00\xdeb\x00", schemas.UTF16, Fault{1, 3, "DE00 is half a character of UTF-16", "the dump is damaged"}},
		{"UTF-8 for windows-1252", "a\nx \xc2\xb0C", schemas.Windows1252, Fault{2, 3, "the text is UTF-8", "the schema states windows-1252; another program may have saved the dump"}},
		{"not assigned", "a \xb0 \x81", schemas.Windows1252, Fault{1, 5, "byte 81 is no character of windows-1252", "the dump is damaged or in another encoding"}},
		{"control of Latin-1", "\xb0\x80", schemas.Latin1, Fault{1, 2, "byte 80 is no character of iso-8859-1", "the dump is damaged or in another encoding"}},
	} {
		_, fault := Decode([]byte(c.data), c.encoding)
		if fault == nil || *fault != c.want {
			t.Errorf("%s:\ngot  %+v\nwant %+v", c.name, fault, c.want)
		}
	}
}

// golang.org/x/text is the outside reference for windows-1252. It maps what
// is not assigned to U+FFFD.
func TestWindows1252Table(t *testing.T) {
	for i, got := range windows1252 {
		want := charmap.Windows1252.DecodeByte(byte(0x80 + i))
		if want == '\ufffd' {
			want = 0
		}
		if got != want {
			t.Errorf("byte %02X: %U, want %U", 0x80+i, got, want)
		}
	}
}

func TestColumn(t *testing.T) {
	for _, c := range []struct {
		name     string
		data     string
		encoding schemas.Encoding
		find     string
		want     int // counted in the data by hand
	}{
		{"UTF-8", "ä;x", schemas.UTF8, "x", 4},
		{"UTF-8 with mark", "\xef\xbb\xbfä;x", schemas.UTF8, "x", 7},
		{"windows-1252", "\xe4\x80;x", schemas.Windows1252, "x", 4},
		{"UTF-16", "\xff\xfe\xe4\x00\x3d\xd8\x00\xdex\x00", schemas.UTF16, "x", 9},
	} {
		text, fault := Decode([]byte(c.data), c.encoding)
		if fault != nil {
			t.Fatal(fault)
		}
		if got := text.Column(0, bytes.Index(text.Body, []byte(c.find))); got != c.want {
			t.Errorf("%s: column %d, want %d", c.name, got, c.want)
		}
	}
}

func TestLooseReplacesDamage(t *testing.T) {
	for _, c := range []struct{ data, want string }{
		{"\xef\xbb\xbfa\x00b", "a?b"}, {"a\xfcb", "aüb"}, {"\xff\xfea\x00\x00\xd8b\x00", "a?b"}, {"a\x00b\x00", "ab"}, {"\x00a\x00b", "ab"}, {"\xfe\xff\x00a", "a"},
	} {
		if got := string(Loose([]byte(c.data)).Body); got != c.want {
			t.Errorf("%q: %q, want %q", c.data, got, c.want)
		}
	}
}

// A decoded text is valid UTF-8 and has no NUL; places are inside the dump.
func FuzzDecode(f *testing.F) {
	f.Add([]byte("a;b\r\n\xb0C"), uint8(2))
	f.Add([]byte("\xff\xfea\x00\x3d\xd8"), uint8(1))
	encodings := []schemas.Encoding{schemas.UTF8, schemas.UTF16, schemas.Windows1252, schemas.Latin1}
	f.Fuzz(func(t *testing.T, data []byte, which uint8) {
		text, fault := Decode(data, encodings[int(which)%len(encodings)])
		Loose(data)
		if fault != nil {
			if fault.Line < 1 || fault.Col < 1 || fault.Line > len(data)+1 || fault.Col > len(data)+1 {
				t.Fatalf("%q: place %d:%d", data, fault.Line, fault.Col)
			}
			return
		}
		if strings.ToValidUTF8(string(text.Body), "") != string(text.Body) || bytes.IndexByte(text.Body, 0) >= 0 {
			t.Fatalf("%q gives %q", data, text.Body)
		}
		if end := text.Column(0, len(text.Body)); end > len(data)+1 {
			t.Fatalf("%q: the end is column %d", data, end)
		}
	})
}
