package simulate

// Faults are what went wrong between the electrode and the dump: dosing saw
// the right readings, the dump does not have them. The zero value is no fault;
// each one has its place as a volume, and touches the first readings from
// there on.
type Faults struct {
	StrayFromML float64 // one reading is wrong
	StrayBy     float64 // by so much, in its unit
	StuckFromML float64 // the reading stands still
	StuckCount  int     // so many equal readings
	BackFromML  float64 // one volume goes back
	BackByML    float64 // to so much below the volume before it
}

// plant writes the faults into a curve, to the steps of the displays. A place
// beyond the curve plants nothing.
func (f Faults) plant(c *Curve, readingStep, volumeStep float64) {
	if i := from(c, f.StrayFromML); f.StrayBy != 0 && i >= 0 {
		c.Readings[i] = rounded(c.Readings[i]+f.StrayBy, readingStep)
	}
	if i := from(c, f.StuckFromML); f.StuckCount > 0 && i >= 0 {
		for k := i; k < min(i+f.StuckCount, len(c.Readings)); k++ {
			c.Readings[k] = c.Readings[i]
		}
	}
	if i := from(c, f.BackFromML); f.BackByML > 0 && i > 0 {
		c.VolumesML[i] = rounded(c.VolumesML[i-1]-f.BackByML, volumeStep)
	}
}

// from returns the first reading at or past a volume, -1 for none.
func from(c *Curve, volumeML float64) int {
	for i, v := range c.VolumesML {
		if v >= volumeML {
			return i
		}
	}
	return -1
}
