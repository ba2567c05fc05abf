package handover

import (
	"fmt"
	"math"
	"strconv"

	"legwright/kin"
	"legwright/objective"

	"gonum.org/v1/gonum/spatial/r3"
)

// The plates that points belong to.
const (
	onBase     = "base"
	onDrive    = "drive" // crank ends and carriages, at home
	onPlatform = "platform"
)

// point is a joint centre or another place that tables and plans name.
type point struct {
	name  string // B1, K1, P1, …; P1a and P1b for the rods of a parallelogram
	plate string
	leg   int // 0-based, -1 for none
	what  string
	base  kin.Vec // in the base frame, the machine at home
	own   kin.Vec // of a platform's point: in the platform frame
	hole  bool    // wants a hole in its plate
}

// axis is a direction that a point has.
type axis struct {
	point, what, frame string
	dir                kin.Vec // in that frame
	base               kin.Vec // the same in base axes at home
}

// link is a distance between two points.
type link struct {
	leg            int
	what, from, to string
	length         float64
}

// model is the machine at home, as tables and plans want it.
type model struct {
	points []point
	axes   []axis
	links  []link
	home   bool // home can be reached: crank ends and carriages are known
	origin kin.Vec
	rot    kin.Rot
}

func newModel(a *objective.Appraisal) model {
	f, fr := a.Plan.Family, a.Machine.Frame()
	var s kin.State
	home := kin.NewPose(kin.Coords{})
	a.Machine.Move(&home, &s)
	m := model{home: s.Fail == kin.Reached, origin: fr.Home, rot: fr.HomeRot}
	if f.Index("upper_arm") >= 0 {
		m.levelArm(a, &s)
		return m
	}
	mounts := kin.Mountings(a.Machine)
	w := wordsOf(f, fr)
	legs := fr.Legs() - f.Free
	for i := range legs {
		m.leg(i, fr, &s, &mounts[i], &w)
	}
	if f.Free > 0 {
		foot, top := "B"+strconv.Itoa(legs+1), "P"+strconv.Itoa(legs+1)
		m.points = append(m.points,
			point{name: foot, plate: onBase, leg: legs, what: "universal joint of the shaft", hole: true},
			point{name: top, plate: onPlatform, leg: legs, what: "universal joint of the shaft", base: fr.Home, hole: true})
		m.axes = append(m.axes, axis{foot, "shaft upright", onBase, kin.Vec{Z: 1}, kin.Vec{Z: 1}})
		m.links = append(m.links, link{legs, "shaft at home", foot, top, r3.Norm(fr.Home)})
	}
	if fr.Rails != nil && a.Plan.Family.Rails {
		m.railEnds(a, fr)
	}
	m.order()
	return m
}

// words are what a family's joints are called.
type words struct{ base, drive, platform, link string }

func wordsOf(f *kin.Family, fr *kin.Frame) words {
	planar := !f.Has(kin.Z) && !f.Has(kin.Roll)
	switch {
	case fr.Tied:
		return words{base: "revolute joint (hinge)", platform: "spherical joint"}
	case fr.Rods == nil && planar:
		return words{base: "revolute joint", platform: "revolute joint"}
	case fr.Rods == nil:
		return words{base: "universal joint", platform: "spherical joint"}
	case f.Index("rod_spacing") >= 0 && fr.Rails != nil:
		return words{base: "rail, coordinate 0", drive: "carriage at home", platform: "middle between the two rods"}
	case f.Index("rod_spacing") >= 0:
		return words{base: "arm pivot (revolute)", drive: "knee at home", platform: "middle between the two rods", link: "arm"}
	case fr.Rails != nil:
		return words{base: "rail, coordinate 0", drive: "carriage at home, universal joint", platform: "spherical joint"}
	case planar:
		return words{base: "crank pivot (revolute)", drive: "elbow at home, revolute joint", platform: "revolute joint", link: "crank"}
	}
	return words{base: "crank pivot (revolute)", drive: "crank end at home, universal joint", platform: "spherical joint", link: "crank"}
}

// leg adds the points, axes and links of one leg.
func (m *model) leg(i int, fr *kin.Frame, s *kin.State, mt *kin.Mounting, w *words) {
	n := strconv.Itoa(i + 1)
	b, k, p := "B"+n, "K"+n, "P"+n
	m.points = append(m.points, point{name: b, plate: onBase, leg: i, what: w.base, base: fr.Base[i], hole: true})
	if mt.Hinge != (kin.Vec{}) {
		m.axes = append(m.axes, axis{b, "hinge", onBase, mt.Hinge, mt.Hinge})
	}
	if fr.Rails != nil {
		m.axes = append(m.axes, axis{b, "rail", onBase, fr.Rails[i], fr.Rails[i]})
	}
	twin := mt.Side != kin.Vec{}
	start := b
	if fr.Rods != nil && m.home {
		start = k
		m.points = append(m.points, point{name: k, plate: onDrive, leg: i, what: w.drive, base: s.End[i]})
		if fr.Rails == nil {
			m.links = append(m.links, link{i, w.link, b, k, r3.Norm(r3.Sub(s.End[i], fr.Base[i]))})
		} else {
			m.links = append(m.links, link{i, "carriage's coordinate at home", b, k, s.Q[i]})
		}
	}
	mount := func(of string, plate string, v kin.Vec) {
		if v == (kin.Vec{}) {
			return
		}
		a := axis{of, "mounting axis", plate, v, v}
		if plate == onPlatform {
			a.base = m.rot.Apply(v)
		}
		m.axes = append(m.axes, a)
	}
	mount(start, onBase, mt.Base)
	m.points = append(m.points, m.carried(p, i, w.platform, fr.Platform[i], !twin))
	if twin {
		m.parallelogram(i, fr, s, mt.Side)
		return
	}
	mount(p, onPlatform, mt.Platform)
	switch {
	case fr.Rods != nil && m.home:
		m.links = append(m.links, link{i, "rod", k, p, fr.Rods[i]})
	case fr.Rods == nil && m.home:
		m.links = append(m.links, link{i, "leg at home", b, p, s.Q[i]})
	}
}

// parallelogram adds the two rods of a leg; side runs from their middle to the first.
func (m *model) parallelogram(i int, fr *kin.Frame, s *kin.State, side kin.Vec) {
	n := strconv.Itoa(i + 1)
	k, p := "K"+n, "P"+n
	for e, end := range [2]string{"a", "b"} {
		off := r3.Scale(float64(1-2*e), side)
		m.points = append(m.points, m.carried(p+end, i, "rod end", r3.Add(fr.Platform[i], m.rot.Unapply(off)), true))
		if m.home {
			m.points = append(m.points, point{name: k + end, plate: onDrive, leg: i, what: "rod end, at home", base: r3.Add(s.End[i], off)})
			m.links = append(m.links, link{i, "rod", k + end, p + end, fr.Rods[i]})
		}
	}
	unit := r3.Unit(side)
	m.axes = append(m.axes, axis{p, "short side of the parallelogram", onPlatform, m.rot.Unapply(unit), unit})
	m.links = append(m.links, link{i, "distance of the two rods", p + "a", p + "b", 2 * r3.Norm(side)})
}

// carried is a point of the platform, given in its frame.
func (m *model) carried(name string, leg int, what string, own kin.Vec, hole bool) point {
	return point{name: name, plate: onPlatform, leg: leg, what: what, base: m.place(own), own: own, hole: hole}
}

// place is a point of the platform in the base frame at home.
func (m *model) place(own kin.Vec) kin.Vec { return r3.Add(m.origin, m.rot.Apply(own)) }

// railEnds finds what of each rail the carriages use.
func (m *model) railEnds(a *objective.Appraisal, fr *kin.Frame) {
	least, span := a.Plan.Family.Range()
	low, high := a.Values[least], a.Values[least]+a.Values[span]
	if math.IsNaN(high) || math.IsInf(high, 0) {
		return
	}
	for i, u := range fr.Rails {
		n := strconv.Itoa(i + 1)
		ends := [2]kin.Vec{r3.Add(fr.Base[i], r3.Scale(low, u)), r3.Add(fr.Base[i], r3.Scale(high, u))}
		m.points = append(m.points,
			point{name: "R" + n + "a", plate: onBase, leg: i, what: "rail, carriage at its least", base: ends[0]},
			point{name: "R" + n + "b", plate: onBase, leg: i, what: "rail, carriage at its most", base: ends[1]})
		m.links = append(m.links, link{i, "travel", "R" + n + "a", "R" + n + "b", high - low})
	}
}

// order puts the points by plate, legs in their order.
func (m *model) order() {
	var out []point
	for _, plate := range []string{onBase, onDrive, onPlatform} {
		for _, p := range m.points {
			if p.plate == plate {
				out = append(out, p)
			}
		}
	}
	m.points = out
}

// levelArm is the model of the palletising arm: its column, shoulder, elbow, wrist and tool axis in the plane y = 0.
func (m *model) levelArm(a *objective.Appraisal, s *kin.State) {
	dim := func(name string) float64 { return a.Values[a.Plan.Family.Index(name)] }
	shoulder := kin.Vec{X: dim("base_offset"), Z: dim("base_height")}
	m.points = append(m.points,
		point{name: "B1", plate: onBase, what: "column's axis at floor level", hole: true},
		point{name: "B2", plate: onBase, leg: 1, what: "shoulder (both links), on the column at home", base: shoulder})
	m.axes = append(m.axes,
		axis{"B1", "hinge", onBase, kin.Vec{Z: 1}, kin.Vec{Z: 1}},
		axis{"B2", "hinge", onBase, kin.Vec{Y: -1}, kin.Vec{Y: -1}})
	m.links = append(m.links,
		link{0, "base_offset, column's axis to shoulder, level", "B1", "B2", dim("base_offset")},
		link{1, "upper arm", "B2", "K1", dim("upper_arm")},
		link{2, "forearm", "K1", "K2", dim("forearm")},
		link{3, "wrist_offset, wrist to tool's axis, level", "K2", "P1", dim("wrist_offset")},
		link{3, "wrist_drop, platform origin below the wrist", "K2", "P1", dim("wrist_drop")})
	if m.home {
		sin, cos := math.Sincos(s.Q[1])
		elbow := r3.Add(shoulder, kin.Vec{X: dim("upper_arm") * cos, Z: dim("upper_arm") * sin})
		sin, cos = math.Sincos(s.Q[2])
		wrist := r3.Add(elbow, kin.Vec{X: dim("forearm") * cos, Z: dim("forearm") * sin})
		m.points = append(m.points,
			point{name: "K1", plate: onDrive, leg: 1, what: "elbow at home", base: elbow},
			point{name: "K2", plate: onDrive, leg: 2, what: "wrist at home", base: wrist})
	}
	m.points = append(m.points, point{name: "P1", plate: onPlatform, leg: 3, what: "tool's axis", base: m.origin, hole: true})
	m.axes = append(m.axes, axis{"P1", "hinge", onPlatform, kin.Vec{Z: 1}, kin.Vec{Z: 1}})
}

// legName is the number of a leg, from 1; nothing for none.
func legName(i int) string {
	if i < 0 {
		return ""
	}
	return fmt.Sprint(i + 1)
}
