package night

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
	"time"

	"lastdrop/cmd/internal/night/publish"
)

// ours refuses an OUT that holds a file named like one of a night and no
// last-sweep.txt of a sweep: it is somebody's work and would be lost.
func ours(o Options) error {
	if begun(o.Into) {
		return nil
	}
	entries, err := os.ReadDir(o.Into)
	if err != nil && !errors.Is(err, fs.ErrNotExist) {
		return nil // what is wrong with OUT says who opens it
	}
	var theirs []string
	for _, e := range entries {
		if e.Name() == LastSweep || o.Own != nil && o.Own(e.Name()) {
			theirs = append(theirs, e.Name())
		}
	}
	if len(theirs) == 0 {
		return nil
	}
	return &Error{Kind: BadRequest,
		Msg: fmt.Sprintf("OUT %s holds %s, and no %s of a sweep beside it: a sweep would overwrite what is not its own", o.Into, strings.Join(theirs, ", "), LastSweep),
		Try: "name another folder with --into, or move " + count(len(theirs), "the file", "these files") + " out of it"}
}

// begun is true where a sweep has left its last-sweep.txt.
func begun(into string) bool {
	text, err := os.ReadFile(filepath.Join(into, LastSweep))
	return err == nil && bytes.HasPrefix(text, []byte("time: ")) && bytes.Contains(text, []byte("\nlastdrop: "))
}

// begin marks OUT as a sweep's own before anything is published into it, so
// that a sweep which is killed is not in the way of the next one.
func begin(o Options) error {
	if begun(o.Into) {
		return nil
	}
	return publish.Replace(o.Into, LastSweep, func(w io.Writer) error {
		_, err := fmt.Fprintf(w, "time: %s\nlastdrop: %s\nexit: none yet\npublished: nothing\nwhy: the first sweep has not ended, or was ended by force\n",
			o.Now().Format(time.RFC3339), o.Lastdrop)
		return err
	})
}
