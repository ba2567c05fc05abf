//go:build unix

package study

import (
	"errors"
	"os"
	"syscall"
)

// errBusy says that another process holds a lock.
var errBusy = errors.New("held by another process")

// seize takes the lock of an open file for this process, without waiting. The system gives it up when
// the process ends, however it ends. It returns false where the file system knows no locks.
func seize(f *os.File) (bool, error) {
	for {
		err := syscall.Flock(int(f.Fd()), syscall.LOCK_EX|syscall.LOCK_NB)
		switch {
		case err == nil:
			return true, nil
		case errors.Is(err, syscall.EINTR):
		case errors.Is(err, syscall.EWOULDBLOCK):
			return false, errBusy
		case errors.Is(err, syscall.ENOLCK), errors.Is(err, syscall.ENOSYS), errors.Is(err, syscall.ENOTSUP), errors.Is(err, syscall.EOPNOTSUPP):
			return false, nil
		default:
			return false, err
		}
	}
}
