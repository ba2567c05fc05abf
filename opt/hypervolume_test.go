package opt

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"
)

// grid is the oracle: it cuts space along all coordinates of the points and
// counts the cells that some point dominates.
func grid(pts [][]float64, ref []float64) float64 {
	var cell func(k int, low []float64, size float64) float64
	cell = func(k int, low []float64, size float64) float64 {
		if k == len(ref) {
			for _, p := range pts {
				if within(p, low) {
					return size
				}
			}
			return 0
		}
		cuts := []float64{ref[k]}
		for _, p := range pts {
			if p[k] < ref[k] {
				cuts = append(cuts, p[k])
			}
		}
		sum := 0.0
		seen := map[float64]bool{}
		for _, c := range cuts[1:] {
			if seen[c] {
				continue
			}
			seen[c] = true
			next := ref[k]
			for _, d := range cuts {
				if d > c && d < next {
					next = d
				}
			}
			sum += cell(k+1, append(low, c), size*(next-c))
		}
		return sum
	}
	return cell(0, nil, 1)
}

func randomSet(r *rand.Rand, n, m int, ties bool) [][]float64 {
	pts := make([][]float64, n)
	for i := range pts {
		pts[i] = make([]float64, m)
		for k := range pts[i] {
			if pts[i][k] = 1.2 * r.Float64(); ties {
				pts[i][k] = float64(r.IntN(6)) / 4
			}
		}
	}
	return pts
}

// Values: cell count by hand or by inclusion-exclusion, computed apart from
// this program in Python with rational numbers.
func TestHypervolumeSmallSets(t *testing.T) {
	for _, c := range []struct {
		why  string
		pts  [][]float64
		ref  []float64
		want float64
	}{
		{"staircase", [][]float64{{1, 3}, {2, 2}, {3, 1}}, []float64{4, 4}, 6},
		{"dominated and double", [][]float64{{1, 3}, {2, 2}, {3, 1}, {2, 3}, {2, 2}}, []float64{4, 4}, 6},
		{"one", [][]float64{{0, 0}}, []float64{1, 1}, 1},
		{"outside", [][]float64{{5, 5}}, []float64{4, 4}, 0},
		{"one outside", [][]float64{{1, 5}, {2, 2}}, []float64{4, 4}, 4},
		{"cube", [][]float64{{1, 1, 1}}, []float64{2, 2, 2}, 1},
		{"cyclic", [][]float64{{1, 2, 3}, {2, 3, 1}, {3, 1, 2}}, []float64{4, 4, 4}, 13},
		{"touching", [][]float64{{1, 2, 2}, {2, 1, 2}, {2, 2, 1}}, []float64{3, 3, 3}, 4},
		{"same second goal", [][]float64{{1, 1, 3}, {3, 3, 1}}, []float64{4, 4, 4}, 11},
		{"four goals", [][]float64{{1, 2, 3, 4}, {4, 3, 2, 1}, {2, 2, 2, 2}}, []float64{5, 5, 5, 5}, 93},
		{"single goal", [][]float64{{3}, {1}, {2}}, []float64{5}, 4},
		{"empty", nil, []float64{1, 1, 1}, 0},
	} {
		if got := Hypervolume(c.pts, c.ref); got != c.want {
			t.Errorf("%s: %v, want %v", c.why, got, c.want)
		}
		if got := grid(c.pts, c.ref); got != c.want {
			t.Errorf("%s: oracle %v, want %v", c.why, got, c.want)
		}
	}
}

func TestHypervolumeAgainstCells(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 2))
	for it := range 600 {
		m := 1 + it%5
		pts := randomSet(r, 1+r.IntN(8), m, it%2 == 0)
		ref := []float64{1.1, 1.1, 1.1, 1.1, 1.1}[:m]
		if got, want := Hypervolume(pts, ref), grid(pts, ref); math.Abs(got-want) > 1e-12 {
			t.Fatalf("%d goals, %v: %v, want %v", m, pts, got, want)
		}
	}
}

// What a point covers alone is, by definition, the loss of hypervolume without
// it. The set is changed step by step, so every shortcut of shares is met.
func TestSharesFollowTheSet(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 4))
	for it := range 120 {
		m := 1 + it%5
		ref := []float64{1.1, 1.3, 1.1, 1.25, 1.1}[:m]
		var s shares
		s.reset(ref)
		for step := range 60 {
			switch {
			case step%9 == 8:
				ref = append([]float64(nil), ref...)
				ref[r.IntN(m)] = 1 + 0.5*r.Float64()
				s.move(ref)
			case s.len() > 1 && r.IntN(3) == 0:
				s.remove(r.IntN(s.len()))
			default:
				p := randomSet(r, 1, m, it%2 == 0)[0]
				dominated := false
				for i := s.len() - 1; i >= 0; i-- {
					switch compare(s.point(i), p) {
					case -1:
						dominated = true
					case 1:
						s.remove(i)
					}
				}
				if !dominated {
					s.add(p)
				}
			}
			var set [][]float64
			for i := range s.len() {
				set = append(set, s.point(i))
			}
			all := Hypervolume(set, ref)
			if r.IntN(3) == 0 { // else what is stale stays so for a while
				continue
			}
			for i := range set {
				s.exact(i)
				rest := slices.Delete(slices.Clone(set), i, i+1)
				if want := all - Hypervolume(rest, ref); math.Abs(want-s.alone[i]) > 1e-12 {
					t.Fatalf("%d goals, step %d: point %d of %v covers %v alone, want %v", m, step, i, set, s.alone[i], want)
				}
			}
		}
	}
}

// The point to leave out is the one that covers least, however many were left
// out before; few volumes are computed for it.
func TestLeastAfterRemovals(t *testing.T) {
	r := rand.New(rand.NewPCG(7, 8))
	for m := 2; m <= 4; m++ {
		var s shares
		ref := slices.Repeat([]float64{1.1}, m)
		s.reset(ref)
		for _, p := range sphere(r, 40, m) {
			s.add(p)
		}
		s.settle()
		for s.len() > 1 {
			b := s.least()
			all := s
			all.pts, all.upper = slices.Clone(s.pts), slices.Clone(s.upper)
			all.alone, all.stale = slices.Clone(s.alone), slices.Clone(s.stale)
			all.settle()
			if want := all.least(); want != b {
				t.Fatalf("%d goals, %d points: left out %d, want %d", m, s.len(), b, want)
			}
			s.remove(b)
		}
	}
}

func BenchmarkHypervolume(b *testing.B) {
	r := rand.New(rand.NewPCG(5, 6))
	for _, m := range []int{2, 3, 4} {
		pts := make([][]float64, 200)
		for i := range pts {
			p, norm := make([]float64, m), 0.0
			for k := range p {
				p[k] = math.Abs(r.NormFloat64())
				norm += p[k] * p[k]
			}
			for k := range p {
				p[k] /= math.Sqrt(norm)
			}
			pts[i] = p
		}
		ref := []float64{1.1, 1.1, 1.1, 1.1}[:m]
		b.Run(string(rune('0'+m)), func(b *testing.B) {
			for b.Loop() {
				Hypervolume(pts, ref)
			}
		})
	}
}
