package fit_test

import (
	"fmt"
	"math"
	"testing"

	"lastdrop/fit"
)

// What is no curve is refused by Check and by every estimator, with a reason.
func TestWhatIsNoCurveIsRefused(t *testing.T) {
	for what, spoil := range map[string]func(*fit.Curve){
		"NaN reading":       func(c *fit.Curve) { c.Y[3] = math.NaN() },
		"infinite reading":  func(c *fit.Curve) { c.Y[len(c.Y)-1] = math.Inf(1) },
		"NaN volume":        func(c *fit.Curve) { c.V[0] = math.NaN() },
		"infinite volume":   func(c *fit.Curve) { c.V[5] = math.Inf(-1) },
		"4 readings":        func(c *fit.Curve) { c.V, c.Y = c.V[:4], c.Y[:4] },
		"no readings":       func(c *fit.Curve) { c.V, c.Y = nil, nil },
		"a reading missing": func(c *fit.Curve) { c.Y = c.Y[1:] },
		"a volume missing":  func(c *fit.Curve) { c.V = c.V[1:] },
	} {
		for _, make := range []way{{"strong", ways()[0].dose}, {"conductivity", evenWays()[0].dose}} {
			s := strong(1)
			if make.name == "conductivity" {
				s = strongConductivity(1)
			}
			c, _ := run(t, make.dose(s), 1)
			end := 7.0
			c.EndReading = &end
			spoil(c)
			if err := c.Check(); err == nil || err.Error() == "" {
				t.Errorf("%s, %s: Check found nothing", make.name, what)
			}
			for _, estimator := range append(fit.Estimators(), "") {
				if r, err := fit.Evaluate(c, estimator, fit.Defaults()); err == nil || r != nil {
					t.Errorf("%s, %s: %q returned %v and error %v", make.name, what, estimator, r, err)
				}
			}
		}
	}
}

// The value in the message lets the reader find the place.
func TestRefusalNamesThePlace(t *testing.T) {
	c, _ := run(t, dynamic(strong(1), 0.04), 1)
	c.Y[17] = math.NaN()
	err := c.Check()
	if err == nil {
		t.Fatal("NaN passes")
	}
	var place int
	for i := 0; i+1 < len(err.Error()); i++ {
		if n, _ := fmt.Sscanf(err.Error()[i:], "%d", &place); n == 1 && (place == 17 || place == 18) {
			return
		}
	}
	t.Errorf("%q does not name reading 17 (or 18, from 1)", err)
}

// An estimator that does not apply to the signal is an error, as is one that
// does not exist and a signal that is none; "" takes what the signal asks for.
func TestEstimatorsApplyToTheirSignals(t *testing.T) {
	end := 7.0
	ph, _ := run(t, dynamic(strong(1), 0.04), 1)
	mv, _ := run(t, dynamic(silver(1), 0.04), 1)
	cond, _ := run(t, fixed(strongConductivity(1), 0.2), 1)
	toEnd := copied(ph)
	toEnd.EndReading = &end
	none := copied(ph)
	none.Signal = 0
	for _, x := range []struct {
		what, estimator, want string // want "": refused
		c                     *fit.Curve
	}{
		{"pH", "", fit.Derivative, ph}, {"mV", "", fit.Derivative, mv}, {"conductivity", "", fit.TwoLine, cond}, {"pH with end reading", "", fit.AtReadingName, toEnd},
		{"pH", fit.Derivative, fit.Derivative, ph}, {"pH with end reading", fit.Derivative, fit.Derivative, toEnd}, {"conductivity", fit.TwoLine, fit.TwoLine, cond},
		{"pH with end reading", fit.AtReadingName, fit.AtReadingName, toEnd},
		{"pH", fit.TwoLine, "", ph}, {"mV", fit.TwoLine, "", mv}, {"conductivity", fit.Derivative, "", cond},
		{"conductivity", fit.AtReadingName, "", cond}, {"pH without end reading", fit.AtReadingName, "", ph},
		{"pH", "parabola", "", ph}, {"no signal", "", "", none},
	} {
		r, err := fit.Evaluate(x.c, x.estimator, fit.Defaults())
		switch {
		case x.want == "" && (err == nil || err.Error() == ""):
			t.Errorf("%s by %q: no error, endpoints%s", x.what, x.estimator, places(r))
		case x.want != "" && err != nil:
			t.Errorf("%s by %q: %v", x.what, x.estimator, err)
		case x.want != "" && r.Estimator != x.want:
			t.Errorf("%s by %q: answers of %q, want %q", x.what, x.estimator, r.Estimator, x.want)
		}
	}
}

// The names are the three that the package documents.
func TestEstimatorNames(t *testing.T) {
	got := fmt.Sprint(fit.Estimators())
	if got != "[derivative at-reading two-line]" {
		t.Errorf("estimators %s", got)
	}
}

// The limit of numerics §4: the larger of 0.5 % of Veq and 0.010 mL. By hand:
// 0.5 % of 10 mL is 0.05 mL; of 1 mL it is 0.005, so the floor counts.
func TestAgreementLimit(t *testing.T) {
	near(t, "at 10 mL", fit.Defaults().Agreement(10), 0.05, 1e-12)
	near(t, "at 1 mL", fit.Defaults().Agreement(1), 0.010, 0.0005) // about 0.010: eight times 1.2 uL is 0.0096
}

// A decade by hand: 0.19842 x 298.15 = 59.159 mV at 25 °C, 0.19842 x 313.15 =
// 62.135 mV at 40 °C, half of it with two electrons; 1 for pH.
func TestDecade(t *testing.T) {
	for _, x := range []struct {
		c    fit.Curve
		want float64
	}{
		{fit.Curve{Signal: fit.PH, TemperatureC: 40}, 1}, {fit.Curve{Signal: fit.Potential}, 59.159}, {fit.Curve{Signal: fit.Potential, TemperatureC: 25}, 59.159},
		{fit.Curve{Signal: fit.Potential, TemperatureC: 40}, 62.135}, {fit.Curve{Signal: fit.Potential, TemperatureC: 40, Electrons: 2}, 31.068},
	} {
		near(t, fmt.Sprintf("decade of signal %d at %g °C, %d electrons", x.c.Signal, x.c.TemperatureC, x.c.Electrons), x.c.Decade(), x.want, 0.001)
	}
}
