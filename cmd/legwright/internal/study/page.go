package study

import (
	"errors"
	"fmt"
	"os"
	"path/filepath"
)

// pageFile is the report page.
const pageFile = "report.html"

// Open opens the folder of a study, finished or interrupted, to write what follows from its front again. It
// refuses one that another process has open. Whoever opens a folder closes it.
func Open(dir string) (*Folder, *Front, error) {
	if _, err := Read(dir); err != nil { // not to leave a lock in a folder that is none of ours
		return nil, nil, err
	}
	f := &Folder{dir: dir}
	var err error
	if f.lock, err = takeLock(dir); errors.Is(err, errBusy) {
		return nil, nil, err
	} else if err == nil {
		err = f.writable()
	}
	if err != nil {
		f.Close()
		return nil, nil, fmt.Errorf("%s: the folder cannot be written to (%w); make it yours to write, or copy it", Clean(dir), bare(err))
	}
	front, err := Read(dir)
	if err == nil {
		f.state, err = inspect(dir)
	}
	if err != nil {
		f.Close()
		return nil, nil, err
	}
	return f, front, nil
}

// Brief is the path of the brief's copy in the folder.
func (f *Folder) Brief() (string, error) {
	for _, name := range briefNames {
		path := filepath.Join(f.dir, name)
		if info, err := os.Stat(path); err == nil && info.Mode().IsRegular() {
			return path, nil
		}
	}
	return "", fmt.Errorf("%s: the copy of the brief is missing; put it back as %s", Clean(f.dir), briefNames[0])
}

// SavePage writes the report page. A search writes it before the study, whose front.json comes last.
func (f *Folder) SavePage(b []byte) error { return f.write(pageFile, b) }

// Page is the path of the report page.
func (f *Folder) Page() string { return filepath.Join(f.dir, pageFile) }
