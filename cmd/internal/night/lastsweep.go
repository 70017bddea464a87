package night

import (
	"fmt"
	"io"
	"os"
	"time"

	"lastdrop/cmd/internal/night/publish"
	"lastdrop/report"
)

// LastSweep is the name of the file that tells of the last sweep.
const LastSweep = "last-sweep.txt"

// Last is what last-sweep.txt tells, so that a timer that died is seen.
type Last struct {
	At       time.Time
	Lastdrop string
	Exit     int
	Says     string  // why there is no night; "" after a night
	Result   *Result // nil without a night
}

// Write rewrites last-sweep.txt in OUT. Without OUT nothing is made: a sweep
// that was asked for wrongly leaves no trace.
func (l Last) Write(into string) error {
	if info, err := os.Stat(into); err != nil || !info.IsDir() {
		return nil
	}
	return publish.Replace(into, LastSweep, l.write)
}

func (l Last) write(w io.Writer) error {
	_, err := fmt.Fprintf(w, "time: %s\nlastdrop: %s\nexit: %d\n", l.At.Format(time.RFC3339), l.Lastdrop, l.Exit)
	if err != nil {
		return err
	}
	if l.Result == nil {
		_, err = fmt.Fprintf(w, "published: nothing\nwhy: %s\n", report.Visible(l.Says))
		return err
	}
	n := l.Result.Night
	_, err = fmt.Fprintf(w, "published: %s\ndumps: %d\nruns: %d\ndisputed: %d\ndoubtful: %d\nsound: %d\nunread: %d\nwaiting: %d\nother files: %d\nnot followed: %d\nleft out: %d\ngaps: %d\n",
		n.Date, l.Result.Dumps, len(n.Evaluations), n.Count(report.VerdictDisputed), n.Count(report.VerdictDoubtful),
		n.Count(report.VerdictSound), len(n.Unread), len(n.Waiting), n.OtherFiles,
		len(n.Links)+len(n.Specials), n.Excluded, len(n.Gaps))
	return err
}
