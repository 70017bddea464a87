package simulate

import "testing"

// kcl is 100 mL of potassium chloride, before anything is dosed.
func kcl(c float64, law ConductivityLaw) Titration {
	t := conductance(Solution{Spectators: []Spectator{{"K+", c}, {"Cl-", c}}}, Solution{Spectators: []Spectator{{"Na+", 0.1}}})
	t.Law = law
	return t
}

// Potassium chloride at 25 °C in common use, from memory: 146.9 to 147.0 uS/cm
// at 0.001 mol/L, 1412 to 1413 at 0.01 mol/L. The limiting law is 0.1 % and
// 0.7 % low there; the sum of limiting conductivities is 2 and 6 % high.
func TestSquareRootLaw(t *testing.T) {
	law := ConductivityLaw{SquareRoot: true}
	near(t, "0.001 mol/L, mS/cm", at(t, kcl(0.001, law), 0), 0.14695, 0.0003)
	near(t, "0.01 mol/L, mS/cm", at(t, kcl(0.01, law), 0), 1.4125, 0.011)
	near(t, "0.01 mol/L, limiting sum", at(t, kcl(0.01, ConductivityLaw{}), 0), 1.4979, 0.0001)
}

// Pratt et al., Pure Appl. Chem. 73 (2001) 1783: 0.01 mol/kg has 1273.03 uS/cm
// at 20 °C and 1408.23 at 25 °C, a ratio of 0.904; 2 %/K says 0.900.
func TestTwoPercentPerKelvin(t *testing.T) {
	cold := kcl(0.01, ConductivityLaw{Temperature: true})
	warm := cold
	cold.TemperatureC, warm.TemperatureC = 20, 25
	near(t, "20 to 25 °C", at(t, cold, 0)/at(t, warm, 0), 1273.03/1408.23, 0.005)
}

func TestUnknownConductivity(t *testing.T) {
	run := conductance(Solution{Groups: []Group{Phosphoric(0.01)}}, Solution{Spectators: []Spectator{{"Na+", 0.1}}})
	if _, err := run.Reading(5); err == nil {
		t.Error("hydrogen phosphate has no tabulated conductivity: no error")
	}
	if _, err := run.VolumeAt(1); err == nil {
		t.Error("a volume for a conductivity: no error")
	}
}
