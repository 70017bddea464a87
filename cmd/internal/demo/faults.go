package demo

import "lastdrop/report"

// Fault names what was planted in a run or a dump.
type Fault string

// The faults. Clean is none.
const (
	Clean          Fault = "clean"
	Overshoot      Fault = "overshoot"
	LargeOvershoot Fault = "large overshoot"
	StopsShort     Fault = "stops short"
	NoSample       Fault = "no sample"
	Sparse         Fault = "sparse"
	Lagging        Fault = "lagging electrode"
	StrayReading   Fault = "stray reading"
	StuckReading   Fault = "stuck reading"
	VolumeReversal Fault = "volume goes back"
	WrongIndicated Fault = "wrong indicated endpoint"
	ExportedTwice  Fault = "exported twice"
	ExportedAgain  Fault = "exported again with a change"
	SameReadings   Fault = "same readings for two samples"
	Truncated      Fault = "truncated dump"
	CutOff         Fault = "last run cut off"
	SwappedMark    Fault = "one decimal mark swapped"
	SwappedMarks   Fault = "all decimal marks swapped"
	UnknownDialect Fault = "unknown dialect"
	NotADump       Fault = "not a dump"
)

// Expect is what a sweep should make of a run or a dump.
type Expect string

// What is expected.
const (
	ExpectSound   Expect = "sound"   // read, no doubt
	ExpectFlagged Expect = "flagged" // read, with the flag named, of the weight named or a heavier one
	ExpectLater   Expect = "later"   // read; the flag comes with the potentiometric engine
	ExpectUnread  Expect = "unread"  // named in the list of what could not be read
	ExpectAlso    Expect = "also"    // read as another export of a run that stands elsewhere
	ExpectCounted Expect = "counted" // no dump: counted, not read
)

// Planted is what is true of one run, or of a dump that has none.
type Planted struct {
	Dump          string // path below dumps/
	Run           int    // 1-based in the dump; 0 for the whole dump
	Sample        string
	Procedure     string
	Signal        string
	Kind          string    // of the endpoint to be reported: inflection, at-reading or break
	V0ML          float64   // volume before titration
	EndpointsML   []float64 // equivalence, exact
	InflectionsML []float64 // steepest places, exact; none for conductivity
	AtReadingML   float64   // where the set reading is passed, exact; 0 for none
	Fault         Fault
	PlacedML      float64 // where on the curve the fault was planted; 0 where it has no place
	Expect        Expect
	Flag          string        // of the report's words; "" for none
	Weight        report.Weight // the least weight of that flag; "" for none
}

// story is what the README tells of a fault.
type story struct {
	fault  Fault
	expect Expect
	flag   string
	weight report.Weight
	did    string
	see    string
}

// stories returns all of them, in the order of the README.
func stories() []story {
	return []story{
		{Overshoot, ExpectFlagged, "overshoot", report.Doubtful, "one dose of 8.7 to 9.2 % of the endpoint ran across it", "the endpoint lies somewhere in that dose"},
		{LargeOvershoot, ExpectFlagged, "wide-bracket", report.Disputed, "one dose of 12 to 13 % of the endpoint ran across it", "the bracket is wider than a tenth of the endpoint; overshoot is flagged too"},
		{Sparse, ExpectFlagged, "wide-bracket", report.Doubtful, "equal doses of 5 to 7 % of the endpoint", "too few readings around the endpoint"},
		{StopsShort, ExpectFlagged, "stops-short", report.Disputed, "dosing stopped inside the jump; the instrument named no endpoint", "no endpoint can be defended"},
		{NoSample, ExpectFlagged, "no-endpoint", report.Disputed, "water was titrated in place of the sample; the instrument named no endpoint", "a curve without a jump or a break"},
		{WrongIndicated, ExpectFlagged, "disagrees", report.Disputed, "the instrument's own endpoint is 2 to 4 % off", "refit and instrument do not agree"},
		{Lagging, ExpectLater, "", "", "each reading missed 40 % of the last change", "nothing yet: the lag is found from the potentiometric engine on"},
		{StrayReading, ExpectFlagged, "stray-reading", report.Note, "one reading on the flat part is off by far more than the noise", "told and left out; the endpoint stands"},
		{StuckReading, ExpectFlagged, "stuck", report.Note, "six equal readings where the curve moves", "told and left out; the endpoint stands"},
		{VolumeReversal, ExpectFlagged, "volume-reversal", report.Note, "one volume on the flat part goes back by 0.1 mL", "told and left out; the endpoint stands"},
		{SameReadings, ExpectFlagged, "same-readings", report.Disputed, "the same readings stand under two sample names", "both runs are disputed"},
		{ExportedAgain, ExpectFlagged, "exported-again", report.Disputed, "exported a second time into incoming/ with another indicated endpoint", "the first export stands, disputed"},
		{ExportedTwice, ExpectSound, "", "", "the same run stands in incoming/ once more", "one run, the second dump is named beside it"},
		{Truncated, ExpectUnread, "", "", "the dump ends in the middle of its table", "fewer readings than the dump states: export again"},
		{CutOff, ExpectUnread, "", "", "the dump ends inside its last run", "that run is unread, the runs before it are read"},
		{SwappedMarks, ExpectUnread, "", "", "every reading has a decimal point in place of the comma", "the first wrong number with its place"},
		{SwappedMark, ExpectUnread, "", "", "one reading has a decimal point in place of the comma", "that number with its place"},
		{UnknownDialect, ExpectUnread, "", "", "a file that no schema fits", "unread, with the next command to try"},
		{NotADump, ExpectCounted, "", "", "a note and a picture among the dumps", "counted, not read"},
	}
}

// tell returns the story of a fault.
func tell(f Fault) story {
	for _, s := range stories() {
		if s.fault == f {
			return s
		}
	}
	return story{fault: Clean, expect: ExpectSound}
}
