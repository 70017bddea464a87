package ingest

// Signal is the quantity that a run's readings have.
type Signal string

// The signals, each with the one unit that readings have after ingest.
const (
	PH           Signal = "pH"           // pH
	Potential    Signal = "potential"    // mV
	Conductivity Signal = "conductivity" // mS/cm
)

// Unit returns the unit of a reading of this signal, as printed.
func (s Signal) Unit() string {
	switch s {
	case Potential:
		return "mV"
	case Conductivity:
		return "mS/cm"
	}
	return "pH"
}

// Reading is one measured value, converted to the project's units.
type Reading struct {
	VolumeML float64 // titrant delivered since the start of the run, mL
	Value    float64 // pH, mV or mS/cm, by the run's signal
	Line     int     // in the dump, 1-based
}

// Indicated is an endpoint that the instrument itself wrote into the dump.
type Indicated struct {
	Kind     string  // "inflection", "at-reading", "break" or "equivalence"
	VolumeML float64 // mL
	StepML   float64 // smallest step of the volume as the instrument printed it, mL
	Line     int     // in the dump, 1-based
}

// Fact is a fact that has no field of its own; Key is as the dump writes it.
type Fact struct{ Key, Value string }

// Result is a result that the instrument itself worked out and wrote into the
// dump. It is kept as stated; nothing is converted.
type Result struct {
	Key   string // as the dump writes it
	Value float64
	Text  string // as the dump writes it
	Unit  string // UCUM code, as the schema states it
	Line  int    // in the dump, 1-based
}

// Remark is a text that the dump has about one row.
type Remark struct {
	Line int
	Text string
}

// Facts are what a dump says about a run besides readings. Absent text is "",
// an absent number is nil. JSON names are those of the record.
type Facts struct {
	Sample         string   `json:"sample,omitempty"`
	Procedure      string   `json:"procedure,omitempty"`
	Instrument     string   `json:"instrument,omitempty"`
	Operator       string   `json:"operator,omitempty"`
	Purpose        string   `json:"purpose,omitempty"` // sample (also when absent), blank, standard, control, check, rinse
	Started        string   `json:"started,omitempty"` // RFC 3339; without offset where the dump states no zone
	Titrant        string   `json:"titrant,omitempty"`
	TitrantMolPerL *float64 `json:"titrant_mol_per_l,omitempty"`
	AliquotML      *float64 `json:"aliquot_ml,omitempty"`
	SolventML      *float64 `json:"solvent_ml,omitempty"`
	Reaction       string   `json:"reaction,omitempty"` // acid-base, precipitation, redox or non-aqueous
	TemperatureC   *float64 `json:"temperature_c,omitempty"`
	EndReading     *float64 `json:"end_reading,omitempty"` // pH or mV of a titration to a fixed reading
	Other          []Fact   `json:"-"`                     // in the order of the dump
}

// Run is one titration: one curve with its facts, in the order of the dump.
// Readings keep the order of time; volumes may repeat or go back, fit decides
// what that means.
type Run struct {
	Number        int // 1-based in the dump
	Line          int // of the dump, where the run begins
	Signal        Signal
	Facts         Facts
	Readings      []Reading
	ReadingStep   float64   // smallest step of the readings as displayed, in their unit; 0 unknown
	VolumeStepML  float64   // smallest step of the volumes as displayed, mL; 0 unknown
	TimesS        []float64 // seconds since the start, one a reading; nil when the dump has none
	TemperaturesC []float64 // °C, one a reading; nil when the dump has none
	DriftsPerMin  []float64 // unit of the readings a minute, one a reading; nil when the dump has none
	Indicated     []Indicated
	Results       []Result
	Remarks       []Remark // in the order of the dump
	Repairs       []string // each change made to read the run and each doubt about its numbers, with the line
}

// Curve returns volumes (mL) and readings (in the signal's unit) as two new
// slices, in the order of time.
func (r *Run) Curve() (volumesML, values []float64) {
	volumesML, values = make([]float64, len(r.Readings)), make([]float64, len(r.Readings))
	for i, p := range r.Readings {
		volumesML[i], values[i] = p.VolumeML, p.Value
	}
	return volumesML, values
}
