package night

import "testing"

// What each pattern chooses follows from the rules in the comment of Pattern.
func TestPatterns(t *testing.T) {
	for _, c := range []struct {
		pattern, dump string
		want          bool
	}{
		{"*.csv", "dumps/bench-a/0417.csv", true},
		{"*.csv", "dumps/bench-a/0417.CSV", true},
		{"*.CSV", "dumps/bench-a/0417.csv", true},
		{"*.csv", "dumps/bench-a/0417.csv.bak", false},
		{"041?.csv", "dumps/0417.csv", true},
		{"041?.csv", "dumps/041.csv", false},
		{"041?.csv", "dumps/041ä.csv", true},
		{"*1*7*", "dumps/0417.csv", true},
		{"*7*1*", "dumps/0417.csv", false},
		{"old", "dumps/old/0417.csv", true},
		{"old", "dumps/older/0417.csv", false},
		{"old/", "dumps/old/0417.csv", true},
		{"2031-*.zip", "dumps/2031-03.zip/a/0417.csv", true},
		{"dumps/*.csv", "dumps/0417.csv", true},
		{"dumps/*.csv", "dumps/bench-a/0417.csv", false},
		{"dumps/**/*.csv", "dumps/0417.csv", true},
		{"dumps/**/*.csv", "dumps/a/b/0417.csv", true},
		{"dumps/**/*.csv", "other/0417.csv", false},
		{"**/a/*.csv", "dumps/x/a/0417.csv", true},
		{"**/a/*.csv", "dumps/x/a/y/0417.csv", false},
		{"dumps/bench-a", "dumps/bench-a/0417.csv", true},
		{"dumps/bench-a", "dumps/bench-ab/0417.csv", false},
		{"bench-a/*.csv", "dumps/bench-a/0417.csv", false},
		{"**", "dumps/0417.csv", true},
		{"dumps/**", "dumps/0417.csv", true},
	} {
		p, err := ParsePattern(c.pattern)
		if err != nil {
			t.Fatal(err)
		}
		if got := p.matches(c.dump); got != c.want {
			t.Errorf("%q on %q: got %v, want %v", c.pattern, c.dump, got, c.want)
		}
	}
}

func TestPatternsThatCannotMatch(t *testing.T) {
	for pattern, want := range map[string]string{
		"":          `"" has an empty name between its slashes; it begins with the swept folder's name`,
		"/srv/x":    `"/srv/x" has an empty name between its slashes; it begins with the swept folder's name`,
		"a//b":      `"a//b" has an empty name between its slashes; it begins with the swept folder's name`,
		"../x":      `"../x" leaves the swept folder; it begins with that folder's name`,
		"a**/b":     `"a**/b" has ** beside other signs; ** stands alone between slashes`,
		`dumps\old`: `"dumps\\old" has a backslash; folders are parted by / on every system`,
	} {
		if _, err := ParsePattern(pattern); err == nil || err.Error() != want {
			t.Errorf("%q:\n got %v\nwant %s", pattern, err, want)
		}
	}
}

// A pattern of many stars takes no longer than its length times that of the
// name: 40 stars would need 2^40 steps when each could go back.
func TestPatternOfManyStars(t *testing.T) {
	stars, name := "", ""
	for range 40 {
		stars, name = stars+"*a", name+"aa"
	}
	if matchName([]rune(stars+"b"), []rune(name)) {
		t.Error("matches")
	}
}
