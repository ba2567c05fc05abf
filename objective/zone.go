package objective

import "legwright/kin"

// ZoneKind is the shape of a zone.
type ZoneKind int

// The shapes of zones.
const (
	Box       ZoneKind = iota // all coordinates at once, each within its range
	Axes                      // each coordinate alone, the others at home or where the zone fixes them
	Ellipsoid                 // all at once, within the ellipsoid whose axes are the ranges
	Listed                    // poses given outright
)

// Zone is a set of required poses about home.
type Zone struct {
	Name      string
	Kind      ZoneKind
	Low, High kin.Coords   // ranges; equal ends fix the coordinate
	Samples   int          // poses in all (Box, Ellipsoid) or per moving coordinate (Axes)
	Poses     []kin.Coords // of a Listed zone
}

// MinSamples is the least number of samples that the zone's shape needs: the
// corners and the centre of a box, the ends of an ellipsoid's axes and its centre,
// the two ends of an excursion; one pose where nothing moves.
func (z *Zone) MinSamples() int {
	k := len(z.moving())
	if k == 0 && z.Kind != Listed {
		return 1
	}
	switch z.Kind {
	case Box:
		return 1<<k + 1
	case Ellipsoid:
		return 2*k + 1
	case Axes:
		return 2
	}
	return 0
}

// moving lists the coordinates whose range is not a single value.
func (z *Zone) moving() []int {
	var out []int
	for k := range z.Low {
		if z.Low[k] != z.High[k] {
			out = append(out, k)
		}
	}
	return out
}

// fixed is home, but for the coordinates that the zone fixes elsewhere.
func (z *Zone) fixed() kin.Coords {
	var c kin.Coords
	for k := range c {
		if z.Low[k] == z.High[k] {
			c[k] = z.Low[k]
		}
	}
	return c
}

// centre is the middle of the ranges.
func (z *Zone) centre() kin.Coords {
	var c kin.Coords
	for k := range c {
		c[k] = middle(z.Low[k], z.High[k])
	}
	return c
}

// middle is exact for ranges that are symmetric about zero.
func middle(low, high float64) float64 { return low/2 + high/2 }
