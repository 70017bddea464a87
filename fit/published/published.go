// Package published holds titration tables whose answers are known from
// outside this project: from a printed page, or because the readings were
// computed from an exact equation. Tests and the check of an installation
// send each through the whole way, from the bytes of a dump to an endpoint.
//
// It does not read dumps and computes nothing: a table is the bytes that the
// plain schema reads, and what is known about it. Values stand in the dumps
// as printed; volts, grams and µS/cm became mV, mL and mS/cm by shifting the
// decimal point of the text (testdata/make_dumps.py), so no digit changed.
//
// Units: volumes in mL.
//
// Sources: Table.Source of each table; the second-derivative convention of
// zeros is stated in Answer.How.
package published

import "embed"

//go:embed dumps/*.csv
var dumps embed.FS

// Status says how surely a table or an answer is what its source says.
type Status string

// The statuses.
const (
	Read       Status = "READ"        // seen in a copy of the source
	FromMemory Status = "FROM MEMORY" // recalled, no copy at hand
	Computed   Status = "COMPUTED"    // worked out from the table or from its equation
)

// Table is one curve with everything that is known about it from outside.
type Table struct {
	Name    string // short, unique, fit for a file name
	Dump    []byte // as the plain schema reads it; a copy of the caller's own
	Signal  string // "pH", "potential" or "conductivity"
	Source  string // full citation
	Status  Status // of the readings
	Answers []Answer
	// Hard tells why an estimator that is right elsewhere may miss an answer
	// here, or find an endpoint that is none; such a miss must carry a flag.
	// Empty where every answer has to be found.
	Hard string
}

// Answer is one known place on a curve. Several answers may speak of one
// endpoint, each by its own convention and with its own tolerance.
type Answer struct {
	Endpoint        int    // 1-based among the known endpoints of the table, in rising volume
	Kind            string // "inflection", "break" or "equivalence"; only like kinds are compared
	Estimator       string // the only estimator it speaks of; empty for each one of its kind
	VolumeML        float64
	Status          Status
	How             string // where the figure comes from, with its convention
	ToleranceML     float64
	ToleranceReason string
	MayMiss         bool // the place is real but too faint for the usual limits
}

// Tables returns every table in a fixed order: potentiometric, then
// conductometric.
func Tables() []Table {
	return []Table{
		chlorideSilver(), weakAcid(), phosphoric(), seawater(), diluteAcid(),
		conductanceStrong(), conductanceWeak(), conductanceMixture(), conductanceSilver(),
	}
}

// dump returns the bytes of an embedded dump. A name without a file is a
// programmer's mistake.
func dump(name string) []byte {
	data, err := dumps.ReadFile("dumps/" + name + ".csv")
	if err != nil {
		panic(err)
	}
	return data
}
