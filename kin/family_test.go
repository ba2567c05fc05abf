package kin_test

import (
	"math"
	"slices"
	"strings"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/spatial/r3"
)

// Every registered family must tell what a person needs to know about it.
func TestFamiliesAreComplete(t *testing.T) {
	families := kin.Families()
	if len(families) == 0 {
		t.Fatal("no family is registered")
	}
	seen := map[string]bool{}
	for _, f := range families {
		t.Run(f.Name, func(t *testing.T) {
			if f.Name == "" || seen[f.Name] {
				t.Errorf("the name %q is empty or taken", f.Name)
			}
			seen[f.Name] = true
			if kin.FamilyNamed(f.Name) == nil {
				t.Error("FamilyNamed does not find it")
			}
			if f.Text == "" || strings.Contains(f.Text, "\n") {
				t.Error("Text is not one line")
			}
			if len(f.Picture) < 100 {
				t.Error("Picture does not say where the dimensions are measured")
			}
			if len(f.Sources) == 0 {
				t.Error("no source")
			}
			if f.Build == nil {
				t.Fatal("no Build")
			}
			if !slices.IsSorted(f.Freedoms) || len(slices.Compact(slices.Clone(f.Freedoms))) != len(f.Freedoms) {
				t.Errorf("freedoms %v are not in the order of Coords", f.Freedoms)
			}
			if f.Legs != len(f.Freedoms) {
				t.Errorf("%d legs for %d freedoms", f.Legs, len(f.Freedoms))
			}
			for q := kin.X; q <= kin.Yaw; q++ {
				if f.Has(q) != slices.Contains(f.Freedoms, q) {
					t.Errorf("Has(%s) = %v", q, f.Has(q))
				}
			}
			checkDimensions(t, f)
			checkStarter(t, f)
		})
	}
	if kin.FamilyNamed("no such family") != nil {
		t.Error("FamilyNamed finds what is not there")
	}
}

func checkDimensions(t *testing.T, f *kin.Family) {
	names := map[string]bool{}
	for i, d := range f.Dimensions {
		if d.Name == "" || names[d.Name] {
			t.Errorf("dimension %d: the name %q is empty or taken", i, d.Name)
		}
		names[d.Name] = true
		if f.Index(d.Name) != i {
			t.Errorf("Index(%q) = %d, want %d", d.Name, f.Index(d.Name), i)
		}
		if d.Text == "" {
			t.Errorf("%s: no text", d.Name)
		}
		if d.Unit != kin.Metre && d.Unit != kin.Radian && d.Unit != kin.Sign {
			t.Errorf("%s: unknown unit %d", d.Name, d.Unit)
		}
		switch {
		case math.IsNaN(d.Low + d.High + d.Default), math.IsInf(d.Low+d.High+d.Default, 0):
			t.Errorf("%s: range [%g, %g], default %g", d.Name, d.Low, d.High, d.Default)
		case d.Low > d.High:
			t.Errorf("%s: reversed range [%g, %g]", d.Name, d.Low, d.High)
		case d.Low == d.High && !d.Optional:
			t.Errorf("%s: a dimension that must be given has the empty range [%g, %g]", d.Name, d.Low, d.High)
		case d.Optional && (d.Default < d.Low || d.Default > d.High):
			t.Errorf("%s: default %g outside [%g, %g]", d.Name, d.Default, d.Low, d.High)
		case d.Unit == kin.Radian && math.Max(math.Abs(d.Low), math.Abs(d.High)) > 2*math.Pi:
			t.Errorf("%s: range [%g, %g] is not in radians", d.Name, d.Low, d.High)
		case d.Unit == kin.Metre && (math.Abs(d.Low) > 10 || math.Abs(d.High) > 10):
			t.Errorf("%s: range [%g, %g] is not in metres", d.Name, d.Low, d.High)
		case d.Unit == kin.Metre && strings.Contains(d.Name, "radius") && d.Low <= 0:
			t.Errorf("%s: a radius from %g", d.Name, d.Low)
		}
		if d.Role != kin.Shape && d.Joints {
			t.Errorf("%s: bounds an actuator, so it is wanted beside joints given outright", d.Name)
		}
	}
	if f.Index("no such dimension") != -1 {
		t.Error("Index finds what is not there")
	}
	least, span := f.Range()
	if (least < 0) != (span < 0) {
		t.Errorf("Range() = %d, %d: one without the other", least, span)
	}
	if least >= 0 && (f.Dimensions[least].Role != kin.Least || f.Dimensions[span].Role != kin.Span) {
		t.Errorf("Range() = %d, %d: other roles there", least, span)
	}
}

func checkStarter(t *testing.T, f *kin.Family) {
	s := f.Starter
	if s.Title == "" {
		t.Error("the starter has no title")
	}
	for q := kin.X; q <= kin.Yaw; q++ {
		if f.Has(q) != (s.Box[q] > 0) {
			t.Errorf("starter box: ±%g in %s, which the family has: %v", s.Box[q], q, f.Has(q))
		}
	}
	for name, v := range map[string]float64{"mass": s.Mass, "acceleration": s.Accel, "speed": s.Speed, "diameter": s.Diameter, "swing": s.Swing} {
		if !(v > 0) {
			t.Errorf("starter %s = %g", name, v)
		}
	}
}

// What a built machine tells of itself must be what its family promises.
func TestFrames(t *testing.T) {
	for _, f := range kin.Families() {
		t.Run(f.Name, func(t *testing.T) {
			d := midRange(f)
			fr := f.Build(d, offCentre()).Frame()
			if !slices.Equal(fr.Freedoms, f.Freedoms) || fr.Legs() != f.Legs || len(fr.Platform) != f.Legs {
				t.Fatalf("frame: freedoms %v, %d base and %d platform joints", fr.Freedoms, len(fr.Base), len(fr.Platform))
			}
			if fr.Length != 0.3 {
				t.Errorf("characteristic length %g, want the one of the setup", fr.Length)
			}
			if i := f.Index("platform_radius"); i >= 0 {
				near(t, "default characteristic length", f.Build(d, &kin.Setup{}).Frame().Length, d[i], 0)
				for k, b := range fr.Platform {
					if fr.Rods != nil && fr.Rods[k] == 0 {
						continue // a shaft on the axis
					}
					near(t, "platform radius", math.Hypot(b.X, b.Y), d[i], 1e-15)
					for _, name := range []string{"base_radius", "shoulder_radius", "rail_radius"} {
						if i := f.Index(name); i >= 0 {
							near(t, name, math.Hypot(fr.Base[k].X, fr.Base[k].Y), d[i], 1e-15)
						}
					}
				}
				if f.Outright != nil {
					m := f.Outright(outright(f, d, f.Build(d, offCentre())), &kin.Setup{})
					near(t, "characteristic length of joints given outright", m.Frame().Length, d[i], 1e-15)
				}
			}
			p := atHome()
			origin, rot := fr.Place(&p)
			near(t, "platform origin at home", r3.Norm(r3.Sub(origin, fr.Home)), 0, 1e-15)
			if rot != fr.HomeRot {
				t.Errorf("platform rotation at home %v", rot)
			}
		})
	}
}

func TestFreedomNames(t *testing.T) {
	names := ""
	for q := kin.X; q <= kin.Yaw; q++ {
		names += q.String() + " "
		if q.Angular() != (q > kin.Z) {
			t.Errorf("%s: Angular() = %v", q, q.Angular())
		}
	}
	if names != "x y z roll pitch yaw " {
		t.Errorf("names: %s", names)
	}
}
