package night

import (
	"fmt"
	"strings"

	"lastdrop/report"
)

// twinsNamed is how many other runs a sentence names before it only counts.
const twinsNamed = 3

// sameReadings flags a run whose readings, one by one, stand under another
// sample or start too. twins are the places in all of every run that has them,
// self among them. Two titrations never give the same readings twice, so one
// of the facts is wrong.
func (x export) sameReadings(all []export, twins []int, self int) report.Flag {
	e := x[0].Evaluation
	var others []string
	for _, t := range twins {
		if t != self {
			others = append(others, place(all[t][0].Evaluation)+" as "+ofSample(all[t][0].Evaluation))
		}
	}
	named := strings.Join(others[:min(len(others), twinsNamed)], "; in ")
	if more := len(others) - twinsNamed; more > 0 {
		named += fmt.Sprintf("; and in %d more", more)
	}
	return report.Flag{
		Flag: "same-readings", Weight: report.Disputed,
		Figure: float64(e.Readings), Limit: 0, Unit: count(e.Readings, "reading", "readings"),
		Says: fmt.Sprintf("All %d readings (none may be) stand in %s too; here they are of %s.", e.Readings, named, ofSample(e)),
	}
}

// ofSample names what a run says it is of.
func ofSample(e *report.Evaluation) string {
	s := "a run without a sample name"
	if e.Facts.Sample != "" {
		s = fmt.Sprintf("sample %q", e.Facts.Sample)
	}
	if e.Facts.Started != "" {
		s += ", started " + report.Moment(e.Facts.Started)
	}
	return s
}
