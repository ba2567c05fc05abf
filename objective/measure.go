package objective

import (
	"math"

	"legwright/kin"
)

// Unit is the SI unit of a measure.
type Unit int

// The units of measures.
const (
	Ratio Unit = iota
	Metre
	Radian
	Newton
	NewtonMetre
	MetrePerSecond
	RadianPerSecond
	Watt
	NewtonPerMetre
	NewtonMetrePerRadian
	MetrePerRadian
)

// Sense tells which values of a measure are better.
type Sense int

// The senses.
const (
	Either  Sense = iota // a plain property of the design
	Larger               // the worst value is the least
	Smaller              // the worst value is the greatest
)

// Need is a set of things that must be known at a pose before a measure can read it.
type Need uint

// What measures need of a View.
const (
	NeedMatrix  Need = 1 << iota // inverse Jacobian, its inverse and conditioning
	NeedEfforts                  // least and greatest effort of each leg and case
	NeedRates                    // greatest rate of each leg and case
	NeedGap                      // least distance between legs
	NeedExact                    // the conditioning of every pose, not of the worst alone
)

// UnitOf is the unit of the measure for machines of the family.
func (m *Measure) UnitOf(f *kin.Family) Unit {
	if f.Drive == kin.Rotary && m.Rotary != 0 {
		return m.Rotary
	}
	return m.Unit
}

// Worst is the worst raw value of a measure so far, and where it was met.
type Worst struct {
	Value float64
	Pose  int // index into Task.Samples, -1 for none
	Leg   int // 0-based, -1 for none
	Mate  int // second leg of a pair, -1 for none
	Case  int // -1 for none
	Sum   float64
	Count int
}

// set records a new worst value of leg l in case c at the view's pose.
func (w *Worst) set(v *View, value float64, l, c int) {
	w.Value, w.Pose, w.Leg, w.Mate, w.Case = value, v.index, l, -1, c
}

// Measure is a number that a duty and a design give. Of a measure of poses it is the worst value over
// the required poses, or its mean; of a task whose coverage may be below 100 % or is a goal, over
// those of them that count (Task.Coverage).
type Measure struct {
	Name   string
	Text   string
	Unit   Unit
	Rotary Unit // the unit for families with rotary drives, where it differs from Unit; 0 otherwise
	Sense  Sense
	Source string
	Inputs []string // keys of the brief without which it has no value
	Most   float64  // the largest value that it can have; 0 for no such bound

	// Has tells whether machines of the family have the measure; nil for all.
	Has func(*kin.Family) bool

	// Scale is the unit of a violation where the bound is zero; nil for 1.
	Scale func(*Task) float64

	// A measure of poses: Scan compares the pose in v with the worst so far, in raw
	// values. Start is the worst before any pose, Lost the one of a pose that cannot
	// be reached. Finish turns a raw value into the measure's; nil for no change.
	Need        Need
	Scan        func(v *View, w *Worst)
	Start, Lost float64
	Finish      func(raw float64) float64
	Mean        bool // the value is Sum/Count
	Scouts      bool // asked at home and at the scouts only: it is dear

	// A measure of the design itself.
	Design func(d *Design) float64
}

// perPose tells whether a limit on the measure is judged pose by pose, else over the whole duty.
func (m *Measure) perPose() bool { return m.Scan != nil && !m.Mean && !m.Scouts }

// value is the measure's value after the poses that w has seen.
func (m *Measure) value(w *Worst) float64 {
	x := w.Value
	if m.Mean {
		if w.Count == 0 {
			return m.Lost
		}
		return w.Sum / float64(w.Count)
	}
	if m.Finish != nil {
		x = m.Finish(x)
	}
	return x
}

// lost records a pose that cannot be reached.
func (m *Measure) lost(v *View, w *Worst) {
	if m.Mean {
		if v.pose.Volume {
			w.Count++
		}
		return
	}
	if (m.Sense == Larger && m.Lost < w.Value) || (m.Sense != Larger && m.Lost > w.Value) {
		w.set(v, m.Lost, v.S.Leg, -1)
	}
}

// excess is how far the value is beyond the limit, relative to the bound; at most 0 if the limit holds.
func (l *Limit) excess(t *Task, value float64) float64 {
	scale := math.Abs(l.Bound)
	if scale == 0 {
		scale = 1
		if l.Measure.Scale != nil {
			scale = l.Measure.Scale(t)
		}
	}
	e := (value - l.Bound) / scale
	if l.AtLeast {
		e = -e
	}
	if math.IsNaN(e) {
		return math.Inf(1)
	}
	return e
}

// Holds tells whether the value keeps the limit, within Tolerance.
func (l *Limit) Holds(t *Task, value float64) bool { return l.excess(t, value) <= Tolerance }

// inf is the worst value of a measure without an upper bound, and where the search for a least one starts.
func inf() float64 { return math.Inf(1) }

// tracker follows one measure through a walk.
type tracker struct {
	m    *Measure
	w    Worst
	own  bool // of one leg: what is known of all together is searched for thoroughly, this in short
	spot      // where the worst value lies, if not at a sample
}

func (t *tracker) reset() {
	t.w = Worst{Value: t.m.Start, Pose: -1, Leg: -1, Mate: -1, Case: -1}
	t.set = false
}
