package opt

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"
)

func feasibleDesign(goals ...float64) Design {
	return Design{X: []float64{0}, Goals: goals, Origin: OriginSBX}
}

// The archive holds what a quadratic search over everything offered finds.
func TestArchiveIsTheNonDominatedSet(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 1))
	for it := range 60 {
		m := 1 + it%5
		pts := randomSet(r, 120, m, it%2 == 0)
		var a Archive
		for i, p := range pts {
			d := feasibleDesign(p...)
			d.Order = i
			if i%10 == 9 {
				d.Violation = 0.1
			}
			a.Add(d)
		}
		var want [][]float64
		for i, p := range pts {
			beaten := i%10 == 9
			for j, q := range pts {
				if j != i && j%10 != 9 && within(q, p) && (!slices.Equal(p, q) || j < i) {
					beaten = true
				}
			}
			if !beaten {
				want = append(want, p)
			}
		}
		slices.SortFunc(want, slices.Compare)
		got := a.Designs()
		if len(got) != len(want) || a.Len() != len(want) {
			t.Fatalf("%d goals: %d designs, want %d", m, len(got), len(want))
		}
		for i := range want {
			if !slices.Equal(got[i].Goals, want[i]) || got[i].Origin != OriginSBX {
				t.Fatalf("%d goals: design %d is %v, want %v", m, i, got[i], want[i])
			}
		}
	}
}

// sphere returns n points of the part of the unit sphere that is a front.
func sphere(r *rand.Rand, n, m int) [][]float64 {
	pts := make([][]float64, n)
	for i := range pts {
		p, s := make([]float64, m), 0.0
		for k := range p {
			p[k] = math.Abs(r.NormFloat64())
			s += p[k] * p[k]
		}
		for k := range p {
			p[k] = 1 - p[k]/math.Sqrt(s)
		}
		pts[i] = p
	}
	return pts
}

// Thinning keeps the limit and the best in each goal, and the 200 points
// picked afterwards cover as much as those picked from everything, less a
// thousandth at most.
func TestArchiveLimitLosesNothingThatShows(t *testing.T) {
	r := rand.New(rand.NewPCG(2, 2))
	for _, m := range []int{2, 3, 4} {
		pts := sphere(r, 6000, m)
		ref := slices.Repeat([]float64{1.1}, m)
		all, few := Archive{}, Archive{Limit: archiveLimit(200, m)}
		for _, p := range pts {
			all.Add(feasibleDesign(p...))
			few.Add(feasibleDesign(p...))
			if few.Len() > few.Limit*5/4 {
				t.Fatalf("%d designs, limit %d", few.Len(), few.Limit)
			}
		}
		covered := func(a *Archive) float64 {
			q := a.points()
			var front [][]float64
			for _, i := range pick(q, 200, ref) {
				front = append(front, q[i])
			}
			return Hypervolume(front, ref)
		}
		if a, b := covered(&all), covered(&few); b < 0.999*a {
			t.Errorf("%d goals: %v of %v", m, b, a)
		}
		lowAll, _ := all.bounds()
		lowFew, _ := few.bounds()
		if !slices.Equal(lowAll, lowFew) {
			t.Errorf("%d goals: the best in a goal was lost: %v, %v", m, lowFew, lowAll)
		}
	}
}

// The best k of n by trying all, against what pick takes: it has to come near,
// and 1-1/e of it is proven.
func TestPickAgainstTheBestSubset(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 3))
	worst := 1.0
	for it := range 40 {
		m := 2 + it%3
		pts := sphere(r, 10, m)
		ref := slices.Repeat([]float64{1.1}, m)
		const k = 4
		best := 0.0
		for mask := range 1 << len(pts) {
			var sub [][]float64
			for i, p := range pts {
				if mask>>i&1 == 1 {
					sub = append(sub, p)
				}
			}
			if len(sub) == k {
				best = max(best, Hypervolume(sub, ref))
			}
		}
		chosen := pick(pts, k, ref)
		slices.Sort(chosen)
		if len(slices.Compact(slices.Clone(chosen))) != k {
			t.Fatalf("picked %v", chosen)
		}
		var sub [][]float64
		for _, i := range chosen {
			sub = append(sub, pts[i])
		}
		worst = min(worst, Hypervolume(sub, ref)/best)
	}
	if worst < 0.97 {
		t.Errorf("%.4f of the best subset at worst", worst)
	}
}

func TestPickAndScatterTakeAllOfFew(t *testing.T) {
	pts := sphere(rand.New(rand.NewPCG(4, 4)), 5, 6)
	ref := slices.Repeat([]float64{1.1}, 6)
	if got := pick(pts, 9, ref); len(got) != 5 {
		t.Errorf("picked %v", got)
	}
	got := pick(pts, 3, ref)
	slices.Sort(got)
	if len(slices.Compact(got)) != 3 {
		t.Errorf("picked %v", got)
	}
}

// A newcomer that is beaten costs no memory, nor does the exclusive volume of
// a point.
func TestInnerLoopsDoNotAllocate(t *testing.T) {
	r := rand.New(rand.NewPCG(5, 5))
	for _, m := range []int{2, 3, 4} {
		var s shares
		ref := slices.Repeat([]float64{1.1}, m)
		s.reset(ref)
		for _, p := range sphere(r, 60, m) {
			s.add(p)
		}
		p := append([]float64(nil), s.point(7)...)
		cycle := func() {
			s.remove(7)
			s.add(p)
			s.settle()
		}
		cycle()
		if n := testing.AllocsPerRun(50, cycle); n != 0 {
			t.Errorf("%d goals: %v allocations for a removal and an insertion", m, n)
		}
		var a Archive
		g := &genome{goals: slices.Repeat([]float64{0.2}, m)}
		a.add(g, 0)
		h := &genome{goals: slices.Repeat([]float64{0.3}, m)}
		if n := testing.AllocsPerRun(50, func() { a.add(h, 1) }); n != 0 {
			t.Errorf("%d goals: %v allocations for a beaten newcomer", m, n)
		}
	}
}
