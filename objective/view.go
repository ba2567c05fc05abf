package objective

import (
	"math"
	"slices"

	"legwright/kin"
	"legwright/kin/linalg"
)

// View is everything known of a machine at one pose, and the running record of
// a walk over many poses. It is scratch for one goroutine; walking allocates nothing.
type View struct {
	task     *Task
	machine  kin.Machine
	frame    *kin.Frame
	invLc    float64
	n        int  // legs, and freedoms
	free     int  // actuators, the last ones, without a range (kin.Family.Free)
	legless  bool // the family has no legs, only drives
	homeSign int
	homeQ    [6]float64
	demands  []demand
	active   [][]int // cases that occur in each zone

	// At the pose in work.
	S      kin.State
	pose   *Sample
	stand  *kin.Pose // the pose that the platform takes: with its parasitic coordinates where freedoms are tied
	settle kin.Pose
	index  int
	sign   int         // of det J; 0 if it is singular to rounding
	x      [36]float64 // 6 rows of freedoms by 6 columns of legs: inverse of J, zero where there is no freedom or leg
	ratio2 float64     // (1/kappa)²; where it is above keep, only known to be above
	keep   float64
	lo, hi [][6]float64 // efforts, by case
	rate   [][6]float64 // rates, by case
	gap    float64      // where it is above near, only known to be above
	near   float64
	gapI   int
	gapJ   int
	six    linalg.Six
	small  linalg.Small
	own    [36]float64
	tie    [36]float64
	unit   [36]float64 // unit wrenches

	// Over the walk so far.
	least, most     [6]float64 // actuator coordinates, home included
	leastAt, mostAt [6]int
	lost            int // poses without posture
	singular        int // singular poses
	singularAt      int
	seen            int
}

// newView makes the scratch for a task.
func newView(t *Task) *View {
	v := &View{task: t}
	v.demands = make([]demand, len(t.Cases))
	v.lo = make([][6]float64, len(t.Cases))
	v.hi = make([][6]float64, len(t.Cases))
	v.rate = make([][6]float64, len(t.Cases))
	v.active = make([][]int, len(t.Zones)+1)
	for z := range t.Zones {
		for c := range t.Cases {
			if t.Cases[c].In(z) {
				v.active[z] = append(v.active[z], c)
			}
		}
	}
	for c := range t.Cases {
		v.active[len(t.Zones)] = append(v.active[len(t.Zones)], c)
	}
	return v
}

// serve prepares for machines of the family.
func (v *View) serve(f *kin.Family) { v.free, v.legless = f.Free, !legged(f) }

// begin starts a walk of a machine at home.
func (v *View) begin(m kin.Machine) {
	v.machine, v.frame = m, m.Frame()
	v.invLc = 1 / v.frame.Length
	v.n = v.frame.Legs()
	for c := range v.demands {
		v.demands[c].prepare(&v.task.Cases[c], v.frame)
	}
	v.x = [36]float64{}
	v.near, v.gapI, v.gapJ = math.Inf(1), -1, -1
	v.lost, v.singular, v.singularAt, v.seen = 0, 0, -1, 0
	home := Sample{Pose: kin.NewPose(kin.Coords{})}
	v.pose, v.index = &home, -1
	v.stand = &home.Pose
	m.Move(&home.Pose, &v.S)
	v.homeSign = 0
	for i := range v.least {
		v.least[i], v.most[i] = math.Inf(1), math.Inf(-1)
		v.leastAt[i], v.mostAt[i] = -1, -1
	}
	if v.S.Fail != kin.Reached {
		return
	}
	v.homeQ = v.S.Q
	for i := range v.n {
		v.least[i], v.most[i] = v.S.Q[i], v.S.Q[i]
	}
	v.keep = v.task.Singular * v.task.Singular
	v.factor()
	if v.ratio2 >= v.task.Singular*v.task.Singular {
		v.homeSign = v.sign
	}
}

// factor inverts J and finds its conditioning, exactly only where it is below v.keep.
func (v *View) factor() {
	if v.n == 6 && len(v.frame.Freedoms) == 6 {
		v.sign = v.six.Factor(&v.S.J)
		v.ratio2 = 0
		if v.sign != 0 {
			v.x = v.six.X
			v.ratio2 = v.six.Ratio2(&v.S.J, v.keep)
		}
		return
	}
	n := v.n
	kin.Own(v.frame.Freedoms, &v.S.J, &v.small.A)
	v.sign = v.small.Factor(n)
	v.ratio2 = 0
	if v.sign == 0 {
		return
	}
	v.ratio2 = v.small.Ratio2(v.keep)
	for k, f := range v.frame.Freedoms {
		own, x := v.small.X[n*k:], v.x[6*int(f):]
		switch n { // a copy of fixed length is a move or two
		case 2:
			*(*[2]float64)(x) = [2]float64(own)
		case 3:
			*(*[3]float64)(x) = [3]float64(own)
		default:
			copy(x[:n], own)
		}
	}
	if v.frame.Tied {
		v.untie()
	}
}

// untie adds the other freedoms, of a family where they follow from its own, to the inverse.
func (v *View) untie() {
	n := v.n
	v.machine.Tie(v.stand, &v.tie)
	for q := kin.X; q <= kin.Yaw; q++ {
		if slices.Contains(v.frame.Freedoms, q) {
			continue
		}
		x := v.x[6*int(q) : 6*int(q)+n]
		for i := range x {
			sum := 0.0
			for k := range n {
				sum += v.tie[6*int(q)+k] * v.small.X[n*k+i]
			}
			x[i] = sum
		}
	}
}

// at moves to the sample and finds what need asks for. It reports false if the pose has no posture.
func (v *View) at(s *Sample, index int, need Need) bool {
	v.pose, v.index = s, index
	v.stand = &s.Pose
	if v.frame.Tied {
		v.settle = kin.Settle(v.machine, v.stand)
		v.stand = &v.settle
	}
	v.machine.Move(v.stand, &v.S)
	if v.S.Fail != kin.Reached {
		return false
	}
	if need&NeedGap != 0 {
		v.gap, v.gapI, v.gapJ = v.machine.GapBelow(&v.S, v.near)
	}
	if need&(NeedMatrix|NeedEfforts|NeedExact) != 0 {
		v.factor()
	}
	if need&NeedEfforts != 0 {
		for _, c := range v.active[s.Zone] {
			if v.sign == 0 {
				for i := range v.n {
					v.lo[c][i], v.hi[c][i] = math.Inf(-1), math.Inf(1)
				}
				continue
			}
			v.demands[c].efforts(v.stand, v.task.Gravity, v.invLc, &v.x, v.n, &v.lo[c], &v.hi[c])
		}
	}
	if need&NeedRates != 0 {
		for _, c := range v.active[s.Zone] {
			v.demands[c].rates(&v.S.J, v.n, &v.rate[c])
		}
	}
	return true
}

// isSingular tells whether the pose in work is singular: 1/kappa too small, or
// another sign of the determinant than at home.
func (v *View) isSingular() bool {
	return v.sign != v.homeSign || v.sign == 0 || v.ratio2 < v.task.Singular*v.task.Singular
}

// walk looks at samples[from:to] and brings the trackers up to date.
func (v *View) walk(from, to int, need Need, ts []tracker) {
	matrix := need&(NeedMatrix|NeedEfforts|NeedExact) != 0
	floor := v.task.Singular * v.task.Singular
	var cond, clear *Worst
	for i := range ts {
		switch ts[i].m.Name {
		case "conditioning":
			cond = &ts[i].w
		case "leg_clearance":
			clear = &ts[i].w
		}
	}
	defer func() { v.near = math.Inf(1) }()
	if from == 0 {
		v.home(ts)
	}
	for k := from; k < to; k++ {
		s := &v.task.samples[k]
		v.keep = floor
		if need&NeedExact != 0 {
			v.keep = math.Inf(1)
		} else if cond != nil && cond.Value > floor {
			v.keep = cond.Value
		}
		if clear != nil {
			v.near = clear.Value
		}
		v.seen++
		if !v.at(s, k, need) {
			v.lost++
			for i := range ts {
				if !ts[i].m.Scouts || k < v.task.scouts {
					ts[i].m.lost(v, &ts[i].w)
				}
			}
			continue
		}
		if matrix && v.isSingular() {
			if v.singular++; v.singularAt < 0 {
				v.singularAt = k
			}
		}
		v.follow(ts)
	}
}

// home asks at home the measures that want it.
func (v *View) home(ts []tracker) {
	for i := range ts {
		if m := ts[i].m; m.Scouts {
			home := Sample{Pose: kin.NewPose(kin.Coords{})}
			if v.at(&home, -1, m.Need) {
				m.Scan(v, &ts[i].w)
			}
		}
	}
}

// follow brings the extreme coordinates and the trackers up to date with the pose in work, a required one.
func (v *View) follow(ts []tracker) {
	k := v.index
	for i := range v.n {
		q := v.S.Q[i]
		if q < v.least[i] {
			v.least[i], v.leastAt[i] = q, k
		}
		if q > v.most[i] {
			v.most[i], v.mostAt[i] = q, k
		}
	}
	for i := range ts {
		if !ts[i].m.Scouts || k < v.task.scouts {
			ts[i].m.Scan(v, &ts[i].w)
		}
	}
}

// span is the least and the greatest actuator coordinate so far, and the legs.
func (v *View) span() (least, most float64) {
	least, most = math.Inf(1), math.Inf(-1)
	for i := range v.n - v.free {
		least, most = math.Min(least, v.least[i]), math.Max(most, v.most[i])
	}
	return least, most
}
