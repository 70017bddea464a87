package refit

import (
	"strconv"

	"lastdrop/fit"
	"lastdrop/ingest"
)

// curveOf gives fit the numbers of a run.
func curveOf(r *ingest.Run) *fit.Curve {
	c := &fit.Curve{StepV: r.VolumeStepML, StepY: r.ReadingStep, EndReading: r.Facts.EndReading}
	c.V, c.Y = r.Curve()
	switch r.Signal {
	case ingest.PH:
		c.Signal = fit.PH
	case ingest.Potential:
		c.Signal = fit.Potential
	case ingest.Conductivity:
		c.Signal = fit.Conductivity
	}
	c.V0 = volumeBefore(r.Facts)
	if r.Facts.TemperatureC != nil {
		c.TemperatureC = *r.Facts.TemperatureC
	}
	c.Electrons = electrons(r.Facts)
	for _, i := range r.Indicated {
		c.Indicated = append(c.Indicated, fit.Indicated{Kind: i.Kind, V: i.VolumeML, StepV: i.StepML})
	}
	f := r.Facts
	c.Expected = f.Titrant != "" || f.TitrantMolPerL != nil || len(r.Indicated) > 0
	return c
}

// volumeBefore is aliquot and solvent together; 0, not known, without an
// aliquot.
func volumeBefore(f ingest.Facts) float64 {
	if f.AliquotML == nil {
		return 0
	}
	v := *f.AliquotML
	if f.SolventML != nil {
		v += *f.SolventML
	}
	return v
}

// electrons is the fact `electrons`, the charge number of the sensed species;
// 0 when it is not stated or not a whole number from 1 to 4.
func electrons(f ingest.Facts) int {
	for _, o := range f.Other {
		if o.Key == "electrons" {
			if n, err := strconv.Atoi(o.Value); err == nil && n >= 1 && n <= 4 {
				return n
			}
		}
	}
	return 0
}
