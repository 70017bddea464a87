package schemas

// FactName names a fact of a run; the names are those of the record.
type FactName string

// The facts. The last four are not kept in the record: two enter the readings,
// two let ingest check the dump and join the lines of a footer to their runs.
const (
	FactSample      FactName = "sample"
	FactProcedure   FactName = "procedure"
	FactInstrument  FactName = "instrument"
	FactOperator    FactName = "operator"
	FactPurpose     FactName = "purpose"
	FactStarted     FactName = "started"
	FactTitrant     FactName = "titrant"
	FactTitrantMol  FactName = "titrant_mol_per_l"
	FactAliquot     FactName = "aliquot_ml"
	FactSolvent     FactName = "solvent_ml"
	FactReaction    FactName = "reaction"
	FactTemperature FactName = "temperature_c"
	FactEndReading  FactName = "end_reading"
	FactDensity     FactName = "density_g_per_ml"     // of the titrant, where it is weighed
	FactCell        FactName = "cell_constant_per_cm" // where the readings are conductances
	FactReadings    FactName = "readings"             // how many rows the run has
	FactRun         FactName = "run"                  // which run a footer row is about
)

// form is how the value of a fact is written.
type form int

const (
	formText form = iota + 1
	formDate
	formNumber  // with a unit
	formReading // with the unit of the readings, or one of their quantities
	formCount
)

// factForms has every fact that a schema may map.
var factForms = [...]struct {
	name     FactName
	form     form
	quantity Quantity
	allowed  []string // the only texts allowed; nil for free text
}{
	{FactSample, formText, "", nil},
	{FactProcedure, formText, "", nil},
	{FactInstrument, formText, "", nil},
	{FactOperator, formText, "", nil},
	{FactPurpose, formText, "", []string{"sample", "blank", "standard", "control", "check", "rinse"}},
	{FactStarted, formDate, "", nil},
	{FactTitrant, formText, "", nil},
	{FactTitrantMol, formNumber, Concentration, nil},
	{FactAliquot, formNumber, Volume, nil},
	{FactSolvent, formNumber, Volume, nil},
	{FactReaction, formText, "", []string{"acid-base", "precipitation", "redox", "non-aqueous"}},
	{FactTemperature, formNumber, Temperature, nil},
	{FactEndReading, formReading, "", nil},
	{FactDensity, formNumber, Density, nil},
	{FactCell, formNumber, CellConstant, nil},
	{FactReadings, formCount, "", nil},
	{FactRun, formText, "", nil},
}

// AllowedTexts returns the only texts that a fact may have, nil when any
// text is allowed.
func AllowedTexts(name FactName) []string {
	for i := range factForms {
		if factForms[i].name == name {
			return factForms[i].allowed
		}
	}
	return nil
}

// fieldForms has every role with the quantities that its unit may have; the
// order is that of the documentation.
var fieldForms = [...]struct {
	role       Role
	quantities []Quantity
}{
	{RoleVolume, []Quantity{Volume, Mass}}, {RoleIncrement, []Quantity{Volume, Mass}},
	{RolePH, []Quantity{PH}}, {RolePotential, []Quantity{Potential}},
	{RoleConductivity, []Quantity{Conductivity}}, {RoleConductance, []Quantity{Conductance}},
	{RoleTime, []Quantity{Duration}}, {RoleTemperature, []Quantity{Temperature}}, {RoleDrift, []Quantity{Drift}},
	{RoleStatus, nil}, {RoleRemark, nil}, {RoleNumber, nil}, {RoleRun, nil}, {RoleUnused, nil},
}

func quantitiesOf(r Role) []Quantity {
	for i := range fieldForms {
		if fieldForms[i].role == r {
			return fieldForms[i].quantities
		}
	}
	return nil
}
