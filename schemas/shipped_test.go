package schemas

import (
	"os"
	"regexp"
	"slices"
	"strings"
	"testing"
)

func TestShipped(t *testing.T) {
	var names []string
	for _, s := range Shipped() {
		names = append(names, s.Name)
		src, err := os.ReadFile(s.Name + ".toml") // the file is named as the schema
		if err != nil {
			t.Fatal(err)
		}
		again, err := Parse(s.Name+".toml", src)
		if err != nil || again.SHA256 != s.SHA256 || s.Title == "" {
			t.Errorf("%s: %v", s.Name, err)
		}
	}
	if want := []string{"bench-a", "bench-b", "bench-c", "plain"}; !slices.Equal(names, want) {
		t.Errorf("shipped %v, want %v", names, want)
	}
}

// language.md documents every key and every closed set of values, and no key
// that does not exist.
func TestLanguageIsDocumented(t *testing.T) {
	text, err := os.ReadFile("language.md")
	if err != nil {
		t.Fatal(err)
	}
	for section, want := range keysAsked(t) {
		title, keys := section, want
		body := sectionOf(string(text), title)
		var got []string
		for _, m := range regexp.MustCompile("(?m)^\\| `([a-zA-Z._]+)` \\|").FindAllStringSubmatch(body, -1) {
			if !slices.ContainsFunc(fieldForms[:], func(f struct {
				role       Role
				quantities []Quantity
			}) bool {
				return string(f.role) == m[1]
			}) {
				got = append(got, m[1])
			}
		}
		slices.Sort(got)
		slices.Sort(keys)
		if !slices.Equal(got, keys) {
			t.Errorf("section %q documents %v, the parser knows %v", title, got, keys)
		}
	}
	for _, u := range units {
		if !strings.Contains(string(text), "`"+u.Code+"`") {
			t.Errorf("unit %s is not documented", u.Code)
		}
	}
	for _, f := range factForms {
		for _, word := range append(f.allowed, string(f.name)) {
			if !strings.Contains(string(text), "`"+word+"`") {
				t.Errorf("fact or value %s is not documented", word)
			}
		}
	}
	for _, f := range fieldForms {
		if !strings.Contains(string(text), "`"+string(f.role)+"`") {
			t.Errorf("column %s is not documented", f.role)
		}
	}
}

// keysAsked finds out which keys the parser allows: an unknown key in every
// table makes it list them.
func keysAsked(t *testing.T) map[string][]string {
	t.Helper()
	_, err := Parse("x.toml", []byte("zz=1\ndialect.zz=1\nrecognise.zz=1\npreamble.zz=1\nstack.zz=1\nwide.zz=1\nfooter.zz=1\nfields=[{zz=1}]\nfacts=[{zz=1}]\nindicated=[{zz=1}]\n"))
	_, more := Parse("x.toml", []byte("results=[{zz=1}]\n")) // not too many problems at once
	asked := map[string][]string{}
	for line := range strings.SplitSeq(err.Error()+"\n"+more.Error(), "\n") {
		m := regexp.MustCompile(`: ([a-z]*)(?:\[0\])?\.?zz: unknown key; allowed here: (.*)$`).FindStringSubmatch(line)
		if m == nil {
			continue
		}
		keys := strings.Split(m[2], ", ")
		switch section := m[1]; section {
		case "":
			asked["The file"] = keys
		case "stack", "wide", "footer":
			for _, k := range keys {
				asked["stack, wide and footer"] = append(asked["stack, wide and footer"], section+"."+k)
			}
		default:
			asked[section] = keys
		}
	}
	if len(asked) != 9 {
		t.Fatalf("found %d sections: %v", len(asked), asked)
	}
	return asked
}

func sectionOf(text, title string) string {
	_, after, _ := strings.Cut(text, "\n## "+title+"\n")
	section, _, _ := strings.Cut(after, "\n## ")
	return section
}
