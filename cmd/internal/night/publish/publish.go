package publish

import (
	"bufio"
	"context"
	"errors"
	"io"
	"io/fs"
	"os"
	"path/filepath"

	"golang.org/x/sync/errgroup"
)

// Publish puts the files in place and removes those named in gone, which are
// of an earlier set and not of this one. They move in the order given where
// one must come first: files that a person may hold open, and that a system
// then refuses to replace, are best put first. Files are laid out at the same time, so their
// Write functions must not share what they change. When it returns an error
// the old files stand. A cancelled context is heeded until the files begin to
// move, not after.
func (p *Place) Publish(ctx context.Context, files []File, gone []string) error {
	if err := p.write(ctx, files); err != nil {
		return err
	}
	if err := p.keep(files, gone); err != nil {
		return err
	}
	if ctx.Err() != nil {
		return context.Cause(ctx)
	}
	if err := os.Rename(p.path(stage), p.path(ready)); err != nil {
		return err
	}
	if err := p.remove(); err != nil {
		return errors.Join(err, p.undo(gone))
	}
	moved, err := p.move(files)
	if err != nil {
		return errors.Join(err, p.undo(append(moved, gone...)))
	}
	// What is left of ready is of no use and the next Open removes it.
	os.RemoveAll(p.path(ready))
	return nil
}

// write lays out every file in stage and brings it to the disk.
func (p *Place) write(ctx context.Context, files []File) error {
	var g errgroup.Group
	g.SetLimit(2) // the workbook and the pages take nearly all of the time
	for _, f := range files {
		g.Go(func() error {
			if ctx.Err() != nil {
				return context.Cause(ctx)
			}
			return writeFile(p.path(stage, f.Name), f.Write)
		})
	}
	return g.Wait()
}

// writeFile writes a new file and brings it to the disk.
func writeFile(path string, write func(io.Writer) error) (err error) {
	f, err := os.Create(path)
	if err != nil {
		return err
	}
	defer func() { err = errors.Join(err, f.Close()) }()
	w := bufio.NewWriterSize(f, 1<<16)
	if err := write(w); err != nil {
		return err
	}
	if err := w.Flush(); err != nil {
		return err
	}
	return f.Sync()
}

// keep puts the files that will be replaced or removed beside the new ones,
// notes which ones are removed, and brings all these names to the disk.
func (p *Place) keep(files []File, gone []string) error {
	for _, folder := range [...]string{before, leaving} {
		if err := os.Mkdir(p.path(stage, folder), 0o777); err != nil {
			return err
		}
	}
	old := append([]string{}, gone...)
	for _, f := range files {
		old = append(old, f.Name)
	}
	for _, name := range old {
		err := link(p.path(name), p.path(stage, before, name))
		if err != nil && !errors.Is(err, fs.ErrNotExist) {
			return err
		}
	}
	for _, name := range gone {
		if err := writeFile(p.path(stage, leaving, name), func(io.Writer) error { return nil }); err != nil {
			return err
		}
	}
	return errors.Join(syncFolder(p.path(stage, before)), syncFolder(p.path(stage, leaving)), syncFolder(p.path(stage)))
}

// link gives a file a second name, or copies it where the file system has no
// second names.
func link(from, to string) error {
	if os.Link(from, to) == nil {
		return nil
	}
	f, err := os.Open(from)
	if err != nil {
		return err
	}
	defer f.Close() // opened for reading: nothing to lose
	return writeFile(to, func(w io.Writer) error {
		_, err := io.Copy(w, f)
		return err
	})
}

// move puts the files in place and returns those that it moved.
func (p *Place) move(files []File) (moved []string, err error) {
	if err := syncFolder(p.dir); err != nil {
		return nil, err
	}
	for _, f := range files {
		if err := os.Rename(p.path(ready, f.Name), p.path(f.Name)); err != nil {
			return moved, err
		}
		moved = append(moved, f.Name)
	}
	return moved, syncFolder(p.dir)
}

// undo puts the old files back. A kill in the middle of it leaves both nights
// mixed until the next sweep: that takes two failures within a moment.
func (p *Place) undo(moved []string) error {
	var errs []error
	for _, name := range moved {
		err := os.Rename(p.path(ready, before, name), p.path(name))
		if errors.Is(err, fs.ErrNotExist) {
			if err = os.Remove(p.path(name)); errors.Is(err, fs.ErrNotExist) { // there was none
				err = nil
			}
		}
		errs = append(errs, err)
	}
	errs = append(errs, os.RemoveAll(p.path(ready)), syncFolder(p.dir))
	return errors.Join(errs...)
}

// Replace writes one file that stands by itself: the old one or the new one
// is there at every moment.
func Replace(dir, name string, write func(io.Writer) error) error {
	temporary := filepath.Join(dir, loose+name)
	if err := writeFile(temporary, write); err != nil {
		return errors.Join(err, os.Remove(temporary))
	}
	if err := os.Rename(temporary, filepath.Join(dir, name)); err != nil {
		return errors.Join(err, os.Remove(temporary))
	}
	return syncFolder(dir)
}
