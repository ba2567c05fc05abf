package objective

import (
	"math"
	"slices"

	"legwright/kin"
)

// Gravity is standard gravity in m/s² (ISO 80000-3).
const Gravity = 9.80665

// Tolerance is the relative slack within which a limit counts as held.
const Tolerance = 1e-9

// Actuator is what is known of the actuators before they are chosen.
type Actuator struct {
	DeadLength float64 // least length = DeadRatio·stroke + DeadLength; NaN if not to be checked
	DeadRatio  float64
	Reserve    float64   // kept free at each end of the range
	Strokes    []float64 // stock strokes, ascending; nil for any
	Stiffness  float64   // N/m or N m/rad; 0 if not given
	Error      float64   // m or rad; 0 if not given
}

// Joints are the passive joints.
type Joints struct {
	Axis      kin.Axis
	Stiffness float64 // of all passive joints of one leg together, along the leg, N/m; 0 if not given
}

// Legs are the legs' bodies.
type Legs struct {
	Diameter    float64 // m
	RodDiameter float64 // m; 0 if not given
	Crank       float64 // diameter of cranks and arms, m; 0 for Diameter
	Modulus     float64 // Pa; 0 if not given
	EndFixity   float64 // K of the effective length
}

// LengthRule chooses the characteristic length.
type LengthRule int

// The rules for the characteristic length.
const (
	LengthFromDuty LengthRule = iota // Task.Length is computed from the duty by Prepare
	LengthGiven
	LengthOfPlatform // the platform radius of each design
)

// Goal is a measure to be made large or small.
type Goal struct {
	Measure  *Measure
	Maximise bool
}

// Limit is a measure that must hold.
type Limit struct {
	Measure *Measure
	AtLeast bool
	Bound   float64
	Origin  string // the brief's key: limits, joints.base_swing, actuator.push, …
}

// Task is everything about a study but the geometry. Prepare makes it ready; it is constant after that.
type Task struct {
	Zones    []Zone
	Cases    []Case
	Tool     kin.Vec
	Gravity  kin.Vec // acceleration of free fall, base axes
	Actuator Actuator
	Joints   Joints
	Legs     Legs
	Rule     LengthRule
	Length   float64 // characteristic length for LengthGiven and LengthFromDuty
	Singular float64 // least 1/kappa of a pose that is not singular
	Goals    []Goal
	Limits   []Limit
	// Coverage is the least share of poses at which every pose limit must hold: reach, passive stops,
	// actuator range, no singularity, and every rating and limit on a measure that has a value per
	// pose. Below 1, or where it is a goal, a pose at which one fails goes to coverage alone: it is
	// left out of all other figures, which are over the poses that count. Limits on a design's own measures, on means
	// and on mode_separation stay limits of the whole design, and one pose at least must count.
	Coverage float64
	// CoverageGoal is set when coverage is itself a goal: it is then computed exactly for every design.
	CoverageGoal bool

	samples []Sample
	scouts  int
}

// Prepare samples the zones and fixes the characteristic length.
func (t *Task) Prepare() {
	t.samples = nil
	for i := range t.Zones {
		t.samples = append(t.samples, sampleZone(&t.Zones[i], i)...)
	}
	if !slices.ContainsFunc(t.samples, func(s Sample) bool { return s.Volume }) {
		for i := range t.samples { // axes, corners or single poses alone: the average is over them
			t.samples[i].Volume = true
		}
	}
	t.scouts = arrange(t.samples, len(t.Zones))
	if t.Rule == LengthFromDuty {
		t.Length = t.dutyLength()
	}
	if t.Rule == LengthOfPlatform {
		t.Length = 0
	}
}

// Samples are the required poses, scouts first.
func (t *Task) Samples() []Sample { return t.samples }

// dutyLength is the largest linear over the largest angular speed of any case,
// else the largest translation over the largest rotation of the zones, else 1 m.
func (t *Task) dutyLength() float64 {
	v, w := 0.0, 0.0
	for i := range t.Cases {
		v = math.Max(v, t.Cases[i].Linear.Largest())
		w = math.Max(w, t.Cases[i].Angular.Largest())
	}
	if v > 0 && w > 0 {
		return v / w
	}
	v, w = 0, 0
	for i := range t.samples {
		for k, c := range t.samples[i].Coords {
			if kin.Freedom(k).Angular() {
				w = math.Max(w, math.Abs(c))
			} else {
				v = math.Max(v, math.Abs(c))
			}
		}
	}
	if v > 0 && w > 0 {
		return v / w
	}
	return 1
}

// setup is what a machine needs of the task.
func (t *Task) setup() kin.Setup {
	return kin.Setup{Tool: t.Tool, Axis: t.Joints.Axis, Diameter: t.Legs.Diameter, Crank: t.Legs.Crank, Length: t.Length}
}
