package study

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"
)

// lock keeps other processes from writing into a folder. The file names its holder; what counts is the
// system's lock on it, which ends with the process, so a file that a killed process left blocks nobody.
type lock struct {
	file *os.File
	held bool // the file system knows locks
}

// busy is errBusy with its holder.
type busy struct{ text string }

func (b *busy) Error() string { return b.text }
func (b *busy) Unwrap() error { return errBusy }

// maxHolder bounds what is read of a lock file.
const maxHolder = 300

// takeLock locks a folder. A folder that another process has locked is an error that names it.
func takeLock(dir string) (*lock, error) {
	path := filepath.Join(dir, lockFile)
	for {
		f, err := os.OpenFile(path, os.O_RDWR|os.O_CREATE, 0o666)
		if err != nil {
			return nil, err
		}
		held, err := seize(f)
		switch {
		case errors.Is(err, errBusy):
			who, _ := io.ReadAll(io.LimitReader(f, maxHolder))
			f.Close()
			return nil, &busy{fmt.Sprintf("%s: %s is at work in the folder; wait for it or end it, or give another folder", Clean(dir), holder(who))}
		case err != nil:
			f.Close()
			return nil, err
		}
		// The holder before may have removed the file between our opening and our locking it.
		mine, err := f.Stat()
		there, gone := os.Stat(path)
		if err != nil || gone != nil || !os.SameFile(mine, there) {
			f.Close()
			continue
		}
		host, _ := os.Hostname()
		if f.Truncate(0) == nil { // for messages only: a full disk is no reason to stop here
			fmt.Fprintf(f, "process %d on %s\n", os.Getpid(), host)
		}
		return &lock{f, held}, nil
	}
}

// holder is what a lock file says of its process.
func holder(b []byte) string {
	line, _, _ := bytes.Cut(b, []byte("\n"))
	if who := strings.TrimSpace(Clean(string(line))); who != "" {
		return who
	}
	return "another process"
}

// free removes the file and ends the lock, in this order.
func (l *lock) free() error {
	if l == nil || l.file == nil {
		return nil
	}
	err := os.Remove(l.file.Name())
	if e := l.file.Close(); err == nil {
		err = e
	}
	l.file = nil
	return err
}
