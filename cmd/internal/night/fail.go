package night

// Kind says who can mend an Error.
type Kind int

// The kinds of an Error.
const (
	BadRequest Kind = iota + 1 // what was asked for cannot be done: folders, OUT, or the two together
	Unfinished                 // a folder cannot be read or OUT cannot be written
	NoDump                     // the folders hold no dump
	InUse                      // another sweep writes into the same OUT
)

// Error is why a sweep left no night. OUT is then as it was.
type Error struct {
	Kind Kind
	Msg  string // what was found, lower case, no full stop
	Try  string // what to do next, "" when nothing can be said
	Err  error  // the cause; nil when Msg says all
}

// Error returns what was found and, where there is one, the cause.
func (e *Error) Error() string {
	if e.Err == nil {
		return e.Msg
	}
	return e.Msg + ": " + e.Err.Error()
}

// Unwrap returns the cause.
func (e *Error) Unwrap() error { return e.Err }
