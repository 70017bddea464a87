package demo

import (
	"fmt"
	"math/rand/v2"

	"lastdrop/fit/simulate"
)

// night is the laboratory while it is being made.
type night struct {
	seed    uint64
	files   []File
	planted []Planted
	counts  map[string]int // samples so far, by prefix
	drawn   uint64         // generators so far
}

// firstSample is where the numbers of samples begin.
const firstSample = 211

// newNight makes all dumps in the order bench A, B, C, incoming.
func newNight(seed uint64) (*night, error) {
	n := &night{seed: seed, counts: map[string]int{}}
	for _, step := range []func() error{n.benchA, n.benchB, n.benchC, n.notes} {
		if err := step(); err != nil {
			return nil, err
		}
	}
	return n, nil
}

// add keeps a dump; path is below dumps/.
func (n *night) add(path string, data []byte) {
	n.files = append(n.files, File{"dumps/" + path, data})
}

// sample returns the next sample name of a procedure.
func (n *night) sample(p *procedure) string {
	n.counts[p.prefix]++
	return fmt.Sprintf("%s-%04d", p.prefix, firstSample+n.counts[p.prefix]-1)
}

// titrate runs one job with a generator of its own, so that a change in one
// run leaves all others as they are.
func (n *night) titrate(j job, b bench, started int, operator string) (*titration, error) {
	n.drawn++
	t, err := titrate(j, b, rand.New(rand.NewPCG(n.seed, n.drawn)))
	if err != nil {
		return nil, err
	}
	t.started, t.operator, t.sample = started, operator, n.sample(j.procedure)
	return t, nil
}

// Bench A begins at 08:14 and takes a quarter of an hour for a run.
const benchAStart, benchAEvery = 8*3600 + 14*60, 15 * 60

// benchA makes the dumps of one run each and what was exported from there once
// more.
func (n *night) benchA() error {
	var before *titration
	for i, j := range planBenchA() {
		operator := "Analyst 1"
		if i >= 17 {
			operator = "Analyst 2"
		}
		t, err := n.titrate(j, benchA(), benchAStart+i*benchAEvery, operator)
		if err != nil {
			return err
		}
		if j.fault == SameReadings && before != nil && before.fault == SameReadings {
			t.curve, t.truth, t.indicatedML, t.temperatureC = before.curve, before.truth, before.indicatedML, before.temperatureC
		}
		name := fmt.Sprintf("%04d.csv", 417+i)
		n.writeA(name, t)
		n.exportMore(name, t)
		before = t
	}
	return nil
}

// writeA writes one dump of Bench A, spoiled if its fault says so.
func (n *night) writeA(name string, t *titration) {
	data := benchADump(t)
	if t.dialect == "plain" {
		data = plain(t, plainOptions{times: t.procedure.prefix == "AMM"})
	}
	truth := t.planted("bench-a/"+name, 1)
	switch t.fault {
	case Truncated:
		data = truncate(data)
	case SwappedMark:
		data = swapMarks(data, 1)
	case SwappedMarks:
		data = swapMarks(data, len(t.curve.Readings))
	}
	if truth.Expect == ExpectUnread {
		truth.Run = 0
	}
	n.add("bench-a/"+name, data)
	n.planted = append(n.planted, truth)
}

// exportMore writes the second exports of a run into incoming.
func (n *night) exportMore(name string, t *titration) {
	again := *t
	switch {
	case t.fault == ExportedTwice && t.dialect == "plain":
		n.also(name, plain(t, plainOptions{}), t)
	case t.fault == ExportedTwice:
		n.also("again-"+name, plain(t, plainOptions{localStart: true, temperatures: true}), t)
	case t.fault == ExportedAgain:
		again.indicatedML = []float64{places(1.018*t.indicatedML[0], t.indicatedPlaces())}
		n.also("second-"+name, benchADump(&again), t)
	}
}

// also adds another export of a run.
func (n *night) also(name string, data []byte, t *titration) {
	truth := t.planted("incoming/"+name, 1)
	truth.Expect, truth.Flag, truth.Weight = ExpectAlso, "", ""
	n.add(truth.Dump, data)
	n.planted = append(n.planted, truth)
}

// Benches B and C follow each other's runs without a pause.
const (
	benchBStart, benchBEvery = 8*3600 + 5*60 + 12, 17 * 60
	benchCStart, benchCEvery = 8*3600 + 40*60, 20 * 60
)

// benchB makes the stacked dumps.
func (n *night) benchB() error {
	started := benchBStart
	for i, jobs := range planBenchB() {
		name := fmt.Sprintf("bench-b/curves-0402-%d.txt", i+1)
		var runs []*titration
		cut := false
		for k, j := range jobs {
			t, err := n.titrate(j, benchB(), started, "Analyst 2")
			if err != nil {
				return err
			}
			started += benchBEvery
			cut = cut || j.fault == CutOff
			runs = append(runs, t)
			n.planted = append(n.planted, t.planted(name, k+1))
		}
		n.add(name, benchBDump(runs, cut))
	}
	return nil
}

// benchC makes the long tables; its runs are numbered from C0140 on.
func (n *night) benchC() error {
	started, number := benchCStart, 140
	for i, jobs := range planBenchC() {
		name := fmt.Sprintf("bench-c/shift-%d.csv", i+1)
		var runs []*titration
		for k, j := range jobs {
			t, err := n.titrate(j, benchC(), started, "Analyst 3")
			if err != nil {
				return err
			}
			started += benchCEvery
			runs = append(runs, t)
			n.planted = append(n.planted, t.planted(name, k+1))
		}
		n.add(name, benchCDump(runs, number))
		number += len(runs)
	}
	return nil
}

// notes adds what is no dump of the three benches.
func (n *night) notes() error {
	rng := rand.New(rand.NewPCG(n.seed, n.drawn+1))
	t, err := titrate(job{procedure: hydrochloric()}, benchA(), rng)
	if err != nil {
		return err
	}
	unknown := func(path string, data []byte) {
		n.add(path, data)
		n.planted = append(n.planted, Planted{Dump: path, Fault: UnknownDialect, Expect: ExpectUnread})
	}
	unknown("incoming/bench-d-0402.dat", foreign(t.curve))
	unknown("incoming/weighing-0402.csv", []byte(weighings))
	for _, f := range []File{{"incoming/night-notes.md", []byte(nightNotes)}, {"incoming/beaker.bmp", picture()}} {
		n.add(f.Path, f.Data)
		n.planted = append(n.planted, Planted{Dump: f.Path, Fault: NotADump, Expect: ExpectCounted})
	}
	return nil
}

// foreign writes a curve as an instrument would that no schema knows.
func foreign(c simulate.Curve) []byte {
	out := []byte("~D2|HCL-0230|Analyst 3\n")
	for i, v := range c.VolumesML {
		out = fmt.Appendf(out, "%05d|%s|%s\n", i, fixed(1000*v, 0), fixed(100*c.Readings[i], 0))
	}
	return append(out, "~end\n"...)
}
