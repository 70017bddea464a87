// Package publish puts a set of files into a folder: all of them or none, at
// whatever moment the power fails.
//
// The files are written whole into a hidden folder inside the target and
// brought to the disk there. One rename of that folder decides: before it the
// old files stand, after it the new ones are on their way, and what a kill
// interrupts is finished by the next Open. A failure that is not a kill is
// undone at once: the old files, kept beside the new ones, go back.
//
// It knows nothing of what the files hold, reads no clock and prints nothing.
package publish

import (
	"errors"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
)

// Names inside the target that are the package's own. All begin with a dot,
// so that a sweep of a folder above would pass over them.
const (
	stage   = ".lastdrop-stage"  // being written; worth nothing
	ready   = ".lastdrop-ready"  // complete; on its way into the target
	before  = "before"           // in stage and ready: the files that are replaced or removed
	leaving = "leaving"          // in stage and ready: an empty file for each that is removed
	loose   = ".lastdrop-loose-" // beginning of the temporary names of Replace
)

// ErrInUse is returned by Open when another process has the place.
var ErrInUse = errors.New("another process publishes into the same folder")

// File is one file to publish.
type File struct {
	Name  string // without a path
	Write func(io.Writer) error
}

// Place is a folder that files are published into. It is this process's own
// until Close.
type Place struct {
	dir      string
	lock     io.Closer
	Unlocked error // why others cannot be kept out, on a file system without locks
}

// Open makes the folder when it is missing, keeps other processes out,
// finishes what a kill interrupted, removes what it left over, and tries
// whether the folder can be written.
func Open(dir string) (*Place, error) {
	if err := os.MkdirAll(dir, 0o777); err != nil {
		return nil, err
	}
	p := &Place{dir: dir}
	var err error
	switch p.lock, err = lock(dir); {
	case errors.Is(err, ErrInUse):
		return nil, err
	case err != nil:
		p.Unlocked = err
	}
	if err := p.recover(); err != nil {
		return nil, errors.Join(err, p.unlock())
	}
	if err := os.Mkdir(p.path(stage), 0o777); err != nil {
		return nil, errors.Join(err, p.unlock())
	}
	return p, nil
}

// Close lets others publish.
func (p *Place) Close() error {
	return errors.Join(os.RemoveAll(p.path(stage)), p.unlock())
}

func (p *Place) unlock() error {
	if p.lock == nil {
		return nil
	}
	return p.lock.Close()
}

// recover leaves the folder as if no process had ever been killed in it.
func (p *Place) recover() error {
	if _, err := os.Stat(p.path(ready)); err == nil {
		if err := p.finish(); err != nil {
			return err
		}
	}
	if err := os.RemoveAll(p.path(stage)); err != nil {
		return err
	}
	entries, err := os.ReadDir(p.dir)
	if err != nil {
		return err
	}
	for _, e := range entries {
		if strings.HasPrefix(e.Name(), loose) {
			if err := os.Remove(p.path(e.Name())); err != nil {
				return err
			}
		}
	}
	return nil
}

// remove takes the files that leave out of the target.
func (p *Place) remove() error {
	entries, err := os.ReadDir(p.path(ready, leaving))
	if err != nil && !errors.Is(err, fs.ErrNotExist) {
		return err
	}
	for _, e := range entries {
		if err := os.Remove(p.path(e.Name())); err != nil && !errors.Is(err, fs.ErrNotExist) {
			return err
		}
	}
	return nil
}

// finish removes what leaves and moves what is still in ready into the target.
func (p *Place) finish() error {
	if err := p.remove(); err != nil {
		return err
	}
	entries, err := os.ReadDir(p.path(ready))
	if err != nil {
		return err
	}
	for _, e := range entries {
		if e.Name() == before || e.Name() == leaving {
			continue
		}
		if err := os.Rename(p.path(ready, e.Name()), p.path(e.Name())); err != nil {
			return err
		}
	}
	if err := syncFolder(p.dir); err != nil {
		return err
	}
	return os.RemoveAll(p.path(ready))
}

func (p *Place) path(elements ...string) string {
	return filepath.Join(append([]string{p.dir}, elements...)...)
}
