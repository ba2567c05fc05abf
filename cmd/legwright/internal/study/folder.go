package study

import (
	"encoding/json"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"
)

// State is what a folder holds.
type State int

// The states of a folder.
const (
	Empty      State = iota // nothing, or the folder is not there yet
	Unfinished              // a study that was interrupted or is running
	Finished                // a complete study
	Foreign                 // something else
)

// The files of a study folder.
const (
	frontFile      = "front.json"
	tableFile      = "front.csv"
	progressFile   = "progress.csv"
	checkpointFile = "checkpoint.json"
	logFile        = "checkpoint.log"
	lockFile       = "checkpoint.lock"
	partFile       = "part.json"
	designsFolder  = "designs"
)

// inspect tells what the folder holds. A study is known by a front.json or a checkpoint that this
// program wrote, and by nothing else: files of those names that it did not write are foreign.
func inspect(dir string) (State, error) {
	info, err := os.Stat(dir)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return Empty, nil
	case err != nil:
		return Empty, fmt.Errorf("%s: cannot be looked at (%w); give another folder", Clean(dir), bare(err))
	case !info.IsDir():
		return Empty, fmt.Errorf("%s: is a file, not a folder; give another name", Clean(dir))
	}
	entries, err := os.ReadDir(dir)
	if err != nil {
		return Empty, fmt.Errorf("%s: cannot be read (%w); give another folder", Clean(dir), bare(err))
	}
	entries = slices.DeleteFunc(entries, func(e fs.DirEntry) bool { // what an open or a killed process leaves
		return e.Type().IsRegular() && (e.Name() == lockFile || strings.HasPrefix(e.Name(), halfWritten))
	})
	if len(entries) == 0 {
		return Empty, nil
	}
	has := func(name string) bool {
		return slices.ContainsFunc(entries, func(e fs.DirEntry) bool { return e.Name() == name })
	}
	if has(frontFile) {
		if _, err := Read(dir); err != nil {
			return Foreign, nil
		}
	}
	switch {
	case has(checkpointFile):
		if b, err := readFile(filepath.Join(dir, checkpointFile), maxCheckpoint); (err != nil || !own(b)) && !ownLog(dir) {
			return Foreign, nil
		}
		return Unfinished, nil
	case has(frontFile):
		return Finished, nil
	case ownLog(dir):
		return Unfinished, nil
	}
	return Foreign, nil
}

// own tells whether a checkpoint names this program as its writer.
func own(checkpoint []byte) bool {
	var c struct {
		Program string `json:"program"`
	}
	return json.Unmarshal(checkpoint, &c) == nil && strings.HasPrefix(c.Program, "legwright ")
}

// Folder is a study folder on disk.
type Folder struct {
	dir   string
	state State // when it was opened
	lock  *lock // nil if there is nothing to write
}

// Intent is what to do with a study that the folder holds already.
type Intent struct {
	Force  bool // begin anew, also over a finished one
	Resume bool // go on with an unfinished one, leave a finished one
}

// Create opens a folder to write a study into, making it if it is not there. It refuses a folder that
// holds other things, one that another process has open, and a study unless the intent allows it. With
// Resume a finished study is no error: the caller sees State() == Finished and leaves it alone. Whoever
// opens a folder closes it.
func Create(dir string, intent Intent) (*Folder, error) {
	state, err := inspect(dir)
	if err != nil {
		return nil, err
	}
	name := Clean(dir)
	switch {
	case state == Foreign:
		return nil, fmt.Errorf("%s: the folder holds other files; give a new or an empty folder", name)
	case state == Finished && !intent.Force && !intent.Resume:
		return nil, fmt.Errorf("%s: the folder holds a finished study; give another folder, or --force to replace the study", name)
	case state == Unfinished && !intent.Force && !intent.Resume:
		if l, err := takeLock(dir); err == nil {
			l.free()
		} else if errors.Is(err, errBusy) {
			return nil, err
		}
		return nil, fmt.Errorf("%s: the folder holds an unfinished study; write --resume to go on with it, or --force to replace it", name)
	}
	f := &Folder{dir: dir, state: state}
	if state == Finished && !intent.Force {
		f.tidy()
		return f, nil
	}
	if err := os.MkdirAll(dir, 0o777); err != nil {
		return nil, fmt.Errorf("%s: the folder cannot be made (%w); give a folder that you may write to", name, bare(err))
	}
	if f.lock, err = takeLock(dir); errors.Is(err, errBusy) {
		return nil, err
	} else if err != nil {
		return nil, fmt.Errorf("%s: the folder cannot be written to (%w); give a folder that you may write to", name, bare(err))
	}
	if now, err := inspect(dir); err != nil || now != state { // another process came and went
		f.Close()
		if err != nil {
			return nil, err
		}
		return Create(dir, intent)
	}
	if err := f.writable(); err != nil {
		f.Close()
		return nil, fmt.Errorf("%s: the folder cannot be written to (%w); give a folder that you may write to", name, bare(err))
	}
	f.sweep()
	return f, nil
}

// Close lets other processes have the folder.
func (f *Folder) Close() error { return f.lock.free() }

// Locked tells whether other processes are kept out: some file systems know no locks.
func (f *Folder) Locked() bool { return f.lock != nil && f.lock.held }

// tidy removes the log and the lock file of a study that was finished by a process that was killed in
// its last moment.
func (f *Folder) tidy() {
	if _, err := os.Stat(filepath.Join(f.dir, lockFile)); err != nil && !ownLog(f.dir) {
		return
	}
	l, err := takeLock(f.dir)
	if err != nil {
		return
	}
	defer l.free()
	if state, err := inspect(f.dir); err == nil && state == Finished {
		f.remove(logFile)
	}
}

// State is what the folder held when it was opened.
func (f *Folder) State() State { return f.state }

// writable tries to write.
func (f *Folder) writable() error {
	t, err := os.CreateTemp(f.dir, ".try-*")
	if err != nil {
		return err
	}
	t.Close()
	return os.Remove(t.Name())
}

// bare is the error of the system without the operation and the path, which the message has already.
func bare(err error) error {
	var p *fs.PathError
	if errors.As(err, &p) {
		return p.Err
	}
	return err
}
