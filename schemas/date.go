package schemas

import (
	"fmt"
	"strings"
	"time"
	_ "time/tzdata" // names of zones mean the same on a machine without them
)

// Pattern is a date and time pattern of strptime directives, the form that
// [table] gives to format. The zero Pattern is ISO 8601.
type Pattern struct{ text string }

// Text is the pattern as the schema states it, "" for ISO 8601.
func (p Pattern) Text() string { return p.text }

// directives are those that a pattern may have. %y is a year of this
// century; names of weekdays and months are left out, because they depend on
// a language.
const directives = "YymdHIpMSfz"

// ParsePattern checks a pattern. The order of day and month is always stated:
// a pattern without year, month, day, hour and minute is refused.
func ParsePattern(s string) (Pattern, error) {
	seen, err := seenDirectives(s)
	if err != nil {
		return Pattern{}, err
	}
	for _, need := range []string{"Yy", "m", "d", "HI", "M"} {
		switch n := count(seen, need); {
		case n == 0:
			return Pattern{}, fmt.Errorf("%q lacks %%%s", s, strings.Join(strings.Split(need, ""), " or %"))
		case n > 1:
			return Pattern{}, fmt.Errorf("%q states %%%s twice", s, strings.Join(strings.Split(need, ""), " or %"))
		}
	}
	if count(seen, "I") != count(seen, "p") {
		return Pattern{}, fmt.Errorf("%q needs %%I (12 h clock) and %%p (am, pm) together", s)
	}
	return Pattern{s}, nil
}

// seenDirectives returns the letters of the directives of s, in order.
func seenDirectives(s string) (string, error) {
	seen := ""
	for i := 0; i < len(s); i++ {
		if s[i] != '%' {
			continue
		}
		i++
		if i == len(s) {
			return "", fmt.Errorf("%q ends in %%", s)
		}
		if s[i] == '%' {
			continue
		}
		if strings.IndexByte(directives, s[i]) < 0 {
			return "", fmt.Errorf("%q has the unknown directive %%%c", s, s[i])
		}
		if strings.IndexByte(seen, s[i]) >= 0 {
			return "", fmt.Errorf("%q states %%%c twice", s, s[i])
		}
		seen += s[i : i+1]
	}
	return seen, nil
}

func count(seen, letters string) int {
	n := 0
	for _, c := range letters {
		n += strings.Count(seen, string(c))
	}
	return n
}

// ParseClock checks the pattern of a time column: minute and second at least.
// With an hour it is the time of day, else the time since the start.
func ParseClock(s string) (Pattern, error) {
	seen, err := seenDirectives(s)
	if err != nil {
		return Pattern{}, err
	}
	if count(seen, "M") == 0 || count(seen, "S")+count(seen, "HI") == 0 {
		return Pattern{}, fmt.Errorf("%q lacks %%M with %%H, %%I or %%S", s)
	}
	if date := count(seen, "Yy") + count(seen, "m") + count(seen, "d"); date != 0 && (date != 3 || count(seen, "HI") == 0) || count(seen, "HI") > 1 || count(seen, "z") > 0 {
		return Pattern{}, fmt.Errorf("%q is neither a time nor a date and time", s)
	}
	if count(seen, "I") != count(seen, "p") {
		return Pattern{}, fmt.Errorf("%q needs %%I (12 h clock) and %%p (am, pm) together", s)
	}
	return Pattern{s}, nil
}

// Has reports whether the pattern has one of the directives.
func (p Pattern) Has(letters string) bool {
	seen, err := seenDirectives(p.text)
	return err == nil && count(seen, letters) > 0
}

// Zone is the zone of a dump's local times. The zero Zone means that it is not
// known: such a time is kept without offset.
type Zone struct{ loc *time.Location }

// Known reports whether the schema states a zone.
func (z Zone) Known() bool { return z.loc != nil }

// Location is nil when the zone is not known.
func (z Zone) Location() *time.Location { return z.loc }

// ParseZone reads "UTC", an offset such as "+02:00" or a name of the IANA time
// zone database such as "Europe/Berlin". The machine's own zone is none.
func ParseZone(s string) (Zone, error) {
	if s == "UTC" || s == "Z" {
		return Zone{time.UTC}, nil
	}
	if t, err := time.Parse("-07:00", s); err == nil {
		_, seconds := t.Zone()
		return Zone{time.FixedZone(s, seconds)}, nil
	}
	if !strings.Contains(s, "/") { // "Local", "" and abbreviations, which mean several zones
		return Zone{}, fmt.Errorf("%q is no offset from UTC", s)
	}
	loc, err := time.LoadLocation(s)
	if err != nil {
		return Zone{}, fmt.Errorf("%q is no known time zone", s)
	}
	return Zone{loc}, nil
}
