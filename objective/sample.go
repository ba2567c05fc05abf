package objective

import (
	"cmp"
	"math"
	"slices"

	"legwright/kin"
)

// Sample is one required pose.
type Sample struct {
	Coords kin.Coords
	Pose   kin.Pose
	Zone   int
	Row    int  // its number within the zone, from 0, in the order of generation or of the file
	Volume bool // counts for averages over the volume
}

// sampleZone gives the zone's poses. Box: the corners of the coordinates that
// move (first coordinate slowest, low end first), the centre, then Sobol points
// from number 2 on, since 0 and 1 repeat a corner and the centre. Ellipsoid: the
// centre, the ends of its axes, then Sobol points turned into directions by the
// normal quantile, the first half of them on the surface, the others inside (not
// by turns: points of even and of odd number lie in different halves of the
// second dimension). Axes: evenly spaced, ends included, fixed coordinates kept.
// A zone in which nothing moves is one pose. Listed: as given.
func sampleZone(z *Zone, number int) []Sample {
	var out []Sample
	add := func(c kin.Coords, volume bool) {
		out = append(out, Sample{Coords: c, Pose: kin.NewPose(c), Zone: number, Row: len(out), Volume: volume})
	}
	moving := z.moving()
	k := len(moving)
	if k == 0 && z.Kind != Listed {
		add(z.centre(), false)
		return out
	}
	switch z.Kind {
	case Box:
		for n := range 1 << k {
			c := z.Low
			for b, q := range moving {
				if n>>(k-1-b)&1 == 1 {
					c[q] = z.High[q]
				}
			}
			add(c, false)
		}
		add(z.centre(), false)
		cube(z.Samples-len(out), k, func(u []float64) {
			c := z.centre()
			for b, q := range moving {
				c[q] += (2*u[b] - 1) * (z.High[q] - z.Low[q]) / 2
			}
			add(c, true)
		})
	case Ellipsoid:
		add(z.centre(), false)
		for _, q := range moving {
			for _, end := range [2]float64{z.Low[q], z.High[q]} {
				c := z.centre()
				c[q] = end
				add(c, false)
			}
		}
		free := z.Samples - len(out)
		surface := len(out) + free - free/2
		cube(free, k+1, func(u []float64) {
			c := z.centre()
			radius, inside := 1.0, len(out) >= surface
			if inside {
				radius = math.Pow(u[k], 1/float64(k))
			}
			var d [6]float64
			norm := 0.0
			for b := range moving {
				d[b] = math.Erfinv(2*u[b] - 1)
				norm = math.Hypot(norm, d[b])
			}
			for b, q := range moving {
				if norm > 0 {
					c[q] += radius * d[b] / norm * (z.High[q] - z.Low[q]) / 2
				}
			}
			add(c, inside)
		})
	case Axes:
		for _, q := range moving {
			n := max(z.Samples, 2)
			for i := range n {
				c := z.fixed()
				c[q] = z.Low[q] + (z.High[q]-z.Low[q])*float64(i)/float64(n-1)
				if i == n-1 {
					c[q] = z.High[q]
				}
				add(c, false)
			}
		}
	case Listed:
		for _, c := range z.Poses {
			add(c, true)
		}
	}
	return out
}

// cube calls f with n points of the k-dimensional unit cube: Sobol points from number 2 on.
func cube(n, k int, f func(u []float64)) {
	s := newSobol()
	u := make([]float64, k)
	s.next(u)
	s.next(u)
	for range n {
		s.next(u)
		f(u)
	}
}

// arrange puts the scouts of every zone first, then the rest. Within the two
// parts the poses follow each other by zone and coordinates, so that the order
// of a file's rows changes no result. It gives the number of scouts.
func arrange(all []Sample, zones int) (scouts int) {
	slices.SortStableFunc(all, compareSamples)
	scout := make([]bool, len(all))
	for z := range zones {
		lo, _ := slices.BinarySearchFunc(all, z, func(s Sample, z int) int { return cmp.Compare(s.Zone, z) })
		hi, _ := slices.BinarySearchFunc(all, z+1, func(s Sample, z int) int { return cmp.Compare(s.Zone, z) })
		for _, i := range support(all[lo:hi]) {
			scout[lo+i] = true
		}
	}
	var first, rest []Sample
	for i, s := range all {
		if scout[i] {
			first = append(first, s)
		} else {
			rest = append(rest, s)
		}
	}
	copy(all, first)
	copy(all[len(first):], rest)
	return len(first)
}

func compareSamples(a, b Sample) int {
	if c := cmp.Compare(a.Zone, b.Zone); c != 0 {
		return c
	}
	return slices.Compare(a.Coords[:], b.Coords[:])
}

// support finds the poses that lie farthest out in any of the directions
// (±1, …, ±1) and along each axis, coordinates scaled to their ranges: the
// corners of a box, and what comes nearest to corners in any other set. Such
// poses decide nearly every worst case.
func support(s []Sample) []int {
	if len(s) == 0 {
		return nil
	}
	low, high := s[0].Coords, s[0].Coords
	for i := range s {
		for k, v := range s[i].Coords {
			low[k], high[k] = math.Min(low[k], v), math.Max(high[k], v)
		}
	}
	z := Zone{Low: low, High: high}
	moving := z.moving()
	var dirs []kin.Coords
	for n := range 1 << len(moving) {
		var d kin.Coords
		for b, q := range moving {
			d[q] = float64(2*(n>>b&1)-1) / (high[q] - low[q])
		}
		dirs = append(dirs, d)
	}
	for _, q := range moving {
		var d kin.Coords
		d[q] = 1
		dirs = append(dirs, d)
		d[q] = -1
		dirs = append(dirs, d)
	}
	seen := map[int]bool{}
	var out []int
	for _, d := range dirs {
		best, at := math.Inf(-1), 0
		for i := range s {
			v := 0.0
			for k, c := range s[i].Coords {
				v += d[k] * c
			}
			if v > best+1e-12 {
				best, at = v, i
			}
		}
		if !seen[at] {
			seen[at] = true
			out = append(out, at)
		}
	}
	return out
}
