package report

// Night is one publication: what a sweep found, ordered by dump, then run.
// It carries no clock time, host or user.
type Night struct {
	Lastdrop    string // program version
	Date        string // of the publication, 2031-04-03
	FirstDay    string // days of the runs, 2031-04-02; "" when none states its start
	LastDay     string
	Laboratory  string // "" when not known
	Invented    bool   // every page and sheet says "Invented demonstration data."
	Estimator   string // asked for by name; "" for the usual choice
	Evaluations []Evaluation
	Unread      []Unread
	Waiting     []Waiting
	Schemas     []SchemaUse // by name
	Limits      []Limit     // in force, in the order of the documentation
	OtherFiles  int         // files that are no dumps, counted only
	Excluded    int         // dumps that the patterns of the sweep leave out
	Links       []string    // symbolic links, not followed; by name
	Specials    []string    // pipes, sockets and devices, not opened; by name
	Gaps        []Gap       // by name
}

// Gap are run numbers that no file bears, between two that dumps bear. It is
// worth telling and disputes nothing.
type Gap struct {
	Name   string // dumps/bench-a/0419, or dumps/bench-a/0419 to 0421
	Count  int
	After  string // file names of the dumps on either side
	Before string
}

// SchemaUse is a schema that read at least one run.
type SchemaUse struct {
	Name   string
	SHA256 string
	Runs   int
	From   string // shipped, laboratory or replaces shipped; "" when not known
}

// Where a schema comes from, as every list and report says it.
const (
	Shipped         = "shipped"
	Laboratory      = "laboratory"
	ReplacesShipped = "replaces shipped"
)

// Limit is one limit in force with its meaning and where it comes from.
type Limit struct {
	Flag   string
	Value  float64
	Unit   string
	Means  string
	Source string
}

// Count returns how many evaluations have the verdict.
func (n *Night) Count(v Verdict) int {
	c := 0
	for i := range n.Evaluations {
		if n.Evaluations[i].Verdict == v {
			c++
		}
	}
	return c
}
