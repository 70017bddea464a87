package report

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// Replaced stands where a dump's text holds something that must not reach a
// terminal, a sheet or a page.
const Replaced = '\uFFFD'

// Visible returns s with everything that acts instead of being seen replaced
// by Replaced: terminal escape sequences (one sign for the whole sequence),
// control characters and line breaks, direction overrides and other invisible
// format characters, characters that no file may hold, broken UTF-8. Joiners
// (U+200C, U+200D) stay: some scripts need them to be read.
func Visible(s string) string {
	if isPlain(s) {
		return s
	}
	var b strings.Builder
	for len(s) > 0 {
		if n := escapeLength(s); n > 0 {
			b.WriteRune(Replaced)
			s = s[n:]
			continue
		}
		r, n := utf8.DecodeRuneInString(s)
		if acts(r) {
			r = Replaced
		}
		b.WriteRune(r)
		s = s[n:]
	}
	return b.String()
}

// isPlain is true for printable ASCII: nearly all text of nearly all dumps.
func isPlain(s string) bool {
	for i := 0; i < len(s); i++ {
		if s[i] < ' ' || s[i] > '~' {
			return false
		}
	}
	return true
}

func acts(r rune) bool {
	switch {
	case r == '\u200C' || r == '\u200D':
		return false
	case r&0xFFFE == 0xFFFE || r >= 0xFDD0 && r <= 0xFDEF:
		return true // noncharacters: XML refuses them
	}
	return unicode.In(r, unicode.Cc, unicode.Cf, unicode.Zl, unicode.Zp)
}

// escapeLength returns how many bytes of s a terminal would take for one
// escape sequence that s begins with, 0 for none. An unfinished sequence ends
// where the text does.
//
// Source: ECMA-48, 5.3 to 5.6 (control sequences and control strings), from
// memory.
func escapeLength(s string) int {
	introducer, n := rune(0), 0
	switch r, size := utf8.DecodeRuneInString(s); {
	case r == 0x1B && len(s) > 1:
		introducer, n = rune(s[1])+0x40, 2
	case r >= 0x80 && r <= 0x9F:
		introducer, n = r, size
	default:
		return 0
	}
	switch introducer {
	case 0x9B: // control sequence: parameters, then one final byte
		return n + sequenceLength(s[n:])
	case 0x90, 0x98, 0x9D, 0x9E, 0x9F: // control string: up to its terminator
		return n + stringLength(s[n:])
	}
	if s[0] == 0x1B && (s[1] < ' ' || s[1] > '~') {
		return 1 // a lone ESC: what follows is text
	}
	return n
}

func sequenceLength(s string) int {
	for i := 0; i < len(s); i++ {
		switch c := s[i]; {
		case c >= 0x40 && c <= 0x7E:
			return i + 1
		case c < 0x20 || c > 0x7E:
			return i
		}
	}
	return len(s)
}

func stringLength(s string) int {
	for i, r := range s {
		switch {
		case r == 0x07:
			return i + 1
		case r == 0x9C:
			return i + utf8.RuneLen(r)
		case r == 0x1B && strings.HasPrefix(s[i:], "\x1b\\"):
			return i + 2
		}
	}
	return len(s)
}
