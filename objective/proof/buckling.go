package proof

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"

	"legwright/kin"
)

// pushes gives, for legs with rods, the sign of the drive's rate along the rod, which no posture of a working mode changes: an
// effort of that sign pushes. It is 0 for legs without a rod, 1 where drives are the legs.
func pushes(m kin.Machine) (sign [6]float64) {
	f := m.Frame()
	if f.Rods == nil {
		return [6]float64{1, 1, 1, 1, 1, 1}
	}
	var s kin.State
	p := kin.NewPose(kin.Coords{})
	m.Move(&p, &s)
	for i, rod := range f.Rods {
		if rod != 0 {
			sign[i] = math.Copysign(1, r3.Dot(kin.Vec{X: s.J[6*i], Y: s.J[6*i+1], Z: s.J[6*i+2]}, s.Rod[i]))
		}
	}
	return sign
}

// buckles tests the margins to buckling, with the efforts of a case in half: of each leg the push times the length squared is
// bounded as a product of lines.
func (b *bench) buckles(left uint64) uint64 {
	least := math.Inf(1)
	for i := range b.legs {
		if b.pushes[i] == 0 {
			continue
		}
		var by, q line // what turns an effort into push × length²
		if b.frame.Rods == nil {
			q.take(&b.e.Q[i], b.region.moving)
			by.addMul(1, &q, &q)
			by.spread()
		} else {
			var g, j, u line
			for c := 6 * i; c < 6*i+3; c++ {
				j.take(&b.e.J[c], b.region.moving)
				u.take(&b.e.Wrenches[c], b.region.moving)
				g.addMul(1, &j, &u)
			}
			rod := b.frame.Rods[i] * b.frame.Rods[i]
			if g.c < 0 { // rows may be turned round
				rod = -rod
			}
			by.add(rod, &g)
			by.spread()
		}
		if load := product(&b.half[i], &b.s[i].mid, b.pushes[i], &by); load > 0 {
			least = min(least, b.task.Legs.Euler()/load)
		} else if !(load <= 0) {
			least = math.Inf(-1)
		}
	}
	for p := range b.props {
		if left>>p&1 == 1 && b.props[p].kind == buckling {
			b.worst[p] = min(b.worst[p], least*(1-slack))
			if !(b.worst[p] >= b.target[p]) {
				left &^= 1 << p
			}
		}
	}
	return left
}
