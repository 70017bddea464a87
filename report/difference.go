package report

import "math"

// UDecimals returns how many decimals show two figures of a standard
// uncertainty u (mL), between 1 and 5; 3 without a usable u.
//
// Source: JCGM 100:2008, 7.2.6 (from memory).
func UDecimals(u float64) int {
	if !(u > 0) || math.IsInf(u, 1) {
		return 3
	}
	return min(max(int(math.Ceil(-math.Log10(u)))+1, 1), 5)
}

// U is the one printed form of an endpoint's standard uncertainty, in mL
// without unit.
func (e *Endpoint) U() string { return Fixed(e.UML, UDecimals(e.UML)) }

// differenceMost is how many decimals of a difference are shown at most:
// instruments print an endpoint to 0.001 mL at best.
const differenceMost = 3

// DifferenceDecimals returns how many decimals of refit minus indicated are
// shown: those that u or the agreement limit supports, whichever are more.
func (e *Endpoint) DifferenceDecimals() int {
	decimals := VolumeDecimals(e.UML)
	if e.Differs != nil {
		decimals = max(decimals, VolumeDecimals(e.Differs.LimitML))
	}
	return min(decimals, differenceMost)
}

// Difference is the one printed form of refit minus indicated, in mL, without
// unit; a dash where like kinds are missing.
func (e *Endpoint) Difference() string {
	if e.Differs == nil {
		return Dash
	}
	return Signed(e.Differs.ML, e.DifferenceDecimals())
}

// DifferenceLimit is the one printed form of the agreement limit, in mL.
func (e *Endpoint) DifferenceLimit() string {
	if e.Differs == nil {
		return Dash
	}
	return Fixed(e.Differs.LimitML, UDecimals(e.Differs.LimitML))
}

// DifferencePercent is the one printed form of the difference in % of the
// refit, without unit.
func (e *Endpoint) DifferencePercent() string {
	if e.Differs == nil {
		return Dash
	}
	return Signed(e.Differs.Percent, 2)
}
