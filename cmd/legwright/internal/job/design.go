package job

import (
	"fmt"
	"math"
	"slices"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
	"legwright/objective"
)

// Design reads a design file and the brief to judge it by: briefFile, or the one that the design names.
// The plan leaves nothing open but an actuator range that the file leaves out and the brief sizes.
func Design(file, briefFile string) (*Study, *objective.Task, *objective.Plan, error) {
	d, err := brief.LoadDesign(file, *Known())
	if err != nil {
		return nil, nil, nil, err
	}
	if briefFile == "" {
		briefFile = d.BriefFile()
	}
	if briefFile == "" {
		return nil, nil, nil, brief.Faults{d.Fault("", "names no brief", "write brief: FILE in it, or give one with --brief")}
	}
	b, err := brief.Load(briefFile, *Known())
	if err != nil {
		return nil, nil, nil, err
	}
	s, err := New(b)
	if err != nil {
		return nil, nil, nil, err
	}
	f := kin.FamilyNamed(d.Family)
	t := task(b, f)
	if t.Rule == objective.LengthOfPlatform && f.Index("platform_radius") < 0 {
		return nil, nil, nil, brief.Faults{b.Fault("characteristic_length", f.Name+", the design's family, has no platform_radius", "write a length or duty")}
	}
	t.Prepare()
	p, err := s.plan(t, d)
	s.foreign = !slices.ContainsFunc(b.Families, func(f brief.Family) bool { return f.Name == d.Family })
	return s, t, p, err
}

// plan is the plan of a single design under the study's brief.
func (s *Study) plan(t *objective.Task, d *brief.Design) (*objective.Plan, error) {
	var of *objective.Plan
	for _, p := range s.Plans {
		if p.Family.Name == d.Family {
			of = p
		}
	}
	f := kin.FamilyNamed(d.Family)
	values, missing := dimensionValues(f, d)
	specs := make([]objective.Spec, len(values))
	var faults brief.Faults
	for i, v := range values {
		dim := &f.Dimensions[i]
		specs[i] = objective.Spec{Kind: objective.Fixed, Values: []float64{v}}
		switch {
		case !missing[i] || d.Joints != nil && dim.Joints:
		case dim.Role != kin.Shape && of != nil && leftToDuty(of, i):
			specs[i] = of.Specs[i]
		default:
			faults = append(faults, d.Fault("dimensions", dim.Name+" is missing", "write "+dim.Name+": "+study.DimensionUnit(dim.Unit).Sample()))
		}
	}
	joints, err := outright(d, values)
	if err != nil {
		return nil, err
	}
	if joints != nil && !homeGiven(d) {
		faults = append(faults, d.Fault("joints", "joints are given outright, but not where the platform is at home", "write home: [x, y, z, roll, pitch, yaw], or home_height under dimensions"))
	}
	if err := faults.Err(); err != nil {
		return nil, err
	}
	p := objective.NewPlan(t, f, specs)
	p.Joints = joints
	return p, nil
}

// leftToDuty tells whether a design may leave dimension i, of the actuator range, to the brief's plan:
// the duty sizes it, or derives the range within what the brief allows.
func leftToDuty(of *objective.Plan, i int) bool {
	kind := of.Specs[i].Kind
	return kind == objective.Sized || of.Derive && kind != objective.Choices
}

// dimensionValues puts a design's dimensions into the family's order; missing tells which have neither
// value nor default. Those that place joints have no default beside joints given outright.
func dimensionValues(f *kin.Family, d *brief.Design) (values []float64, missing []bool) {
	given := d.Values()
	values, missing = make([]float64, len(f.Dimensions)), make([]bool, len(f.Dimensions))
	for i := range f.Dimensions {
		dim := &f.Dimensions[i]
		v, ok := given[dim.Name]
		switch {
		case ok:
			values[i] = v
		case dim.Optional && !(d.Joints != nil && dim.Joints):
			values[i] = dim.Default
		default:
			values[i], missing[i] = math.NaN(), true
		}
	}
	return values, missing
}

// outright gives the joints of a design file, or nil. values are the design's dimensions.
func outright(d *brief.Design, values []float64) (*kin.Joints, error) {
	if d.Joints == nil {
		return nil, nil
	}
	j := &kin.Joints{HomeRot: kin.Identity(), Values: values}
	f := kin.FamilyNamed(d.Family)
	for _, p := range d.Joints.Base {
		j.Base = append(j.Base, vec(p))
	}
	for _, p := range d.Joints.Platform {
		j.Platform = append(j.Platform, vec(p))
	}
	for _, r := range d.Rails {
		j.Rails = append(j.Rails, kin.Rail{Point: vec(r.Point), Direction: vec(r.Direction)})
		j.Base = append(j.Base, vec(r.Point))
	}
	if len(d.Rails) == 0 && f.Rails {
		return nil, brief.Faults{d.Fault("joints", "joints are given outright, but no rails", "write rails: [{point: [x, y, z], direction: [x, y, z]}, …]")}
	}
	if len(j.Base) != f.Legs || len(j.Platform) != f.Legs {
		return nil, brief.Faults{d.Fault("joints", fmt.Sprintf("%d base and %d platform joints", len(j.Base), len(j.Platform)),
			fmt.Sprintf("write %d of each", f.Legs))}
	}
	if !f.Has(kin.Z) && !f.Has(kin.Roll) {
		for i := range j.Base {
			if j.Base[i].Z != 0 || j.Platform[i].Z != 0 {
				return nil, brief.Faults{d.Fault("joints", "the joints of a planar machine lie in its plane", "write 0 mm for z")}
			}
		}
	}
	if h := d.Home; h != nil {
		j.Home = kin.Vec{X: h[0], Y: h[1], Z: h[2]}
		j.HomeRot = kin.RPY(h[3], h[4], h[5])
		return j, nil
	}
	if h, ok := d.Values()["home_height"]; ok { // straight above
		j.Home.Z = h
	}
	if h, ok := d.Values()["home_heading"]; ok {
		j.HomeRot = kin.RPY(0, 0, h)
	}
	return j, nil
}

// homeGiven tells whether a design with joints outright says where the platform is at home.
func homeGiven(d *brief.Design) bool {
	v := d.Values()
	_, height := v["home_height"]
	_, heading := v["home_heading"]
	return d.Home != nil || height || heading
}

// Machine builds the machine of a design file for forward kinematics alone: it
// needs no brief, no actuator range and, with joints outright, no home; home
// tells whether the design says where that is.
func Machine(file string) (m kin.Machine, f *kin.Family, home bool, err error) {
	d, err := brief.LoadDesign(file, *Known())
	if err != nil {
		return nil, nil, false, err
	}
	f = kin.FamilyNamed(d.Family)
	values, missing := dimensionValues(f, d)
	joints, err := outright(d, values)
	if err != nil {
		return nil, nil, false, err
	}
	var setup kin.Setup
	var faults brief.Faults
	for i, m := range missing {
		if dim := &f.Dimensions[i]; m && dim.Role == kin.Shape && !(joints != nil && dim.Joints) {
			faults = append(faults, d.Fault("dimensions", dim.Name+" is missing", "write "+dim.Name+": "+study.DimensionUnit(dim.Unit).Sample()))
		}
	}
	if err := faults.Err(); err != nil {
		return nil, nil, false, err
	}
	if joints != nil {
		return f.Outright(joints, &setup), f, homeGiven(d), nil
	}
	return f.Build(values, &setup), f, true, nil
}

// Beyond says which of the actuator values lie outside the range that the design file gives, or nothing.
func Beyond(file string, q []float64) string {
	d, err := brief.LoadDesign(file, *Known())
	if err != nil {
		return ""
	}
	f := kin.FamilyNamed(d.Family)
	least, span := f.Range()
	if least < 0 {
		return ""
	}
	values, missing := dimensionValues(f, d)
	if missing[least] || missing[span] {
		return ""
	}
	low, high := values[least], values[least]+values[span]
	k := study.DimensionUnit(f.Dimensions[least].Unit)
	for i, v := range q[:len(q)-f.Free] {
		if slack := objective.Tolerance * math.Abs(v); v < low-slack || v > high+slack {
			return fmt.Sprintf("actuator %d: %s is outside its range, %s to %s", i+1, units.Format(v, k, 6), units.Format(low, k, 6), units.Format(high, k, 6))
		}
	}
	return ""
}

// EncodeDesign writes the design file of a record. briefFile is the path of the brief from there.
func EncodeDesign(r study.Design, briefFile string) []byte {
	f := kin.FamilyNamed(r.Family)
	d := &brief.Design{Brief: briefFile, ID: r.ID, Family: r.Family}
	for i := range f.Dimensions {
		dim := &f.Dimensions[i]
		v, ok := r.Dimensions[dim.Name]
		if !ok {
			continue
		}
		name, _, listed := eachOf(dim.Name)
		if n := len(d.Dimensions); listed && n > 0 && d.Dimensions[n-1].Name == name {
			d.Dimensions[n-1].Values = append(d.Dimensions[n-1].Values, float64(v))
			continue
		}
		if !listed {
			name = dim.Name
		}
		d.Dimensions = append(d.Dimensions, brief.DesignDimension{Name: name, Kind: study.DimensionUnit(dim.Unit), Values: []float64{float64(v)}})
	}
	return d.Encode()
}
