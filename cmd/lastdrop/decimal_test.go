package main

import (
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// The mark changes what people read on pages, in the mail and on the terminal;
// records and workbook are the same bytes with either.
func TestDecimalMark(t *testing.T) {
	dumps, into := laboratory(t)
	files := map[string]map[string]string{}
	for _, mark := range []string{"point", "comma"} {
		r := try(t, []string{"sweep", dumps, "--into", into, "--decimal", mark, "--pages", "all"}, nil)
		if r.exit != 0 {
			t.Fatal(r.stderr)
		}
		look := try(t, []string{"look", filepath.Join(dumps, "1.csv"), "--decimal", mark}, nil)
		files[mark] = map[string]string{"mail": r.stdout, "look": look.stdout}
		for _, name := range []string{"evaluations.jsonl", "unread.jsonl", "summary.xlsx", "summary.pdf"} {
			data, err := os.ReadFile(filepath.Join(into, name))
			if err != nil {
				t.Fatal(err)
			}
			files[mark][name] = string(data)
		}
	}
	point, comma := files["point"], files["comma"]
	for name := range point {
		same := strings.HasSuffix(name, ".jsonl") || name == "summary.xlsx"
		if (point[name] == comma[name]) != same && name != "mail" {
			t.Errorf("%s: the same with either mark: %v, want %v", name, !same, same)
		}
	}
	if !strings.Contains(comma["look"], ",") || len(comma["look"]) != len(point["look"]) {
		t.Errorf("look with the comma:\n%s", comma["look"])
	}
}

func TestDecimalMarkUnknown(t *testing.T) {
	dumps, into := laboratory(t)
	for command, args := range map[string][]string{"sweep": {"sweep", dumps, "--into", into}, "look": {"look", filepath.Join(dumps, "1.csv")}} {
		r := try(t, append(args, "--decimal", "dot"), nil)
		want := "lastdrop: --decimal \"dot\" is not known; it is one of point, comma\nlastdrop: try: lastdrop " + command + " --help\n"
		if r.exit != 2 || r.stderr != want {
			t.Errorf("%s: exit %d, %s", command, r.exit, r.stderr)
		}
	}
}
