// Package report holds what is published about runs: the record's types, the
// words and the number forms that every report shares. Its sub-packages lay
// them out (lines, terminal, xlsx, pdf); none of them computes: a printed
// figure is a field that somebody else filled.
//
// Units: volumes in mL, readings in the unit of the run's signal (pH, mV,
// mS/cm), standard uncertainties with k = 1.
package report

import "lastdrop/ingest"

// Record is the version of the field names below.
const Record = 1

// Weight says how much a flag speaks against an endpoint.
type Weight string

// The weights, lightest first.
const (
	Note     Weight = "note"     // worth telling, no doubt
	Doubtful Weight = "doubtful" // look before use
	Disputed Weight = "disputed" // a second person must settle it
)

// Verdict is the heaviest weight of an evaluation's flags; Sound when none
// is doubtful or disputed. Sound means no objection, not an approval.
type Verdict string

// The verdicts, lightest first.
const (
	VerdictSound    Verdict = "sound"
	VerdictDoubtful Verdict = "doubtful"
	VerdictDisputed Verdict = "disputed"
)

// Evaluation is all that one refit says of one run; one object of
// evaluations.jsonl. Absent values are left out.
type Evaluation struct {
	Record       int          `json:"record"`
	ID           string       `json:"id"`
	Revision     int          `json:"revision"`
	State        string       `json:"state"` // new, changed or open
	Open         bool         `json:"open"`  // a dispute that no decision settles
	Lastdrop     string       `json:"lastdrop"`
	Dump         string       `json:"dump"`           // swept folder's last element / path below it
	Also         []string     `json:"also,omitempty"` // other dumps that hold the same run
	DumpSHA256   string       `json:"dump_sha256"`
	Run          int          `json:"run"`  // 1-based in the dump
	Line         int          `json:"line"` // of the dump, where the run begins
	Schema       string       `json:"schema"`
	SchemaSHA256 string       `json:"schema_sha256"`
	Facts        ingest.Facts `json:"facts"`
	Repairs      []string     `json:"repairs,omitempty"`
	Signal       string       `json:"signal"`
	Readings     int          `json:"readings"`
	Indicated    []Indicated  `json:"indicated,omitempty"`
	Endpoints    []Endpoint   `json:"endpoints"`
	Diagnostics  Diagnostics  `json:"diagnostics"`
	Flags        []Flag       `json:"flags"` // heaviest first
	Verdict      Verdict      `json:"verdict"`

	AsRead  []ingest.Reading `json:"-"` // every converted reading, in the order of the dump: what the id is made of; nil once that is done
	Picture *Picture         `json:"-"` // what a page draws; nil when no page will
}

// Indicated is an endpoint that the instrument wrote.
type Indicated struct {
	Kind     string  `json:"kind"`
	VolumeML float64 `json:"volume_ml"`
	StepML   float64 `json:"-"` // display step: decimals to print
	Line     int     `json:"-"` // in the dump
}

// Endpoint is one refitted endpoint with the answer of the chosen estimator
// and the estimates of all that apply.
type Endpoint struct {
	N         int         `json:"n"`
	Kind      string      `json:"kind"` // equivalence, inflection, at-reading or break
	Estimator string      `json:"estimator"`
	VolumeML  float64     `json:"volume_ml"`
	UML       float64     `json:"u_ml"` // from the readings only
	Low95ML   float64     `json:"low95_ml"`
	High95ML  float64     `json:"high95_ml"`
	Reading   *float64    `json:"reading,omitempty"` // in the signal's unit
	BracketML [2]float64  `json:"bracket_ml"`        // the two readings on either side
	Estimates []Estimate  `json:"estimates"`
	Differs   *Difference `json:"differs,omitempty"` // refit - indicated, like kinds only
}

// Difference is refit minus indicated endpoint of like kind.
type Difference struct {
	Kind        string  `json:"kind"`
	IndicatedML float64 `json:"indicated_ml"`
	RefitML     float64 `json:"refit_ml"` // of that kind
	ML          float64 `json:"ml"`
	Percent     float64 `json:"percent"`  // of the refit
	LimitML     float64 `json:"limit_ml"` // agreement limit
}

// Estimate is what one estimator says of one endpoint.
type Estimate struct {
	Estimator string  `json:"estimator"`
	Kind      string  `json:"kind"`
	VolumeML  float64 `json:"volume_ml"`
	UFitML    float64 `json:"u_fit_ml"`
}

// Diagnostics are figures of the fit that no flag needs but a reviewer may.
type Diagnostics struct {
	ReadingNoise         *float64 `json:"reading_noise,omitempty"`          // standard deviation of a reading, in its unit
	RelativeNoisePercent *float64 `json:"relative_noise_percent,omitempty"` // conductivity: the same in % of the reading
	ResidualSD           *float64 `json:"residual_sd,omitempty"`            // of the readings used: in noise sd, 1 = as the noise says; conductivity: in % of the reading
	LeftOut              int      `json:"left_out,omitempty"`               // readings that a flag or repair names and the fit does not use
	V0ML                 *float64 `json:"v0_ml,omitempty"`                  // volume before titration
}

// Flag is one named reason for doubt with its figure and its limit.
type Flag struct {
	Flag     string  `json:"flag"`
	Weight   Weight  `json:"weight"`
	Endpoint int     `json:"endpoint,omitempty"` // n of the endpoint; 0 for the run
	Figure   float64 `json:"figure"`
	Limit    float64 `json:"limit"`
	Unit     string  `json:"unit"`
	Lines    []int   `json:"lines,omitempty"` // of the dump
	Says     string  `json:"says"`            // a sentence with both figures
}

// Unread is a dump, or a run in it, that could not be read; one object of
// unread.jsonl.
type Unread struct {
	Record     int    `json:"record"`
	State      string `json:"state"` // new or earlier
	Dump       string `json:"dump"`
	DumpSHA256 string `json:"dump_sha256,omitempty"`
	Run        int    `json:"run,omitempty"`
	Line       int    `json:"line,omitempty"`
	Column     int    `json:"column,omitempty"`
	Field      string `json:"field,omitempty"`
	Says       string `json:"says"`
	Hint       string `json:"hint,omitempty"`
	Next       string `json:"next,omitempty"` // the exact next command, where one helps
	Schema     string `json:"schema,omitempty"`
}

// Waiting is a dump that is too young or changed while it was read; one
// object of waiting.jsonl.
type Waiting struct {
	Record int    `json:"record"`
	Dump   string `json:"dump"`
	Says   string `json:"says"`
}

// XY is a point of a drawn curve: mL, and the unit of the curve.
type XY struct{ X, Y float64 }

// Dot is one reading as drawn.
type Dot struct {
	VolumeML float64
	Value    float64 // as drawn: dilution-corrected for conductivity
	AsRead   float64 // as the instrument wrote it
	Line     int     // in the dump
	LeftOut  bool    // stray, stuck, going back, or in no arm of a two-line fit
}

// Arm is a straight line fitted to one arm of a conductometric curve.
type Arm struct {
	Name                string  // e.g. "falling arm, 16 readings"
	FromML, ToML        float64 // first and last reading used
	Intercept, Slope    float64 // of the drawn values: y = Intercept + Slope * V
	UIntercept, USlope  float64
	CovInterceptSlope   float64
	ExtendToML          float64 // where the dashed prolongation ends, beyond the crossing
	ExtendFromML        float64
	Readings            int
	ResidualSD          float64
	ConfidenceFactor95T float64 // Student factor for the 95 % band
}

// Picture is what a page needs to draw a run: nothing in it is computed by
// report.
type Picture struct {
	Dots         []Dot
	Curve        []XY // shape-keeping curve through the readings used; empty for conductivity
	Slope        []XY // d reading / d volume, positive; empty for conductivity
	SlopeMax     float64
	Arms         []Arm
	Residuals    []XY    // at each reading used
	ResidualUnit string  // "sd" or "%"
	ResidualBand float64 // +- this is 2 x noise; 0 for none
	YName        string  // "pH", "mV", "mS/cm, corrected for dilution"
	XName        string  // "mL of sodium hydroxide 0.1 mol/L"
	SlopeName    string  // "dpH/dV, highest 7.6 per mL"
}
