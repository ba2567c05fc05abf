package objective

import (
	"math"
	"strings"
	"testing"

	"legwright/kin"
)

// every is all measures that machines of the family have.
func every(t *Task, f *kin.Family) []*Measure { return applicable(t, f) }

// Every entry is complete: a name in the style of briefs, a text, a source, a sense
// for everything that poses decide, and inputs that the task knows of.
func TestEveryMeasureIsComplete(t *testing.T) {
	known := map[string]func(*Task){
		"actuator.stiffness": func(t *Task) { t.Actuator.Stiffness = 1 },
		"actuator.error":     func(t *Task) { t.Actuator.Error = 1 },
		"legs.rod_diameter":  func(t *Task) { t.Legs.RodDiameter = 1 },
		"legs.modulus":       func(t *Task) { t.Legs.Modulus = 1 },
	}
	seen := map[string]bool{}
	for _, m := range Measures() {
		if m.Name == "" || strings.ToLower(m.Name) != m.Name || strings.ContainsAny(m.Name, " -") || seen[m.Name] {
			t.Errorf("name %q is not of its own or not in the style of a key", m.Name)
		}
		seen[m.Name] = true
		if len(m.Text) < 20 || m.Source == "" {
			t.Errorf("%s: text %q, source %q", m.Name, m.Text, m.Source)
		}
		kinds := 0
		for _, has := range []bool{m.Scan != nil, m.Design != nil, m.Name == "coverage"} {
			if has {
				kinds++
			}
		}
		if kinds != 1 {
			t.Errorf("%s is read in %d ways", m.Name, kinds)
		}
		if m.Scan != nil && m.Sense == Either {
			t.Errorf("%s: poses decide it, yet it has no sense", m.Name)
		}
		if m.Scan != nil && !m.Mean && ((m.Sense == Larger) != (m.Start > m.Lost) || m.Start == m.Lost) {
			t.Errorf("%s: starts at %g, %g for a pose out of reach", m.Name, m.Start, m.Lost)
		}
		for _, k := range m.Inputs {
			give := known[k]
			if give == nil {
				t.Errorf("%s: unknown input %q", m.Name, k)
				continue
			}
			task := new(Task)
			if task.gives(k) {
				t.Errorf("%s: an empty task gives %s", m.Name, k)
			}
			if give(task); !task.gives(k) {
				t.Errorf("%s: %s is not seen", m.Name, k)
			}
		}
	}
	for _, f := range kin.Families() {
		for _, m := range Measures() {
			if m.Has == nil || m.Has(f) {
				delete(seen, m.Name)
			}
		}
	}
	for name := range seen { // the rotary ones wait for a rotary family
		if name != "motor_torque" && name != "motor_speed" {
			t.Errorf("no family has %s", name)
		}
	}
}

// Units and senses by the list of measures in the specification.
func TestUnitsAndSenses(t *testing.T) {
	want := map[string]struct {
		unit  Unit
		sense Sense
	}{
		"coverage": {Ratio, Larger}, "conditioning": {Ratio, Larger}, "mean_conditioning": {Ratio, Larger},
		"regularity": {Ratio, Larger}, "leg_force": {Newton, Smaller}, "motor_torque": {NewtonMetre, Smaller},
		"push_force": {Newton, Smaller}, "pull_force": {Newton, Smaller}, "leg_speed": {MetrePerSecond, Smaller},
		"motor_speed": {RadianPerSecond, Smaller}, "leg_power": {Watt, Smaller}, "stiffness": {NewtonPerMetre, Larger},
		"turn_stiffness": {NewtonMetrePerRadian, Larger}, "deflection": {Metre, Smaller}, "position_error": {Metre, Smaller},
		"angle_error": {Radian, Smaller}, "base_swing": {Radian, Smaller}, "platform_swing": {Radian, Smaller},
		"leg_clearance": {Metre, Larger}, "joint_spacing": {Metre, Larger}, "buckling_margin": {Ratio, Larger},
		"footprint": {Metre, Smaller}, "stroke": {Metre, Either}, "leg_min": {Metre, Either}, "leg_max": {Metre, Either},
		"home_height": {Metre, Either}, "gain_least": {Ratio, Larger}, "gain_most": {Ratio, Smaller},
		"mode_separation":  {Metre, Larger},
		"parasitic_motion": {Metre, Smaller}, "parasitic_turn": {Radian, Smaller},
	}
	for _, m := range Measures() {
		w, ok := want[m.Name]
		if !ok {
			t.Errorf("%s is not in the list", m.Name)
			continue
		}
		if m.Unit != w.unit || m.Sense != w.sense {
			t.Errorf("%s: unit %v, sense %v, want %v", m.Name, m.Unit, m.Sense, w)
		}
	}
}

// Every measure of random designs is finite, within [0, Most] if it is a share, and has the pose that decides it.
// Two things may be infinite: a buckling margin where no leg is pushed, and the worst value of a measure
// where a pose cannot be reached.
func TestEveryMeasureIsFinite(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(11)
		for range 8 {
			task := richTask(rng, f)
			task.Prepare()
			a := appraise(task, f, randomDesign(rng, f))
			if len(a.Readings) != len(every(task, f)) {
				t.Fatalf("%d readings of %d measures", len(a.Readings), len(every(task, f)))
			}
			reached := true
			for _, r := range Poses(task, a) {
				reached = reached && r.Reached
			}
			for _, r := range a.Readings {
				m := r.Measure
				if !reached && m.Scan != nil && !m.Mean {
					lost := tracker{m: m, w: Worst{Value: m.Lost}}
					if want := m.value(&lost.w); r.Value != want {
						t.Errorf("%s = %g with a pose out of reach, want %g", m.Name, r.Value, want)
					}
					continue
				}
				if math.IsNaN(r.Value) && reached || math.IsInf(r.Value, 0) && reached && m.Name != "buckling_margin" {
					t.Errorf("%s = %g", m.Name, r.Value)
				}
				if m.Most > 0 && (r.Value < 0 || r.Value > m.Most*(1+1e-15)) {
					t.Errorf("%s = %g is not in [0, %g]", m.Name, r.Value, m.Most)
				}
				if m.Scan != nil && !m.Mean && r.Pose == nil && !math.IsInf(r.Value, 0) && r.Value != 0 {
					t.Errorf("%s = %g has no worst pose", m.Name, r.Value)
				}
			}
		}
	})
}

// The worst pose, leg and case of a measure give its value when looked at alone. Equal bit by bit.
func TestTheWorstIsWhereItIsSaidToBe(t *testing.T) {
	everyFamily(t, func(t *testing.T, f *kin.Family) {
		rng := seeded(12)
		task := richTask(rng, f)
		task.Prepare()
		a := appraise(task, f, soundDesign(f))
		v := newView(task)
		v.serve(f)
		v.begin(a.Machine)
		for _, r := range a.Readings {
			if r.Pose == nil {
				continue
			}
			one := tracker{m: r.Measure}
			one.reset()
			v.keep = math.Inf(1)
			v.at(r.Pose, 0, NeedMatrix|NeedEfforts|NeedRates|NeedGap)
			one.m.Scan(v, &one.w)
			if got := r.Measure.value(&one.w); got != r.Value {
				t.Errorf("%s: %g at its worst pose, %g in all", r.Measure.Name, got, r.Value)
			}
			if one.w.Leg != r.Leg || one.w.Mate != r.Mate || one.w.Case != r.Case {
				t.Errorf("%s: leg %d, %d and case %d at the worst pose, %d, %d and %d in all", r.Measure.Name,
					one.w.Leg, one.w.Mate, one.w.Case, r.Leg, r.Mate, r.Case)
			}
		}
	})
}
