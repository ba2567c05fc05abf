package job

import (
	"bytes"
	"context"
	"encoding/json"
	"fmt"
	"math"
	"os"
	"slices"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/brief"
	"legwright/cmd/legwright/internal/sheet"
	"legwright/cmd/legwright/internal/study"
	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
	"legwright/objective"
)

// startOf is a brief of the family within its usual ranges, with a small duty.
func startOf(f *kin.Family) string {
	var dims, box []string
	for i := range f.Dimensions {
		d := &f.Dimensions[i]
		k := study.DimensionUnit(d.Unit)
		switch {
		case d.Role != kin.Shape:
			dims = append(dims, d.Name+": sized")
		case !d.Optional:
			dims = append(dims, fmt.Sprintf("%s: [%s, %s]", d.Name, units.Exact(d.Low, k), units.Exact(d.High, k)))
		}
	}
	for _, q := range f.Freedoms {
		k := units.Length
		if q.Angular() {
			k = units.Angle
		}
		box = append(box, fmt.Sprintf("%s: %s", q, units.Exact(f.Starter.Box[q]/2, k)))
	}
	return fmt.Sprintf(`family: %s
tool: [5 mm, 0 mm, 40 mm]
dimensions: {%s}
legs: {diameter: 1 mm}
duty:
  zones:
    - {name: work, box: {%s}, samples: 90}
    - {name: alone, axes: {%s}}
  cases: [{name: carry, loads: [{name: plate, mass: 2 kg, centre: [0 mm, 0 mm, 10 mm], acceleration: {linear: 2 m/s2}}], speeds: {linear: 0.1 m/s}}]
goals: [{maximise: conditioning}, {minimise: footprint}]
`, f.Name, strings.Join(dims, ", "), strings.Join(box, ", "), box[0])
}

// searched is a small study of a brief.
func searched(t *testing.T, text string, evaluations int) (*Study, *study.Front, *study.Sources) {
	t.Helper()
	b, err := brief.Parse("brief.yaml", []byte(text), *Known())
	if err != nil {
		t.Fatal(err)
	}
	s, err := New(b)
	if err != nil {
		t.Fatal(err)
	}
	run := Settings(b)
	run.Evaluations, run.Workers = evaluations, 1
	found, err := s.Search(context.Background(), run)
	if err != nil {
		t.Fatal(err)
	}
	return s, found.Front, &study.Sources{Brief: study.File{Name: "brief.yaml", Bytes: []byte(text)}}
}

func sheetOf(t *testing.T, s *Study, f *study.Front, run SheetRun) *sheet.Data {
	t.Helper()
	d, err := s.Sheet(f, run)
	if err != nil {
		t.Fatal(err)
	}
	return d
}

// drawn are all points of a posture in the base frame, as the page puts them together.
func drawn(v *sheet.Design, p *sheet.Pose) []kin.Vec {
	triples := func(flat []sheet.Fine) (out []kin.Vec) {
		for i := 0; i < len(flat); i += 3 {
			out = append(out, kin.Vec{X: float64(flat[i]), Y: float64(flat[i+1]), Z: float64(flat[i+2])})
		}
		return out
	}
	out := triples(v.Fixed)
	rot := kin.RPY(float64(p.Place[3]), float64(p.Place[4]), float64(p.Place[5]))
	for _, b := range triples(v.Platform) {
		r := rot.Apply(b)
		out = append(out, kin.Vec{X: float64(p.Place[0]) + r.X, Y: float64(p.Place[1]) + r.Y, Z: float64(p.Place[2]) + r.Z})
	}
	return append(out, triples(p.Moving)...)
}

// Of every family: the data after a round trip through JSON put the joints where the machine of an appraisal has them, within 1e-9 m,
// home is home, legs as long as they are, and every measure is decided by a pose that is there.
func TestSheetOfEveryFamily(t *testing.T) {
	for _, f := range kin.Families() {
		t.Run(f.Name, func(t *testing.T) {
			if testing.Short() && f.Name != "3-RRR" {
				t.Skip("short")
			}
			s, front, sources := searched(t, startOf(f), 300)
			if len(front.Designs) == 0 {
				t.Fatal("no design")
			}
			text, err := json.Marshal(sheetOf(t, s, front, SheetRun{Sources: sources}))
			if err != nil {
				t.Fatal(err)
			}
			d := new(sheet.Data)
			if err := json.Unmarshal(text, d); err != nil {
				t.Fatal(err)
			}
			if len(d.Designs) != len(front.Designs) || len(d.Families) != 1 {
				t.Fatalf("%d designs of %d, %d families", len(d.Designs), len(front.Designs), len(d.Families))
			}
			for i := range d.Designs {
				checkDrawn(t, s, d, &d.Designs[i], &front.Designs[i])
			}
			checkTracks(t, s, d)
		})
	}
}

func checkDrawn(t *testing.T, s *Study, d *sheet.Data, v *sheet.Design, r *study.Design) {
	t.Helper()
	p := s.Plans[v.Family]
	values := make([]float64, len(p.Family.Dimensions))
	for k := range values {
		values[k] = float64(r.Dimensions[p.Family.Dimensions[k].Name])
	}
	a := objective.Appraise(s.Tasks[v.Family], p, values)
	frame := a.Machine.Frame()
	sk := &d.Families[v.Family].Skeleton
	if v.Poses[0].At != [6]sheet.Num{} {
		t.Errorf("%s: the first pose is %v", v.ID, v.Poses[0].At)
	}
	for k := range v.Poses {
		pose := &v.Poses[k]
		var c kin.Coords
		for q := range c {
			c[q] = float64(pose.At[q])
		}
		if k > 0 { // seven digits of a pose would move joints by more than 1e-9
			c = decidingPose(t, d, v, r, k)
		}
		at := drawn(v, pose)
		if len(at) != sk.Fixed+sk.Platform+sk.Moving {
			t.Fatalf("%s: %d points for a skeleton of %+v", v.ID, len(at), sk)
		}
		for _, l := range sk.Lines {
			if l[2] >= len(at) || l[3] >= len(at) || l[0] >= len(sk.Kinds) || l[1] > p.Family.Legs {
				t.Fatalf("line %v", l)
			}
		}
		moved := kin.NewPose(c)
		origin, rot := a.Machine.Place(&moved)
		close := func(what string, got, want kin.Vec) {
			t.Helper()
			if e := math.Hypot(math.Hypot(got.X-want.X, got.Y-want.Y), got.Z-want.Z); e > 1e-9 {
				t.Errorf("%s, pose %d: %s off by %g m", v.ID, k, what, e)
			}
		}
		close("origin", at[sk.Origin], origin)
		tool := rot.Apply(frame.Tool)
		close("tool point", at[sk.Tool], kin.Vec{X: origin.X + tool.X, Y: origin.Y + tool.Y, Z: origin.Z + tool.Z})
		var state kin.State
		a.Machine.Move(&moved, &state)
		for i := range p.Family.Legs {
			if math.Abs(float64(pose.Q[i])-state.Q[i]) > 1e-6*math.Abs(state.Q[i])+1e-9 {
				t.Errorf("%s: leg %d at %v, is at %v", v.ID, i, pose.Q[i], state.Q[i])
			}
			if p.Family.Name == "level-arm" {
				continue
			}
			close("base joint", at[sk.Base[i]], frame.Base[i])
			if frame.Rods != nil && frame.Rods[i] > 0 { // the platform joint is a rod away from the drive's end
				u, e := state.Rod[i], state.End[i]
				l := frame.Rods[i]
				close("platform joint", at[sk.Joints[i]], kin.Vec{X: e.X + l*u.X, Y: e.Y + l*u.Y, Z: e.Z + l*u.Z})
			}
			if frame.Rods == nil {
				b, m := at[sk.Base[i]], at[sk.Joints[i]]
				if l := math.Hypot(math.Hypot(m.X-b.X, m.Y-b.Y), m.Z-b.Z); math.Abs(l-state.Q[i]) > 1e-9 {
					t.Errorf("%s: leg %d drawn %v long, is %v", v.ID, i, l, state.Q[i])
				}
			}
		}
	}
	for k, m := range d.Measures {
		want, ok := r.Measures[m.Name]
		got := float64(v.Measures[k])
		switch {
		case !ok:
		case math.IsInf(float64(want), 0) != slices.Contains(v.Unbounded, k):
			t.Errorf("%s: %s is %v, unbounded %v", v.ID, m.Name, want, v.Unbounded)
		case math.IsInf(float64(want), 0):
		case slices.ContainsFunc(d.Goals, func(g sheet.Goal) bool { return g.Measure == k }):
			if got != float64(want) {
				t.Errorf("%s: goal %s is %v, want %v", v.ID, m.Name, got, want)
			}
		case math.Abs(got-float64(want)) > 1e-6*math.Abs(float64(want)):
			t.Errorf("%s: %s is %v, want %v", v.ID, m.Name, got, want)
		}
	}
}

// decidingPose are the exact coordinates of pose k, from the record.
func decidingPose(t *testing.T, d *sheet.Data, v *sheet.Design, r *study.Design, k int) kin.Coords {
	for _, row := range v.Deciding {
		if row[1] == k {
			p := r.Worst[d.Measures[row[0]].Name].Pose
			return kin.Coords{p.X, p.Y, p.Z, p.Roll, p.Pitch, p.Yaw}
		}
	}
	t.Fatalf("pose %d decides nothing", k)
	return kin.Coords{}
}

// The way of the best design has a posture, with all its numbers, at each required pose; maps and sensitivities are there.
func checkTracks(t *testing.T, s *Study, d *sheet.Data) {
	t.Helper()
	v := &d.Designs[0]
	x, sk, legs := v.Detail, &d.Families[v.Family].Skeleton, len(v.Legs)
	if x == nil {
		t.Fatal("the best design is not shown in full")
	}
	for name, l := range map[string]struct {
		track sheet.Track
		poses []int
	}{"path": {x.Path, d.Path}, "corners": {x.Corners, d.Corners}} {
		n := len(l.poses) / 6
		if k := l.track; len(k.Place) != 6*n || len(k.Moving) != 3*n*sk.Moving || len(k.Q) != legs*n || len(k.Conditioning) != n {
			t.Errorf("%s: %d, %d, %d, %d numbers for %d poses", name, len(k.Place), len(k.Moving), len(k.Q), len(k.Conditioning), n)
		}
	}
	for _, i := range d.Way {
		if slices.Contains(x.Path.Lost, i) {
			t.Errorf("required pose %d of the path has no posture", i)
		}
	}
	if pairs := objective.MapAxes(s.Tasks[0]); len(x.Maps) != min(len(pairs), mapsShown) {
		t.Errorf("%d maps", len(x.Maps))
	}
	for _, m := range x.Maps {
		if len(m.Values) != m.N*m.N || len(m.Fails) != m.N*m.N {
			t.Errorf("map of %s and %s: %d values", m.X, m.Y, len(m.Values))
		}
	}
	if len(x.Excursions) != len(s.Plans[0].Family.Freedoms) || len(x.Together) != 1 || len(x.Sensitivity) == 0 {
		t.Errorf("%d excursions, %d together, %d sensitivities", len(x.Excursions), len(x.Together), len(x.Sensitivity))
	}
	if f := x.Together[0].Factor; f != nil && *f < 1-1e-6 { // nil: nothing fails up to three times the zone
		t.Errorf("the zone as asked is not held: %v %s", *f, x.Together[0].Fails)
	}
}

// The same bytes for any number of workers, and for a front read back from its file.
func TestSheetBytes(t *testing.T) {
	if testing.Short() {
		t.Skip("searches for some seconds")
	}
	s, front, sources := searched(t, startOf(kin.FamilyNamed("6-UPS")), 300)
	one := encoded(t, sheetOf(t, s, front, SheetRun{Sources: sources, Workers: 1}))
	if four := encoded(t, sheetOf(t, s, front, SheetRun{Sources: sources, Workers: 4})); !bytes.Equal(one, four) {
		t.Error("four workers give other bytes")
	}
	text, err := study.Encode(front)
	if err != nil {
		t.Fatal(err)
	}
	back, err := study.Decode(text)
	if err != nil {
		t.Fatal(err)
	}
	if again := encoded(t, sheetOf(t, s, back, SheetRun{Sources: sources})); !bytes.Equal(one, again) {
		t.Error("the front read back gives other bytes")
	}
}

func encoded(t *testing.T, d *sheet.Data) []byte {
	t.Helper()
	b, err := json.Marshal(d)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

// A front of 500 designs of the families with the most to draw stays below what the page may hold, and its best
// designs, those with marks and those asked for are still shown in full.
func TestSheetOfLargeFronts(t *testing.T) {
	if testing.Short() {
		t.Skip("short")
	}
	s, front, sources := searched(t, readBrief(t, mixedBrief), 1500)
	if len(front.Designs) < 10 {
		t.Fatalf("%d designs", len(front.Designs))
	}
	n := len(front.Designs)
	for i := n; i < 500; i++ {
		d := front.Designs[i%n]
		d.ID, d.Rank, d.Marks = fmt.Sprintf("%03d", i+1), i+1, []string{}
		front.Designs = append(front.Designs, d)
	}
	d := sheetOf(t, s, front, SheetRun{Sources: sources, Detail: []string{"444"}})
	if b := len(encoded(t, d)); b > 2_800_000 {
		t.Errorf("%d bytes", b)
	} else {
		t.Logf("%d bytes, %d of the path", b, len(d.Path)/6)
	}
	full := 0
	for i := range d.Designs {
		v := &d.Designs[i]
		if v.Detail != nil {
			full++
		} else if len(v.Marks) > 0 || v.ID == "444" {
			t.Errorf("design %s is not shown in full", v.ID)
		}
		if len(v.Poses) == 0 || len(v.Deciding) < len(d.Goals)-1 { // footprint has no pose
			t.Errorf("design %s: %d poses, %d decided", v.ID, len(v.Poses), len(v.Deciding))
		}
	}
	t.Logf("%d designs in full", full)
	for i := range 20 {
		if d.Designs[i].Detail == nil {
			t.Errorf("design %s, of rank %d, is not shown in full", d.Designs[i].ID, i+1)
		}
	}
}

func readBrief(t *testing.T, file string) string {
	t.Helper()
	b, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	return string(b)
}

// What does not belong together is refused with words.
func TestSheetRefuses(t *testing.T) {
	s, front, sources := searched(t, startOf(kin.FamilyNamed("3-RPR")), 100)
	refused := func(want string, f *study.Front, run SheetRun) {
		t.Helper()
		run.Sources = sources
		if _, err := s.Sheet(f, run); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("refused with %v, want %q", err, want)
		}
	}
	refused("no such design", front, SheetRun{Detail: []string{"999"}})
	other := *front
	other.Goals = []study.Goal{{Measure: "footprint", Sense: study.Minimise}, {Measure: "conditioning", Sense: study.Maximise}}
	refused("not the one that the front was found with", &other, SheetRun{})
	other = *front
	other.Designs = slices.Clone(front.Designs)
	other.Designs[0].Joints.Base = slices.Clone(other.Designs[0].Joints.Base)
	other.Designs[0].Joints.Base[1][0] += 1e-6
	refused("not where its dimensions put them", &other, SheetRun{})
	other.Designs[0].Family = "delta"
	refused("the family delta is not in the brief", &other, SheetRun{})
}

// Sensitivities of the page are the relative changes of appraisals, goal by goal, to five digits.
func TestSheetSensitivities(t *testing.T) {
	s, front, sources := searched(t, startOf(kin.FamilyNamed("6-UPS")), 200)
	d := sheetOf(t, s, front, SheetRun{Sources: sources})
	v := &d.Designs[0]
	for _, c := range v.Detail.Sensitivity {
		values := make([]float64, len(v.Dimensions))
		for i := range values {
			values[i] = float64(v.Dimensions[i])
		}
		x := values[c.Dimension]
		for _, m := range []struct {
			by, want sheet.Num
			goals    []sheet.Num
		}{{c.Down, -0.01, c.Lower}, {c.Up, 0.01, c.Higher}} {
			values[c.Dimension] = x + float64(m.want)*math.Abs(x)
			a := objective.Appraise(s.Tasks[0], s.Plans[0], values)
			for k, g := range d.Goals {
				r := a.Reading(d.Measures[g.Measure].Name)
				base := float64(v.Measures[g.Measure])
				if want := (r.Value - base) / base; math.Abs(float64(m.goals[k])-want) > 1e-6+1e-4*math.Abs(want) {
					t.Errorf("dimension %d, goal %d: %v, appraised %v", c.Dimension, k, m.goals[k], want)
				}
			}
		}
	}
}
