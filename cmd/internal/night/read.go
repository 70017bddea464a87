package night

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"time"

	"lastdrop/report"
)

// maxDumpBytes is the largest dump that is read: 200 times a night's export
// of a busy bench, and small enough that one stray file cannot fill the
// memory (common practice, no source).
const maxDumpBytes = 64 << 20

const changedMeanwhile = "changed while it was read; the next sweep takes it"

// read returns the bytes of a dump, or why it has to wait (says), or why it
// cannot be read. Only one of the three is set.
func (d dump) read(o Options) (data []byte, waits string, problem *report.Unread) {
	before, err := fs.Stat(d.files, d.path)
	if err != nil {
		return d.unread(err)
	}
	if waits := tooYoung(before, o); waits != "" {
		return nil, waits, nil
	}
	if before.Size() > maxDumpBytes {
		return nil, "", &report.Unread{
			Says: fmt.Sprintf("%.1f MiB; a dump has at most %d MiB", float64(before.Size())/(1<<20), maxDumpBytes>>20),
			Hint: "export fewer runs into one file"}
	}
	data, err = d.bytes()
	if err != nil {
		return d.unread(err)
	}
	after, err := fs.Stat(d.files, d.path)
	switch {
	case err != nil:
		return d.unread(err)
	case after.Size() != before.Size() || !after.ModTime().Equal(before.ModTime()) || int64(len(data)) != after.Size():
		return nil, changedMeanwhile, nil
	}
	return data, "", nil
}

func (d dump) bytes() ([]byte, error) {
	f, err := d.files.Open(d.path)
	if err != nil {
		return nil, err
	}
	defer f.Close() // opened for reading: nothing to lose
	// One byte more than allowed: a dump that grows meanwhile is then found
	// to have changed, not cut.
	return io.ReadAll(io.LimitReader(f, maxDumpBytes+1))
}

// unread sorts a failure of the file system: a dump that went away waits,
// anything else is told with what to do.
func (d dump) unread(err error) ([]byte, string, *report.Unread) {
	if errors.Is(err, fs.ErrNotExist) {
		return nil, "vanished before it was read", nil
	}
	return nil, "", &report.Unread{Says: "the file cannot be read: " + cause(err).Error(), Hint: "check its permissions and its disk"}
}

// tooYoung says why a dump has to wait by its age, "" when it has not.
func tooYoung(info fs.FileInfo, o Options) string {
	if o.MinAge <= 0 {
		return ""
	}
	switch age := o.Now().Sub(info.ModTime()); {
	case age >= o.MinAge:
		return ""
	case age < 0:
		return fmt.Sprintf("dated %s in the future; a sweep takes dumps from %s on", span(-age), span(o.MinAge))
	default:
		return fmt.Sprintf("%s old; a sweep takes dumps from %s on", span(age), span(o.MinAge))
	}
}

// span prints a duration of two units or more in that unit, rounded down:
// "12 s", "15 min", "3 h", "4 d".
func span(d time.Duration) string {
	switch s := int64(d / time.Second); {
	case s < 120:
		return fmt.Sprintf("%d s", s)
	case s < 2*3600:
		return fmt.Sprintf("%d min", s/60)
	case s < 48*3600:
		return fmt.Sprintf("%d h", s/3600)
	default:
		return fmt.Sprintf("%d d", s/86400)
	}
}
