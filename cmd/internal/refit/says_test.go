package refit

import (
	"math"
	"testing"

	"lastdrop/fit"
	"lastdrop/ingest"
	"lastdrop/report"
)

// run is a titration with readings at whole millilitres, line 10 first.
func run(signal ingest.Signal, step float64, values ...float64) *ingest.Run {
	r := &ingest.Run{Number: 1, Line: 3, Signal: signal, ReadingStep: step}
	for i, v := range values {
		r.Readings = append(r.Readings, ingest.Reading{VolumeML: float64(i), Value: v, Line: 10 + i})
	}
	return r
}

func TestSentences(t *testing.T) {
	r := run(ingest.PH, 0.01, 3, 3.5, 4, 9, 10, 10.5)
	mv := run(ingest.Potential, 0.1, 100, 101, 140, 103)
	cond := run(ingest.Conductivity, 0.001, 4, 3, 2, 1, 2, 3)
	one := &fit.Result{Endpoints: []fit.Endpoint{{Estimate: fit.Estimate{V: 2.5, U: 0.02}}}}
	bent := &fit.Result{Endpoints: []fit.Endpoint{{Estimate: fit.Estimate{V: 2.5, U: 0.02, Moves: 0.019}}}}
	none := &fit.Result{}
	atReading := 8.1
	for _, c := range []struct {
		run    *ingest.Run
		result *fit.Result
		end    *float64
		flag   fit.Flag
		want   string
	}{
		{r, one, nil, fit.Flag{Name: "overshoot", At: []int{2, 3}, Limit: 8, About: fit.Overshoot{Dose: 0.724, Percent: 9.12, Times: 1.93, Rise: 4.13}},
			"The dose after line 12 was 0.724 mL, 9.1 % of the endpoint volume (limit 8 %) and 1.9 times its neighbours (limit 1.4); the pH changed by 4.13 inside it."},
		{r, one, nil, fit.Flag{Name: "disagrees", Figure: 0.26, Limit: 0.0626, About: fit.Compared{Indicated: fit.Indicated{Kind: fit.Inflection, V: 2.76, StepV: 0.01}, Refit: fit.Estimate{V: 2.5, U: 0.02, Bracket: [2]int{2, 3}}, Limit: 0.0626}},
			"Refit 2.500 mL, indicated 2.76 mL (inflection): refit − indicated −0.260 mL, 0.063 mL allowed. The indicated one lies outside the bracket of the steepest place, 2.000 to 3.000 mL."},
		{r, one, nil, fit.Flag{Name: "wide-bracket", Figure: 5.83, Limit: 3, About: fit.Bracket{Width: 0.146, Leap: true}},
			"The bracket is 0.146 mL, 5.8 % of the endpoint volume (limit 3 %). No reading tells where in it the endpoint lies."},
		{r, one, nil, fit.Flag{Name: "wide-bracket", Figure: 3.2, Limit: 3, About: fit.Bracket{Width: 0.08}},
			"The bracket is 0.080 mL, 3.2 % of the endpoint volume (limit 3 %)."},
		{r, one, nil, fit.Flag{Name: "wide-interval", Endpoint: 1, Figure: 0.02, Limit: 0.0125, About: fit.Bracket{Width: 0.04, Half: 0.02}},
			"The 95 % interval reaches 0.020 mL from the endpoint, more than the agreement limit of 0.013 mL; the bracket is 0.040 mL."},
		{r, one, nil, fit.Flag{Name: "disagrees", Figure: 12.49, Limit: 0.125, About: fit.Compared{Indicated: fit.Indicated{Kind: fit.Inflection, V: 12.5, StepV: 0.1}, Refit: fit.Estimate{V: 24.99, U: 0.02}, Lone: true}},
			"The instrument indicated 12.5 mL too (inflection); the refit finds no endpoint of its own there. The nearest is 12.490 mL away, 0.125 mL allowed."},
		{r, one, nil, fit.Flag{Name: "not-compared", About: fit.Indicated{Kind: "equivalence", V: 2.7, StepV: 0.01}},
			"The instrument indicated 2.70 mL as an equivalence; the refit has no endpoint of that kind, so nothing was compared."},
		{r, one, &atReading, fit.Flag{Name: "passes-again", About: []float64{31.02, 33.5}},
			"The readings pass pH 8.10 3 times (once allowed): also at 31.02, 33.50 mL."},
		{r, one, nil, fit.Flag{Name: "noisy", Figure: 0.0812, Limit: 0.03},
			"The readings scatter by 0.081 pH (standard deviation; limit 0.03 pH) and run backwards."},
		{r, one, nil, fit.Flag{Name: "poor-fit", Figure: 0.0087, Limit: 0.0042},
			"The endpoint moves by 0.0087 mL when blocks of readings are left out (limit 0.0042 mL)."},
		{r, none, nil, fit.Flag{Name: "no-endpoint", About: fit.Indicated{V: 2.7, StepV: 0.01}},
			"No place of the curve is steep enough: an endpoint needs 2 times the slope of the flatter places beside it and a rise of 0.35 pH on either side. The instrument indicated 2.70 mL."},
		{r, &fit.Result{Estimator: fit.AtReadingName}, &atReading, fit.Flag{Name: "no-endpoint"},
			"The readings never pass pH 8.10; they run from 3.00 to 10.50."},
		{cond, none, nil, fit.Flag{Name: "no-endpoint"},
			"No break found: no two straight arms of at least 4 readings meet with an angle that stands out and a 95 % half-width below 3 %."},
		{r, none, nil, fit.Flag{Name: "no-endpoint", Figure: 8.98, Limit: 3, About: fit.Estimate{V: 2.5}},
			"Something stands out near 2.50 mL, but its place is known to ± 9 % only (limit 3 %): no endpoint can be named there."},
		{r, one, nil, fit.Flag{Name: "overshoot", At: []int{1, 2}, Limit: 8, About: fit.Overshoot{Dose: 0.724, Percent: 9.12, Times: 1.93, Rise: 4.13, Beside: true}},
			"The dose after line 11, beside the bracket of the endpoint, was 0.724 mL, 9.1 % of the endpoint volume (limit 8 %) and 1.9 times its neighbours (limit 1.4); the pH changed by 4.13 inside it."},
		{r, none, nil, fit.Flag{Name: "stops-short", Figure: 5, At: []int{5}},
			"The readings that can be used end at 5.000 mL, line 15, while the curve was still getting steeper; an endpoint needs some at least 0.5 % beyond it."},
		{cond, bent, nil, fit.Flag{Name: "wide-interval", Endpoint: 1, Figure: 0.04, Limit: 0.0125},
			"The 95 % interval reaches 0.040 mL from the break (limit 0.013 mL), mainly from arms that bend: the break moves when blocks of readings are left out."},
		{cond, one, nil, fit.Flag{Name: "wide-interval", Endpoint: 1, Figure: 0.04, Limit: 0.02},
			"The 95 % interval reaches 0.040 mL from the break (limit 0.020 mL), mainly from scatter of the readings about the arms."},
		{mv, one, nil, fit.Flag{Name: fit.LeftStray, Figure: 38, Limit: 3.24, At: []int{2}, About: fit.Moved{First: fit.LeftOut{At: 2}, Count: 1, By: 0}},
			"Line 12 stands 38.0 mV off the curve of its neighbours (limit 3.2 mV) and was left out. The endpoint is the same with it in."},
		{mv, one, nil, fit.Flag{Name: fit.LeftStray, Figure: 38, Limit: 3.24, At: []int{2, 3}, About: fit.Moved{First: fit.LeftOut{At: 2}, Count: 2, By: 0.031}},
			"Line 12 stands 38.0 mV off the curve of its neighbours (limit 3.2 mV), and 1 more; both were left out. With them in, the endpoint moves by 0.031 mL."},
		{mv, one, nil, fit.Flag{Name: fit.LeftStray, Figure: 38, Limit: 3.24, At: []int{2}, About: fit.Moved{First: fit.LeftOut{At: 2}, Count: 1, By: math.NaN()}},
			"Line 12 stands 38.0 mV off the curve of its neighbours (limit 3.2 mV) and was left out. With it in, no endpoint is found."},
		{r, one, nil, fit.Flag{Name: fit.LeftStuck, Figure: 0.233, Limit: 0.0376, At: []int{1, 2, 3}, About: fit.Moved{First: fit.LeftOut{At: 1}, Count: 3}},
			"The pH stood at 3.50 up to line 13 while the curve moved by 0.23 (limit 0.04); 3 readings were left out. The endpoint is the same with them in."},
		{r, one, nil, fit.Flag{Name: fit.LeftReversal, Figure: 0.115, At: []int{3}, About: fit.Moved{First: fit.LeftOut{At: 3}, Count: 1}},
			"The volume in line 13, 3.000 mL, is out of order by 0.115 mL; 1 reading was left out."},
	} {
		s := sentences{run: c.run, curve: curveOf(c.run), result: c.result}
		s.curve.EndReading = c.end
		if got := s.says(c.flag); got != c.want {
			t.Errorf("%s:\n got %s\nwant %s", c.flag.Name, got, c.want)
		}
	}
}

// Every flag that fit can set has a sentence, words for people and a limit or
// a reason why it has none.
func TestEveryFlagHasWords(t *testing.T) {
	for _, name := range []string{"disagrees", "overshoot", "wide-bracket", "wide-interval", "poor-fit", "no-endpoint", "stops-short", "passes-again", "noisy", "not-compared", "dilution-unknown", fit.LeftStray, fit.LeftStuck, fit.LeftReversal} {
		if w, ok := report.Words(name); !ok || w.Headline == "" || w.Do == "" {
			t.Errorf("flag %q has no words", name)
		}
	}
}
