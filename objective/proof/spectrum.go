package proof

import "math"

// matrices tests the properties of the inverse Jacobian and of the matrix of wrenches, and gives those that hold.
func (b *bench) matrices(open uint64) (closed uint64) {
	var own, whole, rates, efforts bool
	for i := range b.props {
		if open>>i&1 == 0 {
			continue
		}
		switch k := b.props[i].kind; {
		case k == held || k == wrenches && !b.six:
			whole = true
			continue
		case k == effort || k == push || k == pull || k == buckling:
			efforts = true
		case k == rate:
			rates = true
		case k == power:
			efforts, rates = true, true
		}
		own = true
	}
	if whole && b.w.take(&b.e.Wrenches, 6, every, b.region.moving) && b.onto(&b.w) {
		closed |= b.spectrum(open, true)
	}
	if !own {
		return closed
	}
	inverted := b.onto(&b.j)
	if inverted {
		closed |= b.spectrum(open, false)
	}
	if rates || efforts {
		closed |= b.loaded(open&^closed, efforts && inverted, rates)
	}
	return closed
}

// spectrum tests the properties of the singular values of the matrix in work, which is that of all wrenches or not.
func (b *bench) spectrum(open uint64, whole bool) (closed uint64) {
	for i := range b.props {
		if open>>i&1 == 0 {
			continue
		}
		k := b.props[i].kind
		if whole != (k == held || k == wrenches && !b.six) {
			continue
		}
		ok := false
		switch k {
		case regular, held:
			ok = b.regular(i)
		case conditioned, wrenches:
			ok = b.strongest(i, func(x float64) bool { return b.holds(x, 0) })
		case slowest:
			ok = b.strongest(i, func(x float64) bool { return b.below(1 / x) })
		case fastest:
			ok = b.strongest(i, func(x float64) bool { return b.holds(0, 1/x) })
		}
		if ok {
			closed |= 1 << i
		}
	}
	return closed
}

// onto makes m the matrix in work; false where its centre has no inverse.
func (b *bench) onto(m *family) bool {
	b.m, b.polared = m, false
	return b.inv.take(m)
}

// axes finds the polar decomposition of the centre, once.
func (b *bench) axes() bool {
	if !b.polared {
		b.polared = b.polar.factor(b.m.n, &b.m.c, &b.inv.x, &b.inv.inverter)
	}
	return b.polared
}

// holds proves σmin ≥ k·σmax + floor.
func (b *bench) holds(k, floor float64) bool {
	if !b.axes() {
		return false
	}
	ok, corner := b.cond.holds(b.m, &b.polar, k, floor)
	if !ok && corner >= 0 {
		b.corner = corner
	}
	return ok
}

// below proves σmax ≤ most.
func (b *bench) below(most float64) bool {
	if !b.axes() {
		return false
	}
	ok, corner := b.cond.below(b.m, &b.polar, most)
	if !ok && corner >= 0 {
		b.corner = corner
	}
	return ok
}

// regular proves that no matrix is singular, and some ratio of the singular values.
func (b *bench) regular(i int) bool {
	x := b.inv.regular(b.m)
	if !(x > 0 && x >= b.task.Singular) {
		if x = b.task.Singular; !b.holds(0, x*b.m.size) {
			return false
		}
	}
	b.worst[i] = x
	if b.best[i] > x {
		b.worst[i] = b.stronger(i, x, b.best[i], func(x float64) bool { return b.holds(x, 0) })
	}
	return true
}

// apartness is the least relative distance of bounds that are told apart: far more than rounding, so that whatever has
// a stronger bound keeps a weaker one as well.
const apartness = 1e-6

// strongest proves the target of property i, and notes a stronger bound if it can. Tests answer yes or no: the bound that
// all boxes before keep comes first, being enough.
func (b *bench) strongest(i int, holds func(x float64) bool) bool {
	x, best := b.target[i], b.best[i]
	if !b.props[i].worse(x, best) || math.Abs(best-x) < apartness*math.Abs(x) {
		b.worst[i] = x
		return holds(x)
	}
	if holds(best) {
		b.worst[i] = best
		return true
	}
	if !holds(x) {
		return false
	}
	b.worst[i] = b.stronger(i, x, best, holds)
	return true
}

// stronger narrows, by ratio, the gap between a bound that holds and one that does not.
func (b *bench) stronger(i int, x, best float64, holds func(x float64) bool) float64 {
	corner := b.corner
	for range 6 {
		mid := math.Sqrt(max(x, 1e-6*best) * best)
		if holds(mid) {
			x = mid
		} else {
			best = mid
		}
	}
	b.corner = corner
	return x
}
