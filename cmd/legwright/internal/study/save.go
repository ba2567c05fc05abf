package study

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"

	"legwright/opt"
)

// File is a file that a brief came from or names, with the path as written and its bytes.
type File struct {
	Name  string
	Bytes []byte
}

// Sources are the input of a study: the brief, and the pose files that it names with the paths that
// it names them by.
type Sources struct {
	Brief File
	Poses []File
}

// briefNames are the names that BriefName gives.
var briefNames = []string{"brief.yaml", "brief.toml", "brief.json"}

// BriefName is the name of the brief's copy in the folder: brief.yaml, brief.toml or brief.json.
func (s *Sources) BriefName() string {
	switch strings.ToLower(filepath.Ext(s.Brief.Name)) {
	case ".toml":
		return "brief.toml"
	case ".json":
		return "brief.json"
	}
	return "brief.yaml"
}

// inside tells whether a pose file can be copied so that the brief's copy finds it.
func inside(name string) bool {
	if !filepath.IsLocal(name) {
		return false
	}
	first, _, _ := strings.Cut(filepath.ToSlash(filepath.Clean(name)), "/")
	switch first {
	case frontFile, tableFile, progressFile, checkpointFile, logFile, lockFile, partFile, pageFile, designsFolder, ".":
		return false
	}
	return !slices.Contains(briefNames, first)
}

// Apart lists the pose files that are not copied into a study folder, because their path leads out of
// the brief's folder or is that of another file of a study.
func (s *Sources) Apart() []string {
	var out []string
	for _, p := range s.Poses {
		if !inside(p.Name) {
			out = append(out, p.Name)
		}
	}
	return out
}

// Result is what a study folder is to hold.
type Result struct {
	Front   *Front
	History []opt.Point
	Sources Sources
	// Encode writes a design file (YAML) that names its brief ../brief.yaml.
	Encode func(Design) ([]byte, error)
	// Sheets gives the sheets of a design, by the names of SheetNames; nil for a study without any.
	Sheets func(Design) (map[string][]byte, error)
	// Certificate gives what was proved of a design whose file holds text; nil for nothing. The field is nil for a search without proofs.
	Certificate func(d Design, text []byte) (*Certificate, error)
	// Part is what merging needs of a part of a study; nil for a whole one.
	Part *Part
	// Unfinished leaves the checkpoint where it is.
	Unfinished bool
}

// Save writes the study: the brief as it was given with its pose files, a file for each design and the sheets of
// some, the tables, and front.json last. Until then the study is known by its checkpoint alone, which the caller
// saves before. Of the study that the folder held when it was opened it removes the designs that are no
// more and the brief of another format, but no pose files: they may be the user's own.
func (f *Folder) Save(r *Result) error {
	if err := f.clear(r); err != nil {
		return err
	}
	if err := f.remove(frontFile); err != nil {
		return err
	}
	if err := f.write(r.Sources.BriefName(), r.Sources.Brief.Bytes); err != nil {
		return err
	}
	for _, p := range r.Sources.Poses {
		if inside(p.Name) {
			if err := f.write(filepath.ToSlash(p.Name), p.Bytes); err != nil {
				return err
			}
		}
	}
	if err := f.saveDesigns(r); err != nil {
		return err
	}
	if err := f.saveSheets(r); err != nil {
		return err
	}
	var b bytes.Buffer
	writeProgress(&b, r.History)
	if err := f.write(progressFile, b.Bytes()); err != nil {
		return err
	}
	if err := f.savePart(r.Part); err != nil {
		return err
	}
	if err := f.saveFront(r.Front); err != nil {
		return err
	}
	if !r.Unfinished {
		return f.RemoveCheckpoint()
	}
	return nil
}

// clear removes the files of the study that the folder held when it was opened and that r does not
// write again: the designs that its front.json lists, and briefs under another name.
func (f *Folder) clear(r *Result) error {
	if f.state == Empty {
		return nil
	}
	for _, name := range briefNames {
		if name != r.Sources.BriefName() {
			if err := f.remove(name); err != nil {
				return err
			}
		}
	}
	before, err := Read(f.dir)
	if err != nil {
		return nil // broken off before its front was written
	}
	for i := range before.Designs {
		name := designName(before.Designs[i].ID)
		if err := errors.Join(f.remove(name), f.remove(name+CertificateEnding)); err != nil {
			return err
		}
		if err := f.removeSheets(before.Designs[i].ID); err != nil {
			return err
		}
	}
	return nil
}

// designName is the path of a design's file in the folder.
func designName(id string) string { return designsFolder + "/" + id + ".yaml" }

// saveDesigns writes the file of each design.
func (f *Folder) saveDesigns(r *Result) error {
	for i := range r.Front.Designs {
		d := &r.Front.Designs[i]
		b, err := r.Encode(*d)
		if err != nil {
			return fmt.Errorf("design %s: %w", d.ID, err)
		}
		if err := f.write(designName(d.ID), b); err != nil {
			return err
		}
		if r.Certificate == nil {
			continue
		}
		c, err := r.Certificate(*d, b)
		if err != nil {
			return fmt.Errorf("design %s: %w", d.ID, err)
		}
		if c == nil {
			continue
		}
		if b, err = Encode(c); err != nil {
			return err
		}
		if err := f.write(designName(d.ID)+CertificateEnding, b); err != nil {
			return err
		}
	}
	return nil
}

// saveFront writes front.csv and front.json.
func (f *Folder) saveFront(front *Front) error {
	var b bytes.Buffer
	if err := writeTable(&b, front); err != nil {
		return err
	}
	if err := f.write(tableFile, b.Bytes()); err != nil {
		return err
	}
	text, err := Encode(front)
	if err != nil {
		return err
	}
	return f.write(frontFile, text)
}

// Encode is a record as JSON: indented, keys in a fixed order, every number the shortest that reads
// back to the same bits.
func Encode(v any) ([]byte, error) {
	var b bytes.Buffer
	e := json.NewEncoder(&b)
	e.SetEscapeHTML(false)
	e.SetIndent("", "  ")
	if err := e.Encode(v); err != nil {
		return nil, err
	}
	return b.Bytes(), nil
}

// write writes a file of the folder whole or not at all. The path is relative to the folder, with
// slashes; folders on the way are made.
func (f *Folder) write(name string, b []byte) error {
	if !filepath.IsLocal(filepath.FromSlash(name)) {
		panic("study: a file outside the folder")
	}
	path := filepath.Join(f.dir, filepath.FromSlash(name))
	if err := os.MkdirAll(filepath.Dir(path), 0o777); err != nil {
		return fmt.Errorf("%s: cannot be written (%w)", Clean(path), bare(err))
	}
	return WriteFile(path, b)
}

// maxCheckpoint bounds what is read of a checkpoint.json, in bytes.
const maxCheckpoint = 1 << 20

// Checkpoint reads the checkpoint of an unfinished study; nil if there is none.
func (f *Folder) Checkpoint() ([]byte, error) {
	b, err := readFile(filepath.Join(f.dir, checkpointFile), maxCheckpoint)
	if errors.Is(err, fs.ErrNotExist) {
		return nil, nil
	}
	return b, err
}

// SaveCheckpoint writes the checkpoint.
func (f *Folder) SaveCheckpoint(b []byte) error { return f.write(checkpointFile, b) }

// RemoveCheckpoint removes the checkpoint and its log if there are any.
func (f *Folder) RemoveCheckpoint() error {
	if err := f.remove(checkpointFile); err != nil {
		return err
	}
	return f.remove(logFile)
}

func (f *Folder) remove(name string) error {
	err := os.Remove(filepath.Join(f.dir, filepath.FromSlash(name)))
	if err != nil && !errors.Is(err, fs.ErrNotExist) {
		return fmt.Errorf("%s: %s cannot be removed (%w)", Clean(f.dir), name, bare(err))
	}
	return nil
}
