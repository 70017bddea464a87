package draft

import (
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"unicode/utf16"

	"lastdrop/ingest"
	"lastdrop/schemas"
)

func utf16be(s string) string {
	var b strings.Builder
	for _, u := range utf16.Encode([]rune(s)) {
		b.WriteByte(byte(u >> 8))
		b.WriteByte(byte(u))
	}
	return b.String()
}

// unknown are invented dumps, each with what a person would read out of it:
// readings as volume:value, then facts.
var unknown = []struct{ name, dump, want string }{
	{"increments in microlitres", "Bench E 2.1\nSample: E-17\nMethod: acid\nSample volume: 25.0 mL\n\nStep,Dose (uL),pH\n1,0,2.91\n2,500,3.02\n3,500,3.20\n4,250,3.66\n5,100,4.40\n6,50,6.91\n",
		"pH 0:2.91 0.5:3.02 1:3.2 1.25:3.66 1.35:4.4 1.4:6.91 sample E-17 procedure acid aliquot 25"},
	{"litres and volts", "Volume [L];U [V]\n0,0000;0,2101\n0,0010;0,2054\n0,0020;0,1950\n0,0025;0,1711\n0,0026;-0,0320\n",
		"potential 0:210.1 1:205.4 2:195 2.5:171.1 2.6:-32"},
	{"names and units in two rows", "V;E;T\nmL;mV;°C\n0,00;101;22,1\n1,00;105;22,1\n2,00;119;22,1\n3,00;160;22,2\n4,00;233;22,2\n",
		"potential 0:101 1:105 2:119 3:160 4:233"},
	{"units behind the numbers", "Volume|pH\n0.0 mL|3.10\n1.0 mL|3.22\n2.0 mL|3.50\n3.0 mL|5.01\n4.0 mL|8.92\n", "pH 0:3.1 1:3.22 2:3.5 3:5.01 4:8.92"},
	{"groups of digits", "volume/µL;kappa/µS/cm\n0;12 345,5\n500;9 876,5\n1 000;7 001,0\n1 500;6 002,5\n2 000;7 900,0\n", "conductivity 0:12.3455 0.5:9.8765 1:7.001 1.5:6.0025 2:7.9"},
	{"two electrodes", "V mL\tpH\tE mV\n0.0\t3.10\t230\n1.0\t3.22\t222\n2.0\t3.50\t205\n3.0\t5.01\t118\n4.0\t8.92\t-114\n", "pH 0:3.1 1:3.22 2:3.5 3:5.01 4:8.92"},
	{"wide, titles again", "A;;B;\nV mL;pH;V mL;pH\n0;3,1;0;4\n1;3,2;1;4,1\n2;3,5;2;4,2\n3;5;3;4,5\n4;8,9;4;6\n", "pH 0:3.1 1:3.2 2:3.5 3:5 4:8.9 sample A|pH 0:4 1:4.1 2:4.2 3:4.5 4:6 sample B"},
	{"wide, titles with numbers", "V mL;pH 1;pH 2\n0;3,1;4\n1;3,2;4,1\n2;3,5;4,2\n3;5;4,5\n4;8,9;6\n", "pH 0:3.1 1:3.2 2:3.5 3:5 4:8.9|pH 0:4 1:4.1 2:4.2 3:4.5 4:6"},
	{"stacked by blank lines", "Sample=A\nV mL,pH\n0,3.1\n1,3.2\n2,3.5\n3,5\n4,8.9\n\nSample=B\nV mL,pH\n0,4\n1,4.1\n2,4.2\n3,4.5\n4,6\n", "pH 0:3.1 1:3.2 2:3.5 3:5 4:8.9 sample A|pH 0:4 1:4.1 2:4.2 3:4.5 4:6 sample B"},
	{"footer after a word", "Volume (mL),pH\n0,3.1\n1,3.2\n2,3.5\n3,5\n4,8.9\nSummary\nOperator,Analyst 4\nEndpoint mL,3.21\n", "pH 0:3.1 1:3.2 2:3.5 3:5 4:8.9 operator Analyst 4 inflection 3.21"},
	{"footer after a blank line", "Volume (mL),pH\n0,3.1\n1,3.2\n2,3.5\n3,5\n4,8.9\n\nOperator,Analyst 4\n", "pH 0:3.1 1:3.2 2:3.5 3:5 4:8.9 operator Analyst 4"},
	{"day and month may change places", "Start;02/04/2031 08:14\nVolume mL;pH\n0;3,1\n1;3,2\n2;3,5\n3;5\n4;8,9\n", "pH 0:3.1 1:3.2 2:3.5 3:5 4:8.9"},
	{"day above 12", "Start;22/04/2031 08:14\nVolume mL;pH\n0;3,1\n1;3,2\n2;3,5\n3;5\n4;8,9\n", "pH 0:3.1 1:3.2 2:3.5 3:5 4:8.9 started 2031-04-22T08:14:00"},
	{"UTF-16 without mark", utf16be("Объём мл;pH\n0;3,1\n1;3,2\n2;3,5\n3;5\n4;8,9\n"), "pH 0:3.1 1:3.2 2:3.5 3:5 4:8.9"},
	{"comments of percent", "% sample: P-3\n% operator: Analyst 2\nvolume_mL potential_mV\n", ErrNoTable.Error()},
	{"clock times", "Time;V/mL;E/mV\n08:14:00;0,00;101\n08:14:20;1,00;105\n08:14:41;2,00;119\n08:15:10;3,00;160\n08:15:50;4,00;233\n", "potential 0:101 1:105 2:119 3:160 4:233 times 0 20 41 70 110"},
	{"rows between doses", "t/s;dose/mL;pH\n0;0;3,00\n10;;3,01\n20;1;3,10\n30;;3,11\n40;1;3,40\n50;;3,41\n60;1;4,20\n80;1;8,00\n", "pH 0:3 0:3.01 1:3.1 1:3.11 2:3.4 2:3.41 3:4.2 4:8 times 0 10 20 30 40 50 60 80"},
	{"weighed titrant", "density;1,02\nm/g;pH\n0,00;3,1\n1,02;3,2\n2,04;3,5\n3,06;5\n4,08;8,9\n", "pH 0:3.1 1:3.2 2:3.5 3:5 4:8.9"},
	{"kind of the endpoint", "EP1 mL;3,00\nEP1 kind;set point\nV mL;pH\n0;3,1\n1;3,2\n2;3,5\n3;5\n4;8,9\n", "pH 0:3.1 1:3.2 2:3.5 3:5 4:8.9 at-reading 3"},
	{"no numbers", "Dear colleague,\nthe bench is broken.\n", ErrNoTable.Error()},
	{"one-point record", "sample,result\nA,12.1\nB,12.4\nC,11.9\n", ErrNoTable.Error()},
}

// told is a run as a person would tell it.
func told(r *ingest.Run) string {
	text := string(r.Signal)
	for _, p := range r.Readings {
		text += fmt.Sprintf(" %v:%v", p.VolumeML, p.Value)
	}
	f := r.Facts
	for _, fact := range []ingest.Fact{{Key: "sample", Value: f.Sample}, {Key: "procedure", Value: f.Procedure}, {Key: "operator", Value: f.Operator}, {Key: "started", Value: f.Started}} {
		if fact.Value != "" {
			text += " " + fact.Key + " " + fact.Value
		}
	}
	if f.AliquotML != nil {
		text += fmt.Sprintf(" aliquot %v", *f.AliquotML)
	}
	for _, i := range r.Indicated {
		text += fmt.Sprintf(" %s %v", i.Kind, i.VolumeML)
	}
	if r.TimesS != nil && r.TimesS[len(r.TimesS)-1] > 0 {
		text += " times " + strings.Trim(fmt.Sprint(r.TimesS), "[]")
	}
	return text
}

func TestDraftsOfUnknownDumps(t *testing.T) {
	for _, c := range unknown {
		t.Run(c.name, func(t *testing.T) {
			toml, _, err := Propose([]byte(c.dump), "x.csv")
			if err != nil {
				if err.Error() != c.want {
					t.Errorf("\ngot  %v\nwant %s", err, c.want)
				}
				return
			}
			s, err := schemas.Parse("draft.toml", toml)
			if err != nil {
				t.Fatal(err)
			}
			runs, _, problems := ingest.Read([]byte(c.dump), "x.csv", []*schemas.Schema{s})
			var list []string
			for i := range runs {
				list = append(list, told(&runs[i]))
			}
			if got := strings.Join(list, "|"); got != c.want || len(problems) > 0 {
				t.Errorf("\ngot  %s %v\nwant %s\n%s", got, problems, c.want, toml)
			}
		})
	}
}

// The text of two drafts, read in review like code.
func TestDraftText(t *testing.T) {
	for _, name := range []string{"bench-a.csv", "bench-c.csv"} {
		data, err := os.ReadFile(filepath.Join(testdata, "dialects", name))
		if err != nil {
			t.Fatal(err)
		}
		toml, _, err := Propose(data, "in/"+name)
		if err != nil {
			t.Fatal(err)
		}
		golden := filepath.Join("testdata", strings.TrimSuffix(name, ".csv")+".want.toml")
		if *update {
			if err := os.WriteFile(golden, toml, 0o644); err != nil {
				t.Fatal(err)
			}
		}
		if want, err := os.ReadFile(golden); err != nil || string(want) != string(toml) {
			t.Errorf("%s (%v):\n%s", golden, err, toml)
		}
	}
}

// Whatever the bytes: no panic, and a draft that is proposed parses.
func FuzzPropose(f *testing.F) {
	for _, c := range unknown {
		f.Add([]byte(c.dump))
	}
	f.Fuzz(func(t *testing.T, data []byte) {
		toml, report, err := Propose(data, "a/b.csv")
		if err != nil {
			return
		}
		if _, err := schemas.Parse("draft.toml", toml); err != nil {
			t.Fatalf("%v\n%s", err, toml)
		}
		if report.Runs == 0 && len(report.Problems) == 0 {
			t.Fatal("neither runs nor problems")
		}
	})
}
