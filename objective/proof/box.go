package proof

import (
	"math"

	"legwright/kin"
	"legwright/kin/enclose"
	"legwright/objective"
)

// subject is what a proof is about: constant while boxes are tested.
type subject struct {
	task    *objective.Task
	plan    *objective.Plan
	values  []float64
	machine kin.Encloser
	frame   *kin.Frame
	props   []Property
	target  []float64 // what is proved of each property: its limit, or that less the gap; swings as chords
	best    []float64 // what bounds of singular values are tried up to, NaN where only the target is asked for
	own     []int     // columns of the own freedoms
	six     bool      // J is the matrix of wrenches itself
	legs    int
	pushes  [6]float64 // sign of efforts that push, see pushes
	ranged  int        // actuators whose range is bounded
	rotary  bool       // their coordinates are angles, within half a turn of home
	origin  [6]float64 // coordinates at home
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
	m       *family // of j and w the one in work, whose centre inv and, once polared, polar hold
	inv     inverse
	polar   polar
	polared bool
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
		case drift:
			ok = b.drifts(i)
		case twist:
			ok = b.twists(i)
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
		least, most := b.lower(&b.e.Q[l]), b.upper(&b.e.Q[l])
		if b.rotary && !(most-b.origin[l] < math.Pi && b.origin[l]-least < math.Pi) {
			return false // angles count within half a turn of home, and the enclosure does not jump there
		}
		if low {
			worst = min(worst, least)
		} else {
			worst = max(worst, most)
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
