package figure

import (
	"strings"
	"unicode/utf8"
)

// Wrap breaks text into lines no wider than width mm. A number stays with the
// word after it and with a short word before it ("line 42", "0.3 mL"); a
// word wider than a line is cut where the line ends.
func Wrap(st Style, text string, width float64) []string {
	text, _ = Clean(text)
	space := TextWidth(st, " ")
	var lines []string
	line, used := "", 0.0
	for _, piece := range glued(strings.Fields(text)) {
		w := TextWidth(st, piece)
		if line != "" && used+space+w <= width {
			line, used = line+" "+piece, used+space+w
			continue
		}
		if line != "" {
			lines = append(lines, line)
		}
		var full []string
		full, line = cut(st, piece, width)
		lines, used = append(lines, full...), TextWidth(st, line)
	}
	if line != "" {
		lines = append(lines, line)
	}
	return lines
}

// WrapAtMost is Wrap with the last of at most n lines cut at its end, where
// the text needs more.
func WrapAtMost(st Style, text string, width float64, n int) []string {
	lines := Wrap(st, text, width)
	if len(lines) <= n {
		return lines
	}
	last := lines[n-1] + " …"
	for TextWidth(st, last) > width && strings.Contains(last, " ") {
		words := strings.Fields(strings.TrimSuffix(last, "…"))
		if len(words) < 2 {
			last = Shorten(st, last, width)
			break
		}
		last = strings.Join(words[:len(words)-1], " ") + " …"
	}
	return append(lines[:n-1:n-1], last)
}

// glued joins words that belong on one line.
func glued(words []string) []string {
	var out []string
	for i := 0; i < len(words); i++ {
		piece := words[i]
		for i+1 < len(words) && len(piece) < 24 && stays(words[i], words[i+1]) {
			i++
			piece += " " + words[i]
		}
		out = append(out, piece)
	}
	return out
}

// stays tells whether a line may not end between two words.
func stays(a, b string) bool {
	if a == "±" || a == "−" || b == "±" || b == "−" {
		return true
	}
	if number(a) {
		return utf8.RuneCountInString(b) <= 6 && !number(b) && b != "and" && b != "or"
	}
	switch strings.TrimPrefix(a, "(") {
	case "line", "lines", "page", "pages", "pH", "run", "limit", "endpoint", "about", "to":
		return number(b)
	}
	return false
}

// number tells whether a word is a bare figure: one that a sign or letter
// after it would end ("0.3," is none, the sentence goes on).
func number(word string) bool {
	word = strings.TrimPrefix(strings.TrimPrefix(word, "("), "−")
	word = strings.TrimPrefix(word, "+")
	return word != "" && word[0] >= '0' && word[0] <= '9' && word[len(word)-1] >= '0' && word[len(word)-1] <= '9'
}

// cut breaks a word that is too wide into full lines and a rest, after a
// slash or hyphen where there is one.
func cut(st Style, word string, width float64) (full []string, rest string) {
	for TextWidth(st, word) > width {
		n := fitting(st, word, width)
		if k := strings.LastIndexAny(word[:n], "/-_ "); k > n/2 {
			n = k + 1
		}
		full, word = append(full, strings.TrimRight(word[:n], " ")), strings.TrimLeft(word[n:], " ")
	}
	return full, word
}

// fitting returns how many bytes of text fit the width, at least one rune.
func fitting(st Style, text string, width float64) int {
	_, first := utf8.DecodeRuneInString(text)
	used := 0.0
	for i, r := range text {
		if used += TextWidth(st, string(r)); used > width {
			return max(i, first)
		}
	}
	return len(text)
}

// Shorten takes runes out of the middle of text until it and an ellipsis fit
// the width; names differ mostly at both ends.
func Shorten(st Style, text string, width float64) string {
	text, _ = Clean(text)
	if TextWidth(st, text) <= width {
		return text
	}
	runes := []rune(text)
	room := width - TextWidth(st, "…")
	head, tail := 0, len(runes)
	for head < tail {
		next := runes[head]
		if head > len(runes)-tail {
			next = runes[tail-1]
		}
		if room -= TextWidth(st, string(next)); room < 0 {
			break
		}
		if head > len(runes)-tail {
			tail--
		} else {
			head++
		}
	}
	return strings.TrimRight(string(runes[:head]), " ") + "…" + strings.TrimLeft(string(runes[tail:]), " ")
}
