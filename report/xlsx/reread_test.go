package xlsx

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strconv"
	"testing"

	"lastdrop/report"
)

// Every cell of the three tables, read back and compared with the field that
// it shows, for figures of all sizes. A number is right when it is the field
// to 15 significant digits: half a unit of the last is 5e-15 of the value at
// most, and a cut instead of a rounding is twice as far off at places.
func TestEveryCellIsItsField(t *testing.T) {
	n := inventedNight()
	random := rand.New(rand.NewPCG(1, 2))
	for i := 0; i < 60; i++ {
		n.Evaluations = append(n.Evaluations, scattered(random, i))
	}
	w := write(t, n)
	compareEndpoints(t, n, w.table("Endpoints"))
	compareFlags(t, n, w.table("Flags"))
	compareUnread(t, n, w.table("Unread"))
}

// scattered has a different number with 17 digits in every field.
func scattered(random *rand.Rand, i int) report.Evaluation {
	some17 := func() float64 {
		v := (random.Float64() - 0.5) * math.Pow(10, float64(random.IntN(12)-6))
		return v
	}
	e := overshot()
	e.ID, e.Run, e.Line, e.Revision, e.Readings = fmt.Sprintf("%012d", i), i+2, i*40+1, i%3+1, 100+i
	e.Facts.AliquotML, e.Facts.SolventML, e.Facts.TitrantMolPerL, e.Facts.TemperatureC = some(some17()), some(some17()), some(some17()), some(some17())
	p := &e.Endpoints[0]
	p.VolumeML, p.UML, p.Low95ML, p.High95ML, p.Reading, p.BracketML = some17(), math.Abs(some17()), some17(), some17(), some(some17()), [2]float64{some17(), some17()}
	e.Indicated[0].VolumeML = some17()
	p.Differs = &report.Difference{Kind: "inflection", IndicatedML: e.Indicated[0].VolumeML, ML: some17(), Percent: some17(), LimitML: some17()}
	for k := range e.Flags {
		e.Flags[k].Figure, e.Flags[k].Limit = some17(), some17()
	}
	return e
}

func compareEndpoints(t *testing.T, n *report.Night, rows []map[string]string) {
	t.Helper()
	row := 0
	for i := range n.Evaluations {
		e := &n.Evaluations[i]
		pairs := e.Pairs()
		if len(pairs) == 0 {
			pairs = []report.Pair{{}}
		}
		for _, p := range pairs {
			c := comparison{t, rows[row], fmt.Sprintf("Endpoints row %d", row+2)}
			c.run(e)
			c.facts(e)
			c.refit(p.Refit)
			if p.Indicated != nil {
				c.text("indicated kind", p.Indicated.Kind)
				c.number("indicated (mL)", &p.Indicated.VolumeML)
			}
			row++
		}
	}
	if row != len(rows) {
		t.Errorf("Endpoints has %d rows, want %d", len(rows), row)
	}
}

func compareFlags(t *testing.T, n *report.Night, rows []map[string]string) {
	t.Helper()
	row := 0
	for i := range n.Evaluations {
		e := &n.Evaluations[i]
		for _, f := range e.Flags {
			c := comparison{t, rows[row], fmt.Sprintf("Flags row %d", row+2)}
			mark := map[report.Weight]string{report.Note: "○ note", report.Doubtful: "◆ doubtful", report.Disputed: "■ disputed"}[f.Weight]
			c.text("weight", mark)
			c.text("flag", f.Flag)
			c.text("in figures", f.Says)
			c.text("unit", f.Unit)
			c.number("figure", &f.Figure)
			c.number("limit", &f.Limit)
			c.whole("endpoint", f.Endpoint)
			c.whole("run", e.Run)
			c.text("id", e.ID)
			c.text("dump", e.Dump)
			row++
		}
	}
	if row != len(rows) {
		t.Errorf("Flags has %d rows, want %d", len(rows), row)
	}
}

func compareUnread(t *testing.T, n *report.Night, rows []map[string]string) {
	t.Helper()
	if len(rows) != len(n.Unread) {
		t.Fatalf("Unread has %d rows, want %d", len(rows), len(n.Unread))
	}
	for i, u := range n.Unread {
		c := comparison{t, rows[i], fmt.Sprintf("Unread row %d", i+2)}
		c.text("state", "□ "+u.State)
		c.text("dump", u.Dump)
		c.text("field", u.Field)
		c.text("what was found", u.Says)
		c.text("what to do", u.Hint)
		c.text("next command", u.Next)
		c.text("schema", u.Schema)
		c.text("SHA-256 of the dump", u.DumpSHA256)
		c.whole("run", u.Run)
		c.whole("line", u.Line)
		c.whole("column", u.Column)
	}
}

type comparison struct {
	*testing.T
	row  map[string]string
	name string
}

func (c comparison) run(e *report.Evaluation) {
	c.Helper()
	mark := map[report.Verdict]string{report.VerdictSound: "○ sound", report.VerdictDoubtful: "◆ doubtful", report.VerdictDisputed: "■ disputed"}[e.Verdict]
	c.text("verdict", mark)
	c.text("dump", e.Dump)
	c.text("id", e.ID)
	c.text("state", e.State)
	c.text("signal", e.Signal)
	c.whole("run", e.Run)
	c.whole("line", e.Line)
	c.whole("revision", e.Revision)
	c.whole("readings", e.Readings)
}

func (c comparison) facts(e *report.Evaluation) {
	c.Helper()
	c.text("sample", e.Facts.Sample)
	c.text("procedure", e.Facts.Procedure)
	c.text("instrument", e.Facts.Instrument)
	c.text("operator", e.Facts.Operator)
	c.text("started", e.Facts.Started)
	c.text("titrant", e.Facts.Titrant)
	c.number("titrant (mol/L)", e.Facts.TitrantMolPerL)
	c.number("aliquot (mL)", e.Facts.AliquotML)
	c.number("solvent (mL)", e.Facts.SolventML)
	c.number("temperature (°C)", e.Facts.TemperatureC)
}

func (c comparison) refit(p *report.Endpoint) {
	c.Helper()
	if p == nil {
		for _, head := range []string{"refit (mL)", "u, readings only (mL)", "difference, refit − indicated (mL)", "estimator", "bracket low (mL)"} {
			c.text(head, "")
		}
		return
	}
	c.text("refit kind", p.Kind)
	c.text("estimator", p.Estimator)
	c.whole("endpoint", p.N)
	c.number("refit (mL)", &p.VolumeML)
	c.number("u, readings only (mL)", &p.UML)
	c.number("95 % low, readings only (mL)", &p.Low95ML)
	c.number("95 % high, readings only (mL)", &p.High95ML)
	c.number("reading at endpoint", p.Reading)
	c.number("bracket low (mL)", &p.BracketML[0])
	c.number("bracket high (mL)", &p.BracketML[1])
	if d := p.Differs; d != nil {
		c.number("difference, refit − indicated (mL)", &d.ML)
		c.number("difference (% of refit)", &d.Percent)
		c.number("agreement limit (mL)", &d.LimitML)
	}
}

func (c comparison) text(head, want string) {
	c.Helper()
	if got := c.row[head]; got != want {
		c.Errorf("%s, %s: got %q, want %q", c.name, head, got, want)
	}
}

func (c comparison) whole(head string, want int) {
	c.Helper()
	text := strconv.Itoa(want)
	if want == 0 {
		text = ""
	}
	c.text(head, text)
}

func (c comparison) number(head string, want *float64) {
	c.Helper()
	if want == nil {
		c.text(head, "")
		return
	}
	got, err := strconv.ParseFloat(c.row[head], 64)
	if err != nil {
		c.Errorf("%s, %s: %v", c.name, head, err)
		return
	}
	if d := math.Abs(got - *want); d > 5.1e-15*math.Abs(*want) {
		c.Errorf("%s, %s: got %v, want %v, differs by %g of it", c.name, head, got, *want, d / *want)
	}
}
