package opt

import (
	"cmp"
	"math"
	"slices"
	"sync"
)

// Polish takes place at these shares of the budget, in equal parts.
var polishAt = [...]float64{0.35, 0.55, 0.75, 0.92}

const (
	polishSteps  = 10 // evaluations per real variable and one more, at most
	polishSpread = 60 // designs that stand for the front when gaps are looked for
)

// polish runs a round of Nelder-Mead from designs of the front if one is due:
// jobs side by side, each with its own fixed budget, their designs merged in
// the order of the jobs.
func (r *run) polish() {
	if r.rounds == len(polishAt) || float64(r.evaluations) < polishAt[r.rounds]*float64(r.set.Evaluations) {
		return
	}
	r.rounds++
	due := int(r.set.Polish*float64(r.set.Evaluations)*float64(r.rounds)/float64(len(polishAt))) - r.polished
	if due <= 0 || r.left == 0 || r.archive.Len() == 0 || r.ctx.Err() != nil {
		return
	}
	r.fixReference()
	jobs := r.polishJobs(due)
	if len(jobs) == 0 {
		return
	}
	r.phase = "polish"
	var wg sync.WaitGroup
	slots := make(chan struct{}, r.set.Workers)
	for _, j := range jobs {
		wg.Add(1)
		slots <- struct{}{}
		go func() {
			defer wg.Done()
			j.run(r)
			<-slots
		}()
	}
	wg.Wait()
	for _, j := range jobs {
		l := r.islands[j.start.space]
		r.left += j.budget - len(j.made)
		l.used += len(j.made)
		for _, g := range j.made {
			l.breed.seen[fingerprint(g.x)] = struct{}{}
			if g.feasible() {
				l.guests = append(l.guests, g)
			}
		}
		l.fresh = append(l.fresh, j.made...)
	}
	r.merge()
}

// polishJobs chooses starts and targets that share due evaluations: best in
// the first goal, widest gap, best in the second goal, next gap ... and knee
// among them, going on where the round before ended.
func (r *run) polishJobs(due int) (jobs []*job) {
	pts := r.archive.points()
	low, high := r.archive.bounds()
	aims := r.aims(pts, low, high)
	for i := 0; i < len(aims) && due > 0; i++ {
		a := &aims[(i+r.aimed)%len(aims)]
		l := r.islands[a.start.space]
		n := len(l.dom.real)
		budget := min(polishSteps*(n+1), due, r.left)
		if len(pts[0]) == 1 { // nothing but the one optimum to share with
			budget = min(due, r.left)
		}
		if n == 0 || budget < n+2 { // less does not finish the first simplex
			continue
		}
		due -= budget
		r.left -= budget
		jobs = append(jobs, &job{aim: *a, budget: budget})
	}
	r.aimed += len(jobs)
	r.gave()
	return jobs
}

// aim is a start and the achievement function to minimise from there.
type aim struct {
	start  *genome
	target []float64 // aspiration level
	weight []float64 // per goal
}

// value is Wierzbicki's augmented achievement scalarizing function (1980).
func (a *aim) value(goals []float64) float64 {
	const augment = 1e-3
	worst, sum := math.Inf(-1), 0.0
	for k, v := range goals {
		d := float64(a.weight[k] * (v - a.target[k]))
		worst = max(worst, d)
		sum += d
	}
	return worst + augment*sum
}

// aims lists what a front can be polished for.
func (r *run) aims(pts [][]float64, low, high []float64) []aim {
	m := len(low)
	scale := make([]float64, m)
	for k := range scale {
		if scale[k] = 1; high[k] > low[k] {
			scale[k] = 1 / (high[k] - low[k])
		}
	}
	var rims []aim
	ends := Extremes(pts)
	for k, i := range ends { // far below the front, so that goal k decides
		a := aim{start: r.archive.designs[i], target: make([]float64, m), weight: make([]float64, m)}
		for j := range m {
			a.target[j] = low[j] - 1/scale[j]
			a.weight[j] = 1e-3 * scale[j]
		}
		a.weight[k] = scale[k]
		rims = append(rims, a)
	}
	if i := Knee(pts); m > 1 {
		a := aim{start: r.archive.designs[i], target: slices.Clone(low), weight: make([]float64, m)}
		for k := range m {
			a.weight[k] = 1 / max(pts[i][k]-low[k], 1e-3/scale[k])
		}
		rims = append(rims, a)
	}
	var out []aim
	gaps := r.gaps(pts)
	for n := range max(len(rims), len(gaps)) {
		if n < len(rims) {
			out = append(out, rims[n])
		}
		if n < len(gaps) {
			out = append(out, aim{start: r.archive.designs[gaps[n]], target: pts[gaps[n]], weight: scale})
		}
	}
	return out
}

// gaps returns points of the inner front with most room around, the one with
// most first: what they cover alone among a few points that stand for all.
func (r *run) gaps(pts [][]float64) []int {
	chosen := scatter(pts, min(len(pts), polishSpread))
	if len(r.reference) > maxShareGoals {
		return chosen
	}
	slices.SortFunc(chosen, func(a, b int) int {
		m := len(r.reference) - 1
		return cmp.Or(cmp.Compare(pts[a][m], pts[b][m]), cmp.Compare(a, b))
	})
	var s shares
	s.reset(r.reference)
	room := make(map[int]float64, len(chosen))
	for _, i := range chosen {
		s.add(pts[i]) // in ascending order of the last goal: index for index
	}
	s.settle()
	var inner []int
	for j, i := range chosen {
		rim := false
		for k, u := range s.corner(j) {
			rim = rim || u == r.reference[k]
		}
		if room[i] = s.alone[j]; !rim {
			inner = append(inner, i)
		}
	}
	slices.SortStableFunc(inner, func(a, b int) int { return cmp.Compare(room[b], room[a]) })
	return inner
}
