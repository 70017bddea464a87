package report

// FlagWord is how people read a flag.
type FlagWord struct {
	Flag     string
	Headline string // after the verdict word on a page: "disputed  a dose ran over the endpoint"
	Do       string // what to do next, one sentence
}

// flagWords has every flag that this program can set, heaviest concern first:
// the order in which a run's flags of equal weight are told.
var flagWords = [...]FlagWord{
	{"dump-altered", "the same run has other readings now", "Find out which export is the true one before either is used."},
	{"disagrees", "the instrument and the refit do not agree", "Compare both places on the curve; a second person decides which one stands."},
	{"exported-again", "exported twice with different values", "Find out which export is right; the first one's values stand until then."},
	{"same-readings", "the same readings under two samples or starts", "Find out which sample was really titrated; one of the two has no run of its own."},
	{"no-endpoint", "no endpoint found", "Look at the curve; titrate again if an endpoint was expected."},
	{"stops-short", "dosing stopped before the endpoint was passed", "Titrate again with more titrant; no endpoint can be defended."},
	{"overshoot", "a dose ran over the endpoint", "Titrate again with smaller doses near the endpoint, or let a second person settle it."},
	{"wide-bracket", "too few readings around the endpoint", "Titrate again with smaller doses near the endpoint if the bracket matters for the result."},
	{"wide-interval", "the endpoint is uncertain", "Look at the readings named below; titrate again if the interval matters for the result."},
	{"passes-again", "the set reading is passed more than once", "Look which pass ended the titration; a second person decides."},
	{"noisy", "the readings scatter", "Check electrode, cable and stirrer; titrate again if the interval matters for the result."},
	{"poor-fit", "the endpoint hangs on a few readings", "Look at the curve; titrate again if the readings do not follow one curve."},
	{"dilution-unknown", "the volume before titration is not known", "State the aliquot and the solvent in the dump or the schema; without them a break is found too early."},
	{"stray-reading", "a reading stands off the curve", "Look whether the curve is believable without it; it was left out."},
	{"stuck", "the reading stood still while titrant was added", "Check electrode and stirrer; the readings were left out."},
	{"volume-reversal", "a volume is out of order", "Check whether the burette was refilled or the dump was edited; what is out of order was left out."},
	{"not-compared", "the indicated endpoint could not be checked", "State the kind of the indicated endpoint as the instrument means it, or check it by hand."},
}

// Words returns how people read a flag; ok is false for a name that no flag
// has.
func Words(flag string) (w FlagWord, ok bool) {
	for _, w := range flagWords {
		if w.Flag == flag {
			return w, true
		}
	}
	return FlagWord{Flag: flag, Headline: flag}, false
}

// Concern returns the place of a flag in the order of concern, first = 0.
func Concern(flag string) int {
	for i, w := range flagWords {
		if w.Flag == flag {
			return i
		}
	}
	return len(flagWords)
}

// Flags lists every flag in the order of concern.
func Flags() []FlagWord { return append([]FlagWord(nil), flagWords[:]...) }

// Caution stands on every page, sheet and summary.
const Caution = "Advisory until an authorised person has approved it. The laboratory's own validated procedure, safety data sheets and local regulations come first."

// SoundMeans explains the lightest verdict wherever it is counted.
const SoundMeans = "no objection, not an approval"

// InventedNote stands where figures are of the demonstration laboratory.
const InventedNote = "Invented demonstration data."
