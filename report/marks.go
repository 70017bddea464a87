package report

// Marks in text. A word always stands beside a verdict's mark.

// KindMark returns the sign of a kind of endpoint: filled for the refit, open
// for the indicated one. An unknown kind has a cross.
func KindMark(kind string, filled bool) string {
	for _, m := range kindMarks {
		if m.Kind == kind {
			if filled {
				return m.Filled
			}
			return m.Open
		}
	}
	return "×"
}

// Kind is a kind of endpoint with its marks in text and what it means.
type Kind struct{ Kind, Filled, Open, Means string }

var kindMarks = [...]Kind{
	{"equivalence", "●", "○", "the chemistry: as much titrant as titrand"},
	{"inflection", "▼", "▽", "the steepest place of the curve"},
	{"at-reading", "■", "□", "the place where the curve passes a fixed pH or mV"},
	{"break", "◆", "◇", "the kink of a conductivity curve, where two arms meet"},
}

// Kinds lists the kinds of endpoint. Only like kinds are compared.
func Kinds() []Kind { return append([]Kind(nil), kindMarks[:]...) }
