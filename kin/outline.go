package kin

import (
	"cmp"
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r3"
)

// LineKind says what a line of an Outline stands for.
type LineKind int

// The kinds of lines.
const (
	BaseEdge     LineKind = iota // between neighbouring base joints
	PlatformEdge                 // between neighbouring platform joints
	PrismaticLeg                 // from base joint to platform joint
	CrankLine                    // a crank or arm, from its pivot
	RodLine                      // a rod of fixed length, one of two of a parallelogram
	RailLine                     // a rail, over the range of its carriage
	ShaftLine                    // a telescopic shaft
	LinkLine                     // a link of an arm
	BarLine                      // a short side of a parallelogram, or a bar that keeps a plate level
	ToolLine                     // from the platform origin to the tool point, or a hand that shows where the tool points
)

var lineNames = [...]string{"base", "platform", "leg", "crank", "rod", "rail", "shaft", "link", "bar", "tool"}

// String is the kind in a word.
func (k LineKind) String() string { return lineNames[k] }

// Line joins two points of an Outline, by number.
type Line struct {
	Kind LineKind
	Leg  int // 0-based, -1 for none
	A, B int
}

// Outline is a machine as lines to draw. Its points are numbered through: the fixed ones first, then those on the
// platform, then the moving ones.
type Outline struct {
	Fixed    []Vec // base frame; the first are the base joints, or pivots, or where rails have the coordinate 0
	Platform []Vec // platform frame; the first are the platform joints, the last two its origin and the tool point
	Moving   int   // number of other points
	Lines    []Line

	Base, Joints []int // the points that are base and platform joints, by leg
	Origin, Tool int   // the points that are the platform's origin and the tool point, which may be a moving one

	machine Machine
}

// NewOutline finds the lines of a machine. Rails are drawn where their coordinate is in [least, most], or
// not at all where that is no range.
func NewOutline(m Machine, least, most float64) *Outline {
	o := &Outline{machine: m}
	switch m := m.(type) {
	case *arm:
		m.outline(o)
	case *toolDelta:
		m.shiftingRods.rods.outline(o, 0, 0)
		m.addShaft(o)
	case *shiftingRods:
		m.rods.outline(o, least, most)
	case *turningRods:
		m.rods.outline(o, least, most)
	default:
		strutOutline(o)
	}
	return o
}

// Points gives all points at the pose p in the base frame, in the order of their numbers, the place
// of the platform, and the posture; false and nothing else if there is none.
func (o *Outline) Points(p *Pose) (points []Vec, s State, ok bool) {
	if o.machine.Move(p, &s); s.Fail != Reached {
		return nil, s, false
	}
	origin, rot := o.Place(p)
	points = append(points, o.Fixed...)
	for _, v := range o.Platform {
		points = append(points, r3.Add(origin, rot.Apply(v)))
	}
	return append(points, o.Move(p, &s)...), s, true
}

// Place is where the points of the platform are: its origin and its rotation in the base frame. It is
// that of the machine, but that a platform which never turns does not turn with the pose.
func (o *Outline) Place(p *Pose) (origin Vec, rot Rot) {
	switch m := o.machine.(type) {
	case *shiftingRods:
		return m.frame.Place(&Pose{P: p.P, R: Identity()})
	case *toolDelta:
		origin, _ = m.frame.Place(p)
		return origin, m.frame.HomeRot
	}
	return o.machine.Place(p)
}

// Move gives the moving points at the pose p with the posture s, base frame.
func (o *Outline) Move(p *Pose, s *State) []Vec {
	switch m := o.machine.(type) {
	case *arm:
		return m.links(s)
	case *toolDelta:
		out := m.shiftingRods.ends3(s)
		origin, _ := m.frame.Place(p)
		return append(out, r3.Add(origin, p.R.Apply(m.frame.Tool)), r3.Add(origin, p.R.Apply(Vec{X: m.hand()})))
	case *shiftingRods:
		return m.ends3(s)
	case *turningRods:
		return m.ends3(s)
	}
	return nil
}

// strutOutline is the outline of machines of prismatic legs.
func strutOutline(o *Outline) {
	f := o.machine.Frame()
	o.Fixed = append(o.Fixed, f.Base...)
	o.plate(f, nil)
	for i := range f.Base {
		o.line(PrismaticLeg, i, o.Base[i], o.Joints[i])
	}
}

// plate adds the platform's joints, other points of it, its origin and the tool point, the edges of both plates and the
// line to the tool. The fixed points are there already, the base joints first.
func (o *Outline) plate(f *Frame, others []Vec) {
	n, first := f.Legs(), len(o.Fixed)
	for i := range n {
		o.Base, o.Joints = append(o.Base, i), append(o.Joints, first+i)
	}
	o.Platform = append(append(o.Platform, f.Platform...), others...)
	o.Origin = len(o.Fixed) + len(o.Platform)
	o.Tool = o.Origin + 1
	o.Platform = append(o.Platform, Vec{}, f.Tool)
	o.edges(BaseEdge, f.Base, 0)
	o.edges(PlatformEdge, f.Platform, first)
	if f.Tool != (Vec{}) {
		o.line(ToolLine, -1, o.Origin, o.Tool)
	}
}

func (o *Outline) line(k LineKind, leg, a, b int) {
	o.Lines = append(o.Lines, Line{Kind: k, Leg: leg, A: a, B: b})
}

// edges joins joints in the order of their azimuths about their middle. Joints that coincide count as one.
func (o *Outline) edges(k LineKind, joints []Vec, first int) {
	var middle Vec
	for _, v := range joints {
		middle = r3.Add(middle, r3.Scale(1/float64(len(joints)), v))
	}
	size := 0.0
	for _, v := range joints {
		size = math.Max(size, r3.Norm(r3.Sub(v, middle)))
	}
	if !(size > 0) {
		return
	}
	azimuth := func(i int) float64 { return math.Atan2(joints[i].Y-middle.Y, joints[i].X-middle.X) }
	var order []int
	for i, v := range joints {
		if !slices.ContainsFunc(order, func(j int) bool { return r3.Norm(r3.Sub(joints[j], v)) <= oneJoint*size }) {
			order = append(order, i)
		}
	}
	slices.SortStableFunc(order, func(a, b int) int { return cmp.Compare(azimuth(a), azimuth(b)) })
	for i, a := range order {
		b := order[(i+1)%len(order)]
		if len(order) == 2 && i == 1 || a == b {
			break
		}
		o.line(k, -1, first+a, first+b)
	}
}
