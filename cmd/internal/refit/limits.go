package refit

import (
	"lastdrop/fit"
	"lastdrop/report"
)

// Limits lists the limits in force when neither procedure nor schema states
// others, for the pages that print them.
func Limits() []report.Limit {
	l := fit.Defaults()
	own := "this project, measured on simulated and published curves"
	common := "common practice, no source"
	return []report.Limit{
		{Flag: "disagrees", Value: l.AgreementPercent, Unit: "%", Means: "agreement limit, of the endpoint volume", Source: common},
		{Flag: "disagrees", Value: l.AgreementFloorU * l.BuretteUML, Unit: "mL", Means: "agreement limit, never less than this: 8 burette u, and u is at most a tenth of the median increment", Source: own},
		{Flag: "disagrees", Value: 1, Unit: "bracket", Means: "an inflection must also lie outside the bracket of the refit, by one display step (at most the limit)", Source: own},
		{Flag: "disagrees", Value: 3, Unit: "u of the difference", Means: "a break or a fixed reading must also differ by this, if it is more", Source: own},
		{Flag: "overshoot", Value: l.OvershootPercent, Unit: "%", Means: "dose across the endpoint, of the endpoint volume", Source: own},
		{Flag: "overshoot", Value: l.OvershootTimes, Unit: "times", Means: "the same dose against the median of its six neighbours", Source: own},
		{Flag: "overshoot", Value: l.OvershootDecades, Unit: "decades", Means: "rise of the reading inside the dose", Source: own},
		{Flag: "wide-bracket", Value: l.WideBracketDoubtfulPercent, Unit: "%", Means: "bracket of a derivative or at-reading answer, of the endpoint volume: doubtful", Source: own},
		{Flag: "wide-bracket", Value: l.WideBracketDisputedPercent, Unit: "%", Means: "the same: disputed", Source: own},
		{Flag: "wide-interval", Value: l.AgreementPercent, Unit: "%", Means: "95 % half-width of a break, of the endpoint volume: doubtful; twice this: disputed", Source: own},
		{Flag: "wide-interval", Value: l.AgreementPercent, Unit: "%", Means: "95 % half-width of an inflection or a fixed reading: a note", Source: own},
		{Flag: "noisy", Value: l.MostNoise, Unit: "decades", Means: "noise of a reading, where readings run backwards by more than three times that of a difference", Source: common},
		{Flag: "poor-fit", Value: l.AgreementPercent / 3, Unit: "%", Means: "movement of the endpoint when blocks of readings are left out: doubtful; three times this: disputed", Source: own},
		{Flag: "no-endpoint", Value: l.Contrast, Unit: "times", Means: "slope at an endpoint against the flatter places beside it", Source: own},
		{Flag: "no-endpoint", Value: l.SideDecades, Unit: "decades", Means: "rise of the reading on each side of an endpoint", Source: own},
		{Flag: "no-endpoint", Value: l.HalfWidthMost, Unit: "%", Means: "95 % half-width, of the endpoint volume; a wider one is no endpoint", Source: own},
		{Flag: "no-endpoint", Value: l.BreakGainTotal, Unit: "BIC", Means: "gain that an expected conductometric break must bring", Source: own},
		{Flag: "no-endpoint", Value: l.BreakGain, Unit: "BIC per reading", Means: "gain that an unexpected one must bring", Source: own},
		{Flag: "stops-short", Value: l.PastPercent, Unit: "%", Means: "data beyond the endpoint, of its volume", Source: own},
		{Flag: "stuck", Value: l.StuckSteps, Unit: "display steps", Means: "movement of the curve while the reading stands", Source: own},
		{Flag: "stuck", Value: l.StuckNoise, Unit: "noise sd", Means: "the same", Source: own},
		{Flag: "stray-reading", Value: 100 * l.StrayFalseRate, Unit: "% of clean runs", Means: "may lose a reading as stray; the bound grows with the number of readings", Source: own},
	}
}
