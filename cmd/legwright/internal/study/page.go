package study

import (
	"fmt"
	"os"
	"path/filepath"
)

// pageFile is the report page.
const pageFile = "report.html"

// Open opens the folder of a study, finished or interrupted, to write what follows from its front again.
func Open(dir string) (*Folder, *Front, error) {
	front, err := Read(dir)
	if err != nil {
		return nil, nil, err
	}
	state, err := inspect(dir)
	if err != nil {
		return nil, nil, err
	}
	f := &Folder{dir: dir, state: state}
	if err := f.writable(); err != nil {
		return nil, nil, fmt.Errorf("%s: the folder cannot be written to (%w); make it yours to write, or copy it", Clean(dir), bare(err))
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
