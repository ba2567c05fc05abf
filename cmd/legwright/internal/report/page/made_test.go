package page

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strings"

	"legwright/cmd/legwright/internal/sheet"
)

// made is the data of a study that was not searched: as many designs as asked, with joints of a real
// machine and goals that trade off, two families that differ in name only. Page tests that need no
// exact figures use it.
func made(n int, title string) *sheet.Data {
	rnd := rand.New(rand.NewPCG(1, 2))
	num := func(v float64) *sheet.Num { x := sheet.Num(v); return &x }
	d := &sheet.Data{
		Format: sheet.Format, Title: title, Program: "test", Seed: 1, Status: "budget spent", Evaluations: 10 * n, Budget: 10 * n, Feasible: 4 * n, Poses: 300,
		Hypervolume: 0.4321, Reference: []sheet.Exact{0, 5000, 2}, Caution: "A study of geometry, not an assessment of safety.", Cautions: "Legs crush and shear.",
		Brief: sheet.Brief{File: "brief.yaml", Paragraph: "A platform is to reach one zone under one load case; " + title, Zones: []string{"work: x ±100 mm"}, Cases: []string{"running: 300 kg"}, Limits: []string{"leg_clearance at least 10 mm"}, Open: []string{"base_radius 400 to 1200 mm"}},
		Steps: []string{"80 mm less footprint costs 4 % less conditioning: design 002"}, LeftOut: []string{"massless legs"}, Notes: []string{"characteristic length 800 mm"},
		Units: map[string]sheet.Unit{"m": {Symbol: "mm", Factor: 1000, Finest: 4}, "rad": {Symbol: "deg", Factor: 180 / math.Pi, Finest: 3}, "N": {Symbol: "N", Factor: 1, Finest: -1},
			"m/s": {Symbol: "mm/s", Factor: 1000, Finest: -1}, "": {Factor: 1, Finest: -1}},
		Goals: []sheet.Goal{{Measure: 0, More: true, Weight: 2}, {Measure: 1, Weight: 1}, {Measure: 2, Weight: 1}},
		Measures: []sheet.Column{{Name: "conditioning", Text: "least over largest singular value", Sense: "larger"}, {Name: "leg_force", Text: "largest effort", Unit: "N", Sense: "smaller"},
			{Name: "footprint", Text: "smallest circle in plan", Unit: "m", Sense: "smaller"}, {Name: "leg_clearance", Text: "least distance of legs", Unit: "m", Sense: "larger"}},
		Limits: []sheet.LimitKind{{Measure: "leg_clearance", Origin: "limits", Unit: "m", AtLeast: true}, {Measure: "longest needed", Origin: "dimensions.stroke", Unit: "m"}},
		Zones:  []sheet.Zone{{Name: "work", Kind: "box", Low: [6]sheet.Num{-0.1, -0.1, -0.08, -0.2, -0.2, -0.15}, High: [6]sheet.Num{0.1, 0.1, 0.08, 0.2, 0.2, 0.15}, Text: "work: x ±100 mm"}},
		Cases:  []string{"running"}, Families: []sheet.Family{madeFamily("6-UPS"), madeFamily("6-XPS")}, Folder: "out", Hash: "0123456789abcdef",
	}
	const steps = 40
	for k := range steps + 1 {
		a := 2 * math.Pi * float64(k) / steps
		d.Path = append(d.Path, sheet.Count(0.1*math.Sin(a), sheet.Step), sheet.Count(0.1*math.Sin(2*a), sheet.Step), sheet.Count(0.05*math.Sin(a), sheet.Step), sheet.Count(0.2*math.Sin(a), sheet.Step), 0, sheet.Count(0.1*math.Sin(3*a), sheet.Step))
		d.Way = append(d.Way, k)
	}
	for k := range 8 {
		s := func(bit int, v float64) int { return sheet.Count(v*float64(2*(k>>bit&1)-1), sheet.Step) }
		d.Corners = append(d.Corners, s(0, 0.1), s(1, 0.1), s(2, 0.08), s(0, 0.2), s(1, -0.2), s(2, 0.15))
	}
	for i := range n {
		t := (float64(i) + 0.5) / float64(n)
		base, platform, height := 0.4+0.8*t, 0.25+0.3*rnd.Float64(), 0.9+0.2*rnd.Float64()
		g := sheet.Design{ID: fmt.Sprintf("%03d", i+1), Rank: i + 1, Score: sheet.Exact(1 - t), Family: i % 7 / 5, Feasible: true, Marks: []string{}, Sheets: i < 20, Tightest: 1,
			Dimensions: []sheet.Exact{sheet.Exact(base), sheet.Exact(platform), sheet.Exact(height), 0.88, 0.7},
			Measures:   []sheet.Exact{sheet.Exact(0.15 + 0.25*math.Sqrt(t) + 0.01*rnd.Float64()), sheet.Exact(2300 + 1500*(1-t)*(1-t) + 30*rnd.Float64()), sheet.Exact(2 * base), sheet.Exact(0.03 * (1 + rnd.Float64()))},
			Limits:     [][5]sheet.Num{{0, 0.01, 0.03, 2, 1}, {1, 1.57, 1.56, 0.006, 1}},
			Deciding:   [][6]int{{0, 1, 0, 0, 0, -1}, {1, 2, 3, 0, 0, 0}, {3, 1, 2, 3, 0, -1}},
			Range:      [2]sheet.Num{0.88, 1.58}, Legs: [][8]sheet.Num{}}
		var joints [][3]float64
		for k := range 6 {
			corner := float64(k/2) * 2 * math.Pi / 3
			sign := float64(2*(k%2) - 1)
			a, b := corner+2*math.Pi/6+sign*0.9, corner+2*math.Pi/6+sign*0.15
			g.Fixed = append(g.Fixed, sheet.Fine(base*math.Cos(a)), sheet.Fine(base*math.Sin(a)), 0)
			joints = append(joints, [3]float64{platform * math.Cos(b), platform * math.Sin(b), 0})
		}
		joints = append(joints, [3]float64{}, [3]float64{0, 0, 0.25})
		for _, p := range joints {
			g.Platform = append(g.Platform, sheet.Fine(p[0]), sheet.Fine(p[1]), sheet.Fine(p[2]))
		}
		for k, at := range [][6]sheet.Num{{}, {0.1, 0.1, 0.08, 0.2, -0.2, 0.15}, {-0.1, 0.1, -0.08, 0.2, 0.2, -0.15}} {
			p := sheet.Pose{At: at, Q: []sheet.Num{}}
			for j, v := range at {
				p.Place[j] = sheet.Fine(v)
			}
			p.Place[2] += sheet.Fine(height)
			for j := range 6 {
				p.Q = append(p.Q, sheet.Num(1.1+0.1*math.Sin(float64(j+k))))
			}
			g.Poses = append(g.Poses, p)
		}
		for k := range 6 {
			g.Legs = append(g.Legs, [8]sheet.Num{0.9, 1.2, sheet.Num(1.5 + 0.01*float64(k)), 2300, 1400, 0.7, 0.3, 0.5})
		}
		if i < 20 {
			g.Detail = madeDetail(d, height)
		}
		d.Designs = append(d.Designs, g)
	}
	few := min(7, n)
	for k := range few {
		i := k * (n - 1) / max(few-1, 1)
		d.Designs[i].Marks = []string{[]string{"best rank", "knee", "best leg_force", "most margin", "best conditioning", "best footprint", "between"}[k]}
		d.First = append(d.First, sheet.First{Design: i, Near: []string{}})
	}
	d.Families[0].Push = num(2500)
	return d
}

func madeFamily(name string) sheet.Family {
	f := sheet.Family{Name: name, Text: "six legs that change their length", Freedoms: []string{"x", "y", "z", "roll", "pitch", "yaw"}, Bounded: 6, Coordinate: "m", Effort: "N", Rate: "m/s", Reserve: 0.01,
		Skeleton: sheet.Skeleton{Fixed: 6, Platform: 8, Origin: 12, Tool: 13, Kinds: []string{"base", "platform", "leg", "tool"}}}
	low, high := sheet.Num(0.4), sheet.Num(1.2)
	for _, c := range []string{"base_radius", "platform_radius", "home_height", "leg_min", "stroke"} {
		f.Dimensions = append(f.Dimensions, sheet.Column{Name: c, Text: "a length", Unit: "m", Form: "range", Low: &low, High: &high})
	}
	for k := range 6 {
		s := &f.Skeleton
		s.Base, s.Joints = append(s.Base, k), append(s.Joints, 6+k)
		s.Lines = append(s.Lines, [4]int{0, 0, k, (k + 1) % 6}, [4]int{1, 0, 6 + k, 6 + (k+1)%6}, [4]int{2, k + 1, k, 6 + k})
	}
	f.Skeleton.Lines = append(f.Skeleton.Lines, [4]int{3, 0, 12, 13})
	return f
}

func madeDetail(d *sheet.Data, height float64) *sheet.Detail {
	track := func(poses []int) sheet.Track {
		var t sheet.Track
		for k := range len(poses) / 6 {
			t.Place = append(t.Place, poses[6*k:6*k+6]...)
			t.Place[6*k+2] += sheet.Count(height, sheet.Step)
			for range 6 {
				t.Q = append(t.Q, 110000+100*k)
			}
			t.Conditioning = append(t.Conditioning, 3000+10*k)
		}
		return t
	}
	num := sheet.Num(0.4)
	const n = 21
	m := sheet.Map{X: "x", Y: "roll", XRange: [2]sheet.Num{-0.3, 0.3}, YRange: [2]sheet.Num{-0.5, 0.5}, N: n, Fails: strings.Repeat("x", n) + strings.Repeat(".", n*n-n)}
	for k := range n * n {
		x, y := float64(k%n)-n/2, float64(k/n)-n/2
		m.Values = append(m.Values, int(4000-10*x*x-12*y*y))
	}
	m.Values[0] = -1
	return &sheet.Detail{Path: track(d.Path), Corners: track(d.Corners), Maps: []sheet.Map{m},
		Excursions:  []sheet.Excursion{{Coordinate: "x", Unit: "m", Low: &num, LowFails: "actuator range", High: nil}},
		Together:    []sheet.Together{{Zone: 0, Factor: &num, Fails: "actuator range"}},
		Sensitivity: []sheet.Change{{Dimension: 0, Text: "±1 %", Down: 0.01, Up: 0.01, Lower: []sheet.Num{-0.01, 0.02, -0.01}, Higher: []sheet.Num{0.01, -0.02, 0.01}}}}
}
