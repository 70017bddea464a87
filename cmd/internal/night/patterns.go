package night

import (
	"fmt"
	"slices"
	"strings"
)

// Pattern chooses dumps by their names, upper and lower case alike.
//
//	"*"   any text within one name
//	"?"   one sign
//	"**"  any number of names, none too; it stands alone between slashes
//
// A pattern without a slash is held against the dump's own name and the name
// of each folder and archive that it lies in: "*.dat", "old". One with a slash
// is held against the dump's name as reports print it, from the swept folder's
// name on: "bench-a/**/*.csv"; it may also end at a folder above the dump.
type Pattern struct{ parts []string }

// ParsePattern refuses a pattern that could never match. The error says what
// is wrong, for people.
func ParsePattern(s string) (Pattern, error) {
	parts := strings.Split(strings.ToLower(strings.TrimSuffix(s, "/")), "/")
	for _, p := range parts {
		switch {
		case p == "":
			return Pattern{}, fmt.Errorf("%q has an empty name between its slashes; it begins with the swept folder's name", s)
		case p == "." || p == "..":
			return Pattern{}, fmt.Errorf("%q leaves the swept folder; it begins with that folder's name", s)
		case strings.Contains(p, "**") && p != "**":
			return Pattern{}, fmt.Errorf("%q has ** beside other signs; ** stands alone between slashes", s)
		case strings.ContainsRune(p, '\\'):
			return Pattern{}, fmt.Errorf("%q has a backslash; folders are parted by / on every system", s)
		}
	}
	return Pattern{parts}, nil
}

// matches reports whether the pattern chooses the dump, or a folder or archive
// that it lies in.
func (p Pattern) matches(dump string) bool {
	names := strings.Split(strings.ToLower(dump), "/")
	if len(p.parts) == 1 {
		for _, n := range names {
			if p.parts[0] == "**" || matchName([]rune(p.parts[0]), []rune(n)) {
				return true
			}
		}
		return false
	}
	return matchNames(p.parts, names)
}

// matchNames holds the parts against the beginning of the names: what is left
// of them lies below the folder that matched.
func matchNames(parts, names []string) bool {
	switch {
	case len(parts) == 0:
		return true
	case parts[0] == "**":
		for skip := range len(names) + 1 {
			if matchNames(parts[1:], names[skip:]) {
				return true
			}
		}
		return false
	}
	return len(names) > 0 && matchName([]rune(parts[0]), []rune(names[0])) && matchNames(parts[1:], names[1:])
}

// matchName goes back to the last * only, so that no pattern takes long.
func matchName(pattern, name []rune) bool {
	star, from := -1, 0
	p, n := 0, 0
	for n < len(name) {
		switch {
		case p < len(pattern) && pattern[p] == '*':
			star, from = p, n
			p++
		case p < len(pattern) && (pattern[p] == '?' || pattern[p] == name[n]):
			p++
			n++
		case star >= 0:
			from++
			p, n = star+1, from
		default:
			return false
		}
	}
	for p < len(pattern) && pattern[p] == '*' {
		p++
	}
	return p == len(pattern)
}

// excludesArchive reports whether an archive is not to be opened. Include
// patterns may be about its members.
func (o *Options) excludesArchive(name string) bool {
	return slices.ContainsFunc(o.Exclude, func(p Pattern) bool { return p.matches(name) })
}

// excludes reports whether the patterns leave a dump out.
func (o *Options) excludes(dump string) bool {
	if o.excludesArchive(dump) {
		return true
	}
	return len(o.Include) > 0 && !slices.ContainsFunc(o.Include, func(p Pattern) bool { return p.matches(dump) })
}
