package opt

import (
	"math"
	"testing"
)

func mixedDomain() *domain {
	return newDomain(&Space{Vars: []Var{
		{Name: "r", Low: -2, High: 3}, {Name: "o", Kind: Ordered, Levels: 50}, {Name: "c", Kind: Choice, Levels: 6},
		{Name: "fixed", Low: 1, High: 1}, {Name: "two", Kind: Ordered, Levels: 2},
	}})
}

// Whatever the operators do, designs stay legal, fixed variables stay fixed,
// and a choice is always one that some parent had or a fresh draw, never a
// number in between.
func TestOperatorsStayLegal(t *testing.T) {
	d := mixedDomain()
	rng := stream(1, streamBreed, 0, 0)
	legal := func(op string, x []float64) {
		for i, v := range x {
			if !(d.low[i] <= v && v <= d.high[i]) || d.vars[i].Kind != Real && v != math.Trunc(v) {
				t.Fatalf("%s: %s is %v", op, d.vars[i].Name, v)
			}
		}
	}
	n := len(d.vars)
	p := make([][]float64, 5)
	for range 3000 {
		for i := range p {
			p[i] = make([]float64, n)
			d.random(p[i], rng)
			legal("random", p[i])
		}
		c2, c0, c1 := p[2][2], p[0][2], p[1][2]
		d.crossover(p[0], p[1], rng)
		legal("crossover", p[0])
		legal("crossover", p[1])
		if !(p[0][2] == c0 && p[1][2] == c1 || p[0][2] == c1 && p[1][2] == c0) {
			t.Fatalf("crossover of choices %v, %v gave %v, %v", c0, c1, p[0][2], p[1][2])
		}
		dst := make([]float64, n)
		d.differ(dst, p[2], p[3], p[4], p[0], 0.7, 0.5, rng)
		legal("differ", dst)
		if v := dst[2]; v != c2 && v != p[3][2] && v != p[4][2] {
			t.Fatalf("trial has choice %v, none of its parents'", v)
		}
		d.mutate(dst, 0.8, rng)
		legal("mutate", dst)
		for _, i := range d.free {
			old := dst[i]
			d.redraw(dst, i, rng)
			legal("redraw", dst)
			if d.vars[i].Kind != Real && dst[i] == old {
				t.Fatalf("redraw kept %s at %v", d.vars[i].Name, old)
			}
			old = dst[i]
			d.nudge(dst, i, rng)
			legal("nudge", dst)
			if d.vars[i].Kind != Real && dst[i] == old {
				t.Fatalf("nudge kept %s at %v", d.vars[i].Name, old)
			}
		}
	}
}

// Simulated binary crossover keeps the parents' mean where no bound is near,
// and its spread factor has the median 1 of its density (half of it contracts,
// half expands; Deb and Agrawal 1995).
func TestCrossoverDistribution(t *testing.T) {
	d := newDomain(&Space{Vars: []Var{{Low: -1e6, High: 1e6}}})
	rng := stream(2, streamBreed, 0, 0)
	crossed, wider := 0, 0
	for range 20000 {
		a, b := []float64{1}, []float64{2}
		d.crossover(a, b, rng)
		if a[0] == 1 || a[0] == 2 {
			continue
		}
		if math.Abs(a[0]+b[0]-3) > 1e-9 {
			t.Fatalf("children %v, %v: mean not kept", a, b)
		}
		if crossed++; math.Abs(a[0]-b[0]) > 1 {
			wider++
		}
	}
	if share := float64(wider) / float64(crossed); math.Abs(share-0.5) > 0.02 {
		t.Errorf("%.3f of the pairs are wider than their parents, want 0.5", share)
	}
	if math.Abs(float64(crossed)/20000-0.5) > 0.02 {
		t.Errorf("%d of 20000 crossed, want half", crossed)
	}
}

// Each slice of each variable's range holds exactly one point.
func TestLatinHypercube(t *testing.T) {
	d := mixedDomain()
	const n = 50
	xs := make([][]float64, n)
	for i := range xs {
		xs[i] = make([]float64, len(d.vars))
	}
	d.latin(xs, stream(3, streamSample, 0, 0))
	var slot, level [n]int
	for _, x := range xs {
		slot[int((x[0]+2)/5*n)]++
		level[int(x[1])]++
	}
	for i := range slot {
		if slot[i] != 1 || level[i] != 1 {
			t.Errorf("slice %d: %d reals, %d steps", i, slot[i], level[i])
		}
	}
}

func TestRootsAndPowers(t *testing.T) {
	for _, v := range []float64{0, 1e-9, 0.3, 1, 1.7} {
		if got := power16(root16(v)); math.Abs(got-v) > 1e-14 {
			t.Errorf("power of the root of %v is %v", v, got)
		}
		if got := power16(v); math.Abs(got-math.Pow(v, 16)) > 1e-12*got {
			t.Errorf("16th power of %v is %v", v, got)
		}
	}
}
