package report

import (
	"math"
	"strconv"

	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
)

// gazetteer gives the poses that a screen speaks of short names: A, B, C, …
type gazetteer struct{ poses []study.Pose }

// label is the name of a pose, "" for none.
func (g *gazetteer) label(p *study.Pose) string {
	if p == nil {
		return ""
	}
	for i := range g.poses {
		if g.poses[i] == *p {
			return letters(i)
		}
	}
	g.poses = append(g.poses, *p)
	return letters(len(g.poses) - 1)
}

// orHome is the name of a pose, "home" for none.
func (g *gazetteer) orHome(p *study.Pose) string {
	if p == nil {
		return "home"
	}
	return g.label(p)
}

// letters counts A, B, …, Z, AA, AB, …
func letters(i int) string {
	if i < 26 {
		return string(rune('A' + i))
	}
	return letters(i/26-1) + letters(i%26)
}

// coordinate is the scale of a pose coordinate.
func coordinate(name string) scale {
	switch name {
	case "roll", "pitch", "yaw":
		return scale{kind: units.Angle}
	}
	return scale{kind: units.Length}
}

// poses draws the poses that were named. Coordinates that none of them has are left out.
func (s *sheet) poses(g *gazetteer) {
	if len(g.poses) == 0 {
		return
	}
	s.heading("Poses, about home")
	cols := []column{{head: "pose", left: true}}
	for i := range g.poses {
		cols[0].cells = append(cols[0].cells, letters(i))
	}
	names := []string{"x", "y", "z", "roll", "pitch", "yaw"}
	for k, n := range names {
		c := coordinate(n)
		values := make([]float64, len(g.poses))
		moves := false
		for i, p := range g.poses {
			v := [6]float64{p.X, p.Y, p.Z, p.Roll, p.Pitch, p.Yaw}[k]
			moves = moves || v != 0
			values[i] = c.in(v)
		}
		if moves {
			cols = append(cols, column{head: n, unit: c.unit(), cells: short(values)})
		}
	}
	s.grid(cols)
	s.gap()
}

// short shows numbers with as many decimals as they need, two at most, the same for all.
func short(values []float64) []string {
	decimals := 0
	for _, v := range values {
		for decimals < 2 && math.Abs(v-math.Round(v*math.Pow10(decimals))/math.Pow10(decimals)) > 1e-9 {
			decimals++
		}
	}
	out := make([]string, len(values))
	for i, v := range values {
		out[i] = fixed(v, decimals)
	}
	return out
}

// legs draws what each leg must do.
func (s *sheet) legs(d *study.Design, g *gazetteer) {
	if len(d.Legs) == 0 {
		return
	}
	s.heading("Legs, over home and all poses that count")
	q, effort, rate := study.DriveKinds(d.Family)
	names := [3]string{"shortest", "longest", "push"}
	pull := "pull"
	if q == units.Angle {
		names, pull = [3]string{"least", "most", "torque +"}, "torque -"
	}
	number := column{head: "leg"}
	shortAt, longAt := column{head: "pose", left: true}, column{head: "pose", left: true}
	for i := range d.Legs {
		number.cells = append(number.cells, strconv.Itoa(i+1))
		shortAt.cells = append(shortAt.cells, g.orHome(d.Legs[i].ShortestAt))
		longAt.cells = append(longAt.cells, g.orHome(d.Legs[i].LongestAt))
	}
	of := func(name string, k units.Kind, digits int, field func(*study.Leg) study.Number) column {
		c := scale{kind: k}
		col := column{head: words(name), unit: c.unit()}
		values := make([]float64, len(d.Legs))
		for i := range d.Legs {
			values[i] = float64(field(&d.Legs[i]))
		}
		col.cells = c.column(values, digits, digits)
		return col
	}
	s.blocks([]column{
		number,
		of(names[0], q, manyDigits, func(l *study.Leg) study.Number { return l.Shortest }), shortAt,
		of("home", q, manyDigits, func(l *study.Leg) study.Number { return l.Home }),
		of(names[1], q, manyDigits, func(l *study.Leg) study.Number { return l.Longest }), longAt,
		of(names[2], effort, fewDigits, func(l *study.Leg) study.Number { return l.Push }),
		of(pull, effort, fewDigits, func(l *study.Leg) study.Number { return l.Pull }),
		of("speed", rate, fewDigits, func(l *study.Leg) study.Number { return l.Speed }),
		of("base_swing", units.Angle, fewDigits, func(l *study.Leg) study.Number { return l.BaseSwing }),
		of("platform_swing", units.Angle, fewDigits, func(l *study.Leg) study.Number { return l.PlatformSwing }),
	})
	s.gap()
}
