package publish

import (
	"errors"
	"io"
	"os"
	"path/filepath"
	"syscall"
)

// lockName is a file that exists as long as the lock: Windows cannot lock a
// folder. It is deleted by the system when the process ends, however it ends.
const lockName = ".lastdrop-lock"

const (
	fileFlagDeleteOnClose = 0x04000000        // of CreateFile
	errorSharingViolation = syscall.Errno(32) // another process has the file
)

// lock takes the folder for this process by a file that nobody else may open.
func lock(dir string) (io.Closer, error) {
	path := filepath.Join(dir, lockName)
	name, err := syscall.UTF16PtrFromString(path)
	if err != nil {
		return nil, err
	}
	const shareWithNobody = 0
	handle, err := syscall.CreateFile(name, syscall.GENERIC_READ|syscall.GENERIC_WRITE, shareWithNobody, nil,
		syscall.OPEN_ALWAYS, syscall.FILE_ATTRIBUTE_NORMAL|fileFlagDeleteOnClose, 0)
	if errors.Is(err, errorSharingViolation) {
		return nil, ErrInUse
	}
	if err != nil {
		return nil, &os.PathError{Op: "open", Path: path, Err: err}
	}
	return os.NewFile(uintptr(handle), path), nil
}

// syncFolder does nothing: Windows brings names to the disk with their files
// and refuses to sync a folder.
func syncFolder(string) error { return nil }
