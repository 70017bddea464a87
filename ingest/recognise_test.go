package ingest

import (
	"strings"
	"testing"

	"lastdrop/schemas"
)

// Whole dumps that no schema, or more than one, can read.
func TestRecognitionRefusals(t *testing.T) {
	bText := "bench B day log\r\n" + bRun(1) + "< curve\t5\r\n"
	aText := aHead + "Readings;4\r\n" + aTable + aRows
	for _, c := range []struct{ name, path, dump, want string }{
		{"empty", "x.csv", "", "x.csv:1:1: the dump is empty; export it again"},
		{"unknown", "bench-d/0007.csv", "volts|litres\n1|2\n", "bench-d/0007.csv:1:1: schema: no schema fits; it begins with \"volts|litres\" (tried bench-a, bench-b, bench-c, plain); export it as a schema expects, or write a schema for it"},
		{"path with a blank and a quote", "it's new/7.csv", "?", `it's new/7.csv:1:1: schema: no schema fits; it begins with "?" (tried bench-a, bench-b, bench-c, plain); export it as a schema expects, or write a schema for it`},
		{"other version", "x.csv", string(as1252(strings.Replace(aText, ";4", ";5", 1))), `x.csv:1:1: schema: no schema fits: bench-a nearly does, but line 1 is "Bench A curve record;5" where it expects "Bench A curve record;4"; export it as a schema expects, or write a schema for it`},
		{"first line lost", "x.csv", "\n" + strings.TrimPrefix(cHead, "bench C shift table\n") + cRun("C1"), `x.csv:2:1: schema: no schema fits: bench-c nearly does, but line 2 is "run,step,dose_uL,delivered_uL,cond_uS_pe…" where it expects "bench C shift table"; export it as a schema expects, or write a schema for it`},
		{"semicolons", "x.csv", "# sample: A\nvolume_mL;pH\n0;3\n", `x.csv:2:1: schema: no schema fits: plain nearly does, but the header in line 2 has ";" between its columns, not ","; export it as a schema expects, or write a schema for it`},
		{"fact without comment sign", "x.csv", "sample: A\n# aliquot_ml: 10\nvolume_mL,pH\n0,3\n", `x.csv:1:1: schema: no schema fits: plain nearly does, but "sample: A" in line 1 is neither a fact nor the header; export it as a schema expects, or write a schema for it`},
		{"reading misnamed", "x.csv", "# sample: A\nvolume_mL,ph value\n0,3\n", `x.csv:2:1: schema: no schema fits: plain nearly does, but the header is "volume_mL,ph value" (schema plain needs a header with "volume_mL" and "pH" or "mV" or "potential_mV" or "conductivity_mS_cm"); export it as a schema expects, or write a schema for it`},
		{"NUL", "x.csv", "# sample: A\nvolume_mL,pH\n0,\x003\n", `x.csv:3:3: schema: no schema fits: plain nearly does, but a NUL byte (text has none; the dump is damaged, binary or UTF-16 without byte order mark); export it as a schema expects, or write a schema for it`},
		{"not UTF-8", "x.csv", "# sample: A\r# operator: J\xfcrg\rvolume_mL,pH\r0,3\r", `x.csv:2:14: schema: no schema fits: plain nearly does, but byte FC is not UTF-8 (the dump is damaged or in another encoding); export it as a schema expects, or write a schema for it`},
		{"UTF-8 where one byte a character is stated", "x.csv", aText, `x.csv:6:20: schema: no schema fits: bench-a nearly does, but the text is UTF-8 (the schema states windows-1252; another program may have saved the dump); export it as a schema expects, or write a schema for it`},
		{"not a character of windows-1252", "x.csv", string(as1252(strings.Replace(aText, "VIN", "\u0081VIN", 1))), `x.csv:2:13: schema: no schema fits: bench-a nearly does, but byte 81 is no character of windows-1252 (the dump is damaged or in another encoding); export it as a schema expects, or write a schema for it`},
		{"UTF-8 where UTF-16 is stated", "x.csv", bText, `x.csv:1:1: schema: no schema fits: bench-b nearly does, but no UTF-16 byte order mark (the schema states utf-16); export it as a schema expects, or write a schema for it`},
		{"UTF-16 where UTF-8 is stated", "x.csv", "\xff\xfe" + string(asUTF16("volume_mL,pH\n0,3\n")), `x.csv:1:1: schema: no schema fits: plain nearly does, but a UTF-16 byte order mark (the schema states utf-8); export it as a schema expects, or write a schema for it`},
		{"half a character of UTF-16", "x.csv", "\xff\xfe" + string(asUTF16(bText[:17])) + "\x00\xd8" + string(asUTF16(bText[17:])), `x.csv:2:1: schema: no schema fits: bench-b nearly does, but D800 is half a character of UTF-16 (the dump is damaged); export it as a schema expects, or write a schema for it`},
		{"NUL in UTF-16", "x.csv", "\xff\xfe" + string(asUTF16(strings.Replace(bText, "BRI", "B\x00I", 1))), `x.csv:3:17: schema: no schema fits: bench-b nearly does, but a NUL character (text has none; the dump is damaged or binary); export it as a schema expects, or write a schema for it`},
	} {
		t.Run(c.name, func(t *testing.T) {
			runs, schema, problems := Read([]byte(c.dump), c.path, schemas.Shipped())
			if len(runs) > 0 || schema != nil || len(problems) != 1 {
				t.Fatalf("%d runs, schema %v, problems %v", len(runs), schema, problems)
			}
			if got := problems[0].Error(); got != c.want {
				t.Errorf("\ngot  %s\nwant %s", got, c.want)
			}
			next := "lastdrop schema draft " + c.path
			if c.path == "it's new/7.csv" {
				next = `lastdrop schema draft 'it'\''s new/7.csv'`
			}
			if c.dump == "" {
				next = "" // nothing can be drafted
			}
			if problems[0].Next != next {
				t.Errorf("next command %s, want %s", problems[0].Next, next)
			}
		})
	}
}

func TestTwoSchemasFit(t *testing.T) {
	other, err := schemas.Parse("my.toml", []byte("name = \"my\"\nlayout = \"single\"\nrecognise.header = true\ndialect.commentChar = \"#\"\npreamble.lines = \"comments\"\nfields = [{name=\"volume\", titles=\"volume_mL\", unit=\"mL\"}, {name=\"pH\", titles=\"pH\"}]\n"))
	if err != nil {
		t.Fatal(err)
	}
	_, schema, problems := Read([]byte(plainHead+plainRows), "x.csv", append(schemas.Shipped(), other))
	want := "x.csv:1:1: schema: the schemas plain (1 point) and my (1 point) both fit; one must lead by 2: state firstLine or lines in [recognise] of the right one"
	if schema != nil || len(problems) != 1 || problems[0].Error() != want {
		t.Errorf("\ngot  %v\nwant %s", problems, want)
	}
}

func TestNoSchemas(t *testing.T) {
	_, _, problems := Read([]byte("x"), "x.csv", nil)
	if want := "x.csv:1:1: schema: no schema fits; there is none; export it as a schema expects, or write a schema for it"; len(problems) != 1 || problems[0].Error() != want {
		t.Errorf("\ngot  %v\nwant %s", problems, want)
	}
}

func TestTooLarge(t *testing.T) {
	_, _, problems := Read(make([]byte, MaxBytes+1), "x.csv", schemas.Shipped())
	if want := "x.csv: 67108865 bytes; a dump has at most 67108864 bytes (64 MiB)"; len(problems) != 1 || problems[0].Error() != want {
		t.Errorf("\ngot  %v\nwant %s", problems, want)
	}
}
