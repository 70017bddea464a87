package cells

import (
	"testing"
	"time"

	"lastdrop/schemas"
)

func TestParseDate(t *testing.T) {
	for _, c := range []struct{ pattern, zone, text, want string }{
		{"", "", "2031-04-02T08:14:00+02:00", "2031-04-02T08:14:00+02:00"},
		{"", "", "2031-04-02T08:14:00Z", "2031-04-02T08:14:00Z"},
		{"", "", "2031-04-02T08:14:00-0330", "2031-04-02T08:14:00-03:30"},
		{"", "", "2031-04-02 08:14", "2031-04-02T08:14:00"},
		{"", "+01:00", "2031-04-02T08:14:59", "2031-04-02T08:14:59+01:00"},
		{"", "+01:00", "2031-04-02T08:14:59-07:00", "2031-04-02T08:14:59-07:00"},
		{"", "", "2031-04-02T08:14:59.250+02:00", "2031-04-02T08:14:59.250+02:00"},
		{"", "", "2032-02-29T23:59:59", "2032-02-29T23:59:59"},
		{"", "", "2031-04-02", ""},
		{"", "", "02.04.2031 08:14", ""},
		{"", "", "2031-02-29T08:14", ""}, {"", "", "2031-13-01T08:14", ""}, {"", "", "2031-00-01T08:14", ""}, {"", "", "2031-04-02T24:00", ""},
		{"", "", "2031-04-02T08:60", ""}, {"", "", "2031-04-02T08:14:60", ""}, {"", "", "2031-04-02T08:14:00+25:00", ""}, {"", "", "2031-04-02T08:14:", ""},
		{"", "", "2031-04-02T08:14:00.", ""}, {"", "", "2031-04-02T08:14:00 x", ""}, {"", "", "", ""},
		{"%d.%m.%Y %H:%M", "", "02.04.2031 08:14", "2031-04-02T08:14:00"},
		{"%d.%m.%Y %H:%M", "", "2.4.2031 8:14", "2031-04-02T08:14:00"},
		{"%m/%d/%Y %H:%M", "", "02/04/2031 08:14", "2031-02-04T08:14:00"},
		{"%d.%m.%Y %H:%M", "UTC", "31.12.2031 23:59", "2031-12-31T23:59:00Z"},
		{"%d.%m.%Y %H:%M", "", "31.11.2031 08:14", ""}, {"%d.%m.%Y %H:%M", "", "02.04.2031 08:14:00", ""}, {"%d.%m.%Y %H:%M", "", "02.04.31 08:14", ""},
		{"%y%m%d %I.%M %p", "", "310402 12.05 AM", "2031-04-02T00:05:00"},
		{"%y%m%d %I.%M %p", "", "310402 12.05 pm", "2031-04-02T12:05:00"},
		{"%y%m%d %I.%M %p", "", "310402 01.05 pm", "2031-04-02T13:05:00"},
		{"%y%m%d %I.%M %p", "", "310402 13.05 pm", ""}, {"%y%m%d %I.%M %p", "", "310402 00.05 pm", ""}, {"%y%m%d %I.%M %p", "", "310402 01.05 xm", ""},
		{"%Y-%m-%d %H:%M:%S.%f %z", "", "2031-04-02 08:14:07.5 +0200", "2031-04-02T08:14:07.5+02:00"},
		{"%Y %m %d %H %M 100%%", "", "2031 04 02 08 14 100%", "2031-04-02T08:14:00"},
	} {
		var pattern schemas.Pattern
		var zone schemas.Zone
		var err error
		if c.pattern != "" {
			if pattern, err = schemas.ParsePattern(c.pattern); err != nil {
				t.Fatal(err)
			}
		}
		if c.zone != "" {
			if zone, err = schemas.ParseZone(c.zone); err != nil {
				t.Fatal(err)
			}
		}
		got, err := ParseDate(c.text, pattern, zone)
		if got != c.want || (err == nil) != (c.want != "") {
			t.Errorf("%q as %q: %q, %v; want %q", c.text, c.pattern, got, err, c.want)
		}
	}
}

// The standard library is the outside reader of what ParseDate writes.
func FuzzDate(f *testing.F) {
	f.Add("02.04.2031 08:14", true)
	f.Add("2031-04-02T08:14:00.5+02:00", false)
	german, err := schemas.ParsePattern("%d.%m.%Y %H:%M")
	if err != nil {
		f.Fatal(err)
	}
	f.Fuzz(func(t *testing.T, text string, dots bool) {
		var pattern schemas.Pattern
		if dots {
			pattern = german
		}
		got, err := ParseDate(text, pattern, schemas.Zone{})
		if err != nil {
			return
		}
		_, err1 := time.Parse("2006-01-02T15:04:05", got)
		_, err2 := time.Parse(time.RFC3339, got)
		if err1 != nil && err2 != nil {
			t.Fatalf("%q gives %q: %v, %v", text, got, err1, err2)
		}
	})
}
