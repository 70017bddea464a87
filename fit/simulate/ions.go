package simulate

// ion is one row of the table of ions.
type ion struct {
	name       string
	charge     int
	equivalent float64 // limiting equivalent conductivity at 25 °C, S cm2/mol
}

// ions are the limiting equivalent conductivities at 25 °C of [crc]. Ag+, Ba2+,
// Ca2+, H+, K+, Li+, Mg2+ and NH4+ were read in a copy; all others are from
// memory of the same table.
var ions = [...]ion{
	{"Ag+", 1, 61.9},
	{"Ba+2", 2, 63.6},
	{"Br-", -1, 78.1},
	{"CH3COO-", -1, 40.9},
	{"CO3-2", -2, 69.3},
	{"Ca+2", 2, 59.47},
	{"Cl-", -1, 76.31},
	{"ClO4-", -1, 67.3},
	{"F-", -1, 55.4},
	{"H+", 1, 349.65},
	{"H2PO4-", -1, 36},
	{"HCO3-", -1, 44.5},
	{"I-", -1, 76.8},
	{"K+", 1, 73.48},
	{"Li+", 1, 38.66},
	{"Mg+2", 2, 53.0},
	{"NH4+", 1, 73.5},
	{"NO3-", -1, 71.42},
	{"Na+", 1, 50.08},
	{"OH-", -1, 198},
	{"SO4-2", -2, 80.0},
}

// findIon returns the ion of that name.
func findIon(name string) (ion, bool) {
	for _, i := range ions {
		if i.name == name {
			return i, true
		}
	}
	return ion{}, false
}
