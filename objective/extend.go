package objective

// spot is where a tracker's worst value lies between the samples.
type spot struct {
	at  Sample
	set bool
}

// extend drives the extreme coordinates of the legs and the worst value of every tracker beyond the samples that the view
// has walked. It stops and reports false at a pose that is out of reach or singular, which is then the one in work.
func (r *Refiner) extend(ts []tracker) bool {
	r.prepare(ts)
	if !r.stretch() {
		return false
	}
	try := r.try
	for i := range ts {
		r.try = try
		if ts[i].own {
			r.try = quick()
		}
		if !r.worsen(ts, i) {
			return false
		}
	}
	r.try = try
	return true
}

// prepare ranks, for trackers that the view has followed over all samples, the poses that are tried as starts: the scouts,
// all poses of single excursions, and the sample that each tracker knows as the worst.
func (r *Refiner) prepare(ts []tracker) {
	v := r.v
	t := v.task
	r.props = len(ts) + 12
	if n := r.props * len(t.Zones); len(r.by) != n {
		r.by = make([]ranking, n)
	}
	for i := range r.by {
		r.by[i].n = 0
	}
	var need Need
	for i := range ts {
		if m := ts[i].m; m.perPose() {
			need |= m.Need
		}
	}
	for k := range t.samples {
		s := &t.samples[k]
		z := &t.Zones[s.Zone]
		all := k < t.scouts || z.Kind == Axes || r.known(ts, k)
		if !z.refinable() || !all && !r.knownToOwn(ts, k) {
			continue
		}
		r.here = *s
		if !r.look(k, need) {
			continue
		}
		by := r.rankings(s.Zone)
		for i := range ts {
			if m := ts[i].m; m.perPose() && (all || ts[i].own) {
				if bad, ok := r.scan(m); ok {
					by[i].enter(bad, k)
				}
			}
		}
		legs := by[len(ts):]
		for i := 0; i < v.n && all; i++ {
			legs[2*i].enter(-v.S.Q[i], k)
			legs[2*i+1].enter(v.S.Q[i], k)
		}
	}
}

// known tells whether the walk has found the sample to be the worst of anything that concerns all legs, or an extreme
// coordinate.
func (r *Refiner) known(ts []tracker, sample int) bool {
	for i := range ts {
		if ts[i].w.Pose == sample && !ts[i].own {
			return true
		}
	}
	for i := range r.v.n {
		if r.v.leastAt[i] == sample || r.v.mostAt[i] == sample {
			return true
		}
	}
	return false
}

// knownToOwn tells whether the sample is the worst of what concerns one leg. It is a start for that alone, so that what
// is found of all legs is what a search finds, which does not ask for single ones.
func (r *Refiner) knownToOwn(ts []tracker, sample int) bool {
	for i := range ts {
		if ts[i].own && ts[i].w.Pose == sample {
			return true
		}
	}
	return false
}

// rankings are those of a zone: of each tracker, then of the least and the greatest coordinate of each leg.
func (r *Refiner) rankings(zone int) []ranking { return r.by[zone*r.props : (zone+1)*r.props] }

// stretch is extend for the coordinates of the legs.
func (r *Refiner) stretch() bool {
	v := r.v
	r.legs = [12]spot{}
	for z := range v.task.Zones {
		if !v.task.Zones[z].refinable() {
			continue
		}
		by := r.rankings(z)[r.props-12:]
		for i := range v.n {
			r.aim(Property{Leg: i})
			if r.drive(z, &by[2*i], -v.least[i]) {
				if r.fails() {
					return false
				}
				v.least[i] = r.w.Value
				r.legs[2*i] = spot{r.here, true}
			}
			r.aim(Property{Leg: i, Most: true})
			if r.drive(z, &by[2*i+1], v.most[i]) {
				if r.fails() {
					return false
				}
				v.most[i] = r.w.Value
				r.legs[2*i+1] = spot{r.here, true}
			}
		}
	}
	return true
}

// worsen is extend for tracker i.
func (r *Refiner) worsen(ts []tracker, i int) bool {
	v, t := r.v, &ts[i]
	if !t.m.perPose() {
		return true
	}
	r.aim(Property{Measure: t.m})
	for z := range v.task.Zones {
		if !v.task.Zones[z].refinable() {
			continue
		}
		if r.drive(z, &r.rankings(z)[i], t.m.bad(t.w.Value)) {
			if b := t.m.bad(r.w.Value); b > t.m.bad(t.w.Value) {
				t.w, t.spot = r.w, spot{r.here, true}
			}
			if r.fails() {
				return false
			}
		}
	}
	return true
}

// fails tells whether the pose in work is one that no design may have, and counts it.
func (r *Refiner) fails() bool {
	switch {
	case r.lost:
		r.v.lost++
	case r.singular:
		r.v.singular++
	default:
		return false
	}
	return true
}

// refinable tells whether the walk so far leaves anything to refine: where a pose fails anyway, worst values are those of
// the samples.
func (v *View) refinable() bool { return v.lost == 0 && v.singular == 0 && v.homeSign != 0 }
