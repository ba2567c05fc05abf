package assembly

import (
	"math"
	"math/rand/v2"
	"testing"
)

func randomPoint(rng *rand.Rand, n int) (x point) {
	for i := range n {
		x[i] = complex(rng.NormFloat64(), rng.NormFloat64())
	}
	return x
}

// systems are the equations of both continuations, between random parameters.
func systems(rng *rand.Rand) map[string]equations {
	from, _ := startCircles(rng)
	to, _ := startCircles(rng)
	return map[string]equations{
		"soma":    &soma{from: randomLegs(rng), to: randomLegs(rng), gamma: bend(rng)},
		"circles": &circles{from: from, to: to, gamma: bend(rng)},
	}
}

// All derivatives against central differences.
func TestDerivatives(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 3))
	const h = 1e-5
	for name, sys := range systems(rng) {
		ends := sys.blocks()
		n := ends[len(ends)-1]
		x, at := randomPoint(rng, n), complex(0.4, 0.2)
		var w, up, down workspace
		sys.at(at, &x, &w)
		check := func(what string, row int, got, step complex128) {
			want := (up.f[row] - down.f[row]) / (2 * step)
			if !(size2(got-want) < 1e-14*(1+size2(want))) {
				t.Errorf("%s: derivative %d by %s is %v, want %v", name, row, what, got, want)
			}
		}
		for i := range n {
			y := x
			y[i] += h
			sys.at(at, &y, &up)
			y[i] -= 2 * h
			sys.at(at, &y, &down)
			for row := range n - len(ends) {
				check("an unknown", row, w.lu.a[row][i], h)
			}
		}
		sys.at(at+h, &x, &up)
		sys.at(at-h, &x, &down)
		for row := range n - len(ends) {
			check("t", row, w.ft[row], h)
		}
	}
}

// At t = 1 the product system's 16 points are solutions, all different.
func TestStartCircles(t *testing.T) {
	sys := systems(rand.New(rand.NewPCG(5, 1)))["circles"].(*circles)
	rng := rand.New(rand.NewPCG(5, 1))
	from, ends := startCircles(rng)
	sys.from = from
	if len(ends) != circlePaths {
		t.Fatalf("%d points", len(ends))
	}
	k := newTracker(sys)
	for i := range ends {
		k.normalise(&ends[i].x)
		sys.at(1, &ends[i].x, &k.work)
		if r := k.work.f.norm(); !(r < 1e-13) {
			t.Errorf("point %d has the residual %g", i, r)
		}
		for j := range i {
			if k.apart(&ends[i].x, &ends[j].x) < 1e-3 {
				t.Errorf("points %d and %d are one", i, j)
			}
		}
	}
}

// Solutions of random linear systems, residuals against rounding; a singular one is refused.
func TestLU(t *testing.T) {
	rng := rand.New(rand.NewPCG(2, 7))
	for range 100 {
		m := lu{n: 1 + rng.IntN(order)}
		for i := range m.n {
			m.a[i] = randomPoint(rng, m.n)
		}
		a, b := m.a, randomPoint(rng, m.n)
		x := b
		if !m.factor() {
			t.Fatal("a random matrix is singular")
		}
		m.solve(&x)
		for i := range m.n {
			r := b[i]
			for j := range m.n {
				r -= a[i][j] * x[j]
			}
			if !(size2(r) < 1e-24*(1+x.norm()*x.norm())) {
				t.Errorf("residual %v", r)
			}
		}
		m.a[m.n-1] = a[0]
		for i := range m.n - 1 {
			m.a[i] = a[i]
		}
		if m.n > 1 && m.factor() {
			t.Error("two equal rows are factored")
		}
	}
	m := lu{n: 2}
	m.a[0][0], m.a[1][1] = 2, 4i
	m.factor()
	if got := m.inverseNorm(); !(math.Abs(got-math.Sqrt(1./4+1./16)) < 1e-15) {
		t.Errorf("norm of the inverse %g", got)
	}
}

// The step of the tracker allocates nothing.
func TestStepAllocates(t *testing.T) {
	p, ends := startSystem(0)
	k := newTracker(&soma{from: p, to: randomLegs(rand.New(rand.NewPCG(3, 3))), gamma: 1})
	x := ends[0].x
	if n := testing.AllocsPerRun(20, func() {
		y := x
		k.along(&y, 1, 0.9, mostSteps, false)
	}); n != 0 {
		t.Errorf("%g allocations", n)
	}
}

// A double end, x² = t y² with a second block at rest: the loop closes after two
// turns, and the limit is exact.
func TestEndgameOfDoubleEnd(t *testing.T) {
	k := newTracker(parabola{})
	e := k.run(point{1, 1})
	if e.outcome != singular || e.cycle != 2 || !(math.Sqrt(size2(e.x[0])) < 1e-9) {
		t.Errorf("%+v, want a double end at x = 0", e)
	}
}

type parabola struct{}

func (parabola) blocks() []int { return []int{2} }

func (parabola) at(t complex128, x *point, w *workspace) {
	w.f[0] = x[0]*x[0] - t*x[1]*x[1]
	w.ft[0] = -x[1] * x[1]
	w.lu.a[0] = [order]complex128{2 * x[0], -2 * t * x[1]}
}

// The number of processors changes no bit.
func TestRunAllInOrder(t *testing.T) {
	p, starts := startSystem(0)
	sys := &soma{from: p, to: randomLegs(rand.New(rand.NewPCG(9, 3))), gamma: 1}
	ends := runAll(sys, starts[:8])
	for i := range ends {
		if alone := newTracker(sys).run(starts[i].x); alone != ends[i] {
			t.Errorf("path %d ends elsewhere when it is alone", i)
		}
	}
}
