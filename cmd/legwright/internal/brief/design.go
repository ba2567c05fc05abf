package brief

import (
	"fmt"
	"path/filepath"
	"slices"
	"strings"

	"legwright/cmd/legwright/internal/units"
)

// Design is one geometry: a family and a value for every dimension, or joint centres given outright.
// All numbers are in SI units and radians.
type Design struct {
	Brief      string            `json:"brief,omitempty" mapstructure:"brief"` // as the file gives it; "": none
	ID         string            `json:"id,omitempty" mapstructure:"id"`       // where it comes from
	Title      string            `json:"title,omitempty" mapstructure:"title"`
	Family     string            `json:"family" mapstructure:"family"`
	Dimensions []DesignDimension `json:"dimensions" mapstructure:"dimensions"`
	Joints     *DesignJoints     `json:"joints,omitempty" mapstructure:"joints"`
	Home       *[6]float64       `json:"home,omitempty" mapstructure:"home"` // platform origin and roll, pitch, yaw of R_home, base frame
	Rails      []Rail            `json:"rails,omitempty" mapstructure:"rails"`

	places places
}

// DesignDimension is the value of one dimension, or one value for each leg.
type DesignDimension struct {
	Name   string     `json:"name"`
	Kind   units.Kind `json:"kind"`
	Values []float64  `json:"values"`
}

// DesignJoints are joint centres given outright, in place of the dimensions that place joints.
type DesignJoints struct {
	Base     [][3]float64 `json:"base,omitempty"` // base frame; nil where rails are given
	Platform [][3]float64 `json:"platform"`       // platform frame
}

// Rail is the line of a slider in the base frame. The direction need not have length 1.
type Rail struct {
	Point     [3]float64 `json:"point"`
	Direction [3]float64 `json:"direction"`
}

// LoadDesign reads a design file. The error is of type Faults.
func LoadDesign(file string, known Known) (*Design, error) {
	if format(file) == "" {
		return nil, unknownFormat(file)
	}
	data, err := readFile(file, maxFile)
	if err != nil {
		return nil, Faults{{Position{File: file}, "", err.Error(), "give the path of a design file"}}
	}
	return ParseDesign(file, data, known)
}

// ParseDesign is LoadDesign of text in memory.
func ParseDesign(file string, data []byte, known Known) (*Design, error) {
	if format(file) == "" {
		return nil, unknownFormat(file)
	}
	r := newReader(file, &known)
	d := &Design{}
	if err := r.through(file, data, r.design, nil, d); err != nil {
		return nil, err
	}
	d.places = r.places
	return d, nil
}

// BriefFile is the path of the brief that the design names, "" if it names none.
func (d *Design) BriefFile() string {
	if d.Brief == "" || filepath.IsAbs(d.Brief) {
		return d.Brief
	}
	return filepath.Join(filepath.Dir(d.places.file), d.Brief)
}

// Values gives every dimension by name; those with one value for each leg as name_1, name_2, …
func (d *Design) Values() map[string]float64 {
	out := map[string]float64{}
	for _, dim := range d.Dimensions {
		if len(dim.Values) == 1 {
			out[dim.Name] = dim.Values[0]
			continue
		}
		for i, v := range dim.Values {
			out[fmt.Sprintf("%s_%d", dim.Name, i+1)] = v
		}
	}
	return out
}

// Fault is a fault of the design file at the place of the key, or of the nearest key around it.
func (d *Design) Fault(path, problem, remedy string) Fault {
	return Fault{d.places.find(path), path, problem, remedy}
}

// designKeys are the keys of a design file, in the order in which they are read.
func designKeys() []key {
	return []key{
		{name: "brief", read: readPath},
		{name: "id", read: readName},
		{name: "title", read: readTitle},
		{name: "family", need: true, read: readOneFamily},
		{name: "dimensions", read: func(_ *reader, n *node) any { return n }},
		{name: "joints", read: readOutright},
		{name: "home", read: readHome},
		{name: "rails", read: readRails},
	}
}

// readPath reads the path of a file.
func readPath(r *reader, n *node) any {
	if s, ok := r.word(n, "the path of a file"); ok {
		return s
	}
	return nil
}

// readOneFamily reads the family of a design.
func readOneFamily(r *reader, n *node) any {
	if n.shape == list {
		r.refuse(n, "a design has one family", "write its name alone")
		return nil
	}
	fs, _ := readFamily(r, n).(families)
	if len(fs.names) == 0 {
		return nil
	}
	return fs.names[0]
}

// outright tells what a design file gives in place of dimensions.
type outright struct{ joints, home, rails *node }

func (o outright) replaces(p Places) *node {
	switch p {
	case PlacesJoints:
		return o.joints
	case PlacesHome:
		return o.home
	case PlacesRails:
		return o.rails
	}
	return nil
}

// wants tells whether the design must give the dimension. A brief may size the range, and forward
// kinematics needs neither that nor, where joints are given, a home.
func (o outright) wants(d *KnownDimension) bool {
	return !d.Optional && !d.Sizable && o.replaces(d.Places) == nil && !(d.Places == PlacesHome && o.joints != nil)
}

// design reads the whole tree of a design file.
func (r *reader) design(n *node) map[string]any {
	m := r.mapping(n, designKeys())
	if m == nil {
		return nil
	}
	var o outright
	o.joints, _ = n.child("joints")
	o.home, _ = n.child("home")
	o.rails, _ = n.child("rails")
	if o.rails != nil && o.joints == nil {
		r.missing(n, "joints")
	}
	if j := o.joints; j != nil && j.shape == mapping && o.rails == nil {
		if _, ok := j.child("base"); !ok && !near1(j, "base") {
			r.missing(j, "base")
		}
	}
	dims, given := m["dimensions"].(*node)
	delete(m, "dimensions")
	if len(r.families) == 0 {
		return m
	}
	f := r.families[0]
	if !given {
		if slices.ContainsFunc(f.Dimensions, func(d KnownDimension) bool { return o.wants(&d) }) {
			r.missing(n, "dimensions")
		}
		return m
	}
	m["dimensions"] = r.designDimensions(dims, f, o)
	return m
}

func (r *reader) designDimensions(n *node, f *KnownFamily, o outright) (out []DesignDimension) {
	if !r.isMapping(n, "the dimensions: "+strings.Join(dimensionNames(f), ", ")) {
		return nil
	}
	excused := r.strangers(n, dimensionNames(f))
	for i := range f.Dimensions {
		d := &f.Dimensions[i]
		instead := o.replaces(d.Places)
		v, ok := n.child(d.Name)
		switch {
		case ok && instead != nil:
			r.fault(v.key, v.path, fmt.Sprintf("%s on line %d gives it outright", instead.path, instead.key.Line), "leave one of them out")
		case ok:
			if values := r.designValues(v, d); values != nil {
				out = append(out, DesignDimension{d.Name, d.Kind, values})
			}
		case o.wants(d) && !excused[d.Name]:
			r.lacks(n, d.Name, d.Name+": "+d.Kind.Sample())
		}
	}
	return out
}

// designValues reads the value of a dimension, or its values for each leg.
func (r *reader) designValues(n *node, d *KnownDimension) []float64 {
	s := d.sign()
	if d.Each > 1 && (n.shape == list || d.Kind != units.Sign) {
		values := make([]float64, d.Each)
		if !r.fill(n, values, d.Kind, s) {
			return nil
		}
		return values
	}
	if n.shape == list || n.shape == mapping || n.shape == text && n.text == "sized" {
		r.refuse(n, "a design has one value for each dimension", "write a value, such as "+d.Kind.Sample())
		return nil
	}
	v, ok := r.dimensionValue(n, d)
	if !ok {
		return nil
	}
	return slices.Repeat([]float64{v}, max(d.Each, 1))
}
