package lines

import (
	"bytes"
	"math"
	"strings"
	"testing"

	"lastdrop/ingest"
	"lastdrop/report"
)

func number(v float64) *float64 { return &v }

// overshot is an invented run with the figures that the record's own
// description uses.
func overshot() report.Evaluation {
	return report.Evaluation{
		Record: 1, ID: "9f31c07a52de", Revision: 1, State: "new", Open: true, Lastdrop: "0.1.0",
		Dump: "bench-a/0417.csv", Also: []string{"bench-a/copy/0417.csv"}, DumpSHA256: "ab12", Run: 1, Line: 12,
		Schema: "bench-a", SchemaSHA256: "cd34",
		Facts: ingest.Facts{Sample: "VIN-0417 <a&b>", Procedure: "vinegar acidity", Started: "2031-04-02T08:14:00+02:00",
			Titrant: "NaOH", TitrantMolPerL: number(0.1), AliquotML: number(50), Other: []ingest.Fact{{Key: "Till", Value: "3"}}},
		Repairs: []string{"line 40: trailing delimiter dropped"},
		Signal:  "pH", Readings: 63,
		Indicated: []report.Indicated{{Kind: "inflection", VolumeML: 14.35, StepML: 0.01, Line: 7}},
		Endpoints: []report.Endpoint{{N: 1, Kind: "equivalence", Estimator: "equilibrium", VolumeML: 14.3421, UML: 0.0031,
			Low95ML: 14.336, High95ML: 14.348, Reading: number(8.72), BracketML: [2]float64{13.50, 14.80},
			Estimates: []report.Estimate{{Estimator: "derivative", Kind: "inflection", VolumeML: 14.36, UFitML: 0.37}}}},
		Diagnostics: report.Diagnostics{ResidualSD: number(0.004)},
		Flags:       []report.Flag{{Flag: "overshoot", Weight: report.Disputed, Endpoint: 1, Figure: 9.1, Limit: 8, Unit: "%", Says: "…"}},
		Verdict:     report.VerdictDisputed,
		Picture:     &report.Picture{YName: "never in a line"},
	}
}

// wantOvershot is laid out after the record's description of evaluations.jsonl,
// written by hand: its names, its order, 13.50 as the shortest 13.5.
const wantOvershot = `{"record":1,"id":"9f31c07a52de","revision":1,"state":"new","open":true,"lastdrop":"0.1.0",` +
	`"dump":"bench-a/0417.csv","also":["bench-a/copy/0417.csv"],"dump_sha256":"ab12","run":1,"line":12,` +
	`"schema":"bench-a","schema_sha256":"cd34",` +
	`"facts":{"sample":"VIN-0417 <a&b>","procedure":"vinegar acidity","started":"2031-04-02T08:14:00+02:00","titrant":"NaOH","titrant_mol_per_l":0.1,"aliquot_ml":50},` +
	`"repairs":["line 40: trailing delimiter dropped"],"signal":"pH","readings":63,` +
	`"indicated":[{"kind":"inflection","volume_ml":14.35}],` +
	`"endpoints":[{"n":1,"kind":"equivalence","estimator":"equilibrium","volume_ml":14.3421,"u_ml":0.0031,"low95_ml":14.336,"high95_ml":14.348,"reading":8.72,"bracket_ml":[13.5,14.8],` +
	`"estimates":[{"estimator":"derivative","kind":"inflection","volume_ml":14.36,"u_fit_ml":0.37}]}],` +
	`"diagnostics":{"residual_sd":0.004},` +
	`"flags":[{"flag":"overshoot","weight":"disputed","endpoint":1,"figure":9.1,"limit":8,"unit":"%","says":"…"}],` +
	`"verdict":"disputed"}` + "\n"

// wantBare: lists that every run has stay lists, all else that is absent is
// left out.
const wantBare = `{"record":1,"id":"0d4f6c28a1b5","revision":1,"state":"new","open":false,"lastdrop":"0.1.0",` +
	`"dump":"bench-c/0007.csv","dump_sha256":"ef56","run":2,"line":40,"schema":"plain","schema_sha256":"0a0b",` +
	`"facts":{},"signal":"conductivity","readings":3,"endpoints":[],"diagnostics":{},"flags":[],"verdict":"sound"}` + "\n"

func TestEvaluations(t *testing.T) {
	bare := report.Evaluation{Record: 1, ID: "0d4f6c28a1b5", Revision: 1, State: "new", Lastdrop: "0.1.0",
		Dump: "bench-c/0007.csv", DumpSHA256: "ef56", Run: 2, Line: 40, Schema: "plain", SchemaSHA256: "0a0b",
		Signal: "conductivity", Readings: 3, Verdict: report.VerdictSound}
	var got bytes.Buffer
	if err := Evaluations(&got, []report.Evaluation{overshot(), bare}); err != nil {
		t.Fatal(err)
	}
	same(t, got.String(), wantOvershot+wantBare)
}

func TestUnreadAndWaiting(t *testing.T) {
	var got bytes.Buffer
	unread := []report.Unread{{Record: 1, State: "new", Dump: "bench-b/0031.csv", DumpSHA256: "77aa", Run: 2, Line: 14, Column: 9,
		Field: "pH", Says: `"7,42" is not a number`, Hint: `set decimalChar = "," in the schema`}}
	if err := Unread(&got, unread); err != nil {
		t.Fatal(err)
	}
	if err := Waiting(&got, []report.Waiting{{Record: 1, Dump: "bench-c/0007.csv", Says: "12 s old; a sweep takes dumps from 15 min on"}}); err != nil {
		t.Fatal(err)
	}
	// By hand, after the record's description of both files.
	same(t, got.String(), `{"record":1,"state":"new","dump":"bench-b/0031.csv","dump_sha256":"77aa","run":2,"line":14,"column":9,"field":"pH","says":"\"7,42\" is not a number","hint":"set decimalChar = \",\" in the schema"}`+"\n"+
		`{"record":1,"dump":"bench-c/0007.csv","says":"12 s old; a sweep takes dumps from 15 min on"}`+"\n")
}

func TestNothingIsAnEmptyFile(t *testing.T) {
	var got bytes.Buffer
	if err := Evaluations(&got, nil); err != nil {
		t.Fatal(err)
	}
	same(t, got.String(), "")
}

// A float reads back to the same value, also those that need 17 digits.
func TestFloatsReadBackUnchanged(t *testing.T) {
	e := overshot()
	e.Endpoints[0].VolumeML = 0.1 + 0.2 // 0.30000000000000004
	e.Endpoints[0].UML = 5e-324
	e.Endpoints[0].Estimates = nil
	var text bytes.Buffer
	if err := Evaluations(&text, []report.Evaluation{e}); err != nil {
		t.Fatal(err)
	}
	if e.Endpoints[0].Estimates != nil {
		t.Error("writing changed the evaluation")
	}
	if !strings.Contains(text.String(), `"estimates":[]`) {
		t.Errorf("estimates are no list in %s", text.String())
	}
	back, err := CheckEvaluations(&text)
	if err != nil {
		t.Fatal(err)
	}
	if got, want := back[0].Endpoints[0].VolumeML, e.Endpoints[0].VolumeML; got != want {
		t.Errorf("volume: got %v, want %v", got, want)
	}
	if got, want := back[0].Endpoints[0].UML, e.Endpoints[0].UML; got != want {
		t.Errorf("u: got %v, want %v", got, want)
	}
}

func TestNoNumberNoLine(t *testing.T) {
	e := overshot()
	e.Flags[0].Figure = math.NaN()
	err := Evaluations(&bytes.Buffer{}, []report.Evaluation{e})
	if err == nil || !strings.HasPrefix(err.Error(), "bench-a/0417.csv: run 1: ") {
		t.Errorf("got %v, want an error that names bench-a/0417.csv, run 1", err)
	}
}

func TestCheckRefuses(t *testing.T) {
	for _, c := range []struct{ name, text, want string }{
		{"unknown field", `{"record":1,"dump":"a","says":"b","Size":3}` + "\n", `line 1: json: unknown field "Size"`},
		{"null", `{"record":1,"dump":null,"says":"b"}` + "\n", "line 1: null; an absent value is left out"},
		{"twin", `{"record":1,"dump":"a","dump":"b","says":"c"}` + "\n", `line 1: "dump" stands twice in one object`},
		{"cut off", `{"record":1,"dump":"a","says":"b"}` + "\n" + `{"record":1`, "line 2: the last line is not ended; the file is cut off"},
		{"two in a line", `{"record":1,"dump":"a","says":"b"}{}` + "\n", "line 1: more than one object; one a line"},
	} {
		_, err := CheckWaiting(strings.NewReader(c.text))
		if err == nil || err.Error() != c.want {
			t.Errorf("%s: got %v, want %s", c.name, err, c.want)
		}
	}
	got, err := CheckWaiting(strings.NewReader(`{"record":1,"dump":"dump","says":"dump"}` + "\n"))
	if err != nil || len(got) != 1 {
		t.Errorf("a value that is like a name: got %v, %v", got, err)
	}
}

func TestCheckReadsWhatIsWritten(t *testing.T) {
	if _, err := CheckEvaluations(strings.NewReader(wantOvershot + wantBare)); err != nil {
		t.Error(err)
	}
}

func same(t *testing.T, got, want string) {
	t.Helper()
	if got == want {
		return
	}
	i := 0
	for i < len(got) && i < len(want) && got[i] == want[i] {
		i++
	}
	t.Errorf("differs at byte %d:\n got …%s\nwant …%s", i, got[max(i-20, 0):], want[max(i-20, 0):])
}
