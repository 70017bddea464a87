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
	Wide    Layout = "wide"    // one table; each run has columns of its own
)

// Encoding is how the bytes of a dump become text.
type Encoding string

// The encodings, named as in the IANA register that [csvw] refers to.
const (
	UTF8        Encoding = "utf-8"        // with or without byte order mark
	UTF16       Encoding = "utf-16"       // byte order by its mark, which must be there
	UTF16LE     Encoding = "utf-16le"     // low byte first, with or without mark
	UTF16BE     Encoding = "utf-16be"     // high byte first, with or without mark
	Windows1252 Encoding = "windows-1252" // one byte a character
	Latin1      Encoding = "iso-8859-1"   // one byte a character
	Auto        Encoding = "auto"         // by its mark, else UTF-8; nothing else is guessed
)

// Schema is one mapping file. Parse has checked it; nobody changes it
// afterwards, so it may be used by many goroutines at once.
type Schema struct {
	Name   string // e.g. "bench-a"
	Title  string // one line for people
	SHA256 string // of the TOML bytes, in hex
	TOML   string // the file as it was written, to be copied
	Layout Layout

	// ValidFrom is the first day on which the schema is in force, as
	// 2006-01-02; "" when it always was. Schemas of one name and different
	// days are versions, of which the start of a run chooses one.
	ValidFrom string
	Replaces  bool // a laboratory's schema in the place of a shipped one; Load sets it

	Dialect   Dialect
	Recognise Recognise
	Preamble  Preamble
	Stack     Stack
	Wide      []string // layout wide: titles of the rows above the header that have a cell for each run
	Footer    Footer
	Fields    []Field
	Facts     []Fact
	Indicated []Indicated
	Results   []Result

	SameVolume     SameVolume
	RepeatedHeader bool // the same header may stand again inside the table

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
	EscapeChar    byte     // takes its meaning from the character behind it
	Repeated      bool     // several delimiters part two cells once; those at the ends of a line none
	DecimalChar   byte     // '.' or ','
	GroupChar     string   // between groups of three digits; "" for none, " " for any blank of Unicode's four
	HeaderRows    []int    // rows of the header that make the titles, from 1; nil for one
	HeaderJoin    string   // between the texts of one column's header rows
	MissingValues []string // cell texts that mean "not given"; "" is always one
}

// Recognise is the evidence that a dump is of this schema. All that is stated
// must hold.
type Recognise struct {
	FirstLine string   // the first line that is not blank, without trailing delimiters; "" when not asked
	Begins    string   // what that line begins with; "" when not asked
	Lines     []string // what some lines begin with
	Absent    []string // what no line begins with
	Header    bool     // there is a header row with the volume and a reading
}

// Margin is by how many points one schema must lead, when several fit, to be
// the one. Source: this project; two points are one stated text.
const Margin = 2

// Points is the weight of the evidence, all of it being there: what is stated
// more narrowly counts more. Source: this project.
func (r *Recognise) Points() int {
	points := 2 * len(r.Lines)
	points += len(r.Absent)
	if r.FirstLine != "" {
		points += 4
	}
	if r.Begins != "" {
		points += 3
	}
	if r.Header {
		points++
	}
	return points
}

// Lines says where the facts above the header stand.
type Lines string

// The kinds of preamble.
const (
	NoPreamble   Lines = ""         // the header comes first
	CommentLines Lines = "comments" // comment lines of key, separator, value
	CellLines    Lines = "cells"    // rows whose first cell is the key and second the value
	TextLines    Lines = "text"     // lines of key, separator, value
	UnusedLines  Lines = "unused"   // known and of no use; below a table only
)

// Preamble is what stands above a header row.
type Preamble struct {
	Lines     Lines
	Separator byte // between key and value in a comment or text line
}

// Stack marks the runs of a stacked dump by the first cell of a row.
type Stack struct {
	Begin string // begins a run
	End   string // ends it; "" when a run ends where the next begins
	Blank bool   // a blank line below the rows ends it, and the next line begins the next
}

// Footer is what stands below the table. Its rows have no header of their
// own, so the schema gives their cells titles.
type Footer struct {
	Begin  string   // first cell of the row that begins it; "" when there is none
	Blank  bool     // a blank line below the rows begins it
	Lines  Lines    // layouts single and stacked: how its facts stand
	Row    string   // first cell of each row below that one; "" when the first cell is a fact too
	Titles []string // of the cells of each row, after the one that Row states
}

// Role is what a column is.
type Role string

// The roles of columns.
const (
	RoleVolume       Role = "volume"       // titrant delivered since the start
	RoleIncrement    Role = "increment"    // titrant delivered since the row above
	RolePH           Role = "pH"           // a reading
	RolePotential    Role = "potential"    // a reading
	RoleConductivity Role = "conductivity" // a reading
	RoleConductance  Role = "conductance"  // a reading, of conductivity by the cell constant
	RoleTime         Role = "time"         // since the start
	RoleTemperature  Role = "temperature"  // of the titrand
	RoleDrift        Role = "drift"        // of the reading
	RoleStatus       Role = "status"       // says what the row is
	RoleRemark       Role = "remark"       // text about the row
	RoleNumber       Role = "number"       // counts the rows of a run up by one
	RoleRun          Role = "run"          // names the run; layout long
	RoleUnused       Role = "unused"       // known and of no use
)

// IsReading reports whether the column holds the readings of a run.
func (r Role) IsReading() bool {
	return r == RolePH || r == RolePotential || r == RoleConductivity || r == RoleConductance
}

// IsVolume reports whether the column says how much titrant was delivered.
func (r Role) IsVolume() bool { return r == RoleVolume || r == RoleIncrement }

// Written is how a number stands in a dump.
type Written struct {
	Unit     Unit     // zero for what has none
	Suffixes []string // texts that may stand behind the number, such as "mL"
	Bounds   bool     // "<" or ">" may stand before it and is dropped
}

// Empty is what an empty cell means.
type Empty string

// The meanings of an empty cell.
const (
	EmptyRefused Empty = ""     // the run cannot be read
	EmptySame    Empty = "same" // no titrant since the row above; volumes only
	EmptySkip    Empty = "skip" // the row is no reading; readings only
)

// SameVolume is what becomes of several readings at one volume.
type SameVolume string

// The ways with several readings at one volume.
const (
	SameAll  SameVolume = ""     // all are kept
	SameLast SameVolume = "last" // the last is kept, which had most time to come to rest
)

// The meanings that a text of a status column may have.
const (
	StatusReading  = "reading"   // the row is a reading
	StatusTimedOut = "timed-out" // it is one that had not come to rest
	StatusDose     = "dose"      // it is none, and titrant was delivered: the row must say how much
	StatusSkip     = "skip"      // it is none
)

// Field is one column of the table.
type Field struct {
	Role   Role
	Titles []string // header texts, upper and lower case alike
	Written
	Empty   Empty
	Refills bool    // a volume that begins anew when the burette was filled
	Shared  bool    // layout wide: the column belongs to every run
	Clock   Pattern // of a time that is written as a clock shows it
	Values  []Value // of a status
}

// Fact maps a statement of the dump (key and value) to a fact of the run.
type Fact struct {
	Name    FactName
	Titles  []string // keys, upper and lower case alike
	Columns []string // header texts of a column that has it in every row
	File    Capture  // the part of the file's name that is the fact
	Folder  Capture  // the part of its folder's name
	Written          // of a number; the unit is zero for an end reading in the unit of the readings
	Times   []string // of a date: keys of its time of day, where that stands by itself
	Format  Pattern  // of a date; zero for ISO 8601
	Zone    Zone     // of a date that states none; zero when not known
	Values  []Value  // what the texts of the dump mean; empty when they mean themselves
	Default string   // used when the dump states nothing
	Number  *float64 // the same of a number, in the project's unit
}

// Value is one text of a dump and what it means.
type Value struct{ Text, Means string }

// Indicated maps statements of the dump to one indicated endpoint.
type Indicated struct {
	Titles  []string
	Columns []string // header texts of a column that has it in every row
	Written
	Kind       string   // when the dump does not state it; "" for break in conductivity runs, else inflection
	KindTitles []string // keys of the statement of the kind
	KindValues []Value
}

// Result maps a statement of the dump to a result that the instrument worked
// out. Its unit is kept as stated; nothing is converted.
type Result struct {
	Titles []string
	Written
}

// Kinds are the kinds of an endpoint that an instrument may indicate.
func Kinds() []string { return []string{"inflection", "at-reading", "break", "equivalence"} }
