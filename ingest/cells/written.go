package cells

import (
	"bytes"

	"lastdrop/schemas"
)

// ParseWritten reads a number as a dump may write it: with "<" or ">" before
// it, with groups of three digits and with a text glued to it, each only where
// the schema allows it. bound tells that a "<" or ">" was dropped.
func ParseWritten(b []byte, d *schemas.Dialect, w *schemas.Written) (n Number, bound bool, fault NumberFault) {
	n, fault = ParseNumber(b, d.DecimalChar, w.Unit.Shift)
	if fault == NumberOK || len(b) > 2*maxNumberBytes {
		return n, false, fault
	}
	rest, bound := withoutBound(b)
	rest = withoutSuffix(rest, w.Suffixes)
	if d.GroupChar != "" {
		var room [maxNumberBytes]byte
		rest = withoutGroups(room[:0], rest, d)
	}
	if len(rest) == len(b) {
		return n, false, fault
	}
	again, fault := ParseNumber(rest, d.DecimalChar, w.Unit.Shift)
	if fault == NumberOK && bound && !w.Bounds {
		return Number{}, true, NumberBound
	}
	return again, bound, fault
}

func withoutBound(b []byte) ([]byte, bool) {
	for _, sign := range []string{"<", ">", "≤", "≥"} {
		if bytes.HasPrefix(b, []byte(sign)) {
			rest := bytes.TrimPrefix(b[len(sign):], []byte("="))
			return bytes.TrimLeft(rest, " \u00a0\u2009\u202f"), true
		}
	}
	return b, false
}

// withoutSuffix takes the longest of the suffixes away, and blanks before it.
func withoutSuffix(b []byte, suffixes []string) []byte {
	longest := 0
	for _, s := range suffixes {
		if len(s) > longest && len(s) < len(b) && string(b[len(b)-len(s):]) == s {
			longest = len(s)
		}
	}
	if longest == 0 {
		return b
	}
	return bytes.TrimRight(b[:len(b)-longest], " \u00a0\u2009\u202f")
}

// blanks are the group characters that " " in a schema stands for: blank,
// no-break, thin and narrow no-break.
var blanks = [...]string{" ", "\u00a0", "\u2009", "\u202f"}

// withoutGroups appends the number without its group characters to room. Text
// whose groups are not one to three digits and then three each is returned as
// it is, and is no number then.
func withoutGroups(room, b []byte, d *schemas.Dialect) []byte {
	run, groups := 0, 0
	for i := 0; i < len(b); {
		size := groupSize(b[i:], d.GroupChar)
		switch {
		case size > 0:
			if run == 0 || run > 3 || groups > 0 && run != 3 {
				return b
			}
			groups, run = groups+1, 0
			i += size
			continue
		case b[i]-'0' < 10:
			run++
		case groups > 0:
			if run != 3 {
				return b
			}
			return append(room, b[i:]...)
		case b[i] == d.DecimalChar: // groups stand before it only
			return b
		}
		if len(room) == cap(room) {
			return b
		}
		room = append(room, b[i])
		i++
	}
	if groups == 0 || run != 3 {
		return b
	}
	return room
}

// groupSize is the length of the group character that b begins with, 0 for
// none.
func groupSize(b []byte, group string) int {
	if group != " " {
		if bytes.HasPrefix(b, []byte(group)) {
			return len(group)
		}
		return 0
	}
	for _, blank := range blanks {
		if bytes.HasPrefix(b, []byte(blank)) {
			return len(blank)
		}
	}
	return 0
}
