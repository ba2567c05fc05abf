package proof

import (
	"math"

	"legwright/kin"
	"legwright/kin/enclose"
	"legwright/objective"
)

// subject is what a proof is about: constant while it runs.
type subject struct {
	task    *objective.Task
	plan    *objective.Plan
	values  []float64
	machine kin.Encloser
	frame   *kin.Frame
	props   []Property
	target  []float64 // what is proved of each property: its limit, or that less the gap; swings as chords
	own     []int     // columns of the own freedoms
	six     bool      // J is the matrix of wrenches itself
	legs    int
	ranged  int // actuators whose range is bounded
}

// every is the column of each freedom.
var every = []int{0, 1, 2, 3, 4, 5}

// bench is the scratch of one worker.
type bench struct {
	*subject
	region *region
	cases  []*payload // that occur in the region's zone

	e       kin.Enclosure
	j, w    family
	inv     inverse
	polar   polar
	cond    conditioner
	rest    rests
	s       [6]support
	speed   support
	half    [6]line
	rot     [9]line
	tie     [36]line
	worst   []float64 // bound met by each property that the last test proved
	ball    ball
	corner  int // vertex at which a property seems to fail, -1 for none
	polared bool
}

func newBench(s *subject) *bench {
	return &bench{subject: s, worst: make([]float64, len(s.props))}
}

// enter prepares for boxes of the region.
func (b *bench) enter(g *region) {
	b.region = g
	b.cases = cases(b.task, b.frame, g.zone)
}

// prove tests the properties in open over the box and gives those that hold there, and the coordinate along which the box is
// best split. b.worst then has the bounds that the proved ones keep.
func (b *bench) prove(box *enclose.Box, open uint64) (closed uint64, split int) {
	b.corner = -1
	b.machine.Enclose(box, &b.e)
	if b.region.ball {
		b.ball.place(b.region, box)
	}
	split = b.widest(box)
	if b.e.Reach != kin.AllReach {
		return 0, split
	}
	hard := false
	for i := range b.props {
		if open>>i&1 == 0 {
			continue
		}
		ok := false
		switch k := b.props[i].kind; k {
		case reach:
			ok = true
		case shortest, longest:
			ok = b.ranges(i)
		case baseSwing:
			ok = b.swings(i, &b.e.BaseChord)
		case otherSwing:
			ok = b.swings(i, &b.e.PlatformChord)
		case apart:
			ok = b.clear(i)
		default:
			hard = true
		}
		if ok {
			closed |= 1 << i
		}
	}
	if !b.j.take(&b.e.J, b.legs, b.own, b.region.moving) {
		return closed, split
	}
	split = b.steepest(box, split)
	if hard {
		closed |= b.matrices(open &^ closed)
	}
	return closed, split
}

// widest is the coordinate along which the box is widest against its region.
func (b *bench) widest(box *enclose.Box) int {
	most, at := -1.0, 0
	for _, q := range b.region.moving {
		w := b.part(box, q)
		if w > most*(1+1e-9) {
			most, at = w, q
		}
	}
	return at
}

// lopsided is how often, of its region, a box is wider along its widest coordinate than along the steepest before it is split
// along the former all the same.
const lopsided = 3

// steepest is the coordinate along which the inverse Jacobian changes most over the box, unless the box is far wider along
// another: a payload off the centre may turn by a coordinate that the Jacobian hardly depends on.
func (b *bench) steepest(box *enclose.Box, wide int) int {
	most, at := -1.0, 0
	for k, q := range b.region.moving {
		if g := b.j.g[k].norm2(); g > most*(1+1e-9) {
			most, at = g, q
		}
	}
	if b.part(box, wide) > lopsided*b.part(box, at) {
		return wide
	}
	return at
}

// part is the box's width along coordinate q, over that of its region.
func (b *bench) part(box *enclose.Box, q int) float64 {
	return (box.High[q] - box.Low[q]) / (b.region.box.High[q] - b.region.box.Low[q])
}

// ranges proves the bound of the actuator coordinates.
func (b *bench) ranges(i int) bool {
	low := b.props[i].kind == shortest
	worst := math.Inf(-1)
	if low {
		worst = math.Inf(1)
	}
	for l := range b.ranged {
		if low {
			worst = min(worst, b.lower(&b.e.Q[l]))
		} else {
			worst = max(worst, b.upper(&b.e.Q[l]))
		}
	}
	b.worst[i] = worst
	return !b.props[i].worse(worst, b.target[i])
}

// swings proves the bound of the swing of joints.
func (b *bench) swings(i int, chords *[6]enclose.Form) bool {
	worst := 0.0
	for l := range b.legs {
		worst = max(worst, b.upper(&chords[l]))
	}
	b.worst[i] = worst
	return worst <= b.target[i]
}

// matrices tests the properties of the inverse Jacobian and gives those that hold.
func (b *bench) matrices(open uint64) (closed uint64) {
	b.polared = false
	inverted := false
	efforts, rates := false, false
	for i := range b.props {
		if open>>i&1 == 0 {
			continue
		}
		k := b.props[i].kind
		switch {
		case k == held || k == wrenches && !b.six:
			if b.wrench(i) {
				closed |= 1 << i
			}
			continue
		case k == rate || k == power:
			rates = true
		}
		switch k {
		case effort, push, pull, power:
			efforts = true
		}
	}
	if open&^closed == 0 {
		return closed
	}
	inverted = b.inv.take(&b.j)
	for i := range b.props {
		if (open&^closed)>>i&1 == 0 || !inverted {
			continue
		}
		ok := false
		switch k := b.props[i].kind; {
		case k == regular:
			ok = b.inv.regular(&b.j, b.task.Singular) || b.axes() && b.holds(&b.j, 0, b.task.Singular*b.j.size)
		case k == conditioned || k == wrenches && b.six:
			ok = b.axes() && b.holds(&b.j, b.target[i], 0)
		case k == slowest:
			ok = b.axes()
			if ok {
				ok, b.corner = b.cond.below(&b.j, &b.polar, 1/b.target[i])
			}
		case k == fastest:
			ok = b.axes() && b.holds(&b.j, 0, 1/b.target[i])
		}
		if ok {
			closed |= 1 << i
			b.worst[i] = b.target[i]
		}
	}
	if rates || efforts {
		closed |= b.loaded(open&^closed, efforts && inverted, rates)
	}
	return closed
}

// axes finds the polar decomposition of the centre, once.
func (b *bench) axes() bool {
	if !b.polared {
		b.polared = b.polar.factor(b.j.n, &b.j.c, &b.inv.x, &b.inv.inverter)
	}
	return b.polared
}

// holds proves σmin ≥ k·σmax + floor.
func (b *bench) holds(m *family, k, floor float64) bool {
	ok, corner := b.cond.holds(m, &b.polar, k, floor)
	if !ok && corner >= 0 {
		b.corner = corner
	}
	return ok
}

// wrench tests a property of the 6×6 matrix of wrenches.
func (b *bench) wrench(i int) bool {
	if !b.w.take(&b.e.Wrenches, 6, every, b.region.moving) || !b.inv.take(&b.w) {
		return false
	}
	b.polared = false
	ok := false
	if b.props[i].kind == held {
		ok = b.inv.regular(&b.w, b.task.Singular)
		if !ok && b.polar.factor(6, &b.w.c, &b.inv.x, &b.inv.inverter) {
			ok = b.holds(&b.w, 0, b.task.Singular*b.w.size)
		}
	} else if b.polar.factor(6, &b.w.c, &b.inv.x, &b.inv.inverter) {
		ok = b.holds(&b.w, b.target[i], 0)
	}
	if ok {
		b.worst[i] = b.target[i]
	}
	return ok
}
