package study

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"math"
	"os"
	"path/filepath"
	"regexp"
)

// maxFront bounds what is read of a front.json, in bytes.
const maxFront = 1 << 30

// Read reads the front of a study folder. Fields that it does not know are passed over; a file of
// another format, a damaged one, or one whose designs lack what the front promises is an error that
// names the file.
func Read(dir string) (*Front, error) {
	path := filepath.Join(dir, frontFile)
	b, err := readFile(path, maxFront)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return nil, fmt.Errorf("%s: there is no front.json; give the folder that `legwright search -o` has written", Clean(dir))
	case err != nil:
		if info, e := os.Stat(dir); e == nil && !info.IsDir() {
			return nil, fmt.Errorf("%s: is a file; give the folder of a study", Clean(dir))
		}
		return nil, fmt.Errorf("%s: cannot be read (%w)", Clean(path), bare(err))
	}
	f, err := Decode(b)
	if err != nil {
		return nil, fmt.Errorf("%s: %w", Clean(path), err)
	}
	return f, nil
}

// Decode reads the text of a front.json.
func Decode(b []byte) (*Front, error) {
	const again = "search again, or take the file from a backup"
	var head struct {
		Format string `json:"format"`
	}
	f := new(Front)
	if err := json.Unmarshal(b, &head); err != nil {
		return nil, fmt.Errorf("%w; %s", unreadable(b, err), again)
	}
	if head.Format != Format {
		return nil, fmt.Errorf("format is %.60q, not %q; give a front.json that this program has written", Clean(head.Format), Format)
	}
	d := json.NewDecoder(bytes.NewReader(b))
	if err := d.Decode(f); err != nil {
		return nil, fmt.Errorf("%w; %s", unreadable(b, err), again)
	}
	if _, err := d.Token(); err != io.EOF {
		return nil, fmt.Errorf("there is more after the front; %s", again)
	}
	if err := f.check(); err != nil {
		return nil, fmt.Errorf("%w; %s", err, again)
	}
	f.restore()
	return f, nil
}

// unreadable words an error of the JSON decoder, which may quote any length of the text, with its place.
func unreadable(b []byte, err error) error {
	return fmt.Errorf("%s: %.200s", place(b, err), Clean(err.Error()))
}

// place is the line of a fault in the text.
func place(b []byte, err error) string {
	at := int64(len(b))
	var s *json.SyntaxError
	var t *json.UnmarshalTypeError
	switch {
	case errors.As(err, &s):
		at = s.Offset
	case errors.As(err, &t):
		at = t.Offset
	}
	at = min(max(at, 0), int64(len(b)))
	return fmt.Sprintf("line %d", 1+bytes.Count(b[:at], []byte("\n")))
}

var idForm = regexp.MustCompile(`^[0-9]{3,9}$`)

// check looks for what ranking and tables rely on.
func (f *Front) check() error {
	if len(f.Goals) == 0 {
		return errors.New("goals: the list is empty")
	}
	for i, g := range f.Goals {
		if g.Measure == "" || g.Sense != Maximise && g.Sense != Minimise {
			return fmt.Errorf("goals[%d]: a measure with the sense maximise or minimise is wanted, not %.60q %.60q", i, Clean(g.Sense), Clean(g.Measure))
		}
	}
	if n := len(f.ReferencePoint); n != 0 && n != len(f.Goals) {
		return fmt.Errorf("reference_point: has %d numbers for %d goals", n, len(f.Goals))
	}
	seen := map[string]bool{}
	for i := range f.Designs {
		d := &f.Designs[i]
		switch {
		case !idForm.MatchString(d.ID):
			return fmt.Errorf("designs[%d].id: %.60q is not a number such as 001", i, Clean(d.ID))
		case seen[d.ID]:
			return fmt.Errorf("designs[%d].id: %s is there twice", i, d.ID)
		case d.Family == "":
			return fmt.Errorf("designs[%d].family: is missing", i)
		}
		seen[d.ID] = true
		for _, g := range f.Goals {
			if _, ok := d.Measures[g.Measure]; !ok {
				return fmt.Errorf("designs[%d].measures: the goal %.60s is missing", i, Clean(g.Measure))
			}
		}
	}
	for i := range f.Families {
		if f.Families[i].Name == "" {
			return fmt.Errorf("families[%d].name: is missing", i)
		}
	}
	if f.Help != nil {
		for i, r := range f.Help.Relaxations {
			if r.Design < 0 || r.Design >= len(f.Help.Nearest) {
				return fmt.Errorf("infeasible.relaxations[%d].design: there is no design %d", i, r.Design)
			}
		}
	}
	return nil
}

// restore puts the sign back to values that were written as null: the worst there is, where a limit
// does not hold.
func (f *Front) restore() {
	for i := range f.Designs {
		f.Designs[i].restore()
	}
	if f.Help != nil {
		for i := range f.Help.Nearest {
			f.Help.Nearest[i].restore()
		}
	}
}

func (d *Design) restore() {
	for i := range d.Limits {
		l := &d.Limits[i]
		if !l.Holds && math.IsInf(float64(l.Margin), 1) {
			l.Margin = -l.Margin
		}
		if l.Unbounded && !l.Holds && l.Sense == AtLeast && math.IsInf(float64(l.Value), 1) {
			l.Value = -l.Value
		}
	}
	for i := range d.Excursions {
		if e := &d.Excursions[i]; math.IsInf(float64(e.Low), 1) {
			e.Low = -e.Low
		}
	}
}
