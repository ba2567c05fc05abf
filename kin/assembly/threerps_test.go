package assembly

import (
	"math"
	"math/rand/v2"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// E3 (polynomial homotopy finds 16 solutions, 8 of them real; random starts find the 8).
func TestThreeRPSReference(t *testing.T) {
	var base, hinge, platform [3]kin.Vec
	for i := range 3 {
		s, c := math.Sincos(float64(i) * 2 * math.Pi / 3)
		base[i] = kin.Vec{X: 0.5 * c, Y: 0.5 * s}
		hinge[i] = kin.Vec{X: -s, Y: c}
		platform[i] = kin.Vec{X: 0.3 * c, Y: 0.3 * s}
	}
	length := [3]float64{0.5484681910986863, 0.6076797444098804, 0.7567443412390726}
	rows, col := readTable(t, "E3_3rps_fk.csv")
	for seed := range uint64(10) {
		got := ThreeRPS(base, hinge, platform, length, seed)
		if len(got.Modes) != 8 || got.Complex != 16 || got.Lost != 0 {
			t.Errorf("seed %d: %d modes of %d, %d lost, want 8 of 16", seed, len(got.Modes), got.Complex, got.Lost)
		}
		for _, row := range rows {
			q := [4]float64(row[col["q0"] : col["q0"]+4])
			want := Mode{Origin: vec(row[col["px"]:]), Rot: rotation(q)}
			if _, far := nearest(got.Modes, &want); !(far < 5e-12) { // printed to 12 decimals
				t.Errorf("seed %d: posture %v is missed by %g", seed, row[0], far)
			}
		}
	}
}

// A 6-3 platform is three hinged legs: both solvers agree on its 16 solutions.
func TestThreeRPSIsSixThree(t *testing.T) {
	machines := 40
	if testing.Short() {
		machines = 2
	}
	rng := rand.New(rand.NewPCG(12, 12))
	counts := map[int]int{}
	for n := range machines {
		a, b, p, r := scattered(rng, n%2 == 1)
		b[1], b[3], b[5] = b[0], b[2], b[4]
		l := lengths(&a, &b, p, &r)
		var base, hinge, platform [3]kin.Vec
		var length [3]float64
		for i := range 3 {
			d := r3.Sub(a[2*i+1], a[2*i])
			along := (l[2*i]*l[2*i] - l[2*i+1]*l[2*i+1] + r3.Norm2(d)) / (2 * r3.Norm2(d))
			base[i], hinge[i], platform[i] = r3.Add(a[2*i], r3.Scale(along, d)), d, b[2*i]
			length[i] = math.Sqrt(l[2*i]*l[2*i] - along*along*r3.Norm2(d))
		}
		got, want := ThreeRPS(base, hinge, platform, length, 0), SixLegs(a, b, l, 0)
		if len(got.Modes) != len(want.Modes) || got.Complex != want.Complex {
			t.Errorf("machine %d: %d modes of %d by three circles, %d of %d by six legs", n, len(got.Modes), got.Complex, len(want.Modes), want.Complex)
		}
		counts[len(got.Modes)]++
		for _, m := range want.Modes {
			if _, far := nearest(got.Modes, &m); !(far < 1e-7) {
				t.Errorf("machine %d: a mode is missed by %g", n, far)
			}
		}
	}
	t.Logf("machines by number of modes: %v", counts)
}

// Usual machines at poses that they reach: the posture is found, its mirror image below the base too,
// and nothing is lost.
func TestThreeRPSRandom(t *testing.T) {
	machines := 400
	if testing.Short() {
		machines = 20
	}
	rng := rand.New(rand.NewPCG(13, 13))
	for n := range machines {
		var base, hinge, platform [3]kin.Vec
		rb, rp := uniform(rng, 0.2, 0.6), uniform(rng, 0.1, 0.4)
		for i := range 3 {
			s, c := math.Sincos(math.Pi/2 + float64(i)*2*math.Pi/3)
			base[i] = kin.Vec{X: rb * c, Y: rb * s}
			hinge[i] = kin.Vec{X: -s, Y: c}
			platform[i] = kin.Vec{X: rp * c, Y: rp * s}
		}
		// Any three swings near the upright whose joints have the platform's sides: start
		// from the pose with tilt only, as the platform's joints stay in the legs' planes.
		roll, pitch := uniform(rng, -0.5, 0.5), uniform(rng, -0.5, 0.5)
		yaw := math.Atan2(math.Sin(pitch)*math.Sin(roll), math.Cos(pitch)+math.Cos(roll))
		r := kin.RPY(roll, pitch, yaw)
		p := kin.Vec{X: -rp * r[1], Y: rp / 2 * (r[4] - r[0]), Z: uniform(rng, 0.3, 0.8)}
		var length [3]float64
		for i := range 3 {
			s := r3.Sub(r3.Add(p, r.Apply(platform[i])), base[i])
			if off := r3.Dot(s, hinge[i]); !(math.Abs(off) < 1e-12) {
				t.Fatalf("machine %d: leg %d is %g off its plane", n, i, off)
			}
			length[i] = r3.Norm(s)
		}
		got := ThreeRPS(base, hinge, platform, length, 0)
		if got.Lost != 0 || got.Complex+got.Infinite+got.Singular != 16 {
			t.Errorf("machine %d: %d simple, %d infinite, %d singular, %d lost", n, got.Complex, got.Infinite, got.Singular, got.Lost)
		}
		if _, far := nearest(got.Modes, &Mode{Origin: p, Rot: r}); !(far < 1e-7) {
			t.Errorf("machine %d: the posture that gave the lengths is missed by %g", n, far)
		}
		for _, m := range got.Modes {
			below := 0
			for _, o := range got.Modes {
				if math.Abs(m.Origin.Z+o.Origin.Z) < 1e-7 && math.Abs(m.Origin.X-o.Origin.X) < 1e-7 {
					below++
				}
			}
			if below == 0 {
				t.Errorf("machine %d: no mirror image of the mode at %v", n, m.Origin)
			}
		}
	}
}

func BenchmarkThreeRPS(b *testing.B) {
	rng := rand.New(rand.NewPCG(12, 12))
	for b.Loop() {
		var base, hinge, platform [3]kin.Vec
		for i := range 3 {
			s, c := math.Sincos(float64(i) * 2 * math.Pi / 3)
			base[i] = kin.Vec{X: 0.5 * c, Y: 0.5 * s}
			hinge[i] = kin.Vec{X: -s, Y: c}
			platform[i] = kin.Vec{X: 0.3 * c, Y: 0.3 * s}
		}
		ThreeRPS(base, hinge, platform, [3]float64{uniform(rng, 0.5, 0.7), uniform(rng, 0.5, 0.7), uniform(rng, 0.5, 0.7)}, 0)
	}
}
