package night

import (
	"time"

	"lastdrop/report"
)

// run is one evaluated run and the digest of its readings. Joining works on
// copies: the flags of an evaluation are shared until one is added.
type run struct {
	*report.Evaluation
	readings digest
}

// export is a run under all its names: the first in byte order represents it.
type export []run

// join makes one evaluation of every run, in the order of dump and run, and
// flags what exports of one run, or runs with the same readings, say of each
// other.
func join(outcomes []outcome) []report.Evaluation {
	exports, same := sameRuns(outcomes)
	joined := make([]report.Evaluation, len(exports))
	for i, x := range exports {
		e := *x[0].Evaluation
		e.Also = x.also()
		e.Flags = append(append([]report.Flag{}, e.Flags...), x.exportedAgain()...)
		if twins := same[x[0].readings]; len(twins) > 1 {
			e.Flags = append(e.Flags, x.sameReadings(exports, twins, i))
		}
		settle(&e)
		joined[i] = e
	}
	return joined
}

// sameRuns sorts runs into exports of the same run. same holds, for each
// digest, the places in exports of those that have these readings.
func sameRuns(outcomes []outcome) (exports []export, same map[digest][]int) {
	same = map[digest][]int{}
	for i := range outcomes {
		for k := range outcomes[i].evaluations {
			r := run{&outcomes[i].evaluations[k], outcomes[i].readings[k]}
			at := -1
			for _, x := range same[r.readings] {
				if exports[x].takes(r) {
					at = x
					break
				}
			}
			if at < 0 {
				at = len(exports)
				exports = append(exports, nil)
				same[r.readings] = append(same[r.readings], at)
			}
			exports[at] = append(exports[at], r)
		}
	}
	return exports, same
}

// takes is true when r, which has the same readings, is one more export of
// this run: sample and start are equal, or absent on one side, with all that
// are in it already.
func (x export) takes(r run) bool {
	for _, in := range x {
		if !agree(in.Facts.Sample, r.Facts.Sample) || !sameMoment(in.Facts.Started, r.Facts.Started) {
			return false
		}
	}
	return true
}

func agree(a, b string) bool { return a == b || a == "" || b == "" }

// sameMoment compares two starts. With an offset on both sides the moments
// count; where one side states none, the time of day as written does.
func sameMoment(a, b string) bool {
	if agree(a, b) {
		return true
	}
	at, errA := time.Parse(time.RFC3339, a)
	bt, errB := time.Parse(time.RFC3339, b)
	if errA == nil && errB == nil {
		return at.Equal(bt)
	}
	return (errA == nil || errB == nil) && wallClock(a) == wallClock(b)
}

// wallClock is a start without its offset.
func wallClock(started string) string {
	const length = len("2031-04-02T08:14:05")
	return started[:min(len(started), length)]
}

// also lists the other dumps that hold the run, each once, in byte order; the
// run's own dump when that holds it twice.
func (x export) also() []string {
	var names []string
	for _, r := range x[1:] {
		if len(names) == 0 || names[len(names)-1] != r.Dump {
			names = append(names, r.Dump)
		}
	}
	return names
}
