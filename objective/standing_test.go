package objective

import (
	"math"
	"testing"

	"legwright/kin"
)

// A pose of a path or a map is judged as an appraisal that requires that pose alone judges it.
func TestMapsAgreeWithAppraisals(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		task := richTask(seeded(7), f)
		task.Prepare()
		p := sizedPlan(task, f, soundDesign(f))
		a := Appraise(task, p, p.Single())
		pairs := MapAxes(task)
		if n := len(f.Freedoms); len(pairs) != n*(n-1)/2 {
			t.Errorf("%d pairs of %d coordinates", len(pairs), n)
		}
		told := 0
		for _, xy := range pairs {
			m := ConditioningMap(task, a, xy[0], xy[1], 5)
			for k, s := range m.Standings {
				c := m.At
				c[xy[0]] = m.Low[xy[0]] + float64(k%5)/4*(m.High[xy[0]]-m.Low[xy[0]])
				c[xy[1]] = m.Low[xy[1]] + float64(k/5)/4*(m.High[xy[1]]-m.Low[xy[1]])
				one := *task
				one.Cases = append([]Case(nil), task.Cases...)
				for i := range one.Cases {
					one.Cases[i].Zones = nil
				}
				one.Zones = []Zone{{Kind: Listed, Poses: []kin.Coords{c}}}
				one.Prepare()
				b := Appraise(&one, p, a.Values)
				r := b.Reading("conditioning")
				if !s.Reached {
					if r.Value > 0 {
						t.Errorf("%v: %s, but %v", c, s.Fails, r.Value)
					}
					continue
				}
				told++
				near(t, "conditioning", s.Conditioning, r.Value, 1e-9)
			}
		}
		if told == 0 {
			t.Error("no pose has a posture")
		}
	})
}

// cutTask is a duty, all cases everywhere, of which a design with actuators sized by it keeps one half: conditioning is
// limited halfway between the worst and the best pose.
func cutTask(f *kin.Family) (*Task, *Appraisal) {
	task := richTask(seeded(13), f)
	for i := range task.Cases {
		task.Cases[i].Zones = nil
	}
	task.Prepare()
	p := sizedPlan(task, f, soundDesign(f))
	low, high := math.Inf(1), 0.0
	for _, r := range Poses(task, Appraise(task, p, p.Single())) {
		if r.Reached {
			low, high = math.Min(low, r.Conditioning), math.Max(high, r.Conditioning)
		}
	}
	task.Limits = []Limit{{Measure: MeasureNamed("conditioning"), AtLeast: true, Bound: low/2 + high/2}}
	return task, Appraise(task, p, p.Single())
}

// What fails at a pose of the duty is what the table of poses says, for cases that occur everywhere.
func TestStandingsAgreeWithPoses(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		task, a := cutTask(f)
		rows := Poses(task, a)
		var poses []kin.Coords
		for _, r := range rows {
			poses = append(poses, r.Sample.Coords)
		}
		for i, s := range Standings(task, a, poses) {
			if r := &rows[i]; s.Fails != r.Fails || s.Reached != r.Reached || s.Reached && (s.Q != r.Q || s.Conditioning != r.Conditioning) {
				t.Fatalf("pose %v: %+v, table %+v", poses[i], s, r)
			}
		}
	})
}

// A box grown by the factor holds at its corners, grown by a little more it does not.
func TestTogetherIsTheLargestBox(t *testing.T) {
	const little = 1e-6
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		task, a := cutTask(f)
		found := Simultaneous(task, a)
		if len(found) == 0 {
			t.Fatal("no zone")
		}
		for _, g := range found {
			corners := func(x float64) (fails string) {
				var poses []kin.Coords
				for i := range task.samples[:task.scouts] {
					if s := &task.samples[i]; s.Zone == g.Zone {
						var c kin.Coords
						for k := range c {
							c[k] = x * s.Coords[k]
						}
						poses = append(poses, c)
					}
				}
				for _, s := range Standings(task, a, poses) {
					if s.Fails != "" {
						return s.Fails
					}
				}
				return ""
			}
			if math.IsInf(g.Factor, 1) {
				if why := corners(mostTogether); why != "" {
					t.Errorf("zone %d has no end, but %s", g.Zone, why)
				}
				continue
			}
			if why := corners(g.Factor); why != "" && g.Factor > 0 {
				t.Errorf("zone %d at %v: %s", g.Zone, g.Factor, why)
			}
			if why := corners(g.Factor + little); why == "" {
				t.Errorf("zone %d beyond %v: nothing fails, %q was said", g.Zone, g.Factor, g.Fails)
			}
		}
	})
}
