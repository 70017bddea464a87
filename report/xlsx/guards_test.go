package xlsx

import (
	"bytes"
	"math"
	"sort"
	"strings"
	"testing"
	"unicode/utf16"

	"github.com/xuri/excelize/v2"

	"lastdrop/report"
)

func TestSameNightSameBytes(t *testing.T) {
	first := write(t, inventedNight())
	for i := 0; i < 8; i++ {
		if again := write(t, inventedNight()); !bytes.Equal(first.bytes, again.bytes) {
			t.Fatalf("writing %d gave other bytes", i+2)
		}
	}
	names, content := first.parts()
	if names[0] != "[Content_Types].xml" || !sort.StringsAreSorted(names[1:]) {
		t.Errorf("parts are not in order: %q", names)
	}
	// The date of the night as W3CDTF; the library's own would be 2006-09-16.
	if core := content["docProps/core.xml"]; !strings.Contains(core, ">2031-04-03T00:00:00Z<") || strings.Contains(core, "xuri") || strings.Contains(core, "2006-09") {
		t.Errorf("properties: %s", core)
	}
}

func TestNoNumberIsRefusedByItsCell(t *testing.T) {
	for _, c := range []struct {
		name, want string
		spoil      func(*report.Night)
	}{
		{"volume", "sheet Endpoints: F2: refit (mL): NaN is no number; the figure must be left out or mended before it is published",
			func(n *report.Night) { n.Evaluations[0].Endpoints[0].VolumeML = math.NaN() }},
		{"fact", "sheet Endpoints: AC3: aliquot (mL): +Inf is no number; the figure must be left out or mended before it is published",
			func(n *report.Night) { n.Evaluations[1].Facts.AliquotML = some(math.Inf(1)) }},
		{"flag", "sheet Flags: H4: figure: -Inf is no number; the figure must be left out or mended before it is published",
			func(n *report.Night) { n.Evaluations[0].Flags[2].Figure = math.Inf(-1) }},
		{"limit", "sheet Provenance: B22: NaN is no number; the figure must be left out or mended before it is published",
			func(n *report.Night) { n.Limits[0].Value = math.NaN() }},
	} {
		n := inventedNight()
		if c.name == "volume" {
			n.Evaluations = n.Evaluations[:1]
			n.Evaluations[0].Verdict = report.VerdictSound // the front sheet shows it else
		}
		c.spoil(n)
		var b bytes.Buffer
		err := Write(&b, n, Options{})
		if err == nil || err.Error() != c.want {
			t.Errorf("%s:\n got %v\nwant %s", c.name, err, c.want)
		}
		if b.Len() > 0 {
			t.Errorf("%s: %d bytes were written", c.name, b.Len())
		}
	}
}

func TestDateMustBeADay(t *testing.T) {
	n := inventedNight()
	n.Date = "3.4.2031"
	err := Write(&bytes.Buffer{}, n, Options{})
	if want := `date of the night: "3.4.2031" is no day; write it as 2031-04-03`; err == nil || err.Error() != want {
		t.Errorf("got %v, want %s", err, want)
	}
}

// Text of a dump stays text: inline, marked to be kept so, without formula,
// without what acts on a terminal, and not taken for a coded character.
func TestTextOfADumpStaysText(t *testing.T) {
	w := write(t, inventedNight())
	hostileRow := "8" // 2 overshot, 3 and 4 silent, 5 and 6 twofold, 7 conducted
	for _, c := range []struct{ column, want string }{
		{"B", `=HYPERLINK("x";"y")`}, {"C", "+1-2"}, {"S", "@SUM(A1)"}, {"R", "-1"}, {"T", " 0417 "},
		{"AA", "_x0041_ & <b>\"NaOH\"</b>"}, {"AF", "\uFFFDacid\uFFFDbase\uFFFD\uFFFD"},
	} {
		cell := c.column + hostileRow
		if got := w.cell("Endpoints", cell); got != c.want {
			t.Errorf("%s: got %q, want %q", cell, got, c.want)
		}
		kind, err := w.file.GetCellType("Endpoints", cell)
		if err != nil || kind != excelize.CellTypeInlineString {
			t.Errorf("%s: got type %v, %v; want inline text", cell, kind, err)
		}
		id, err := w.file.GetCellStyle("Endpoints", cell)
		if err != nil {
			t.Fatal(err)
		}
		if q := w.file.Styles.CellXfs.Xf[id].QuotePrefix; q == nil || !*q {
			t.Errorf("%s: its style does not keep it text", cell)
		}
	}
	_, content := w.parts()
	for name, part := range content {
		if strings.Contains(part, "<f>") || strings.Contains(part, "<f ") {
			t.Errorf("%s holds a formula", name)
		}
	}
}

func TestLongTextIsCutVisibly(t *testing.T) {
	for _, text := range []string{strings.Repeat("ab ", 20000), strings.Repeat("😀", 20000), "x" + strings.Repeat("😀", 20000)} {
		got := cut(text)
		units := utf16.Encode([]rune(got))
		if len(units) > 32767 || len(units) < 32760 {
			t.Errorf("%q…: %d units, want 32767 or a little less", text[:5], len(units))
		}
		if !strings.HasSuffix(got, "(cut here: a cell holds no more; the whole text is in the dump)") || strings.ContainsRune(got, '\uFFFD') {
			t.Errorf("%q… ends %q", text[:5], got[len(got)-80:])
		}
	}
	fits := strings.Repeat("äö", 16383) + "x" // 32767 units, 65533 bytes
	if got := cut(fits); got != fits {
		t.Error("a text that fits was cut")
	}
}

// 15 digits by hand: 2/3 = 0.666 666 666 666 666 6666…, which a cut would end
// in 6; 0.1+0.2 = 0.300000000000000044…
func TestRound15(t *testing.T) {
	for _, c := range []struct{ give, want float64 }{
		{2.0 / 3, 0.666666666666667}, {0.1 + 0.2, 0.3}, {-2.0 / 3e7, -0.0000000666666666666667}, {math.MaxFloat64, math.MaxFloat64}, {math.Copysign(0, -1), 0}, {123456789012345678, 123456789012346000},
	} {
		if got := round15(c.give); got != c.want || math.Signbit(got) != math.Signbit(c.want) {
			t.Errorf("%v: got %v, want %v", c.give, got, c.want)
		}
	}
}
