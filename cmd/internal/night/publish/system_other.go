//go:build !windows

package publish

import (
	"errors"
	"io"
	"os"
	"syscall"
)

// lock takes the folder for this process by an advisory lock on the folder
// itself, which the kernel gives up when the process ends, however it ends.
func lock(dir string) (io.Closer, error) {
	f, err := os.Open(dir)
	if err != nil {
		return nil, err
	}
	err = syscall.Flock(int(f.Fd()), syscall.LOCK_EX|syscall.LOCK_NB)
	if err == nil {
		return f, nil
	}
	if errors.Is(err, syscall.EWOULDBLOCK) {
		err = ErrInUse
	}
	return nil, errors.Join(err, f.Close())
}

// syncFolder brings the names in a folder to the disk.
func syncFolder(dir string) (err error) {
	f, err := os.Open(dir)
	if err != nil {
		return err
	}
	defer func() { err = errors.Join(err, f.Close()) }()
	if err := f.Sync(); err != nil && !errors.Is(err, syscall.EINVAL) {
		return err
	}
	return nil // a file system that cannot sync a folder says EINVAL
}
