package fit

// Estimate is what one estimator says of one endpoint.
type Estimate struct {
	Estimator  string  // "derivative", "at-reading" or "two-line"
	Kind       string  // Inflection, AtReading or Break
	V          float64 // mL
	U          float64 // standard uncertainty, mL
	Low, High  float64 // 95 % interval, mL
	Reading    float64 // at V, in the curve's unit; conductivity as measured, not corrected
	Bracket    [2]int  // indices in the Curve of the readings on either side
	ByReadings bool    // single readings decide, not a curve through many
	Leap       bool    // the bracket holds most of the rise: the interval follows from it alone
	Rise       float64 // of the reading inside the bracket, decades; 0 for a break
	Moves      float64 // jackknife: standard deviation when blocks of readings are left out, mL
	Contrast   float64 // slope against the flatter places beside it; 0 for a break
}

// Endpoint is the answer of the chosen estimator with the estimates of all
// that apply, the answer's among them.
type Endpoint struct {
	Estimate
	Estimates []Estimate
}

// student95 is the normal quantile behind "half-width = 1.96 u".
const student95 = 1.959963984540054

// uniform95 is the half-width of the 95 % interval of a value that lies
// anywhere in a bracket with equal chance, as a share of the bracket.
const uniform95 = 0.475

// bracketOf returns i with v_i <= x < v_i+1, taken to the outer increments.
func (k *cleaned) bracketOf(x float64) int {
	i := 0
	for i+2 < len(k.v) && k.v[i+1] <= x {
		i++
	}
	return i
}
