package cells

import (
	"strconv"
	"strings"
	"unicode"
	"unicode/utf8"
)

// MaxTextRunes is the longest text of a fact; what is longer is cut with a
// repair line.
const MaxTextRunes = 200

// Clean makes text of a dump safe to show: blanks around it taken away,
// characters that have no sign of their own or that turn the direction of a
// line replaced by U+FFFD, a tab by a blank, the length limited.
func Clean(b []byte) (s string, replaced, cut bool) {
	s = strings.TrimSpace(string(b))
	if plainASCII(s) {
		if len(s) > MaxTextRunes {
			return s[:MaxTextRunes], false, true
		}
		return s, false, false
	}
	var out strings.Builder
	n := 0
	for _, r := range s {
		if n == MaxTextRunes {
			cut = true
			break
		}
		n++
		if r == '\t' {
			r = ' '
		}
		if !showable(r) {
			r, replaced = utf8.RuneError, true
		}
		out.WriteRune(r)
	}
	return out.String(), replaced, cut
}

func plainASCII(s string) bool {
	for i := range len(s) {
		if s[i] < ' ' || s[i] > '~' {
			return false
		}
	}
	return true
}

// showable: joiners are kept, because scripts need them.
func showable(r rune) bool {
	switch {
	case r == '\u200c' || r == '\u200d':
		return true
	case r == utf8.RuneError, unicode.IsControl(r), unicode.Is(unicode.Cf, r), unicode.Is(unicode.Zl, r), unicode.Is(unicode.Zp, r), unicode.Is(unicode.Co, r):
		return false
	}
	return true
}

// maxQuoted is how many characters of a dump a message quotes.
const maxQuoted = 40

// Quoted puts text of a dump into a message.
func Quoted(b []byte) string {
	s := string(b)
	if utf8.RuneCountInString(s) > maxQuoted {
		s = string([]rune(s)[:maxQuoted]) + "…"
	}
	return strconv.Quote(s)
}
