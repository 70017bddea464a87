package demo

import (
	"math"
	"testing"
)

// noiseSD is the largest noise of a reading that the benches have, in the
// unit of the run: 0.003 decades, or 0.0008 of a conductivity.
func noiseSD(p Planted, reading float64) float64 {
	switch p.Signal {
	case "potential":
		return 0.003 * 58.6
	case "conductivity":
		return 0.0008 * math.Abs(reading)
	}
	return 0.003
}

// displayStep returns the step of the run's readings.
func displayStep(p Planted) float64 {
	switch p.Signal {
	case "potential":
		return 0.1
	case "conductivity":
		return 0.0001
	}
	return 0.01
}

// checkPlateau looks for what must, or must not, stand on the flat parts: a
// volume that goes back, a stretch of equal readings, a stray reading.
func checkPlateau(t *testing.T, p Planted, r parsed) {
	t.Helper()
	back := 0
	for i := 1; i < len(r.volumes); i++ {
		if r.volumes[i] < r.volumes[i-1] {
			back++
		}
	}
	if want := count(p.Fault == VolumeReversal); back != want {
		t.Errorf("%s: the volume goes back %d times, want %d", where(p), back, want)
	}
	if stuck := stuckReadings(p, r); stuck != 6*count(p.Fault == StuckReading) {
		t.Errorf("%s: %d readings stand still where the curve moves", where(p), stuck)
	}
	if strays := strayReadings(p, r); strays != count(p.Fault == StrayReading) {
		t.Errorf("%s: %d stray readings", where(p), strays)
	}
}

// count is 1 for true.
func count(yes bool) int {
	if yes {
		return 1
	}
	return 0
}

// stuckReadings returns the length of the longest stretch of five or more
// equal readings around which the curve moves by more than 3 display steps and
// 8 noise sd.
func stuckReadings(p Planted, r parsed) int {
	longest, ys := 0, r.readings
	for i := 1; i < len(ys); i++ {
		end := i
		for end < len(ys) && ys[end] == ys[i] {
			end++
		}
		if end-i < 5 || end == len(ys) {
			continue
		}
		move := math.Abs(ys[end] - ys[i-1])
		if move > 3*displayStep(p) && move > 8*noiseSD(p, ys[i]) {
			longest = max(longest, end-i)
		}
	}
	return longest
}

// strayReadings counts the readings before 90 % of the first endpoint, and
// past the second one, that stand 15 noise sd and more off the line through
// their neighbours. A curve bends by less than that there.
func strayReadings(p Planted, r parsed) int {
	if p.Fault == VolumeReversal || p.Fault == StuckReading {
		return 0
	}
	n, first := 0, p.EndpointsML[0]
	for i := 1; i+1 < len(r.volumes); i++ {
		v0, v, v1 := r.volumes[i-1], r.volumes[i], r.volumes[i+1]
		if v0 < 0.2*first || v1 > 0.8*first {
			continue
		}
		line := r.readings[i-1] + (r.readings[i+1]-r.readings[i-1])*(v-v0)/(v1-v0)
		if math.Abs(r.readings[i]-line) > 15*noiseSD(p, line) {
			n++
		}
	}
	if p.Fault == StrayReading && n > 1 {
		n = 1 // its neighbours see it too
	}
	return n
}
