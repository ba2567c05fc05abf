package proof

import (
	"math"
	"slices"
)

// loaded tests efforts, rates and power of every case, and gives the properties that hold.
func (b *bench) loaded(open uint64, efforts, rates bool) uint64 {
	left := uint64(0) // what is still in question
	for i := range b.props {
		if open>>i&1 == 0 {
			continue
		}
		switch b.props[i].kind {
		case effort, push, pull, power, buckling:
			if efforts {
				left |= 1 << i
				if b.worst[i] = math.Inf(-1); b.props[i].AtLeast {
					b.worst[i] = math.Inf(1)
				}
			}
		case rate:
			left |= 1 << i
			b.worst[i] = math.Inf(-1)
		}
	}
	if efforts {
		if b.rest.take(&b.j, &b.inv) {
			b.turnTo()
		} else {
			for i := range b.props {
				if b.props[i].kind != rate {
					left &^= 1 << i
				}
			}
		}
	}
	for _, c := range b.cases {
		if left == 0 {
			break
		}
		left = b.load(c, left)
	}
	for i := range b.props {
		if left>>i&1 == 1 && math.IsInf(b.worst[i], -1) {
			b.worst[i] = 0 // no case there
		}
	}
	return left
}

// turnTo brings rotation and ties to the box.
func (b *bench) turnTo() {
	for i := range b.rot {
		b.rot[i].take(&b.e.R[i], b.region.moving)
	}
	if b.frame.Tied {
		for i := range b.tie {
			b.tie[i].take(&b.e.T[i], b.region.moving)
		}
	}
}

// column sets x to column i of the inverse over all six freedoms.
func (b *bench) column(i int, x *[6]line) {
	*x = [6]line{}
	for k, q := range b.own {
		x[q] = b.rest.x[i][k]
	}
	if !b.frame.Tied {
		return
	}
	for q := range x {
		if slices.Contains(b.own, q) {
			continue
		}
		for k := range b.own {
			x[q].addMul(1, &b.tie[6*q+k], &b.rest.x[i][k])
		}
		x[q].spread()
	}
}

// load tests the properties in left against one case and gives those that hold.
func (b *bench) load(c *payload, left uint64) uint64 {
	want := func(kinds ...kind) bool {
		for i := range b.props {
			if left>>i&1 == 1 && slices.Contains(kinds, b.props[i].kind) {
				return true
			}
		}
		return false
	}
	if want(effort, push, pull, power, buckling) {
		left = b.efforts(c, left)
	}
	if want(buckling) {
		left = b.buckles(left)
	}
	if want(rate, power) {
		left = b.speeds(c, left)
	}
	return left
}

// efforts fills the supports and their upper halves and tests the properties about efforts.
func (b *bench) efforts(c *payload, left uint64) uint64 {
	c.move(&b.rot)
	var high, low, most, room [6]float64
	var x [6]line
	for i := range b.legs {
		s := &b.s[i]
		b.column(i, &x)
		c.effort(&x, s)
		h, excess := s.half()
		b.half[i] = h
		up, down := h, h
		up.add(1, &s.mid)
		up.spread()
		down.add(-1, &s.mid)
		down.spread()
		high[i], low[i], room[i] = up.most(), down.most(), excess
		most[i] = max(high[i], low[i], 0)
	}
	rest := b.rest.most(b.legs, &most)
	for p := range b.props {
		if left>>p&1 == 0 {
			continue
		}
		k := b.props[p].kind
		if k != effort && k != push && k != pull {
			continue
		}
		for i := range b.legs {
			value := sided(k, high[i], low[i]) + rest[i]
			if value > b.target[p] && value-room[i] <= b.target[p] && room[i] > 0 {
				// exact at the vertices
				h, l := b.s[i].vertices(b.j.d)
				high[i], low[i], room[i] = min(high[i], h), min(low[i], l), 0
				value = sided(k, high[i], low[i]) + rest[i]
			}
			b.worst[p] = max(b.worst[p], 0, value+slack*math.Abs(value))
			if !(b.worst[p] <= b.target[p]) {
				left &^= 1 << p
				break
			}
		}
	}
	// For power and buckling: bounds of the efforts as lines.
	for i := range b.legs {
		b.half[i].r += rest[i]
	}
	return left
}

// sided is what counts of the largest effort and of the largest of the other sign.
func sided(k kind, high, low float64) float64 {
	switch k {
	case push:
		return high
	case pull:
		return low
	}
	return max(high, low)
}

// speeds tests the properties about rates and power.
func (b *bench) speeds(c *payload, left uint64) uint64 {
	s := &b.speed
	var row [6]line
	for i := range b.legs {
		for k := range row {
			row[k].take(&b.e.J[6*i+k], b.region.moving)
		}
		c.rate(&row, s)
		h, excess := s.half()
		speed := h.most()
		for p := range b.props {
			if left>>p&1 == 0 {
				continue
			}
			value := 0.0
			switch b.props[p].kind {
			case rate:
				value = speed
				if value > b.target[p] && value-excess <= b.target[p] {
					value, _ = s.vertices(b.j.d)
				}
			case power:
				value = max(product(&b.half[i], &b.s[i].mid, 1, &h), product(&b.half[i], &b.s[i].mid, -1, &h))
			default:
				continue
			}
			b.worst[p] = max(b.worst[p], value*(1+slack))
			if !(b.worst[p] <= b.target[p]) {
				left &^= 1 << p
			}
		}
	}
	return left
}

// product bounds (half + s·mid) · rate where the first is not negative.
func product(half, mid *line, s float64, rate *line) float64 {
	f := *half
	f.add(s, mid)
	f.spread()
	var p line
	p.addMul(1, &f, rate)
	p.spread()
	return max(p.most(), 0)
}
