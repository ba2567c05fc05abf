package objective

import "math"

// size finds the derived dimensions of the actuator range from the least and the
// greatest coordinate that the duty needs, home included. The reserve is kept
// free at both ends; a stock stroke, or the next step, is taken above what is
// needed, the least coordinate staying where it is.
func (p *Plan) size(a *Actuator, least, most float64, d []float64) {
	if p.least < 0 {
		return
	}
	low, high := least-a.Reserve, most+a.Reserve
	ls, ss := &p.Specs[p.least], &p.Specs[p.span]
	if p.derived(p.least) {
		d[p.least] = ls.below(low)
	}
	if p.derived(p.span) {
		d[p.span] = ss.above(high-d[p.least], a.Strokes)
	}
}

// below is the largest admitted value that is not above x, or the least admitted one.
func (s *Spec) below(x float64) float64 {
	switch s.Kind {
	case Range:
		return math.Max(s.Low, math.Min(s.High, x))
	case Steps:
		k := math.Floor((x-s.Low)/s.Step + Tolerance)
		return s.at(int(math.Max(0, math.Min(float64(s.Levels-1), k))))
	}
	return x
}

// above is the least admitted value that is not below x, or the largest admitted
// one. Of stock strokes none may be long enough: x itself is then given, and
// fits reports it.
func (s *Spec) above(x float64, stock []float64) float64 {
	switch s.Kind {
	case Range:
		return math.Max(s.Low, math.Min(s.High, x))
	case Steps:
		k := math.Ceil((x-s.Low)/s.Step - Tolerance)
		return s.at(int(math.Max(0, math.Min(float64(s.Levels-1), k))))
	}
	for _, v := range stock {
		if v >= x*(1-Tolerance) {
			return v
		}
	}
	return x
}

// rangeExcess is how far the coordinates [least, most] leave the actuator range
// less its reserve, relative to the stroke.
func (p *Plan) rangeExcess(a *Actuator, least, most float64, d []float64) float64 {
	if p.least < 0 {
		return 0
	}
	low, span := d[p.least], d[p.span]
	e := math.Max(low+a.Reserve-least, most-(low+span-a.Reserve))
	if e <= p.rangeSlack(d) {
		return math.Min(e, 0)
	}
	return e / math.Max(span, 1e-3)
}

// rangeSlack is how far a coordinate may leave the range by rounding. It depends on the range
// alone, so that single poses and the whole duty are judged alike.
func (p *Plan) rangeSlack(d []float64) float64 {
	low, span := d[p.least], d[p.span]
	return Tolerance * math.Max(math.Abs(low), math.Abs(low+span))
}

// deadExcess is how far the least coordinate falls short of the actuator's dead
// length, relative to that length; also a sized stroke that no stock stroke holds.
func (p *Plan) deadExcess(a *Actuator, d []float64) float64 {
	if p.least < 0 {
		return 0
	}
	if len(a.Strokes) > 0 && p.Specs[p.span].Kind == Sized {
		if last := a.Strokes[len(a.Strokes)-1]; d[p.span] > last*(1+Tolerance) {
			return (d[p.span] - last) / last
		}
	}
	if math.IsNaN(a.DeadLength) {
		return 0
	}
	need := a.DeadRatio*d[p.span] + a.DeadLength
	e := need - d[p.least]
	if e <= Tolerance*need {
		return math.Min(e, 0)
	}
	return e / math.Max(a.DeadLength, 1e-3)
}
