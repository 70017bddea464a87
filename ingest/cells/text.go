// Package cells turns the bytes of a dump into rows of cells, numbers and
// dates, and says of each where it stands in the original bytes. It knows the
// characters of a dialect and nothing of runs.
//
// Lines are counted from 1; a column is the byte, from 1, of its line in the
// original dump, whatever its encoding.
package cells

import (
	"bytes"
	"fmt"
	"unicode/utf8"

	"lastdrop/schemas"
)

// Text is a dump as UTF-8 without byte order mark.
type Text struct {
	Body     []byte
	Cut      bool // the last character of the dump is incomplete and left out
	encoding schemas.Encoding
	mark     int // bytes of the byte order mark
}

// Encoding is the encoding that the bytes were read with, in which a byte order
// mark counts for the order; the zero Text has none.
func (t *Text) Encoding() schemas.Encoding { return t.encoding }

// Fault is why bytes are not text of an encoding, or text no cells.
type Fault struct {
	Line, Col int
	Msg, Hint string
}

var (
	markUTF8  = []byte{0xEF, 0xBB, 0xBF}
	markLower = []byte{0xFF, 0xFE} // UTF-16, low byte first
	markUpper = []byte{0xFE, 0xFF} // UTF-16, high byte first
)

// Decode makes text of the bytes. It copies only where a character changes
// its bytes, so Body may be data itself. NUL and bytes that the encoding does
// not have are refused; an incomplete last character is left out and told by
// Cut, because a dump that is cut off ends like that.
func Decode(data []byte, encoding schemas.Encoding) (*Text, *Fault) {
	lower, upper := bytes.HasPrefix(data, markLower), bytes.HasPrefix(data, markUpper)
	switch encoding {
	case schemas.Auto:
		if encoding = schemas.UTF8; lower || upper {
			encoding = schemas.UTF16
		}
		t, fault := Decode(data, encoding)
		if fault != nil && encoding == schemas.UTF8 && bytes.IndexByte(data, 0) < 0 {
			fault.Hint = "the dump is damaged or in an encoding that only the schema can state, such as windows-1252"
		}
		return t, fault
	case schemas.UTF16:
		if !lower && !upper {
			return nil, &Fault{1, 1, "no UTF-16 byte order mark", "the schema states utf-16"}
		}
		return decodeUTF16(data[2:], upper, 2)
	case schemas.UTF16LE, schemas.UTF16BE:
		return decodeOrdered(data, encoding)
	}
	if lower || upper {
		return nil, &Fault{1, 1, "a UTF-16 byte order mark", fmt.Sprintf("the schema states %s", encoding)}
	}
	if at := bytes.IndexByte(data, 0); at >= 0 {
		return nil, placed(data, at, "a NUL byte", "text has none; the dump is damaged, binary or UTF-16 without byte order mark")
	}
	if encoding == schemas.UTF8 {
		return decodeUTF8(data)
	}
	return decodeBytes(data, encoding)
}

// decodeOrdered decodes UTF-16 whose byte order the schema states.
func decodeOrdered(data []byte, encoding schemas.Encoding) (*Text, *Fault) {
	big := encoding == schemas.UTF16BE
	own, other := markLower, markUpper
	if big {
		own, other = other, own
	}
	switch {
	case bytes.HasPrefix(data, other):
		return nil, &Fault{1, 1, "the byte order mark of the other byte order", fmt.Sprintf("the schema states %s", encoding)}
	case bytes.HasPrefix(data, own):
		return decodeUTF16(data[2:], big, 2)
	case bytes.IndexByte(data, 0) < 0:
		return nil, &Fault{1, 1, "no UTF-16", fmt.Sprintf("the schema states %s", encoding)}
	}
	return decodeUTF16(data, big, 0)
}

// placed gives a byte offset its line and column, for encodings in which a
// line end is one byte.
func placed(data []byte, at int, msg, hint string) *Fault {
	line, start := lineAt(data, at)
	return &Fault{line, at - start + 1, msg, hint}
}

// lineAt returns the line in which an offset stands, and the offset at which
// that line begins.
func lineAt(body []byte, offset int) (line, start int) {
	line = 1
	for i, c := range body[:offset] {
		if c == '\n' || c == '\r' && !(i+1 < len(body) && body[i+1] == '\n') {
			line, start = line+1, i+1
		}
	}
	return line, start
}

func decodeUTF8(data []byte) (*Text, *Fault) {
	t := &Text{Body: data, encoding: schemas.UTF8}
	if bytes.HasPrefix(data, markUTF8) {
		t.Body, t.mark = data[len(markUTF8):], len(markUTF8)
	}
	if utf8.Valid(t.Body) {
		return t, nil
	}
	at := 0
	for {
		r, size := utf8.DecodeRune(t.Body[at:])
		if r == utf8.RuneError && size == 1 {
			break
		}
		at += size
	}
	if !utf8.FullRune(t.Body[at:]) { // cut off in the middle of a character
		t.Body, t.Cut = t.Body[:at], true
		return t, nil
	}
	return nil, placed(data, t.mark+at, fmt.Sprintf("byte %02X is not UTF-8", t.Body[at]), "the dump is damaged or in another encoding")
}

// decodeUTF16 refuses NUL and half surrogate pairs. An odd last byte or a
// half pair at the very end is an incomplete last character.
func decodeUTF16(units []byte, upper bool, mark int) (*Text, *Fault) {
	high, low := 1, 0
	if upper {
		high, low = 0, 1
	}
	t := &Text{encoding: schemas.UTF16, mark: mark, Cut: len(units)%2 == 1, Body: make([]byte, 0, len(units)/2+len(units)/32)}
	for ; len(units) >= 2; units = units[2:] {
		r := rune(units[high])<<8 | rune(units[low])
		switch {
		case r == 0:
			return nil, t.placed("a NUL character", "text has none; the dump is damaged or binary")
		case r < utf8.RuneSelf:
			t.Body = append(t.Body, byte(r))
		case r < 0xD800 || r > 0xDFFF:
			t.Body = utf8.AppendRune(t.Body, r)
		case r < 0xDC00 && len(units) < 4:
			t.Cut = true
		case r < 0xDC00 && units[2+high]&0xFC == 0xDC:
			second := rune(units[2+high])<<8 | rune(units[2+low])
			t.Body = utf8.AppendRune(t.Body, (r-0xD800)<<10|(second-0xDC00)+0x10000)
			units = units[2:]
		default:
			return nil, t.placed(fmt.Sprintf("%04X is half a character of UTF-16", r), "the dump is damaged")
		}
	}
	return t, nil
}

// placed is a fault at the end of what has been decoded.
func (t *Text) placed(msg, hint string) *Fault {
	line, start := lineAt(t.Body, len(t.Body))
	return &Fault{line, t.Column(start, len(t.Body)), msg, hint}
}

// windows1252 has the characters of the bytes 0x80 to 0x9F; 0 is not
// assigned. Source: the unicode.org mapping CP1252.TXT, through
// golang.org/x/text/encoding/charmap, with which a test compares it.
var windows1252 = [32]rune{
	'€', 0, '‚', 'ƒ', '„', '…', '†', '‡', 'ˆ', '‰', 'Š', '‹', 'Œ', 0, 'Ž', 0,
	0, '‘', '’', '“', '”', '•', '–', '—', '˜', '™', 'š', '›', 'œ', 0, 'ž', 'Ÿ',
}

// decodeBytes decodes an encoding of one byte a character. Bytes that are
// UTF-8 throughout are refused: read as one byte a character they would give
// wrong letters in silence.
func decodeBytes(data []byte, encoding schemas.Encoding) (*Text, *Fault) {
	t := &Text{Body: data, encoding: encoding}
	first := nonASCII(data)
	if first == len(data) {
		return t, nil
	}
	if utf8.Valid(data) {
		return nil, placed(data, first, "the text is UTF-8", fmt.Sprintf("the schema states %s; another program may have saved the dump", encoding))
	}
	if at := mixedAt(data); at >= 0 {
		return nil, placed(data, at, "a character of UTF-8 among others that are not", fmt.Sprintf("the schema states %s; two programs have written the dump", encoding))
	}
	t.Body = make([]byte, 0, len(data)+len(data)/32+16)
	for at := 0; at < len(data); {
		plain := nonASCII(data[at:])
		t.Body = append(t.Body, data[at:at+plain]...)
		if at += plain; at == len(data) {
			break
		}
		r := charOf(data[at], encoding)
		if r == 0 {
			return nil, placed(data, at, fmt.Sprintf("byte %02X is no character of %s", data[at], encoding), "the dump is damaged or in another encoding")
		}
		t.Body = utf8.AppendRune(t.Body, r)
		at++
	}
	return t, nil
}

// mixedAt returns the offset of a letter or sign that is written in UTF-8, -1
// for none. Read as one byte a character it would begin with Â, Ã or â and a
// sign behind it, which no text of a dump has.
func mixedAt(data []byte) int {
	for i, c := range data {
		two := (c == 0xC2 || c == 0xC3) && i+1 < len(data) && data[i+1]&0xC0 == 0x80
		three := c == 0xE2 && i+2 < len(data) && data[i+1]&0xC0 == 0x80 && data[i+2]&0xC0 == 0x80
		if two || three {
			return i
		}
	}
	return -1
}

// nonASCII returns the offset of the first byte that is not ASCII.
func nonASCII(b []byte) int {
	for i, c := range b {
		if c >= utf8.RuneSelf {
			return i
		}
	}
	return len(b)
}

// charOf returns the character of a byte that is not ASCII, 0 for none.
func charOf(c byte, encoding schemas.Encoding) rune {
	switch {
	case c >= 0xA0:
		return rune(c)
	case encoding == schemas.Windows1252:
		return windows1252[c-0x80]
	}
	return 0
}

// Column returns the column of an offset of Body that stands in the line
// beginning at start.
func (t *Text) Column(start, offset int) int {
	n := 1
	if start == 0 {
		n += t.mark
	}
	if t.encoding == schemas.UTF8 {
		return n + offset - start
	}
	for i := start; i < offset; {
		r, size := utf8.DecodeRune(t.Body[i:])
		switch {
		case t.encoding != schemas.UTF16:
			n++
		case r > 0xFFFF:
			n += 4
		default:
			n += 2
		}
		i += size
	}
	return n
}

// Loose makes whatever text it can of the bytes, for diagnosis only: what is
// damaged stands as '?', and columns are not those of the dump.
func Loose(data []byte) *Text {
	mark := bytes.HasPrefix(data, markLower) || bytes.HasPrefix(data, markUpper)
	if mark || len(data) > 3 && (data[0] == 0) != (data[1] == 0) {
		return &Text{Body: loose16(data)}
	}
	data = bytes.TrimPrefix(data, markUTF8)
	valid := utf8.Valid(data)
	body := make([]byte, 0, len(data)+len(data)/32)
	for _, c := range data {
		switch {
		case c == 0:
			body = append(body, '?')
		case valid || c < utf8.RuneSelf:
			body = append(body, c)
		default:
			body = utf8.AppendRune(body, rune(c)) // nearly all letters of Western encodings
		}
	}
	return &Text{Body: body}
}

func loose16(data []byte) []byte {
	high, low := 1, 0
	if data[0] == markUpper[0] || data[0] == 0 {
		high, low = 0, 1
	}
	var body []byte
	for ; len(data) > 1; data = data[2:] {
		switch r := rune(data[high])<<8 | rune(data[low]); {
		case r == 0xFEFF: // the mark
		case r == 0 || r >= 0xD800 && r <= 0xDFFF:
			body = append(body, '?')
		default:
			body = utf8.AppendRune(body, r)
		}
	}
	return body
}
