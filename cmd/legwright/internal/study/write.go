package study

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"strings"

	"github.com/natefinch/atomic"
)

// halfWritten begins the name of a file that is not whole yet.
const halfWritten = ".new-"

// WriteFile writes a file whole or not at all, and to the disk before it is seen under its name. A new
// file may be read by whoever may read its folder; one that is replaced keeps its mode.
func WriteFile(path string, b []byte) error {
	if err := replace(path, b); err != nil {
		return fmt.Errorf("%s: cannot be written (%w); the disk may be full or the folder closed to you", Clean(path), bare(err))
	}
	return nil
}

func replace(path string, b []byte) (err error) {
	f, err := os.CreateTemp(filepath.Dir(path), halfWritten+"*")
	if err != nil {
		return err
	}
	defer func() {
		if err != nil {
			f.Close()
			os.Remove(f.Name())
		}
	}()
	if _, err := f.Write(b); err != nil {
		return err
	}
	if err := f.Sync(); err != nil {
		return err
	}
	if err := f.Close(); err != nil {
		return err
	}
	mode := fs.FileMode(0o600)
	if info, err := os.Stat(path); err == nil {
		mode = info.Mode().Perm()
	} else if info, err := os.Stat(filepath.Dir(path)); err == nil {
		mode = info.Mode().Perm() & 0o666
	}
	if err := os.Chmod(f.Name(), mode); err != nil {
		return err
	}
	return atomic.ReplaceFile(f.Name(), path)
}

// sweep removes the files that a killed process was writing, in the folder and below its designs.
func (f *Folder) sweep() {
	remove := func(path string, e fs.DirEntry) {
		if strings.HasPrefix(e.Name(), halfWritten) && e.Type().IsRegular() {
			os.Remove(path)
		}
	}
	entries, _ := os.ReadDir(f.dir)
	for _, e := range entries {
		remove(filepath.Join(f.dir, e.Name()), e)
	}
	// What cannot be looked at or removed stays: it harms nothing.
	_ = filepath.WalkDir(filepath.Join(f.dir, designsFolder), func(path string, e fs.DirEntry, err error) error {
		if err != nil {
			if errors.Is(err, fs.ErrNotExist) {
				return fs.SkipAll
			}
			return nil
		}
		remove(path, e)
		return nil
	})
}
