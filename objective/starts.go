package objective

import "math"

// diligence is how hard a Refiner tries.
type diligence struct {
	starts int     // climbs at most: 8 found the true worst in every trial of some thousands
	still  int     // climbs after which it stops if none has left its start, a corner whose slopes all point outward
	hope   float64 // climbs go on while this times the linear prediction of what is left to gain passes the worst so far; 0 for always
}

// thorough is for appraisals, of which a search could not afford one for each candidate.
func thorough() diligence { return diligence{starts: 8, still: 8} }

// quick is for searches, at a third of the cost. In trials it was short of thorough in one of a hundred of the worst values that lie
// between the samples, by at most half a per cent of the value.
func quick() diligence { return diligence{starts: 5, still: 2, hope: 1} }

// rankPlaces is from how many of the worst poses starts are chosen.
const rankPlaces = 24

// start is a sampled pose and how bad a property is there.
type start struct {
	bad    float64 // larger is worse
	sample int
}

// ranking holds the worst samples of one zone by one property, worst first.
type ranking struct {
	n  int
	at [rankPlaces]start
}

// enter offers a sample; of equally bad ones the first met stays ahead.
func (k *ranking) enter(bad float64, sample int) {
	if k.n == rankPlaces && bad <= k.at[rankPlaces-1].bad {
		return
	}
	i := min(k.n, rankPlaces-1)
	for ; i > 0 && k.at[i-1].bad < bad; i-- {
		k.at[i] = k.at[i-1]
	}
	k.at[i] = start{bad, sample}
	k.n = min(k.n+1, rankPlaces)
}

// refinable tells whether worst values over the zone can be driven beyond its samples: it is continuous
// and something moves in it.
func (z *Zone) refinable() bool {
	return z.Kind != Listed && z.Low != z.High
}

// refined tells whether worst values are driven beyond the samples in any zone: not in zones of listed poses, nor in a
// task in which single poses may fail, since those do not count.
func (t *Task) refined() bool { return !t.soft() && t.continuous() }

// continuous tells whether any zone holds more poses than its samples.
func (t *Task) continuous() bool {
	for i := range t.Zones {
		if t.Zones[i].refinable() {
			return true
		}
	}
	return false
}

// bad turns a raw value of the measure into one of which larger is worse; it is its own inverse.
func (m *Measure) bad(raw float64) float64 {
	if m.Sense == Larger {
		return -raw
	}
	return raw
}

// neighbours tells whether a climb from one pose of the region would pass the other: at most one coordinate differs by
// more than a quarter of its range, as at corners of a box that share an edge.
func (g *region) neighbours(a, b *[6]float64) bool {
	differ := 0
	for k := range g.n {
		if math.Abs(a[k]-b[k]) > 0.5 {
			differ++
		}
	}
	return differ < 2
}
