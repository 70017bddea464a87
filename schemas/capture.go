package schemas

import (
	"fmt"
	"regexp"
	"strings"
)

// Capture takes a fact out of the name of a file or folder. The zero Capture
// takes nothing.
type Capture struct{ pattern *regexp.Regexp }

// ParseCapture reads a pattern in which {} is the fact and * any text:
// "run-{}_*.csv". Letters count as upper and lower case alike.
func ParseCapture(s string) (Capture, error) {
	if strings.Count(s, "{}") != 1 {
		return Capture{}, fmt.Errorf("%q has %d times {}", s, strings.Count(s, "{}"))
	}
	if strings.ContainsAny(s, `/\\`) {
		return Capture{}, fmt.Errorf("%q has a separator of folders", s)
	}
	quoted := strings.NewReplacer(`\*`, `.*?`, `\{\}`, `(.+?)`).Replace(regexp.QuoteMeta(s))
	pattern, err := regexp.Compile("(?is)^" + quoted + "$")
	if err != nil {
		return Capture{}, fmt.Errorf("%q is too long", s)
	}
	return Capture{pattern}, nil
}

// Of returns the part of a name that is the fact, "" when the name is of
// another form.
func (c Capture) Of(name string) string {
	if c.pattern == nil {
		return ""
	}
	if m := c.pattern.FindStringSubmatch(name); m != nil {
		return m[1]
	}
	return ""
}
