package schemas

// Quantity is what a unit measures.
type Quantity string

// The quantities that a dump may state, each with the one unit that it has
// after reading.
const (
	Volume        Quantity = "volume"        // mL
	PH            Quantity = "pH"            // pH
	Potential     Quantity = "potential"     // mV
	Conductivity  Quantity = "conductivity"  // mS/cm
	Duration      Quantity = "time"          // s
	Temperature   Quantity = "temperature"   // °C
	Concentration Quantity = "concentration" // mol/L
	Mass          Quantity = "mass"          // g, of titrant
	Density       Quantity = "density"       // g/mL
	Conductance   Quantity = "conductance"   // mS
	CellConstant  Quantity = "cell constant" // 1/cm
	Drift         Quantity = "drift"         // unit of the readings a minute
)

// Unit is a unit of a dump and how it becomes the project's unit:
//
//	project value = dump value · 10^Shift · Times + Plus
//
// The power of ten is kept apart, because moving the decimal point before the
// text becomes a number costs no rounding.
type Unit struct {
	Code     string // [ucum], case-sensitive form
	Quantity Quantity
	Shift    int
	Times    float64
	Plus     float64
}

// units has every unit that a schema may state, the project's own first in
// each quantity. Codes: [ucum]; factors are exact by definition of the units.
var units = [...]Unit{
	{"mL", Volume, 0, 1, 0}, {"uL", Volume, -3, 1, 0}, {"L", Volume, 3, 1, 0},
	{"[pH]", PH, 0, 1, 0},
	{"mV", Potential, 0, 1, 0}, {"V", Potential, 3, 1, 0}, {"uV", Potential, -3, 1, 0},
	{"mS/cm", Conductivity, 0, 1, 0}, {"uS/cm", Conductivity, -3, 1, 0}, {"S/cm", Conductivity, 3, 1, 0},
	{"S/m", Conductivity, 1, 1, 0}, {"mS/m", Conductivity, -2, 1, 0},
	{"s", Duration, 0, 1, 0}, {"ms", Duration, -3, 1, 0}, {"min", Duration, 0, 60, 0}, {"h", Duration, 0, 3600, 0},
	{"Cel", Temperature, 0, 1, 0}, {"K", Temperature, 0, 1, -273.15},
	{"g", Mass, 0, 1, 0}, {"mg", Mass, -3, 1, 0}, {"kg", Mass, 3, 1, 0},
	{"g/mL", Density, 0, 1, 0}, {"kg/L", Density, 0, 1, 0}, {"g/L", Density, -3, 1, 0}, {"kg/m3", Density, -3, 1, 0},
	{"mS", Conductance, 0, 1, 0}, {"uS", Conductance, -3, 1, 0}, {"S", Conductance, 3, 1, 0},
	{"/cm", CellConstant, 0, 1, 0}, {"/m", CellConstant, -2, 1, 0},
	{"mV/min", Drift, 0, 1, 0}, {"mV/s", Drift, 0, 60, 0}, {"uV/s", Drift, -3, 60, 0}, {"[pH]/min", Drift, 0, 1, 0}, {"[pH]/s", Drift, 0, 60, 0},
	{"mol/L", Concentration, 0, 1, 0}, {"mmol/L", Concentration, -3, 1, 0}, {"mol/m3", Concentration, -3, 1, 0},
}

// unitOf returns the unit with this code; ok is false for a code that no
// schema may state.
func unitOf(code string) (u Unit, ok bool) {
	for _, u := range units {
		if u.Code == code {
			return u, true
		}
	}
	return Unit{}, false
}

// codes lists the codes of one quantity, the project's own first.
func codes(q Quantity) []string {
	var list []string
	for _, u := range units {
		if u.Quantity == q {
			list = append(list, u.Code)
		}
	}
	return list
}
