package schemas

import (
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// folder writes files into a new folder and returns its path.
func folder(t *testing.T, files map[string]string) string {
	t.Helper()
	dir := t.TempDir()
	for name, text := range files {
		if err := os.WriteFile(filepath.Join(dir, name), []byte(text), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	return dir
}

func named(name, more string) string {
	return more + strings.Replace(good, `"mine"`, `"`+name+`"`, 1)
}

func TestLoadJoinsTheLaboratorys(t *testing.T) {
	dir := folder(t, map[string]string{"own.toml": named("mine", ""), "B.TOML": named("bench-b", ""), "b2.toml": named("bench-b", "valid_from = 2031-07-01\n"), "notes.txt": "?"})
	set, err := Load(dir)
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for _, s := range set {
		line := s.Name + " " + s.ValidFrom + " " + s.Title
		if s.Replaces {
			line += " replaces"
		}
		got = append(got, line)
	}
	want := "bench-a  Bench A, a semicolon table with decimal commas|bench-b  Mine replaces|bench-b 2031-07-01 Mine replaces|bench-c  Bench C, a conductivity table a shift, facts at its foot|mine  Mine|plain  A bare table with # key: value lines above it"
	first := strings.Split(strings.Join(got, "|"), "|")
	wanted := strings.Split(want, "|")
	if len(first) != len(wanted) {
		t.Fatalf("%q", got)
	}
	for i := 1; i < len(wanted); i++ { // the title of bench-a is its own affair
		if first[i] != wanted[i] {
			t.Errorf("%d: %s, want %s", i, first[i], wanted[i])
		}
	}
	if set, err := Load(""); err != nil || len(set) != len(Shipped()) {
		t.Errorf("without folder: %d schemas, %v", len(set), err)
	}
}

func TestLoadRefusals(t *testing.T) {
	dir := folder(t, map[string]string{"a.toml": named("mine", ""), "b.toml": named("mine", ""), "c.toml": "x = 1\n" + named("other", ""), "d.toml": strings.Replace(good, `"single"`, `"tall"`, 1)})
	set, err := Load(dir)
	want := filepath.Join(dir, "b.toml") + `:1:1: name: "mine" is the name in ` + filepath.Join(dir, "a.toml") + ` too; give it another name, or each version another valid_from` + "\n" +
		filepath.Join(dir, "c.toml") + `:1:1: x: unknown key; allowed here: dialect, facts, fields, footer, indicated, keepUnterminatedRow, layout, name, preamble, recognise, repeatedHeader, results, sameVolume, stack, title, valid_from, wide` + "\n" +
		filepath.Join(dir, "d.toml") + `:3:10: layout: found "tall"; allowed: "single", "stacked", "long", "wide"`
	if set != nil || err == nil || err.Error() != want {
		t.Errorf("\ngot  %v\nwant %s", err, want)
	}
	_, err = Load(filepath.Join(dir, "none"))
	if want := filepath.Join(dir, "none") + ": the folder of schemas cannot be read: no such file or directory; check the path"; err == nil || err.Error() != want {
		t.Errorf("\ngot  %v\nwant %s", err, want)
	}
}

// The further keys of the language, each with what is wrong with it; § is the
// place.
func TestFurtherRefusals(t *testing.T) {
	format := `format = "%d.%m.%Y %H:%M"`
	for _, c := range []struct{ name, old, new, want string }{
		{"valid_from", `title = "Mine"`, `valid_from = §"spring"`, `valid_from: found the text "spring"; a date such as 2031-04-02 is allowed`},
		{"valid_from with a time", `title = "Mine"`, `valid_from = §2031-04-02T08:14:00Z`, `valid_from: found a date; a date such as 2031-04-02 is allowed`},
		{"same volume", `title = "Mine"`, `sameVolume = §"first"`, `sameVolume: found "first"; allowed: "all", "last"`},
		{"header rows", `commentChar = "#"`, "commentChar = \"#\"\nheaderRows = §[2, 3]", `dialect.headerRows: found the number 2 in the list; numbers from 1 up to 9 are allowed, the first of them 1`},
		{"header rows not up", `commentChar = "#"`, "commentChar = \"#\"\nheaderRows = §[1, 1]", `dialect.headerRows: found the number 1 in the list; numbers from 1 up to 9 are allowed, the first of them 1`},
		{"header rows no list", `commentChar = "#"`, "commentChar = \"#\"\nheaderRows = §2", `dialect.headerRows: found the number 2; a list of numbers is allowed, e.g. [1, 2]`},
		{"group char", `commentChar = "#"`, "commentChar = \"#\"\ngroupChar = §\"..\"", `dialect.groupChar: found ".."; one character that no number has is allowed, for any blank " "`},
		{"group char is the decimal", `commentChar = "#"`, "commentChar = \"#\"\ngroupChar = §\",\"", `dialect.groupChar: "," is the decimalChar too; state two different characters`},
		{"escape is the quote", `commentChar = "#"`, "commentChar = \"#\"\nescapeChar = §'\"'", `dialect.escapeChar: "\"" is the quoteChar too; state two different characters`},
		{"two evidences of one line", `firstLine = "mine"`, "firstLine = \"mine\"\nfirstLineBegins = §\"m\"", `recognise.firstLineBegins: found beside firstLine; state one of them`},
		{"begins with blanks", `firstLine = "mine"`, `firstLineBegins = §" m"`, `recognise.firstLineBegins: found " m"; a text without blanks around it is allowed`},
		{"only absent", `firstLine = "mine"`, `absent = ["x"]`, ``},
		{"footer without begin", "[recognise]", "§[footer]\nlines = \"cells\"\n\n[recognise]", `footer: neither begin nor blank; state the first cell of the row that begins the footer, or blank = true when a blank line does`},
		{"footer with both", "[recognise]", "[footer]\nlines = \"cells\"\nbegin = \"x\"\nblank = §true\n\n[recognise]", `footer.blank: found beside begin; state one of them`},
		{"footer rows", "[recognise]", "[footer]\nlines = \"cells\"\nbegin = \"x\"\nrow = §\"y\"\n\n[recognise]", `footer.row: only the layout "long" has it; leave it out`},
		{"wide in a single layout", "[recognise]", "§[wide]\ntitles = [\"x\"]\n\n[recognise]", `wide: found in the layout "single"; only the layout "wide" has it`},
		{"shared in a single layout", `titles = "pH"`, "titles = \"pH\"\nshared = §true", `fields[1].shared: found in the layout "single"; only in the layout "wide" runs share columns`},
		{"numbered in a single layout", `titles = "pH"`, `titles = §"pH {n}"`, `fields[1].titles: "pH {n}" in the layout "single"; only in the layout "wide" the columns of runs are numbered`},
		{"empty of a volume", `unit = "mL"`, "unit = \"mL\"\nempty = §\"skip\"", `fields[0].empty: found "skip"; allowed: "same"`},
		{"empty of a reading", `titles = "pH"`, "titles = \"pH\"\nempty = §\"same\"", `fields[1].empty: found "same"; allowed: "skip"`},
		{"empty of a time", `titles = "pH"`, "titles = \"pH\"\n[[fields]]\nname = \"time\"\ntitles = \"t\"\nunit = \"s\"\nempty = §\"skip\"", `fields[2].empty: only volumes and readings may be empty; leave it out`},
		{"refills of a reading", `titles = "pH"`, "titles = \"pH\"\nrefills = §true", `fields[1].refills: only a volume begins anew; leave it out`},
		{"suffix like a number", `unit = "mL"`, "unit = \"mL\"\nsuffixes = §[\"e3\"]", `fields[0].suffixes: found "e3"; a text without blanks around it that does not begin like a number is allowed`},
		{"suffixes of a status", `titles = "pH"`, "titles = \"pH\"\n[[fields]]\nname = \"status\"\ntitles = \"s\"\nvalues = { a = \"skip\" }\nsuffixes = §\"x\"", `fields[2].suffixes: only a number has suffixes; leave it out`},
		{"status without values", `titles = "pH"`, "titles = \"pH\"\n§[[fields]]\nname = \"status\"\ntitles = \"s\"", `fields[2]: values is missing; state what each text of the column means: "reading", "timed-out", "skip"`},
		{"status not known", `titles = "pH"`, "titles = \"pH\"\n[[fields]]\nname = \"status\"\ntitles = \"s\"\nvalues = { a = §\"ok\" }", `fields[2].values.a: found "ok"; allowed: "reading", "timed-out", "skip"`},
		{"clock", `titles = "pH"`, "titles = \"pH\"\n[[fields]]\nname = \"time\"\ntitles = \"t\"\nformat = §\"%H\"", `fields[2].format: "%H" lacks %M with %H, %I or %S; state e.g. "%H:%M:%S" for the time of day or "%M:%S" for minutes and seconds since the start`},
		{"clock with half a date", `titles = "pH"`, "titles = \"pH\"\n[[fields]]\nname = \"time\"\ntitles = \"t\"\nformat = §\"%d %H:%M\"", `fields[2].format: "%d %H:%M" is neither a time nor a date and time; state e.g. "%H:%M:%S" for the time of day or "%M:%S" for minutes and seconds since the start`},
		{"clock and unit", `titles = "pH"`, "titles = \"pH\"\n[[fields]]\nname = \"time\"\ntitles = \"t\"\nformat = \"%H:%M\"\nunit = §\"s\"", `fields[2].unit: a time with a format has no unit; leave it out`},
		{"format of a volume", `unit = "mL"`, "unit = \"mL\"\nformat = §\"%H:%M\"", `fields[0].format: only a time has a format; leave it out`},
		{"increment beside volume", `titles = "pH"`, "titles = \"pH\"\n[[fields]]\nname = §\"increment\"\ntitles = \"d\"\nunit = \"mL\"", `fields[2].name: "increment" beside the other kind of volume; give one of them the name "unused"`},
		{"file pattern", format, "file = §\"run-*.csv\"", `facts[0].file: "run-*.csv" has 0 times {}; state {} once for the fact and * for any text, e.g. "run-{}_*.csv"`},
		{"folder pattern", format, "folder = §\"a/{}\"", `facts[0].folder: "a/{}" has a separator of folders; state {} once for the fact and * for any text, e.g. "run-{}_*.csv"`},
		{"zone not known", format, "zone = §\"Europe/Tern\"", `facts[0].zone: "Europe/Tern" is no known time zone; allowed: "UTC", an offset such as "+02:00" or a name such as "Europe/Berlin"`},
		{"zone of the machine", format, "zone = §\"Local\"", `facts[0].zone: "Local" is no offset from UTC; allowed: "UTC", an offset such as "+02:00" or a name such as "Europe/Berlin"`},
		{"column of a fact and a field", format, "columns = §[\"V\"]", `facts[0].columns: "V" is in fields[0].titles too; a text may mean one thing only`},
		{"default of a date", format, "default = §\"now\"", `facts[0].default: only a text or a number with a unit has a default; leave it out`},
		{"result without unit", format, "§[[results]]\ntitles = \"r\"", `results[0]: unit is missing; every entry here states it`},
		{"unit of a result", format, "[[results]]\ntitles = \"r\"\nunit = §\"g / L\"", `results[0].unit: found "g / L"; a UCUM code is allowed, such as "g/L", "mol/L" or "%"`},
		{"result is a fact", format, "[[results]]\ntitles = §\"Begun\"\nunit = \"g/L\"", `results[0].titles: "Begun" is in facts[0].titles too; a text may mean one thing only`},
	} {
		t.Run(c.name, func(t *testing.T) {
			if c.want == "" {
				_, err := Parse("mine.toml", []byte(change(t, c.old, c.new)))
				if want := `mine.toml:10:1: recognise: no evidence is stated; state firstLine, header = true or both, or every dump would fit`; err == nil || err.Error() != want {
					t.Errorf("\ngot  %v\nwant %s", err, want)
				}
				return
			}
			got, place := problemOf(t, change(t, c.old, c.new))
			if want := "mine.toml:" + place + ": " + c.want; got != want {
				t.Errorf("\ngot  %s\nwant %s", got, want)
			}
		})
	}
}

func TestCapture(t *testing.T) {
	for _, c := range []struct{ pattern, name, want string }{
		{"run-{}_*.csv", "run-7_x.csv", "7"}, {"run-{}_*.csv", "RUN-7_8_x.CSV", "7"}, {"{}", "Bench A", "Bench A"}, {"*_{}.csv", "a_b_c.csv", "b_c"},
		{"run-{}.csv", "run-.csv", ""}, {"run.{}", "runx7", ""}, {"(a|{})", "(a|7)", "7"},
	} {
		p, err := ParseCapture(c.pattern)
		if err != nil {
			t.Fatal(err)
		}
		if got := p.Of(c.name); got != c.want {
			t.Errorf("%s of %s: %q, want %q", c.pattern, c.name, got, c.want)
		}
	}
	if (Capture{}).Of("x") != "" {
		t.Error("no pattern takes something")
	}
}
