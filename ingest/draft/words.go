package draft

import (
	"regexp"
	"strings"

	"lastdrop/schemas"
)

// unitWords are the ways in which benches write the units, in small letters
// without dots and blanks, with their UCUM code. Source: common practice.
var unitWords = map[string]string{
	"ml": "mL", "cm3": "mL", "cm³": "mL", "cc": "mL", "µl": "uL", "μl": "uL", "ul": "uL", "mm3": "uL", "l": "L", "dm3": "L",
	"g": "g", "mg": "mg", "kg": "kg",
	"ph": "[pH]", "mv": "mV", "v": "V", "µv": "uV", "μv": "uV", "uv": "uV",
	"ms/cm": "mS/cm", "µs/cm": "uS/cm", "μs/cm": "uS/cm", "us/cm": "uS/cm", "s/cm": "S/cm", "s/m": "S/m", "ms/m": "mS/m",
	"mspercm": "mS/cm", "uspercm": "uS/cm", "mscm": "mS/cm", "uscm": "uS/cm", "µscm": "uS/cm", "ms": "mS", "us": "uS", "µs": "uS",
	"s": "s", "sec": "s", "sek": "s", "seconds": "s", "min": "min", "minutes": "min", "h": "h", "°c": "Cel", "ºc": "Cel", "degc": "Cel", "c": "Cel", "celsius": "Cel", "k": "K",
	"mv/min": "mV/min", "mv/s": "mV/s", "µv/s": "uV/s", "ph/min": "[pH]/min",
	"mol/l": "mol/L", "m": "mol/L", "mmol/l": "mmol/L", "mol/m3": "mol/m3",
	"g/ml": "g/mL", "g/l": "g/L", "kg/l": "kg/L", "/cm": "/cm", "1/cm": "/cm", "cm-1": "/cm",
}

// unitNamed returns the UCUM code of a unit as a bench may write it, "" for
// another text.
func unitNamed(s string) string {
	return unitWords[strings.NewReplacer(" ", "", ".", "").Replace(strings.ToLower(strings.TrimSpace(s)))]
}

// roleWords are words of column titles, the narrower ones of each role first.
// Source: common practice, in English, German, French, Spanish, Italian,
// Polish, Russian and Japanese.
var roleWords = []struct {
	role  schemas.Role
	words string
}{
	{schemas.RoleDrift, "drift|slope|dérive|deriva|dryf|дрейф"},
	{schemas.RoleIncrement, "dose|increment|inkrement|incrément|incremento|dosis|portion|addition|dv|delta v|δv|доза"},
	{schemas.RoleTemperature, "temp|temperature|temperatur|température|temperatura|tемпература|температура|温度"},
	{schemas.RoleTime, "time|elapsed|clock|seconds|zeit|uhrzeit|temps|heure|tiempo|tempo|czas|время|時間"},
	{schemas.RoleVolume, "volume|vol|volumen|titrant|delivered|dispensed|added|total|burette|buret|verbrauch|zugabe|consumed|objętość|объем|объём|体積|滴定量|mass|masse|masa|v|m"},
	{schemas.RoleConductance, "conductance|leitwert|conductancia|g"},
	{schemas.RoleConductivity, "cond|conductivity|leitfähigkeit|leitf|conductivité|conductividad|conducibilità|przewodność|проводимость|導電率|kappa|κ|lf"},
	{schemas.RolePH, "ph"},
	{schemas.RolePotential, "mv|potential|potentiel|potencial|potenziale|potencjał|потенциал|電位|emf|signal|voltage|spannung|photometer|absorption|e|u"},
	{schemas.RoleStatus, "status|state|accepted"},
	{schemas.RoleRemark, "remark|note|comment|bemerkung|event|remarque|nota|uwaga"},
	{schemas.RoleNumber, "no|nr|n|step|index|point|row|punkt|pas|lp|№|番号|#"},
}

// roleNamed returns the role that a title names, and its unit.
func roleNamed(title string) (role schemas.Role, unit string) {
	name, unit := withoutUnit(title)
	words := wordsOf(name)
	for _, r := range roleWords {
		for w := range strings.SplitSeq(r.words, "|") {
			if strings.Contains(" "+words+" ", " "+w+" ") {
				return fitting(r.role, title, unit), unit
			}
		}
	}
	return byUnit(unit), unit
}

// fitting is the role of a title whose unit may say more than its word: "t/°C"
// is a temperature, "dose rate" none of ours.
func fitting(role schemas.Role, title, unit string) schemas.Role {
	own := byUnit(unit)
	switch {
	case own == "" || role == own || role == schemas.RoleIncrement && own == schemas.RoleVolume || role == schemas.RoleDrift || role == schemas.RoleNumber:
		return role
	case title == "t" || title == "T" || role != own:
		return own
	}
	return role
}

// byUnit is the role that a column of this unit has, "" when it may be
// several.
func byUnit(code string) schemas.Role {
	switch code {
	case "mL", "uL", "L", "g", "mg", "kg":
		return schemas.RoleVolume
	case "[pH]":
		return schemas.RolePH
	case "mV", "V", "uV":
		return schemas.RolePotential
	case "mS/cm", "uS/cm", "S/cm", "S/m", "mS/m":
		return schemas.RoleConductivity
	case "mS", "uS", "S":
		return schemas.RoleConductance
	case "s", "ms", "min", "h":
		return schemas.RoleTime
	case "Cel", "K":
		return schemas.RoleTemperature
	case "mV/min", "mV/s", "uV/s", "[pH]/min":
		return schemas.RoleDrift
	}
	return ""
}

var (
	bracketed = regexp.MustCompile(`^(.*?)\s*[\[(]\s*([^\])]+?)\s*[\])]\s*$`)
	behind    = regexp.MustCompile(`^(.+?)\s*(?:/| in |,\s*|\s|_)\s*([^\s/_]+(?:/[^\s/_]+)?|[a-zµμ]+_?[pP]er_?[a-z]+|[mu]S_cm)$`)
)

// withoutUnit parts a title into its name and the UCUM code of its unit.
func withoutUnit(title string) (name, unit string) {
	for _, form := range []*regexp.Regexp{bracketed, behind} {
		if m := form.FindStringSubmatch(title); m != nil {
			if unit = unitNamed(strings.ReplaceAll(m[2], "_", "")); unit != "" {
				return m[1], unit
			}
		}
	}
	if i := strings.LastIndexAny(title, "_ "); i > 0 { // cond_uS_per_cm
		for j := i; j > 0; j = strings.LastIndexAny(title[:j], "_ ") {
			if unit = unitNamed(strings.NewReplacer("_", "", " ", "").Replace(title[j:])); unit != "" {
				return title[:j], unit
			}
		}
	}
	return title, unitNamed(title)
}

// wordsOf is a title in small letters, its words parted by one blank.
func wordsOf(s string) string {
	return strings.Join(strings.FieldsFunc(strings.ToLower(s), func(r rune) bool { return strings.ContainsRune(" _.-/()[]:,;'\"", r) }), " ")
}

var numbered = regexp.MustCompile(`^(.*?)(\d+)(\D*)$`)

// withoutNumber is a title without the number in it, and with {n} in its
// place; "" when it has none.
func withoutNumber(title string) (name, pattern string) {
	base, _ := withoutUnit(title)
	m := numbered.FindStringSubmatch(base)
	if m == nil {
		return title, ""
	}
	rest := strings.TrimPrefix(title, base)
	return strings.TrimRight(m[1], " _-#") + m[3] + rest, m[1] + schemas.Numbered + m[3] + rest
}

// factWords are words of the keys of facts, and the units that a number of
// them may have.
var factWords = []struct {
	name  schemas.FactName
	words string
}{
	{"indicated", "endpoint|end point|ep|ep1|ep2|end volume|equivalence|break|found ml|endpunkt|point final|punto final|end|eq"},
	{schemas.FactReadings, "readings|points|rows|values|count|number of readings|messpunkte"},
	{schemas.FactCell, "cell constant|cell|zellkonstante"},
	{schemas.FactDensity, "density|dichte|rho|densité"},
	{schemas.FactTitrantMol, "titrant mol|mol l|burette mol l|titrant concentration|concentration|conc|molarity|konzentration|c titrant|titrant c"},
	{schemas.FactAliquot, "aliquot|sample volume|volume of sample|sample ml|portion|einwaage|vorlage|prise"},
	{schemas.FactSolvent, "water|water ml|solvent|wasser|eau|dilution"},
	{schemas.FactTemperature, "temperature|temp|temperatur"},
	{schemas.FactEndReading, "stop at|set point|end ph|end reading|endpoint ph|target|sollwert"},
	{schemas.FactSample, "sample|sample name|sample id|id|probe|échantillon|muestra|campione|próbka|образец|試料|specimen|lot"},
	{schemas.FactProcedure, "procedure|method|determination|methode|méthode|método|metoda|метод|方法"},
	{schemas.FactInstrument, "instrument|bench|device|titrator|gerät|appareil|station"},
	{schemas.FactOperator, "operator|analyst|user|by|bediener|opérateur|operador|оператор|担当|who"},
	{schemas.FactStarted, "start|started|begun|begin|date|date time|started at|datum|begonnen|début|fecha|data|дата|日時|at"},
	{schemas.FactTitrant, "titrant|reagent|burette|titrator solution|titer|масса"},
	{schemas.FactReaction, "reaction|kind|type"},
	{schemas.FactPurpose, "purpose|role"},
}

// factNamed returns the fact that a key names, "" for none.
func factNamed(key string) (name schemas.FactName, unit string) {
	base, unit := withoutUnit(key)
	for _, text := range []string{wordsOf(key), wordsOf(base)} {
		for _, f := range factWords {
			for w := range strings.SplitSeq(f.words, "|") {
				if text == w {
					return f.name, unit
				}
			}
		}
	}
	if bare := strings.TrimRight(wordsOf(base), " 0123456789"); bare != wordsOf(base) {
		for w := range strings.SplitSeq(factWords[0].words, "|") { // end 2
			if bare == w {
				return factWords[0].name, unit
			}
		}
	}
	text := " " + wordsOf(base) + " "
	for _, f := range factWords[:10] {
		for w := range strings.SplitSeq(f.words, "|") {
			if len(w) > 4 && strings.Contains(text, " "+w+" ") {
				return f.name, unit
			}
		}
	}
	return "", unit
}
