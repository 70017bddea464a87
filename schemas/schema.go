// Package schemas holds the mapping files of lastdrop: TOML files that say how
// the export of one instrument becomes runs. It parses and checks them; it
// reads no dump (that is ingest) and computes nothing.
//
// A schema is written by a chemist, so every fault of one is told with line
// and column, what was found and what is allowed. The language is documented
// in one place, language.md beside this file.
//
// Sources of the key names:
//
//	[table]  Data Package v2, Table Dialect and Table Schema
//	[csvw]   W3C Recommendation 17 December 2015, Metadata Vocabulary for Tabular Data
//	[ucum]   The Unified Code for Units of Measure
package schemas

// Layout says how the runs stand in a dump.
type Layout string

// The layouts.
const (
	Single  Layout = "single"  // one run a dump
	Stacked Layout = "stacked" // one run below the other, each with its own preamble and header
	Long    Layout = "long"    // one table; a column names the run
)

// Encoding is how the bytes of a dump become text.
type Encoding string

// The encodings, named as in the IANA register that [csvw] refers to.
const (
	UTF8        Encoding = "utf-8"        // with or without byte order mark
	UTF16       Encoding = "utf-16"       // byte order by its mark, which must be there
	Windows1252 Encoding = "windows-1252" // one byte a character
	Latin1      Encoding = "iso-8859-1"   // one byte a character
)

// Schema is one mapping file. Parse has checked it; nobody changes it
// afterwards, so it may be used by many goroutines at once.
type Schema struct {
	Name   string // e.g. "bench-a"
	Title  string // one line for people
	SHA256 string // of the TOML bytes, in hex
	Layout Layout

	Dialect   Dialect
	Recognise Recognise
	Preamble  Preamble
	Stack     Stack
	Footer    Footer
	Fields    []Field
	Facts     []Fact
	Indicated []Indicated

	// KeepUnterminated permits a last row without line end. Without it such
	// a row is dropped, because a file that is cut off ends like that and the
	// last number may lack digits.
	KeepUnterminated bool
}

// Dialect is how text becomes cells. A char of 0 means that there is none.
type Dialect struct {
	Encoding      Encoding
	Delimiter     byte
	QuoteChar     byte
	CommentChar   byte
	DecimalChar   byte     // '.' or ','
	MissingValues []string // cell texts that mean "not given"; "" is always one
}

// Recognise is the evidence that a dump is of this schema. All that is stated
// must hold.
type Recognise struct {
	FirstLine string // the first line that is not blank, without trailing delimiters; "" when not asked
	Header    bool   // there is a header row with the volume and a reading
}

// Lines says where the facts above the header stand.
type Lines string

// The kinds of preamble.
const (
	NoPreamble   Lines = ""         // the header comes first
	CommentLines Lines = "comments" // comment lines of key, separator, value
	CellLines    Lines = "cells"    // rows whose first cell is the key and second the value
)

// Preamble is what stands above a header row.
type Preamble struct {
	Lines     Lines
	Separator byte // between key and value in a comment line
}

// Stack marks the runs of a stacked dump by the first cell of a row.
type Stack struct {
	Begin string // begins a run
	End   string // ends it; "" when a run ends where the next begins
}

// Footer is what stands below the table. Its rows have no header of their
// own, so the schema gives their cells titles.
type Footer struct {
	Begin  string   // first cell of the row that begins it; "" when there is no footer
	Row    string   // first cell of each row below that one; "" when the first cell is a fact too
	Titles []string // of the cells of each row, after the one that Row states
}

// Role is what a column is.
type Role string

// The roles of columns.
const (
	RoleVolume       Role = "volume"       // titrant delivered since the start
	RolePH           Role = "pH"           // a reading
	RolePotential    Role = "potential"    // a reading
	RoleConductivity Role = "conductivity" // a reading
	RoleTime         Role = "time"         // since the start
	RoleTemperature  Role = "temperature"  // of the titrand
	RoleNumber       Role = "number"       // counts the rows of a run up by one
	RoleRun          Role = "run"          // names the run; layout long
	RoleUnused       Role = "unused"       // known and of no use
)

// IsReading reports whether the column holds the readings of a run.
func (r Role) IsReading() bool {
	return r == RolePH || r == RolePotential || r == RoleConductivity
}

// Field is one column of the table.
type Field struct {
	Role   Role
	Titles []string // header texts, upper and lower case alike
	Unit   Unit     // zero for roles without one
}

// Fact maps a statement of the dump (key and value) to a fact of the run.
type Fact struct {
	Name    FactName
	Titles  []string // keys, upper and lower case alike; empty when only Default holds
	Unit    Unit     // of a number; zero for texts and for an end reading in the unit of the readings
	Format  Pattern  // of a date; zero for ISO 8601
	Zone    Zone     // of a date that states none; zero when not known
	Values  []Value  // what the texts of the dump mean; empty when they mean themselves
	Default string   // used when the dump states nothing
}

// Value is one text of a dump and what it means.
type Value struct{ Text, Means string }

// Indicated maps statements of the dump to one indicated endpoint.
type Indicated struct {
	Titles     []string
	Unit       Unit
	Kind       string   // when the dump does not state it; "" for break in conductivity runs, else inflection
	KindTitles []string // keys of the statement of the kind
	KindValues []Value
}

// Kinds are the kinds of an endpoint that an instrument may indicate.
func Kinds() []string { return []string{"inflection", "at-reading", "break", "equivalence"} }
