package proof

import (
	"context"
	"io"
	"math/rand/v2"
	"runtime"
	"strings"
	"testing"

	"legwright/kin"
	"legwright/objective"
)

// planar is a proof of a planar machine that takes few boxes: a box of poses, an ellipsoid and a list.
func planar(t testing.TB) (*objective.Task, *objective.Plan, []float64, *Record) {
	t.Helper()
	half := kin.Coords{0: 0.03, 1: 0.02, 5: 8 * deg}
	var low kin.Coords
	for q := range half {
		low[q] = -half[q]
	}
	task := boxTask(objective.Box, low, half)
	ball := task.Zones[0]
	ball.Name, ball.Kind = "ball", objective.Ellipsoid
	for q := range half {
		ball.Low[q], ball.High[q] = 1.3*low[q], 1.3*half[q]
	}
	listed := objective.Zone{Name: "poses", Kind: objective.Listed, Poses: []kin.Coords{{0: 0.01}, {0: 0.045, 5: -2 * deg}}}
	task.Zones = append(task.Zones, ball, listed)
	task.Cases = loads()
	f := kin.FamilyNamed("3-RPR")
	values := make([]float64, len(f.Dimensions))
	for i := range f.Dimensions {
		switch d := &f.Dimensions[i]; d.Name {
		case "base_radius":
			values[i] = 0.4
		case "platform_radius":
			values[i] = 0.15
		case "home_heading":
			values[i] = 60 * deg
		default:
			values[i] = d.Default
		}
	}
	p := slackened(t, task, "3-RPR", values, 0.04, "conditioning", "base_swing", "leg_force")
	r := prove(t, task, p, values, Settings{Workers: 1})
	if r.Answer != Proved {
		report(t, r)
		t.Fatal("a limit 4 % off is not proved")
	}
	rec, err := r.Record()
	if err != nil {
		t.Fatal(err)
	}
	return task, p, values, rec
}

// counted is how many boxes the bytes of a branch tell of.
func counted(text []byte) (boxes int) {
	for open := 1; open > 0 && len(text) > 0; open-- {
		code := text[0]
		text = text[1:]
		boxes++
		if code&closes != 0 {
			for len(text) > 0 && text[0]&0x80 != 0 {
				text = text[1:]
			}
			text = text[min(1, len(text)):]
		}
		if code&^closes < settled {
			open += 2
		}
	}
	return boxes
}

// What Check takes is true: whatever the splits, gap and targets of a record, no pose of the duty contradicts a record
// that is not refused.
func FuzzCheck(f *testing.F) {
	task, p, values, good := planar(f)
	for k := range good.Trees {
		text, err := io.ReadAll(inflate(good.Trees[k].Splits))
		if err != nil {
			f.Fatal(err)
		}
		f.Add(text, uint8(k), uint8(0), 0.0, good.Gap)
		for i := range good.Claims {
			f.Add(text, uint8(k), uint8(i), 0.02, 0.05)
			f.Add(text, uint8(k), uint8(i), -1.0, 0.005)
		}
	}
	f.Add([]byte{settled | closes, 0xff, 0xff, 1}, uint8(0), uint8(1), 0.0, 0.01)
	f.Add([]byte{0, outside, outside}, uint8(1), uint8(1), 0.0, 0.01)
	s := mustSubject(task, "3-RPR", values)
	all := regions(s.task.Zones)
	f.Fuzz(func(t *testing.T, text []byte, tree, claim uint8, further, gap float64) {
		if len(text) > 4096 {
			t.Skip()
		}
		rec := &Record{Gap: gap, Claims: append([]Claim(nil), good.Claims...), Trees: append([]Branch(nil), good.Trees...)}
		b := &rec.Trees[int(tree)%len(rec.Trees)]
		var err error
		if b.Splits, err = deflated(text); err != nil {
			t.Fatal(err)
		}
		b.Boxes = counted(text)
		for i := range rec.Claims {
			c := &rec.Claims[i]
			q := &s.props[c.Place]
			switch mine := i == int(claim)%len(rec.Claims); {
			case c.Target != q.Limit, mine && further < 0: // to the gap
				c.Target = q.within(gap)
			case mine: // more than is asked for
				c.Target += further * q.Scale
			}
		}
		_, err = Check(context.Background(), task, p, values, rec, Settings{Workers: 1})
		if err != nil {
			if says := err.Error(); len(says) > 500 || strings.Contains(says, "\n") {
				t.Errorf("not a line: %q", says)
			}
			return
		}
		v := newProber(s)
		r := rand.New(rand.NewPCG(uint64(len(text)), 7))
		for range 200 {
			g := &all[r.IntN(len(all))]
			at := inside(r, &g.box)
			zone := g.zone
			if in := [6]float64(at); !g.holds(&in) {
				continue
			}
			if r.IntN(20) == 0 {
				zone = len(task.Zones) - 1
				at = task.Zones[zone].Poses[r.IntN(2)]
			}
			v.at(at, zone)
			for i := range rec.Claims {
				c := &rec.Claims[i]
				q := s.props[c.Place]
				var met Counter
				v.refutes(c.Place, &met)
				if q.Limit = c.Target; q.Bounded && q.off(met.Value) > 1e-9 || !v.reached {
					t.Fatalf("%s is taken to be at its worst %g, and %g is met at %v", q.Name, c.Target, met.Value, at)
				}
			}
		}
	})
}

// A property that is claimed twice is refused.
func TestClaimedTwice(t *testing.T) {
	task, p, values, rec := planar(t)
	if _, err := Check(context.Background(), task, p, values, rec, Settings{Workers: 1}); err != nil {
		t.Fatalf("a good record is refused: %v", err)
	}
	for i := range rec.Claims {
		if c := rec.Claims[i]; c.Property == "conditioning" {
			rec.Claims = append([]Claim{c}, rec.Claims...)
			break
		}
	}
	for k := range rec.Trees {
		b := &rec.Trees[k]
		for i := range b.Claims {
			b.Claims[i]++
		}
	}
	if _, err := Check(context.Background(), task, p, values, rec, Settings{Workers: 1}); err == nil || !strings.Contains(err.Error(), "twice") {
		t.Errorf("got %v", err)
	}
}

// A branch that inflates to far more than it tells of is refused with little memory.
func TestInflatedBranch(t *testing.T) {
	task, p, values, rec := planar(t)
	bomb, err := deflated(make([]byte, 256<<20))
	if err != nil {
		t.Fatal(err)
	}
	rec.Trees[0].Splits = bomb
	var before, after runtime.MemStats
	runtime.ReadMemStats(&before)
	_, err = Check(context.Background(), task, p, values, rec, Settings{Workers: 1})
	runtime.ReadMemStats(&after)
	if n := after.TotalAlloc - before.TotalAlloc; err == nil || n > 16<<20 {
		t.Errorf("refused with %d bytes of memory: %v", n, err)
	}
}
