package kin_test

import (
	"encoding/json"
	"math"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// farthest is the largest difference of an element.
func farthest(a, b kin.Rot) float64 {
	d := 0.0
	for k := range a {
		d = math.Max(d, math.Abs(a[k]-b[k]))
	}
	return d
}

// RPY against rotations.csv: random angles through scipy's Rotation
// ("xyz", fixed axes), 17 digits. 1e-15.
func TestRPYAgainstScipy(t *testing.T) {
	rows, col := readTable(t, "rotations.csv")
	if len(rows) < 10 {
		t.Fatalf("%d rotations", len(rows))
	}
	for k, row := range rows {
		var want kin.Rot
		copy(want[:], row[col["R11"]:col["R11"]+9])
		got := kin.RPY(row[col["roll_rad"]], row[col["pitch_rad"]], row[col["yaw_rad"]])
		if d := farthest(got, want); d > 1e-15 {
			t.Errorf("row %d: differs by %g", k+1, d)
		}
		roll, pitch, yaw := want.RPY()
		if d := farthest(kin.RPY(roll, pitch, yaw), want); d > 1e-14 {
			t.Errorf("row %d: angles of the matrix give it back within %g", k+1, d)
		}
	}
}

// The worked rotation G4, 10, 20 and 30 degrees: matrix to the 14 decimals
// given, rotation vector and angle to 1e-14 (scipy).
func TestRotationConventions(t *testing.T) {
	var g4 struct{ Expected map[string]json.RawMessage }
	readJSON(t, "G4_rotation_conventions.json", &g4)
	var matrix [][]float64
	if err := json.Unmarshal(g4.Expected["fixed X then Y then Z (= Rz Ry Rx, intrinsic ZYX, yaw-pitch-roll)"], &matrix); err != nil {
		t.Fatal(err)
	}
	var vector []float64
	if err := json.Unmarshal(g4.Expected["rotvec_ZYX"], &vector); err != nil {
		t.Fatal(err)
	}
	const deg = math.Pi / 180
	got := kin.RPY(10*deg, 20*deg, 30*deg)
	for i, row := range matrix {
		for j, want := range row {
			near(t, "R", got[3*i+j], want, 1e-14)
		}
	}
	if d := farthest(kin.Exp(vec(vector)), got); d > 1e-14 {
		t.Errorf("Exp of the rotation vector differs by %g", d)
	}
}

// Angles out of RPY come back, up to and at the ends of pitch, where roll is
// given as 0 and the matrix still comes back. Within 1e-7 of the ends roll and
// yaw are ill-determined, so there only the matrix is compared.
func TestAnglesComeBack(t *testing.T) {
	rng := seeded(4)
	for range 1000 {
		c := kin.Coords{3: between(rng, -3.1, 3.1), 4: between(rng, -1.5, 1.5), 5: between(rng, -3.1, 3.1)}
		p := kin.NewPose(c)
		got := p.Coords()
		for q := kin.Roll; q <= kin.Yaw; q++ {
			near(t, q.String(), got[q], c[q], 1e-13)
		}
	}
	for _, end := range []float64{math.Pi / 2, -math.Pi / 2} {
		for _, short := range []float64{0, 1e-15, 1e-13, 1e-11, 1e-9, 1e-7} {
			want := kin.RPY(0.3, end-math.Copysign(short, end), -1.1)
			roll, pitch, yaw := want.RPY()
			if math.Abs(pitch) > math.Pi/2 {
				t.Errorf("pitch %g", pitch)
			}
			if d := farthest(kin.RPY(roll, pitch, yaw), want); d > 2e-12 {
				t.Errorf("%g short of %g: the matrix comes back within %g", short, end, d)
			}
			if short == 0 && roll != 0 {
				t.Errorf("roll %g at the end of pitch", roll)
			}
		}
	}
}

// Exp against unit quaternions (gonum's r3.Rotation), closed forms about the
// axes, and the first terms of the series for small turns.
func TestExp(t *testing.T) {
	rng := seeded(6)
	for range 200 {
		w, v := ball(rng, 3), ball(rng, 1)
		e := kin.Exp(w)
		want := r3.NewRotation(r3.Norm(w), w).Rotate(v)
		near(t, "Exp(w)v", r3.Norm(r3.Sub(e.Apply(v), want)), 0, 2e-15)
		near(t, "Exp(w)ᵀExp(w)v", r3.Norm(r3.Sub(e.Unapply(e.Apply(v)), v)), 0, 2e-15)
		inverse := kin.Exp(r3.Scale(-1, w))
		if d := farthest(e.Mul(&inverse), kin.Identity()); d > 2e-15 {
			t.Errorf("Exp(w)Exp(-w) differs from the identity by %g", d)
		}
	}
	for _, a := range []float64{0, 1e-12, 0.3, math.Pi / 2, 3, math.Pi} {
		for w, want := range map[kin.Vec]kin.Rot{{X: a}: kin.RPY(a, 0, 0), {Y: a}: kin.RPY(0, a, 0), {Z: a}: kin.RPY(0, 0, a)} {
			if d := farthest(kin.Exp(w), want); d > 1e-15 {
				t.Errorf("Exp(%v) differs by %g", w, d)
			}
		}
	}
	for _, a := range []float64{1e-4, 1e-7, 1.1e-8, 0.9e-8, 1e-9} { // on both sides of where the series takes over
		e := kin.Exp(kin.Vec{Z: a})
		near(t, "sine", (e[3]-(a-a*a*a/6))/a, 0, 1e-15)
	}
}
