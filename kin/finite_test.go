package kin_test

import (
	"math"
	"testing"

	"legwright/kin"
)

// A pose or a dimension that is no finite number is told, never computed with.
func TestNotFinite(t *testing.T) {
	bad := map[string]float64{"NaN": math.NaN(), "+Inf": math.Inf(1), "-Inf": math.Inf(-1), "overflowing": 1e200}
	for _, f := range kin.Families() {
		m := f.Build(midRange(f), offCentre())
		for name, v := range bad {
			for _, q := range f.Freedoms {
				var c kin.Coords
				c[q] = v
				if name == "overflowing" && q.Angular() {
					continue // a large angle is an angle
				}
				p := kin.NewPose(c)
				var s kin.State
				if m.Move(&p, &s); s.Fail != kin.NotFinite || s.Leg < 0 || s.Leg >= f.Legs {
					t.Errorf("%s: %s in %s: fail %d at leg %d", f.Name, name, q, s.Fail, s.Leg)
				}
			}
			for i, dim := range f.Dimensions {
				if dim.Role != kin.Shape || dim.Unit == kin.Sign || name == "overflowing" {
					continue
				}
				d := midRange(f)
				d[i] = v
				p := atHome()
				var s kin.State
				if f.Build(d, offCentre()).Move(&p, &s); s.Fail != kin.NotFinite {
					t.Errorf("%s: %s in %s: fail %d", f.Name, name, dim.Name, s.Fail)
				}
			}
		}
		good := atHome()
		var s kin.State
		if m.Move(&good, &s); s.Fail != kin.Reached || s.Leg != -1 {
			t.Errorf("%s: home after that: fail %d at leg %d", f.Name, s.Fail, s.Leg)
		}
	}
}

// A leg whose two joints coincide has no direction: Move names that leg.
func TestLegOfNoLength(t *testing.T) {
	for _, f := range kin.Families() {
		d := midRange(f)
		m := f.Build(d, offCentre())
		if f.Outright == nil || !prismatic(m) {
			continue
		}
		for leg := range f.Legs {
			j := outright(f, d, m)
			j.Home, j.HomeRot = kin.Vec{}, kin.Identity()
			j.Base[leg] = kin.Vec{X: 0.5, Y: 0.125} // sums of powers of two are exact
			j.Platform[leg] = kin.Vec{X: 0.75, Y: 0.125}
			m := f.Outright(j, &kin.Setup{Length: 0.3})
			p := kin.NewPose(kin.Coords{kin.X: -0.25})
			var s kin.State
			if m.Move(&p, &s); s.Fail != kin.NotFinite || s.Leg != leg {
				t.Errorf("%s: leg %d has no length: fail %d at leg %d", f.Name, leg, s.Fail, s.Leg)
			}
		}
	}
}
