package proof

import (
	"legwright/kin/enclose"
	"legwright/objective"
)

// region is a connected set of poses: the box, or the ellipsoid that fills it.
type region struct {
	zone   int
	box    enclose.Box
	moving []int
	ball   bool
}

// regions are the continuous parts of the zones: of single excursions, one for each coordinate. Zones of listed poses, and
// those in which nothing moves, have none.
func regions(zones []objective.Zone) (out []region) {
	for i := range zones {
		z := &zones[i]
		moving := z.Moving()
		if z.Kind == objective.Listed || len(moving) == 0 {
			continue
		}
		if z.Kind != objective.Axes {
			out = append(out, region{i, enclose.Box{Low: z.Low, High: z.High}, moving, z.Kind == objective.Ellipsoid})
			continue
		}
		for _, q := range moving {
			b := enclose.Box{Low: z.Resting(), High: z.Resting()}
			b.Low[q], b.High[q] = z.Low[q], z.High[q]
			out = append(out, region{zone: i, box: b, moving: []int{q}})
		}
	}
	return out
}

// beyond tells whether no pose of the box belongs to the region.
func (g *region) beyond(b *enclose.Box) bool {
	if !g.ball {
		return false
	}
	sum := 0.0
	for _, q := range g.moving {
		c := g.box.Low[q]/2 + g.box.High[q]/2
		half := (g.box.High[q] - g.box.Low[q]) / 2
		if d := max(b.Low[q]-c, c-b.High[q], 0) / half; d > 0 {
			sum += d * d
		}
	}
	return sum > 1+1e-9
}

// holds tells whether the pose belongs to the region.
func (g *region) holds(c *[enclose.Coords]float64) bool {
	if !g.ball {
		return true
	}
	sum := 0.0
	for _, q := range g.moving {
		d := (c[q] - (g.box.Low[q]/2 + g.box.High[q]/2)) / ((g.box.High[q] - g.box.Low[q]) / 2)
		sum += d * d
	}
	return sum <= 1
}
