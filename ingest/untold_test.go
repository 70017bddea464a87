package ingest_test

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"lastdrop/ingest"
	"lastdrop/schemas"
)

const (
	longSchema = "name=\"m\"\nlayout=\"long\"\nrecognise.header=true\ndialect={delimiter=\";\",decimalChar=\",\"}\n" +
		"fields=[{name=\"run\",titles=\"R\"},{name=\"volume\",titles=\"V\",unit=\"mL\"},{name=\"pH\",titles=\"pH\"}]\n"
	oneSchema = "name=\"m\"\nlayout=\"single\"\nrecognise.header=true\npreamble.lines=\"cells\"\ndialect={delimiter=\";\",decimalChar=\",\"}\n" +
		"facts=[{name=\"sample\",titles=\"Sample\"},{name=\"aliquot_ml\",titles=\"Taken mL\",unit=\"mL\"}]\nindicated=[{titles=\"EP mL\",unit=\"mL\"}]\n" +
		"fields=[{name=\"volume\",titles=\"V\",unit=\"mL\"},{name=\"pH\",titles=\"pH\"},{name=\"remark\",titles=\"note\"}]\n"
	commentSchema = "name=\"m\"\nlayout=\"single\"\nrecognise.header=true\npreamble.lines=\"comments\"\ndialect={delimiter=\";\",commentChar=\"#\"}\n" +
		"facts=[{name=\"sample\",titles=\"sample\"},{name=\"started\",titles=\"started\"},{name=\"aliquot_ml\",titles=\"aliquot_ml\",unit=\"mL\"}]\n" +
		"fields=[{name=\"volume\",titles=\"V\",unit=\"mL\"},{name=\"pH\",titles=\"pH\"}]\n"
	longRows = "A;0;3\nA;1;3,1\nA;2;3,2\nA;3;3,3\nA;4;3,4\nA;5;3,5\n"
	moreRows = "B;0;5\nB;1;5,1\nB;2;5,2\nB;3;5,3\nB;4;5,4\nB;5;5,5\n"
	rows     = "V;pH\n0;3\n1;3\n2;3\n3;3\n4;3\n"
)

// begins is a schema whose first line is known by its begin.
func begins(s string) string {
	return strings.Replace(s, "recognise.header=true", "recognise.firstLineBegins=\"Bench E\"", 1)
}

const (
	longA = "0:3 1:3.1 2:3.2 3:3.3 4:3.4 5:3.5"
	longB = "0:5 1:5.1 2:5.2 3:5.3 4:5.4 5:5.5"
	five  = "0:3 1:3 2:3 3:3 4:3"
)

// damages are dumps whose structure is damaged so that readable rows and facts
// are left, each with the runs that may be read without a word: the true ones.
var damages = []struct{ name, schema, dump, truth string }{
	{"long: trailing delimiters", longSchema, "R;V;pH;\n" + longRows + strings.ReplaceAll(moreRows, "\n", ";\n"), longA + "|" + longB},
	{"long: a damaged first row", longSchema, "R;V;pH\n" + longRows + strings.Replace(moreRows, "B;0;5", "B;0;;5", 1), longA + "|" + longB},
	{"long: two rows merged", longSchema, "R;V;pH\n" + strings.TrimSuffix(longRows, "\n") + moreRows, longA + "|" + longB},
	{"long: a damaged name", longSchema, "R;V;pH\n" + strings.Replace(longRows, "A;2", "A/;2", 1) + moreRows, longA + "|" + longB},
	{"long: the table again", longSchema, "R;V;pH\n" + longRows + moreRows + "R;V;pH\n" + longRows + moreRows, longA + "|" + longB},
	{"long: cut off among rows of two runs", longSchema, "R;V;pH\n" + longRows + moreRows + "A;6;3,6\nB;6;5", longA + "|" + longB},
	{"an extra delimiter where the last cell is empty", oneSchema, "V;pH;note\n0;3;\n1;3;\n2;3;\n3;3;\n4;3;\n5;3;21;\n", ""},
	{"the delimiter as decimal mark where the last cell is empty", strings.Replace(oneSchema, "delimiter=\";\",decimalChar=\",\"", "delimiter=\",\"", 1), "V,pH,note\n0,3,\n1,3,\n2,3,\n3,3,\n4,3,\n5,00,4.86,\n", ""},
	{"a footer cut off in the row that begins it", oneSchema + "footer={begin=\"EP mL\",lines=\"cells\"}\n", rows + "EP mL;3,1", five},
	{"a comment below the table cut off", commentSchema + "footer.lines=\"comments\"\n", rows + "# aliquot_ml: 12", five},
	{"a padded line broken within a number", oneSchema, "Taken mL;1\n2,50;;\n" + rows, five + " taken 12.5"},
	{"a padded line without its first delimiter", oneSchema, "SampleA-1;;\n" + rows, five + " sample A-1"},
	{"the first line merged with a fact", begins(oneSchema), "Bench E;2Sample;A-1\n" + rows, five + " sample A-1"},
	{"text lines merged", strings.Replace(oneSchema, "\"cells\"", "\"text\"", 1), "Sample: A-1Taken mL: 12,5\n" + rows, five + " sample A-1 taken 12.5"},
	{"a key with a delimiter before it", commentSchema, "# ; sample: A-1\n" + rows, five + " sample A-1"},
	{"a separator damaged before another one", commentSchema, "# started; 2031-04-02T08:14\n" + rows, five + " started 2031-04-02T08:14:00"},
	{"a separator that became a letter", commentSchema, "# sampleJ A-1\n" + rows, five + " sample A-1"},
	{"half a character behind the last row", strings.Replace(oneSchema, "dialect={", "dialect={encoding=\"utf-16le\",", 1), string(coding{schemas.UTF16LE, "", false}.encode(rows)) + "5", ""},
	{"a row doubled, the time stands still", strings.Replace(oneSchema, "{name=\"remark\",titles=\"note\"}", "{name=\"time\",titles=\"t\",unit=\"s\"}", 1), "V;pH;t\n0;3;0\n1;3;9\n2;3;21\n2;3;21\n3;3;30\n4;3;41\n", five},
	{"a number above one of several runs cut by a delimiter", "name=\"m\"\nlayout=\"wide\"\nrecognise.header=true\nwide.titles=[\"EP\"]\npreamble.lines=\"cells\"\ndialect={delimiter=\";\",decimalChar=\",\"}\nindicated=[{titles=\"EP\",unit=\"mL\"}]\nfields=[{name=\"volume\",titles=\"V\",unit=\"mL\"},{name=\"pH\",titles=\"pH\"}]\n", "12,5;;;;\nV;pH;V;pH\n0;3;0;3\n1;3;1;3\n2;3;2;3\n3;3;3;3\n4;3;4;3\n", five + " endpoint 12.55|" + five},
	{"UTF-8 where each character is one byte", strings.Replace(oneSchema, "dialect={", "dialect={encoding=\"windows-1252\",", 1), "Sample;S\u00fc\u00dfmost\n" + rows, five + " sample S\u00fc\u00dfmost"},
	{"one line in UTF-8 where each character is one byte", strings.Replace(oneSchema, "dialect={", "dialect={encoding=\"windows-1252\",", 1), "By;J\xfcrgen\nSample;S\u00fc\u00dfmost\n" + rows, five + " sample S\u00fc\u00dfmost"},
	{"the rows again without header", oneSchema, rows + "0;3\n1;3\n2;3\n3;3\n4;3\n", five},
}

// Damage of structure is told in every run that it may concern, or the run is
// refused. (That a trailing delimiter was dropped says nothing about numbers.)
func TestDamageIsTold(t *testing.T) {
	for _, c := range damages {
		t.Run(c.name, func(t *testing.T) {
			s, err := schemas.Parse("m.toml", []byte(c.schema))
			if err != nil {
				t.Fatal(err)
			}
			runs, _, problems := ingest.Read([]byte(c.dump), "x.csv", []*schemas.Schema{s})
			for i := range runs {
				told := slices.DeleteFunc(slices.Clone(runs[i].Repairs), func(line string) bool { return strings.Contains(line, "trailing delimiter dropped") })
				if got := short(&runs[i]); len(told) == 0 && !slices.Contains(strings.Split(c.truth, "|"), got) {
					t.Errorf("%q\nrun %d is read without a word: %s\nproblems %v", c.dump, runs[i].Number, got, problems)
				}
			}
		})
	}
}

// short is what a run says, in one line.
func short(r *ingest.Run) string {
	var parts []string
	for _, p := range r.Readings {
		parts = append(parts, fmt.Sprintf("%v:%v", p.VolumeML, p.Value))
	}
	if r.Facts.Sample != "" {
		parts = append(parts, "sample "+r.Facts.Sample)
	}
	if r.Facts.Started != "" {
		parts = append(parts, "started "+r.Facts.Started)
	}
	if r.Facts.AliquotML != nil {
		parts = append(parts, "taken "+text(r.Facts.AliquotML))
	}
	for _, e := range r.Indicated {
		parts = append(parts, fmt.Sprintf("endpoint %v", e.VolumeML))
	}
	return strings.Join(parts, " ")
}
