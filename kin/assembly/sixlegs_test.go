package assembly

import (
	"math"
	"testing"
	"time"

	"legwright/kin"
)

func gough40(t testing.TB) (base, platform [6]kin.Vec, length [6]float64, modes []Mode) {
	var a1 struct {
		A       [][]float64 `json:"base_points_A"`
		B       [][]float64 `json:"platform_points_B"`
		Lengths []float64   `json:"leg_lengths"`
	}
	readJSON(t, "A1_gough40.json", &a1)
	for i := range 6 {
		base[i], platform[i] = vec(a1.A[i]), vec(a1.B[i])
	}
	copy(length[:], a1.Lengths)
	rows, col := readTable(t, "A1_gough40_poses.csv")
	for _, row := range rows {
		m := Mode{Origin: vec(row[col["px"]:]), Determinant: row[col["detJ"]]}
		copy(m.Rot[:], row[col["R11"]:])
		modes = append(modes, m)
	}
	return base, platform, length, modes
}

func TestGough40(t *testing.T) {
	a, b, l, want := gough40(t)
	for seed := range uint64(11) {
		t0 := time.Now()
		r := SixLegs(a, b, l, seed)
		dt := time.Since(t0)
		worst := 0.0
		for _, w := range want {
			best := math.Inf(1)
			for _, m := range r.Modes {
				d := math.Abs(m.Origin.X - w.Origin.X)
				d = max(d, math.Abs(m.Origin.Y-w.Origin.Y), math.Abs(m.Origin.Z-w.Origin.Z))
				for i := range w.Rot {
					d = max(d, math.Abs(w.Rot[i]-m.Rot[i]))
				}
				best = min(best, d)
			}
			worst = max(worst, best)
		}
		n := len(r.Modes)
		r.Modes = nil
		t.Log(seed, n, r, dt, worst)
	}
}
