package brief

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"

	"github.com/go-viper/mapstructure/v2"
	"github.com/spf13/viper"
)

// Load reads a brief. The error is of type Faults and holds every fault of the brief and of the pose
// files that it names.
func Load(file string, known Known) (*Brief, error) {
	if format(file) == "" {
		return nil, unknownFormat(file)
	}
	data, err := readFile(file, maxFile)
	if err != nil {
		return nil, Faults{{Position{File: file}, "", err.Error(), "give the path of a brief"}}
	}
	return Parse(file, data, known)
}

// Parse is Load of text in memory; file gives the format, the folder of pose files and the name in
// faults.
func Parse(file string, data []byte, known Known) (*Brief, error) {
	if format(file) == "" {
		return nil, unknownFormat(file)
	}
	r := newReader(file, &known)
	b := &Brief{}
	err := r.through(file, data, r.brief, map[string]any{
		"mount":                 floor,
		"tool":                  [3]float64{},
		"actuator.dead_ratio":   1.0,
		"joints.axis":           Axis{Kind: "home_leg"},
		"legs.end_fixity":       1.0,
		"characteristic_length": Length{Kind: "duty"},
		"singular_below":        1e-6,
		"search.evaluations":    20000,
		"search.population":     0,
		"search.seed":           int64(1),
		"search.front":          200,
	}, b)
	if err != nil {
		return nil, err
	}
	b.places = r.places
	return b, nil
}

// delimiter parts the levels of a viper key; no key holds it, so that a dot in one stays a dot.
const delimiter = "\x1f"

// through leads a file through viper: its decoder is the strict one of this package, its defaults
// are the given ones (levels parted by dots), and it decodes into out. The error is of type Faults.
func (r *reader) through(file string, data []byte, read func(*node) map[string]any, defaults map[string]any, out any) error {
	v := viper.NewWithOptions(
		viper.KeyDelimiter(delimiter),
		viper.WithDecoderRegistry(decoder{r, file, read}),
	)
	for path, value := range defaults {
		v.SetDefault(string(bytes.ReplaceAll([]byte(path), []byte("."), []byte(delimiter))), value)
	}
	v.SetConfigType(format(file))
	err := v.ReadConfig(bytes.NewReader(data))
	var f Fault
	switch {
	case errors.As(err, &f):
		return Faults{f}
	case len(r.faults) > 0:
		return r.err()
	case err != nil:
		return fmt.Errorf("brief: %s: %w", file, err)
	}
	err = v.UnmarshalExact(out, func(c *mapstructure.DecoderConfig) {
		c.WeaklyTypedInput = false
		c.DecodeHook = nil
	})
	if err != nil {
		return fmt.Errorf("brief: %s: %w", file, err)
	}
	return nil
}

// decoder is the strict decoder in viper's clothes.
type decoder struct {
	r    *reader
	file string
	read func(*node) map[string]any
}

// Decoder implements viper.DecoderRegistry.
func (d decoder) Decoder(string) (viper.Decoder, error) { return d, nil }

// Decode implements viper.Decoder. It fills the map with values that are checked and in SI units.
func (d decoder) Decode(data []byte, out map[string]any) error {
	tree, err := parse(d.file, format(d.file), data)
	if err != nil {
		return err
	}
	for name, value := range d.read(tree) {
		out[name] = value
	}
	return nil
}

func unknownFormat(file string) error {
	if info, err := os.Stat(file); err == nil && info.IsDir() {
		return Faults{{Position{File: file}, "", "is a folder", "give a file in it, such as " + filepath.Join(file, "designs", "001.yaml") + " of a study"}}
	}
	return Faults{{Position{File: file}, "", fmt.Sprintf("%q is no known ending", filepath.Ext(file)), "name the file .yaml, .toml or .json"}}
}

// maxPath bounds the path of a file, in bytes; systems have such a bound, too.
const maxPath = 4000

// ReadText reads the text of a brief for Parse.
func ReadText(file string) ([]byte, error) {
	text, err := readFile(file, maxFile)
	if err != nil {
		return nil, fmt.Errorf("%w; give the path of a brief", err)
	}
	return text, nil
}

// readFile reads a plain file of bounded size.
func readFile(file string, bound int64) ([]byte, error) {
	if len(file) > maxPath {
		return nil, fmt.Errorf("the path %q has %d bytes, more than %d", short(file), len(file), maxPath)
	}
	info, err := os.Stat(file)
	switch {
	case errors.Is(err, os.ErrNotExist):
		return nil, fmt.Errorf("there is no file %s", file)
	case err != nil:
		return nil, fmt.Errorf("cannot read %s: %w", file, err)
	case !info.Mode().IsRegular():
		return nil, fmt.Errorf("%s is no plain file", file)
	case info.Size() > bound:
		return nil, fmt.Errorf("%s has more than %d bytes", file, bound)
	}
	f, err := os.Open(file)
	if err != nil {
		return nil, fmt.Errorf("cannot read %s: %w", file, err)
	}
	defer f.Close()
	data, err := io.ReadAll(io.LimitReader(f, bound+1))
	if err != nil {
		return nil, fmt.Errorf("cannot read %s: %w", file, err)
	}
	if int64(len(data)) > bound {
		return nil, fmt.Errorf("%s has more than %d bytes", file, bound)
	}
	return data, nil
}
