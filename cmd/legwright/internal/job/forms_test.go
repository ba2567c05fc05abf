package job

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
	"legwright/objective"
)

// usual gives two values within a dimension's usual range.
func usual(d *kin.Dimension) (a, b float64) {
	if d.Unit == kin.Sign {
		return -1, 1
	}
	if d.Low == d.High {
		return d.Default, d.Default + 0.1
	}
	return d.Low + 0.4*(d.High-d.Low), d.Low + 0.7*(d.High-d.Low)
}

// form is one way to write a dimension, with the specification that it must become.
type form struct {
	name, text string
	want       objective.Spec
}

func formsOf(d *kin.Dimension) []form {
	a, b := usual(d)
	k := study.DimensionUnit(d.Unit)
	x, y := units.Exact(a, k), units.Exact(b, k)
	fs := []form{
		{"value", x, objective.Spec{Kind: objective.Fixed, Values: []float64{a}}},
		{"choices", fmt.Sprintf("{choices: [%s, %s]}", y, x), objective.Spec{Kind: objective.Choices, Values: []float64{a, b}}},
	}
	if d.Unit != kin.Sign {
		step := (b - a) / 4
		fs = append(fs,
			form{"range", fmt.Sprintf("[%s, %s]", x, y), objective.Spec{Kind: objective.Range, Low: a, High: b}},
			form{"steps", fmt.Sprintf("{from: %s, to: %s, step: %s}", x, y, units.Exact(step, k)),
				objective.Spec{Kind: objective.Steps, Low: a, High: b, Step: step, Levels: 5}})
	}
	if d.Role != kin.Shape {
		fs = append(fs, form{"sized", "sized", objective.Spec{Kind: objective.Sized}})
	}
	return fs
}

// withForm is a brief of the family in which dimension at has the text and all others a value.
func withForm(f *kin.Family, at int, text string) string {
	var dims []string
	for i := 0; i < len(f.Dimensions); i++ {
		name, _, listed := eachOf(f.Dimensions[i].Name)
		if !listed {
			name = f.Dimensions[i].Name
		}
		var items []string
		for ; i < len(f.Dimensions); i++ {
			d := &f.Dimensions[i]
			if n, _, _ := eachOf(d.Name); listed && n != name {
				break
			}
			v, _ := usual(d)
			if strings.HasPrefix(d.Name, "leg_azimuths") {
				v = d.Default // legs spread about
			}
			item := units.Exact(v, study.DimensionUnit(d.Unit))
			if i == at {
				item = text
			}
			items = append(items, item)
			if !listed {
				break
			}
		}
		if listed {
			i--
			dims = append(dims, fmt.Sprintf("%s: [%s]", name, strings.Join(items, ", ")))
			continue
		}
		dims = append(dims, name+": "+items[0])
	}
	home := f.Freedoms[0].String() + ": [0 mm, 0 mm]"
	if f.Freedoms[0] >= kin.Roll {
		home = f.Freedoms[0].String() + ": [0 deg, 0 deg]"
	}
	return fmt.Sprintf("family: %s\ndimensions: {%s}\nduty: {zones: [{name: home, box: {%s}, samples: 1}]}\ngoals: [{maximise: conditioning}]\n",
		f.Name, strings.Join(dims, ", "), home)
}

// Every form of every dimension of every family goes from a brief into the plan, and a design of the
// plan through its design file back to the same values.
func TestFormsOfEveryDimension(t *testing.T) {
	for k, f := range kin.Families() {
		if testing.Short() && k%4 != 1 {
			continue // one family in four is enough for short runs
		}
		for at := range f.Dimensions {
			for _, c := range formsOf(&f.Dimensions[at]) {
				name := f.Name + " " + f.Dimensions[at].Name + " " + c.name
				s, err := parse(t, withForm(f, at, c.text))
				if err != nil {
					t.Fatalf("%s: %v", name, err)
				}
				p := s.Plans[0]
				if got := p.Specs[at]; fmt.Sprint(got) != fmt.Sprint(c.want) {
					t.Errorf("%s: specification %v, want %v", name, got, c.want)
				}
				keeps(t, name, s)
			}
		}
	}
}

// keeps takes a design of the plan through its record and its design file.
func keeps(t *testing.T, name string, s *Study) {
	t.Helper()
	p := s.Plans[0]
	x := make([]float64, len(p.Free()))
	for k, i := range p.Free() {
		if sp := &p.Specs[i]; sp.Kind == objective.Range {
			x[k] = sp.Low + (sp.High-sp.Low)/3
		} else {
			x[k] = 1 // the second step or choice
		}
	}
	values := make([]float64, len(p.Specs))
	p.Values(x, values)
	r := study.Design{Family: p.Family.Name, Dimensions: map[string]study.Number{}}
	for i, v := range values {
		r.Dimensions[p.Family.Dimensions[i].Name] = study.Number(v)
	}
	if slices.ContainsFunc(values, math.IsNaN) { // for the duty to find
		r = study.FromAppraisal(s.Tasks[0], objective.Appraise(s.Tasks[0], p, values))
	}
	for i, v := range values {
		dim := &p.Family.Dimensions[i]
		got, ok := r.Dimensions[dim.Name]
		switch {
		case !math.IsNaN(v) && float64(got) != v:
			t.Errorf("%s: the record has %s %v, not %v", name, dim.Name, got, v)
		case math.IsNaN(v) && (!ok || dim.Role == kin.Span && got <= 0): // home is out of reach
			a, _ := usual(dim)
			r.Dimensions[dim.Name] = study.Number(a)
		}
		values[i] = float64(r.Dimensions[dim.Name])
	}
	d, err := brief.ParseDesign("design.yaml", EncodeDesign(r, ""), *Known())
	if err != nil {
		t.Errorf("%s: %v", name, err)
		return
	}
	back, err := s.plan(s.Tasks[0], d)
	if err != nil {
		t.Errorf("%s: %v", name, err)
		return
	}
	for i, v := range back.Single() {
		if v != values[i] {
			t.Errorf("%s: %s is %v, was %v", name, p.Family.Dimensions[i].Name, v, values[i])
		}
	}
}
