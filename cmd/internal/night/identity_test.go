package night

import (
	"encoding/hex"
	"math"
	"testing"

	"lastdrop/ingest"
	"lastdrop/report"
)

func TestIdentifyAsSha256sumDoes(t *testing.T) {
	e := report.Evaluation{
		Signal: "pH",
		Facts:  ingest.Facts{Sample: "Essig µ1", Started: "2031-04-02T08:14:00+02:00"},
		AsRead: []ingest.Reading{{VolumeML: 0, Value: 2.873}, {VolumeML: 14.35, Value: 1.0 / 3}},
	}
	id, readings := identify(&e)
	// coreutils 9.1:
	//	printf '2:pH\n9:Essig µ1\n25:2031-04-02T08:14:00+02:00\n0.00000000e+00 2.87300000e+00\n1.43500000e+01 3.33333333e-01\n' | sha256sum | cut -c1-12
	equal(t, "id", id, "65a3d88ddd7e")
	//	printf '2:pH\n0.00000000e+00 2.87300000e+00\n1.43500000e+01 3.33333333e-01\n' | sha256sum
	equal(t, "readings", hex.EncodeToString(readings[:]), "ccf3272f9d4ae5a9244f005955c5a2717e92e777aa162e2e31bae5271f04aa3a")
}

func TestIdentityToTheNinthDigitOnly(t *testing.T) {
	base := func() *report.Evaluation {
		return &report.Evaluation{Signal: "potential", Facts: ingest.Facts{Sample: "a", Started: "b"},
			AsRead: []ingest.Reading{{VolumeML: 1.25, Value: -214.3}, {VolumeML: 2.5, Value: 100}}}
	}
	id, readings := identify(base())
	for _, c := range []struct {
		what         string
		change       func(*report.Evaluation)
		sameID       bool
		sameReadings bool
	}{
		{"tenth digit of a value", func(e *report.Evaluation) { e.AsRead[1].Value = 100.0000004 }, true, true},
		{"ninth digit of a value", func(e *report.Evaluation) { e.AsRead[1].Value = 100.000001 }, false, false},
		{"ninth digit of a volume", func(e *report.Evaluation) { e.AsRead[0].VolumeML = 1.25000001 }, false, false},
		{"line of a reading", func(e *report.Evaluation) { e.AsRead[0].Line = 99 }, true, true},
		{"order", func(e *report.Evaluation) { e.AsRead[0], e.AsRead[1] = e.AsRead[1], e.AsRead[0] }, false, false},
		{"sample", func(e *report.Evaluation) { e.Facts.Sample = "c" }, false, true},
		{"text that moves from sample to start", func(e *report.Evaluation) { e.Facts.Sample, e.Facts.Started = "", "ab" }, false, true},
		{"signal", func(e *report.Evaluation) { e.Signal = "pH" }, false, false},
		{"operator", func(e *report.Evaluation) { e.Facts.Operator = "Analyst 2" }, true, true},
	} {
		e := base()
		c.change(e)
		gotID, gotReadings := identify(e)
		equal(t, c.what+": same id", gotID == id, c.sameID)
		equal(t, c.what+": same readings", gotReadings == readings, c.sameReadings)
	}
}

func TestMinusZeroIsZero(t *testing.T) {
	if !sameNineDigits(0, math.Copysign(0, -1)) {
		t.Error("0 and −0 are told apart")
	}
}
