package opt

// A population starts small, which gets to the front soonest, and ends with as
// many designs as the evaluations per variable can move: a front of one
// dimension more takes more of them. The constants were found on the known
// problems and on the sizing of a six-legged machine.
const (
	usualStart = 30
	costOfOne  = 33 // evaluations per variable, design and dimension of the front
	mostOf4    = 30 // volumes of four goals are dear, and more designs gained nothing
)

// startSize returns the population per space at the start of a search: with
// start designs, room for them and for half of them in others.
func startSize(p *Problem, s *Settings) int {
	budget := s.Evaluations / len(p.Spaces)
	start := s.Population
	if start == 0 {
		start = min(usualStart, max(leastPerSpace, budget/10))
	}
	for i := range p.Spaces {
		start = max(start, 3*len(s.startsOf(i))/2)
	}
	return min(start, budget)
}

// grown returns the population at the end, for the evaluations that the space
// is expected to get.
func (l *island) grown() int {
	r := l.run
	n := min(r.set.Front, l.budget/max(1, len(l.dom.free))*max(1, r.problem.Goals-1)/costOfOne)
	if r.problem.Goals == maxShareGoals {
		n = min(n, mostOf4)
	}
	return max(r.start, n)
}

// grown is the largest population that any space ends with.
func (r *run) grown() int {
	n := 0
	for _, l := range r.islands {
		n = max(n, l.grown())
	}
	return n
}
