package cells

import (
	"errors"
	"fmt"
	"time"

	"lastdrop/schemas"
)

// clock is a date and time as read, before it is known to exist.
type clock struct {
	year, month, day, hour, minute, second int
	fraction                               string // digits of a second
	half                                   string // "am", "pm" or ""
	offset                                 *time.Location
	elapsed                                bool // no time of day; minutes may be many
}

var errNoDate = errors.New("is no date and time of this form")

// ParseDate reads a date and time of the pattern and writes it as RFC 3339;
// without offset when neither text nor zone states one. It refuses times that
// do not exist.
func ParseDate(s string, pattern schemas.Pattern, zone schemas.Zone) (string, error) {
	var c clock
	var err error
	if pattern.Text() == "" {
		err = c.readISO(s)
	} else {
		err = c.read(s, pattern.Text())
	}
	if err != nil {
		return "", err
	}
	if c.offset == nil {
		c.offset = zone.Location()
	}
	return c.format()
}

// readISO reads ISO 8601: date, T or a blank, hour and minute, and perhaps
// seconds, their fraction and an offset.
func (c *clock) readISO(s string) error {
	rest := s
	for _, form := range []string{"%Y-%m-%dT%H:%M", "%Y-%m-%d %H:%M"} {
		var err error
		if rest, err = c.readPrefix(s, form); err == nil {
			break
		} else if form[8] == ' ' {
			return errNoDate
		}
	}
	if len(rest) > 0 && rest[0] == ':' {
		var err error
		if rest, err = c.readPrefix(rest, ":%S"); err != nil {
			return errNoDate
		}
		if len(rest) > 0 && (rest[0] == '.' || rest[0] == ',') {
			if rest, err = c.readPrefix(rest[1:], "%f"); err != nil {
				return errNoDate
			}
		}
	}
	if rest == "" {
		return nil
	}
	return c.read(rest, "%z")
}

// read reads the whole of s.
func (c *clock) read(s, pattern string) error {
	rest, err := c.readPrefix(s, pattern)
	if err != nil || rest != "" {
		return errNoDate
	}
	return nil
}

// readPrefix reads the pattern and returns what follows it in s.
func (c *clock) readPrefix(s, pattern string) (rest string, err error) {
	for i := 0; i < len(pattern); i++ {
		if pattern[i] != '%' {
			if s == "" || s[0] != pattern[i] {
				return s, errNoDate
			}
			s = s[1:]
			continue
		}
		i++
		if s, err = c.directive(s, pattern[i]); err != nil {
			return s, err
		}
	}
	return s, nil
}

// directive reads one strptime directive.
func (c *clock) directive(s string, d byte) (rest string, err error) {
	switch d {
	case '%':
		if s == "" || s[0] != '%' {
			return s, errNoDate
		}
		return s[1:], nil
	case 'Y':
		return digitsInto(&c.year, s, 4, 4)
	case 'y':
		rest, err = digitsInto(&c.year, s, 2, 2)
		c.year += 2000
		return rest, err
	case 'm':
		return digitsInto(&c.month, s, 1, 2)
	case 'd':
		return digitsInto(&c.day, s, 1, 2)
	case 'H', 'I':
		return digitsInto(&c.hour, s, 1, 2)
	case 'M':
		if c.elapsed {
			return digitsInto(&c.minute, s, 1, 4)
		}
		return digitsInto(&c.minute, s, 2, 2)
	case 'S':
		return digitsInto(&c.second, s, 2, 2)
	case 'p':
		return c.readHalf(s)
	case 'f':
		return c.readFraction(s)
	}
	return c.readOffset(s)
}

// digitsInto reads between least and most digits.
func digitsInto(v *int, s string, least, most int) (rest string, err error) {
	n := 0
	*v = 0
	for n < len(s) && n < most && s[n]-'0' < 10 {
		*v = *v*10 + int(s[n]-'0')
		n++
	}
	if n < least {
		return s, errNoDate
	}
	return s[n:], nil
}

func (c *clock) readHalf(s string) (rest string, err error) {
	if len(s) < 2 || s[1]|0x20 != 'm' || s[0]|0x20 != 'a' && s[0]|0x20 != 'p' {
		return s, errNoDate
	}
	c.half = string([]byte{s[0] | 0x20, 'm'})
	return s[2:], nil
}

func (c *clock) readFraction(s string) (rest string, err error) {
	n := 0
	for n < len(s) && s[n]-'0' < 10 {
		n++
	}
	if n == 0 || n > 9 {
		return s, errNoDate
	}
	c.fraction = s[:n]
	return s[n:], nil
}

// readOffset reads Z, +02:00 or +0200.
func (c *clock) readOffset(s string) (rest string, err error) {
	if s != "" && s[0] == 'Z' {
		c.offset = time.UTC
		return s[1:], nil
	}
	for _, form := range []string{"-07:00", "-0700"} {
		if len(s) < len(form) {
			continue
		}
		if t, err := time.Parse(form, s[:len(form)]); err == nil {
			_, seconds := t.Zone()
			c.offset = time.FixedZone("", seconds)
			return s[len(form):], nil
		}
	}
	return s, errNoDate
}

// wholeDay puts the hour of a 12 h clock on one of 24 h.
func (c *clock) wholeDay() error {
	if c.half == "" {
		return nil
	}
	if c.hour < 1 || c.hour > 12 {
		return fmt.Errorf("has the hour %d on a 12 h clock", c.hour)
	}
	c.hour %= 12
	if c.half == "pm" {
		c.hour += 12
	}
	return nil
}

// format checks that the time exists and writes it.
func (c *clock) format() (string, error) {
	if err := c.wholeDay(); err != nil {
		return "", err
	}
	zone := c.offset
	if zone == nil {
		zone = time.UTC // stands for "no offset" below
	}
	t := time.Date(c.year, time.Month(c.month), c.day, c.hour, c.minute, c.second, 0, zone)
	if !c.shows(t) {
		if c.shows(time.Date(c.year, time.Month(c.month), c.day, c.hour, c.minute, c.second, 0, time.UTC)) {
			return "", fmt.Errorf("is a time that the clocks of %s left out", zone)
		}
		return "", errors.New("is a date or time that does not exist")
	}
	if c.doubled(t) {
		return "", fmt.Errorf("is a time that the clocks of %s showed twice", zone)
	}
	text := t.Format("2006-01-02T15:04:05")
	if c.fraction != "" {
		text += "." + c.fraction
	}
	if c.offset != nil {
		text += t.Format("Z07:00")
	}
	return text, nil
}

// shows reports whether t has the date and time that were read.
func (c *clock) shows(t time.Time) bool {
	return t.Year() == c.year && int(t.Month()) == c.month && t.Day() == c.day && t.Hour() == c.hour && t.Minute() == c.minute && t.Second() == c.second
}

// doubled reports whether the clocks of the zone showed the time of t at
// another moment too, as they do when they are put back.
func (c *clock) doubled(t time.Time) bool {
	start, end := t.ZoneBounds()
	_, offset := t.Zone()
	for _, near := range []time.Time{start.Add(-time.Second), end} {
		if near.Unix() < -1<<40 || start.IsZero() && near.Before(t) || end.IsZero() && near.After(t) {
			continue
		}
		_, other := near.Zone()
		twin := t.Add(time.Duration(offset-other) * time.Second)
		if !twin.Equal(t) && c.shows(twin) {
			return true
		}
	}
	return false
}

// ParseClock reads a time as a clock shows it and returns it in seconds: since
// midnight, since the beginning of 1970 when the pattern has a date, or since
// whatever a pattern without hour counts from.
func ParseClock(s string, pattern schemas.Pattern) (seconds float64, err error) {
	c := clock{elapsed: !pattern.Has("HI")}
	if err = c.read(s, pattern.Text()); err != nil {
		return 0, errors.New("is no time of this form")
	}
	if err = c.wholeDay(); err != nil {
		return 0, err
	}
	if c.hour > 23 || c.minute > 59 && pattern.Has("HI") || c.second > 59 {
		return 0, errors.New("is a time that does not exist")
	}
	seconds = float64(c.hour*3600 + c.minute*60 + c.second)
	if pattern.Has("Yy") {
		day := time.Date(c.year, time.Month(c.month), c.day, 0, 0, 0, 0, time.UTC)
		if day.Year() != c.year || int(day.Month()) != c.month || day.Day() != c.day {
			return 0, errors.New("is a date or time that does not exist")
		}
		seconds += float64(day.Unix())
	}
	if c.fraction != "" {
		n, _ := ParseNumber([]byte("0."+c.fraction), '.', 0)
		seconds += n.Value
	}
	return seconds, nil
}
