package fit

// Limits are the limits in force when no procedure states others. Each has
// its reason in the comment; percentages are of the endpoint's volume.
type Limits struct {
	AgreementPercent float64 // can the endpoint be defended within this?
	AgreementFloorU  float64 // and never less than so many burette u

	WideBracketDoubtfulPercent float64 // derivative and at-reading only
	WideBracketDisputedPercent float64

	OvershootTimes   float64 // the dose against the median of its 6 neighbours
	OvershootDecades float64 // rise inside it
	OvershootPercent float64

	Contrast       float64 // slope at an endpoint against the flatter places beside it
	RiseDecades    float64 // between the half-height points of the slope
	SideDecades    float64 // rise from the flatter place, or the end of data, to the endpoint
	PastPercent    float64 // data beyond the endpoint
	HalfWidthMost  float64 // percent; a wider interval is no endpoint
	BreakGain      float64 // gain in BIC per reading that an unexpected break must bring
	BreakGainTotal float64 // gain in BIC that an expected one must bring

	StuckSteps     float64 // display steps that the curve moves while the reading stands
	StuckNoise     float64 // noise sd that it moves
	StrayFalseRate float64 // of clean runs may lose a reading as stray

	MostNoise float64 // decades; what an electrode in order does not exceed

	BuretteUML float64 // burette u, mL; never more than a tenth of the median increment
}

// Defaults are this project's limits, chosen on simulated and published
// curves (measured 2026); where a rule of the trade stands behind one it is
// common practice, no source.
func Defaults() Limits {
	return Limits{
		AgreementPercent: 0.5, AgreementFloorU: 8,
		WideBracketDoubtfulPercent: 3, WideBracketDisputedPercent: 10,
		OvershootTimes: 1.4, OvershootDecades: 0.5, OvershootPercent: 8,
		Contrast: 2, RiseDecades: 0.25, SideDecades: 0.35, PastPercent: 0.5, HalfWidthMost: 3,
		BreakGain: 3, BreakGainTotal: 10,
		StuckSteps: 3, StuckNoise: 5, StrayFalseRate: 0.005,
		MostNoise:  mostNoise,
		BuretteUML: 0.0012,
	}
}

// Agreement returns the agreement limit in mL for an endpoint at v mL with the
// usual burette.
func (l Limits) Agreement(v float64) float64 { return l.agreement(v, l.BuretteUML) }

// agreement is the same for a burette uncertainty of uv mL.
func (l Limits) agreement(v, uv float64) float64 {
	return max(l.AgreementPercent/100*v, l.AgreementFloorU*uv)
}
