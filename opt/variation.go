package opt

import (
	"math"
	"math/rand"
)

// The distribution index of crossover and mutation is 15: the powers and roots of
// the formulas are then of order 16, squarings and square roots, the same bits on
// every machine.

func power16(v float64) float64 {
	v *= v
	v *= v
	v *= v
	return v * v
}

func root16(v float64) float64 { return math.Sqrt(math.Sqrt(math.Sqrt(math.Sqrt(v)))) }

// crossover is simulated binary crossover in its bounded form (Deb, Agrawal
// 1995) on half of the coordinates, in place. Ordered variables are rounded
// afterwards, choices are swapped.
func (d *domain) crossover(a, b []float64, rng *rand.Rand) {
	for _, i := range d.free {
		if rng.Uint64()&1 == 0 || a[i] == b[i] {
			continue
		}
		if d.vars[i].Kind == Choice {
			a[i], b[i] = b[i], a[i]
			continue
		}
		y1, y2 := min(a[i], b[i]), max(a[i], b[i])
		gap := y2 - y1
		if gap < 1e-14*(d.high[i]-d.low[i]) {
			continue
		}
		u := rng.Float64()
		c1 := 0.5 * (y1 + y2 - float64(blend(u, 1+2*(y1-d.low[i])/gap)*gap))
		c2 := 0.5 * (y1 + y2 + float64(blend(u, 1+2*(d.high[i]-y2)/gap)*gap))
		if rng.Uint64()&1 == 0 {
			c1, c2 = c2, c1
		}
		a[i], b[i] = d.settle(i, c1), d.settle(i, c2)
	}
}

// blend draws the spread factor of crossover; reach is the distance to the
// bound in units of half the parents' gap, measured from their middle.
func blend(u, reach float64) float64 {
	a := 2 - 1/power16(reach)
	if float64(u*a) <= 1 {
		return root16(u * a)
	}
	return root16(1 / (2 - float64(u*a)))
}

// mutate changes each coordinate with probability rate, in place: polynomial
// mutation in its bounded form for numbers (Deb, Goyal 1996), at least one
// step for Ordered ones, another alternative for choices.
func (d *domain) mutate(x []float64, rate float64, rng *rand.Rand) {
	for _, i := range d.free {
		if rng.Float64() < rate {
			d.nudge(x, i, rng)
		}
	}
}

func (d *domain) nudge(x []float64, i int, rng *rand.Rand) {
	v := &d.vars[i]
	if v.Kind == Choice {
		d.redraw(x, i, rng)
		return
	}
	low, high := d.low[i], d.high[i]
	span := high - low
	u := rng.Float64()
	var step float64
	if u < 0.5 {
		step = root16(2*u+float64((1-2*u)*power16((high-x[i])/span))) - 1
	} else {
		step = 1 - root16(2*(1-u)+float64((2*u-1)*power16((x[i]-low)/span)))
	}
	step *= span
	if v.Kind == Ordered && math.Abs(step) < 1 {
		if step = math.Copysign(1, step); x[i]+step < low || x[i]+step > high {
			step = -step
		}
	}
	x[i] = d.settle(i, x[i]+step)
}

// redraw gives coordinate i a fresh value, never the old one of a discrete
// variable.
func (d *domain) redraw(x []float64, i int, rng *rand.Rand) {
	if v := &d.vars[i]; v.Kind != Real {
		k := float64(rng.Intn(v.Levels - 1))
		if k >= x[i] {
			k++
		}
		x[i] = k
		return
	}
	x[i] = d.at(i, rng.Float64())
}

// differ writes a trial of differential evolution (Storn, Price 1997) into
// dst: base + f (b - c) on coordinates taken with probability rate, x on the
// others. A trial out of range lands between base and the bound. A choice
// takes its value from base, or from b where b and c differ, with probability
// f.
func (d *domain) differ(dst, x, base, b, c []float64, f, rate float64, rng *rand.Rand) {
	copy(dst, x)
	if len(d.free) == 0 {
		return
	}
	sure := d.free[rng.Intn(len(d.free))]
	for _, i := range d.free {
		if i != sure && rng.Float64() >= rate {
			continue
		}
		if d.vars[i].Kind == Choice {
			dst[i] = base[i]
			if b[i] != c[i] && rng.Float64() < f {
				dst[i] = b[i]
			}
			continue
		}
		v := base[i] + float64(f*(b[i]-c[i]))
		if v < d.low[i] {
			v = d.low[i] + float64(rng.Float64()*(base[i]-d.low[i]))
		} else if v > d.high[i] {
			v = d.high[i] - float64(rng.Float64()*(d.high[i]-base[i]))
		}
		dst[i] = d.settle(i, v)
	}
}
