package simulate

import (
	"math"
	"strings"
	"testing"
)

func TestRefusals(t *testing.T) {
	for _, c := range []struct {
		spoil func(*Titration)
		want  string
	}{
		{func(t *Titration) { t.V0ML = 0 }, "volume before titration"},
		{func(t *Titration) { t.V0ML = math.NaN() }, "volume before titration"},
		{func(t *Titration) { t.Vessel.Spectators[0].Ion = "Xx+" }, `"Xx+" is not in the table`},
		{func(t *Titration) { t.Vessel.Spectators[0].MolPerL = -1 }, "0 or more is needed"},
		{func(t *Titration) { t.Vessel.Groups = []Group{{MolPerL: 0.1}} }, "0 pK"},
		{func(t *Titration) { t.Vessel.Groups = []Group{{MolPerL: 0.1, PK: []float64{5, 4}}} }, "must ascend"},
		{func(t *Titration) { t.TemperatureC = 101 }, "0 to 100 °C"},
		{func(t *Titration) { t.Signal = Potential }, "needs salts"},
		{func(t *Titration) { t.Signal = "" }, "must be pH, potential or conductivity"},
		{func(t *Titration) { t.Salts = []Salt{{"Cl-", 9.75}} }, "no Ag+"},
		{func(t *Titration) { t.Ends = []End{{Levels: []int{1}}} }, "1 levels for 0 groups"},
		{func(t *Titration) { t.Titrant.Spectators[0].Ion = "Cl-" }, "never reaches"},
		{func(t *Titration) { t.Dosing.StopML = 0 }, "stops at 0 mL"},
		{func(t *Titration) { t.Dosing.FixedML = 0 }, "state them, or a fixed dose"},
		{func(t *Titration) { t.Dosing.FixedML = 1e-5 }, "too small"},
		{func(t *Titration) { t.Electrode.Slope = 0 }, "slope is 0"},
		{func(t *Titration) { t.Electrode.Lag = 1 }, "0 to below 1"},
		{func(t *Titration) { t.Electrode.NoiseSD = -1 }, "may be negative"},
	} {
		run := strongStrong()
		c.spoil(&run)
		if _, _, err := run.Run(1); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("error %v, want one with %q", err, c.want)
		}
	}
}

func TestRefusedSalts(t *testing.T) {
	run := silverChloride()
	run.Salts = []Salt{{"Br-", 12.3}}
	if _, _, err := run.Run(1); err == nil || !strings.Contains(err.Error(), `no "Br-"`) {
		t.Errorf("a salt without its anion: error %v", err)
	}
	run.Vessel.Spectators = append(run.Vessel.Spectators, Spectator{"Br-", 0.01})
	run.Salts = []Salt{{"Cl-", 9.75}, {"Br-", 12.3}}
	if _, _, err := run.Run(1); err == nil || !strings.Contains(err.Error(), "least soluble first") {
		t.Errorf("salts in the wrong order: error %v", err)
	}
}

// A blank has no end, and no truth is made up for it.
func TestBlankHasNoTruth(t *testing.T) {
	run := strongStrong()
	run.Vessel, run.Ends = Solution{}, nil
	c, truth := curve(t, run, 1)
	if len(truth.EndpointsML) != 0 || len(truth.InflectionsML) != 0 || len(c.Readings) != 31 {
		t.Errorf("endpoints %v, inflections %v, %d readings", truth.EndpointsML, truth.InflectionsML, len(c.Readings))
	}
	near(t, "pH of water", c.Readings[0], 13.995/2, 1e-9)
}
