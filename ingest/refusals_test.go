package ingest

import (
	"fmt"
	"strings"
	"testing"
	"unicode/utf16"

	"lastdrop/schemas"
)

// In the dumps of these tests § stands just before the place that the message
// must name. placeOf finds line and column without the code under test.

// marked takes the mark out and returns the dump as text and its place
// ("14:9"), with columns counted in bytes of the encoding.
func marked(t *testing.T, dump string, encode func(string) []byte) (text, place string) {
	t.Helper()
	before, after, ok := strings.Cut(dump, "§")
	if !ok {
		return dump, ""
	}
	if strings.Contains(after, "§") {
		t.Fatal("two marks")
	}
	line := 1 + strings.Count(strings.ReplaceAll(before, "\r\n", "\n"), "\n")
	column := 1 + len(encode(before[strings.LastIndexByte(before, '\n')+1:]))
	return before + after, fmt.Sprintf("%d:%d", line, column)
}

func asUTF8(s string) []byte { return []byte(s) }

func as1252(s string) []byte {
	var b []byte
	for _, r := range s { // these tests use characters of Latin-1 only
		b = append(b, byte(r))
	}
	return b
}

func asUTF16(s string) []byte {
	var b []byte
	for _, u := range utf16.Encode([]rune(s)) {
		b = append(b, byte(u), byte(u>>8))
	}
	return b
}

// The parts of small dumps that every schema reads.
const (
	plainHead = "# sample: HCL-0051\n# aliquot_ml: 10.00\nvolume_mL,pH\n"
	plainRows = "0.000,3.21\n0.500,3.24\n1.000,3.31\n1.500,3.55\n"
	aHead     = "Bench A curve record;4\r\nSample name;VIN-0417\r\nBurette mol/L;0,1000\r\n"
	aTable    = "\r\nVolume mL;pH;Temp. °C\r\n"
	aRows     = "0,000;3,21;22,4\r\n3,000;4,29;22,4\r\n6,000;4,76;22,5\r\n9,000;5,19;22,5\r\n"
	cHead     = "bench C shift table\nrun,step,dose_uL,delivered_uL,cond_uS_per_cm,temp_C\n"
	cTotal    = ",CAU-0140,caustic,Analyst 3,2031-04-02T15:40:00+02:00,HCl,0.1,10,90,acid-base\n"
)

// bRun is a run of bench-b between its begin row and its end row.
func bRun(n int) string {
	return fmt.Sprintf("> curve\t%d\r\nsample\tBRI-%d\r\nno.\tV/mL\tE/mV\tt/s\r\n", n, n) +
		"1\t0.000\t101.2\t0\r\n2\t5.000\t109.8\t20\r\n3\t10.000\t124.6\t41\r\n4\t13.000\t148.9\t63\r\n5\t14.000\t181.5\t88\r\n"
}

func cRun(name string) string {
	var b strings.Builder
	for i := range 5 {
		fmt.Fprintf(&b, "%s,%d,500,%d,%d.5,22.4\n", name, i, 500*i, 4000-100*i)
	}
	return b.String()
}

type refusal struct {
	name string
	dump string // § marks the place
	at   string // where the whole line is meant and no mark stands
	want string // what follows the place
}

var plainRefusals = []refusal{
	{name: "decimal comma makes a cell too many", dump: plainHead + "0.000,3.21\n0,500,§3.24\n",
		want: "3 cells where the header in line 3 has 2; a decimal comma in a dump with commas between the columns? export it again with a decimal point"},
	{name: "quoted decimal comma, nothing read before", dump: plainHead + "\"§0,000\",\"3,21\"\n",
		want: `volume: "0,000" is not a number, and 1 more place; set decimalChar = "," in the schema`},
	{name: "quoted decimal comma after good numbers", dump: plainHead + plainRows + "2.000,\"§3,72\"\n",
		want: `pH: "3,72" is not a number; other numbers of the run have the decimal mark "."; export the dump again`},
	{name: "word", dump: plainHead + plainRows + "2.000,§----\n",
		want: `pH: "----" is not a number; a plain decimal number is expected; the cell is damaged or the column is another one`},
	{name: "not a number by name", dump: plainHead + plainRows + "2.000,§NaN\n",
		want: `pH: "NaN" is not a number; a plain decimal number is expected; the cell is damaged or the column is another one`},
	{name: "hexadecimal", dump: plainHead + plainRows + "§0x1p-2,3.2\n",
		want: `volume: "0x1p-2" is not a number; a plain decimal number is expected; the cell is damaged or the column is another one`},
	{name: "too large", dump: plainHead + plainRows + "2.000,§1e999\n",
		want: `pH: "1e999" is too large; the cell is damaged; export the dump again`},
	{name: "empty cell", dump: plainHead + plainRows + "§,3.2\n",
		want: `volume: the cell is empty; the dump is damaged or the reading failed; export it again`},
	{name: "cell too few", dump: plainHead + plainRows + "2.000§\n",
		want: `1 cell where the header in line 3 has 2; the line is damaged; export the dump again`},
	{name: "pH impossible", dump: plainHead + plainRows + "2.000,§17.2\n",
		want: `pH: 17.2 is outside -2 to 16; no pH electrode shows that; check column and decimal mark`},
	{name: "volume negative", dump: plainHead + plainRows + "§−0.5,3.2\n",
		want: `volume: -0.5 mL is outside 0 to 1000 mL; no burette delivers that; check column, unit and decimal mark`},
	{name: "volume too large", dump: plainHead + plainRows + "§1000.1,3.2\n",
		want: `volume: 1000.1 mL is outside 0 to 1000 mL; no burette delivers that; check column, unit and decimal mark`},
	{name: "potential impossible", dump: "volume_ml,potential_mV\n0,§-2001\n",
		want: `potential: -2001 mV is outside -2000 to 2000 mV; no electrode in water shows that; check column, unit and decimal mark`},
	{name: "conductivity negative", dump: "volume_ml,conductivity_mS_cm\n0,§-0.1\n",
		want: `conductivity: -0.1 mS/cm is outside 0 to 2000 mS/cm; no solution conducts like that; check column, unit and decimal mark`},
	{name: "quote not closed", dump: plainHead + plainRows + "2.000,§\"3.72\n2.500,3.9\n",
		want: `a quote that is not closed on its line; the line is damaged; export the dump again`},
	{name: "text after quote", dump: plainHead + plainRows + "2.000,\"3.72\"§1\n",
		want: `text after a closing quote; the line is damaged; export the dump again`},
	{name: "two readings", dump: "volume_mL,pH,§mV\n0,3,100\n",
		want: `potential: a second column, "mV", beside the pH of column 2; a run has one volume and one reading; export it again with one of them`},
	{name: "two volumes", dump: "volume_mL,pH,§Volume_ML\n0,3,100\n",
		want: `volume: a second column, "Volume_ML", beside the volume of column 1; a run has one volume and one reading; export it again with one of them`},
	{name: "two exports in one file", dump: plainHead + plainRows + "§volume_mL,pH\n" + plainRows,
		want: `volume: "volume_mL" is the header again, and 1 more place; two exports in one file? export each by itself`},
	{name: "short", dump: plainHead + plainRows, at: "7",
		want: "4 readings, a curve needs at least 5; the curve is too short; titrate or export again"},
	{name: "no rows", dump: plainHead, at: "3",
		want: "0 readings, a curve needs at least 5; the curve is too short; titrate or export again"},
	{name: "cut off in the last row", dump: plainHead + plainRows + "2.000,3.7", at: "7",
		want: "4 readings, a curve needs at least 5; the curve is too short; titrate or export again"},
	{name: "aliquot no number", dump: "# aliquot_ml: §ten\nvolume_mL,pH\n" + plainRows + "2,4\n",
		want: `aliquot_ml: "ten" is not a number; a plain decimal number is expected; the cell is damaged or the column is another one`},
	{name: "aliquot zero", dump: "# aliquot_ml:§0\nvolume_mL,pH\n" + plainRows + "2,4\n",
		want: `aliquot_ml: 0 mL is outside above 0 to 10000 mL; no vessel holds that; check unit and decimal mark`},
	{name: "titrant other mark", dump: "# titrant_mol_per_l: §0,1\nvolume_mL,pH\n" + plainRows + "2,4\n",
		want: `titrant_mol_per_l: "0,1" is not a number; other numbers of the run have the decimal mark "."; export the dump again`},
	{name: "end reading no pH", dump: "# end_reading: §81\nvolume_mL,pH\n" + plainRows + "2,4\n",
		want: `end_reading: 81 is outside -2 to 16; no pH electrode shows that; check column and decimal mark`},
	{name: "indicated no number", dump: "# indicated_endpoint_ml:  §12.6O\nvolume_mL,pH\n" + plainRows + "2,4\n",
		want: `indicated: "12.6O" is not a number; a plain decimal number is expected; the cell is damaged or the column is another one`},
	{name: "indicated kind", dump: "# indicated_endpoint_ml: 12.66\n# indicated_kind: §steep\nvolume_mL,pH\n" + plainRows + "2,4\n",
		want: `indicated kind: "steep" is not known; known are "at-reading", "break", "equivalence", "inflection"`},
	{name: "fact stated twice", dump: "# sample: A\n# Sample: §B\nvolume_mL,pH\n" + plainRows + "2,4\n",
		want: `sample: "B" here, "A" in line 1; a fact may be stated once; export the dump again`},
	{name: "two facts in one line", dump: "# titrant: NaOH§# titrant_mol_per_l: 0.1\nvolume_mL,pH\n" + plainRows + "2,4\n",
		want: `"# titrant_mol_per_l: 0.1" stands in the line of another fact; a line end is lost; export the dump again`},
	{name: "many places, the first is told", dump: plainHead + "0.000,§x\n0.5,y\nz,1\n", want: `pH: "x" is not a number, and 2 more places; a plain decimal number is expected; the cell is damaged or the column is another one`},
}

func TestPlainRefusals(t *testing.T) { refusals(t, plainRefusals, asUTF8, nil, "") }

// The same places with a byte order mark, whose three bytes count in line 1.
func TestByteOrderMarkCountsInLineOne(t *testing.T) {
	refusals(t, []refusal{{name: "line 1", dump: "volume_mL,pH,§mV\n0,3,100\n",
		want: `potential: a second column, "mV", beside the pH of column 2; a run has one volume and one reading; export it again with one of them`}},
		asUTF8, []byte("\xef\xbb\xbf"), "")
}

var benchARefusals = []refusal{
	{name: "decimal point", dump: aHead + "Readings;5\r\n" + aTable + "§0.000;3,21;22,4\r\n",
		want: `volume: "0.000" is not a number; set decimalChar = "." in the schema`},
	{name: "column behind a sign that is two bytes in UTF-8", dump: "Bench A curve record;4\r\nReadings;5\r\n\r\nTemp. °C;Volume mL;pH\r\n°;§x;3\r\n",
		want: `volume: "x" is not a number; a plain decimal number is expected; the cell is damaged or the column is another one`},
	{name: "fewer rows than stated", dump: aHead + "Readings;7\r\n" + aTable + aRows + "9,500;5,5;22,5\r\n", at: "11",
		want: `readings: 5 rows where line 4 states "7"; the dump is cut off or damaged; export it again`},
	{name: "last row cut off", dump: aHead + "Readings;5\r\n" + aTable + aRows + "9,500;5,5;22,", at: "10",
		want: `readings: 4 rows where line 4 states "5"; the dump is cut off or damaged; export it again`},
	{name: "last row without line end", dump: aHead + "Readings;6\r\n" + aTable + aRows + "9,500;5,5;22,5\r\n9,600;5,6;22,5", at: "11",
		want: `readings: 5 rows where line 4 states "6"; the dump is cut off or damaged; export it again`},
	{name: "more rows than stated", dump: aHead + "Readings;4\r\n" + aTable + aRows + "9,500;5,5;22,5\r\n", at: "11",
		want: `readings: 5 rows where line 4 states "4"; the dump is cut off or damaged; export it again`},
	{name: "count is no number", dump: aHead + "Readings;§4o\r\n" + aTable + aRows + "9,500;5,5;22,5\r\n",
		want: `readings: "4o" is not a number; it is the count of rows; the line is damaged: export the dump again`},
	{name: "count lost", dump: aHead + aTable + aRows + "9,500;5,5;22,5\r\n", at: "10",
		want: `readings: the dump does not state how many rows the run has; schema bench-a expects it; the line is lost: export the dump again`},
	{name: "titrant", dump: "Bench A curve record;4\r\nTemp. °C;22,4\r\nBurette mol/L;§0.1000\r\nReadings;5\r\n" + aTable + aRows + "9,500;5,5;22,5\r\n",
		want: `titrant_mol_per_l: "0.1000" is not a number; other numbers of the run have the decimal mark ","; export the dump again`},
	{name: "end reading in another quantity is impossible here", dump: "Bench A curve record;4\r\nStop at pH;§81,0\r\nReadings;5\r\n" + aTable + aRows + "9,500;5,5;22,5\r\n",
		want: `end_reading: 81 is outside -2 to 16; no pH electrode shows that; check column and decimal mark`},
	{name: "column missing", dump: aHead + "Readings;4\r\n\r\n§Volume mL;pHH;Temp. °C\r\n" + aRows,
		want: `reading: no such column in the header (has "Volume mL", "pHH", "Temp. °C"); schema bench-a needs a header with "Volume mL" and "pH"`},
	{name: "header missing", dump: aHead + "Readings;5\r\n\r\n" + aRows, at: "1",
		want: `no header row; schema bench-a needs a header with "Volume mL" and "pH"`},
	{name: "kind of the endpoint", dump: "Bench A curve record;4\r\nEndpoint seen mL;12,66\r\nEndpoint seen at;§steepst place\r\nReadings;5\r\n" + aTable + aRows + "9,500;5,5;22,5\r\n",
		want: `indicated kind: "steepst place" is not known; known are "set reading", "steepest place"`},
	{name: "quote in the preamble", dump: "Bench A curve record;4\r\nSample name;§\"VIN\r\nReadings;5\r\n" + aTable + aRows + "9,500;5,5;22,5\r\n",
		want: `a quote that is not closed on its line; the line is damaged; export the dump again`},
}

func TestBenchARefusals(t *testing.T) {
	refusals(t, benchARefusals, as1252, nil, "")
}

// refusals reads each dump and asserts the whole message of its one problem.
func refusals(t *testing.T, list []refusal, encode func(string) []byte, mark []byte, run string) {
	t.Helper()
	for _, r := range list {
		t.Run(r.name, func(t *testing.T) {
			text, place := marked(t, r.dump, encode)
			if r.at != "" {
				place = r.at
			}
			if mark != nil && strings.HasPrefix(place, "1:") {
				var column int
				fmt.Sscanf(place, "1:%d", &column)
				place = fmt.Sprintf("1:%d", column+len(mark))
			}
			runs, schema, problems := Read(append(append([]byte(nil), mark...), encode(text)...), "x.csv", schemas.Shipped())
			if schema == nil {
				t.Errorf("no schema")
			}
			if len(runs) != 0 || len(problems) != 1 {
				t.Fatalf("%d runs, problems %v", len(runs), problems)
			}
			if want := "x.csv:" + place + ": " + run + r.want; problems[0].Error() != want {
				t.Errorf("\ngot  %s\nwant %s", problems[0], want)
			}
		})
	}
}
