package opt

import (
	"math"
	"math/rand"
	"testing"
)

// fitted makes designs around the middle of a box of three real variables and
// one choice, with goals and limits that f gives, and fits a model about the
// first of them.
func fitted(t *testing.T, f func(x []float64, g *genome)) (*linear, *pool) {
	t.Helper()
	d := newDomain(&Space{Vars: []Var{{Low: 1, High: 3}, {Kind: Choice, Levels: 2}, {Low: -5, High: 5}, {Low: 0, High: 0.1}}})
	p := &pool{dom: d}
	rng := rand.New(rand.NewSource(1))
	var all []*genome
	for i := range 60 {
		g := newGenome(d, 0, 2, 3)
		for _, k := range d.real {
			u := 0.5
			if i > 0 {
				u += 0.01 * (rng.Float64() - 0.5)
			}
			g.x[k] = d.low[k] + u*(d.high[k]-d.low[k])
		}
		f(g.x, g)
		all = append(all, g)
	}
	p.fill(all)
	l := new(linear)
	if !l.fit(p, all[0]) {
		t.Fatal("too few designs")
	}
	return l, p
}

// Goals and limits that are linear are predicted as they are, but for the
// ridge: slopes differ by its share at most. Limits out of reach are left out.
func TestModelOfLinearFunctions(t *testing.T) {
	slopes := [][]float64{{3, -1, 0.5}, {-2, 4, 1}, {1, 1, 1}, {0.5, -2, 0}}
	at := []float64{7, -3, -0.001, 0.002}
	l, p := fitted(t, func(x []float64, g *genome) {
		u := g.dom.unit(nil, x)
		value := func(o int) float64 {
			v := at[o]
			for c, s := range slopes[o] {
				v += s * (u[c] - 0.5)
			}
			return v
		}
		g.goals[0], g.goals[1] = value(0), value(1)
		g.excess[0], g.excess[1], g.excess[2] = value(2), -1e6, value(2)-4
	})
	if len(l.limits) != 1 || l.limits[0] != 0 {
		t.Fatalf("limits %v matter, want the first alone", l.limits)
	}
	g := p.all[0]
	step := []float64{0.02, -0.01, 0.03}
	want := func(o int) float64 {
		v := at[o]
		for c, s := range slopes[o] {
			v += s * step[c]
		}
		return v
	}
	goals := l.goals(nil, g, step)
	for k, v := range goals {
		if math.Abs(v-want(k)) > 0.01*math.Abs(want(k)-at[k]) {
			t.Errorf("goal %d: %g, want %g", k, v, want(k))
		}
	}
	if v := l.violation(g, step); math.Abs(v-want(2)) > 0.01*want(2) {
		t.Errorf("violation %g, want %g", v, want(2))
	}
	still := []float64{0, 0, 0}
	if v := l.goals(nil, g, still); v[0] != g.goals[0] || v[1] != g.goals[1] {
		t.Errorf("goals %v at the centre, want %v", v, g.goals)
	}
}

// Designs of another choice say nothing of the centre; nor do the goals of
// infeasible ones.
func TestModelKnowsItsKind(t *testing.T) {
	n := 0
	l, p := fitted(t, func(x []float64, g *genome) {
		u := g.dom.unit(nil, x)
		g.goals[0], g.goals[1] = u[0], -u[2]
		switch n++; n % 4 {
		case 2:
			g.x[1], g.goals[0] = 1, 1e9
		case 3:
			g.violation, g.goals[0] = 1, math.NaN()
		}
	})
	for _, i := range l.near {
		if q := p.all[i]; q.x[1] != 0 || !q.feasible() {
			t.Fatalf("fitted to %v with violation %g", q.x, q.violation)
		}
	}
	if v := l.goals(nil, p.all[0], []float64{0.01, 0.2, 0.3}); math.Abs(v[0]-0.51) > 1e-3 || math.Abs(v[1]+0.8) > 1e-3 {
		t.Errorf("goals %v, want 0.51 and -0.8", v)
	}
}

func TestModelsAllocateNothing(t *testing.T) {
	l, p := fitted(t, func(x []float64, g *genome) { g.goals[0], g.goals[1], g.excess[0] = x[0], x[2], x[3]-1 })
	goals, step := make([]float64, 2), []float64{0.1, 0, 0}
	if n := testing.AllocsPerRun(100, func() {
		l.fit(p, p.all[3])
		l.violation(p.all[3], step)
		goals = l.goals(goals, p.all[3], step)
	}); n > 0 {
		t.Errorf("%v allocations", n)
	}
}

// The pool holds the population and the latest others, each once.
func TestPoolHoldsEachOnce(t *testing.T) {
	d := newDomain(&Space{Vars: []Var{{High: 1}}})
	p := pool{dom: d}
	var all []*genome
	for i := range 2*latest + 7 {
		g := newGenome(d, 0, 1, 0)
		g.x[0] = float64(i) / 1000
		if i%10 == 9 {
			g.violation = math.Inf(1)
		}
		all = append(all, g)
		p.take(g)
	}
	for range 2 {
		p.fill(all[len(all)-50 : len(all)-20])
		seen := map[*genome]bool{}
		for i, g := range p.all {
			if seen[g] || math.IsInf(g.violation, 1) || p.x[i] != g.x[0] {
				t.Fatalf("design %d: %v, twice: %v", i, g.x, seen[g])
			}
			seen[g] = true
		}
		if len(p.all) != latest {
			t.Errorf("%d designs, want the latest %d", len(p.all), latest)
		}
	}
	if p.fill(all[:20]); len(p.all) != latest+18 {
		t.Errorf("%d designs, want %d", len(p.all), latest+18)
	}
}
