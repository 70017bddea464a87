package ingest

import (
	"fmt"
	"slices"
	"strings"
	"testing"
)

// In a long table in which nothing counts the rows, a damaged row may be one
// of any run.
func TestRowsLostFromLongTables(t *testing.T) {
	long := func(volume string) string {
		return strings.Replace(single("run|run\n"+volume+"|V|mL\npH|pH"), `"single"`, `"long"`, 1)
	}
	rows, volumes := "run;V;pH\n", "run;V;pH\n"
	for i := range 6 {
		rows += "A;1;3\nB;1;5\n"
		volumes += fmt.Sprintf("A;%d;3\nB;%d;5\n", i, i)
	}
	merged := strings.Replace(rows, "A;1;3\n", "A;1;3;", 1)
	for _, c := range []struct{ name, volume, dump, want string }{
		{"name damaged", "increment", strings.Replace(rows, "B", "b;", 1), "x.csv:3: run 2: a damaged row, which may be one of this run; its increment would lack in every volume below it; export the dump again"},
		{"a name of its own", "increment", strings.Replace(rows, "B", "C", 1), `x.csv:3: run 1: run: run "C" has only 1 row; its name may be damaged, and its increment would lack in every volume of another run; export the dump again`},
		{"two rows in one line, volumes", "volume", strings.Replace(volumes, "A;0;3\n", "A;0;3;", 1), `2 1:5 2:5 3:5 4:5 5:5 [line 2: a damaged row, which may be one of this run, not used]`},
		{"two rows in one line, increments", "increment", merged, `x.csv:2: run 2: a damaged row, which may be one of this run; its increment would lack in every volume below it; export the dump again`},
		{"a row made a comment", "increment", strings.Replace(rows, "B", "%", 1), `x.csv:3: run 1: a damaged row, which may be one of this run; its increment would lack in every volume below it; export the dump again`},
	} {
		t.Run(c.name, func(t *testing.T) {
			schema := strings.Replace(long(c.volume), "decimalChar", "commentChar = \"%\"\ndecimalChar", 1)
			runs, _, problems := Read([]byte(c.dump), "x.csv", made(t, schema))
			var all []string
			for i := range runs {
				all = append(all, strings.TrimSpace(strings.Join([]string{string(rune('0' + runs[i].Number)), points(&runs[i]), "[" + strings.Join(runs[i].Repairs, "|") + "]"}, " ")))
			}
			for _, p := range problems {
				all = append(all, p.Error())
			}
			if !slices.Contains(all, c.want) {
				t.Errorf("\ngot  %s\nwant %s", strings.Join(all, "\n     "), c.want)
			}
		})
	}
}
