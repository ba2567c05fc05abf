package handover

import (
	"encoding/xml"
	"math"
	"strconv"
	"strings"
	"testing"

	"legwright/kin"
	"legwright/objective"
)

// picture is an SVG as encoding/xml reads it.
type picture struct {
	Width  string `xml:"width,attr"`
	Height string `xml:"height,attr"`
	Box    string `xml:"viewBox,attr"`
	Groups []struct {
		ID      string `xml:"id,attr"`
		Circles []struct {
			ID string  `xml:"id,attr"`
			X  float64 `xml:"cx,attr"`
			Y  float64 `xml:"cy,attr"`
			R  float64 `xml:"r,attr"`
		} `xml:"circle"`
		Lines []struct {
			X1 float64 `xml:"x1,attr"`
			Y1 float64 `xml:"y1,attr"`
			X2 float64 `xml:"x2,attr"`
			Y2 float64 `xml:"y2,attr"`
		} `xml:"line"`
		Texts []string `xml:"text"`
	} `xml:"g"`
}

func pictureOf(t *testing.T, b []byte) (p picture, scale float64, texts []string) {
	t.Helper()
	if err := xml.Unmarshal(b, &p); err != nil {
		t.Fatal(err)
	}
	for _, g := range p.Groups {
		texts = append(texts, g.Texts...)
	}
	for _, s := range texts {
		if _, after, ok := strings.Cut(s, "scale "); ok {
			a, c, _ := strings.Cut(strings.Fields(after)[0], ":")
			top, err1 := strconv.ParseFloat(a, 64)
			bottom, err2 := strconv.ParseFloat(c, 64)
			if err1 != nil || err2 != nil {
				t.Fatalf("scale %q", after)
			}
			return p, bottom / top, texts
		}
	}
	t.Fatal("the sheet names no scale")
	return p, 0, nil
}

// checkPlan checks a plan against the places of its joints (mm): the sheet has the paper's size, joints lie to scale from
// each other, the table has their coordinates, and every dimension is a distance, a diameter or an angle of
// these places. Coordinates are written to 1e-6 mm on paper, texts to three decimals.
func checkPlan(t *testing.T, b []byte, at map[string]kin.Vec) {
	t.Helper()
	p, scale, texts := pictureOf(t, b)
	if !(p.Width == "297mm" && p.Height == "210mm" && p.Box == "0 0 297 210") && !(p.Width == "420mm" && p.Height == "297mm" && p.Box == "0 0 420 297") {
		t.Fatalf("size %s × %s, view box %s", p.Width, p.Height, p.Box)
	}
	places := map[string][2]float64{}
	var dims []string
	for _, g := range p.Groups {
		for _, c := range g.Circles {
			if c.ID != "" {
				places[c.ID] = [2]float64{c.X, c.Y}
			}
		}
	}
	for i, g := range p.Groups { // texts follow the group with the layer's lines
		if i > 0 && p.Groups[i-1].ID == "DIMENSIONS" {
			dims = append(dims, g.Texts...)
		}
	}
	if len(places) != len(at) {
		t.Fatalf("%d joints drawn, %d in the table", len(places), len(at))
	}
	var known, angles []float64
	first := ""
	for n, v := range at {
		if _, ok := places[n]; !ok {
			t.Fatalf("%s is not drawn", n)
		}
		if first == "" {
			first = n
		}
		o, w := places[first], at[first]
		near(t, n+" x", (places[n][0]-o[0])*scale, v.X-w.X, 4e-6*scale)
		near(t, n+" y", (o[1]-places[n][1])*scale, v.Y-w.Y, 4e-6*scale)
		for _, u := range at {
			known = append(known, math.Hypot(u.X-v.X, u.Y-v.Y))
			mid := kin.Vec{X: (u.X + v.X) / 2, Y: (u.Y + v.Y) / 2} // of a parallelogram's rods
			known = append(known, 2*math.Hypot(mid.X, mid.Y))
			angles = append(angles, math.Atan2(mid.Y, mid.X)*180/math.Pi)
		}
		known = append(known, 2*math.Hypot(v.X, v.Y))
		angles = append(angles, math.Atan2(v.Y, v.X)*180/math.Pi)
		for _, want := range []string{n, decimals(v.X, 3), decimals(v.Y, 3), decimals(v.Z, 3)} {
			found := false
			for _, s := range texts {
				found = found || s == want
			}
			if !found {
				t.Errorf("%s: %q is not on the sheet", n, want)
			}
		}
	}
	angles = append(angles, 0, 60, 120, 180, 240) // +x, and the centres of pairs
	for _, s := range dims {
		if a, ok := strings.CutSuffix(s, "°"); ok {
			v, err := strconv.ParseFloat(a, 64)
			if err != nil {
				t.Fatal(err)
			}
			found := false
			for _, x := range angles {
				for _, y := range angles {
					found = found || math.Abs(math.Remainder(x-y-v, 360)) <= 5.1e-4
				}
			}
			if !found {
				t.Errorf("angle %q is none of the joints'", s)
			}
			continue
		}
		v, err := strconv.ParseFloat(strings.TrimPrefix(s, "Ø "), 64)
		if err != nil {
			t.Fatal(err)
		}
		found := false
		for _, x := range known {
			found = found || math.Abs(x-v) <= 5.1e-4
		}
		if !found {
			t.Errorf("dimension %q is no distance of joints", s)
		}
	}
	if len(dims) == 0 && len(at) > 2 {
		t.Error("no dimensions")
	}
}

// drawn are the places of the holes of a plate in the joint table, and the palletising arm's shoulder.
func drawn(t *testing.T, files map[string][]byte, plate string) map[string]kin.Vec {
	t.Helper()
	out := map[string]kin.Vec{}
	_, _, holes := read(t, files["holes.csv"])
	for _, h := range holes {
		if h["plate"] == plate {
			out[h["hole"]] = kin.Vec{X: cell(t, h, "x_mm"), Y: cell(t, h, "y_mm"), Z: cell(t, h, "z_mm")}
		}
	}
	_, _, joints := read(t, files["joints.csv"])
	for _, j := range joints {
		if plate == onBase && strings.HasPrefix(j["what"], "shoulder") {
			out[j["point"]] = place(t, j, "base_frame")
		}
	}
	return out
}

func TestPlansAgainstCoordinates(t *testing.T) {
	for _, f := range kin.Families() {
		for _, part := range []float64{0.3, 0.02, 0.7, 0.98} {
			if testing.Short() && part != 0.3 {
				break
			}
			task := starterTask(f)
			files := Files(task, appraised(f, task, part), wicked)
			checkPlan(t, files["base.svg"], drawn(t, files, onBase))
			checkPlan(t, files["platform.svg"], drawn(t, files, onPlatform))
			if t.Failed() {
				t.Fatalf("%s, %g of the way up its ranges", f.Name, part)
			}
		}
	}
}

// A machine by its joint centres, which stand on no circle: the plan has them and their distances, and no pitch circle.
func TestPlanOfAnAsymmetricMachine(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := starterTask(f)
	fr := appraised(f, task, 0.3).Machine.Frame()
	j := &kin.Joints{Base: append([]kin.Vec(nil), fr.Base...), Platform: append([]kin.Vec(nil), fr.Platform...), Home: fr.Home, HomeRot: kin.RPY(0.1, 0, 0.2)}
	j.Base[2] = kin.Vec{X: -0.5, Y: 0.6, Z: 0.05}
	j.Platform[0].X += 0.03
	specs := make([]objective.Spec, len(f.Dimensions))
	for i := range specs {
		specs[i] = objective.Spec{Kind: objective.Fixed, Values: []float64{math.NaN()}}
	}
	least, span := f.Range()
	specs[least], specs[span] = objective.Spec{Kind: objective.Sized}, objective.Spec{Kind: objective.Sized}
	plan := objective.NewPlan(task, f, specs)
	plan.Joints = j
	files := Files(task, objective.Appraise(task, plan, plan.Single()), wicked)
	for _, plate := range []string{onBase, onPlatform} {
		p, _, _ := pictureOf(t, files[plate+".svg"])
		for _, g := range p.Groups {
			for _, s := range g.Texts {
				if strings.HasPrefix(s, "Ø") {
					t.Errorf("%s: %q, but its joints stand on no circle", plate, s)
				}
			}
		}
	}
	checkPlan(t, files["base.svg"], drawn(t, files, onBase))
	checkPlan(t, files["platform.svg"], drawn(t, files, onPlatform))
	_, _, joints := read(t, files["joints.csv"])
	for _, row := range joints {
		if row["point"] == "B3" {
			near(t, "z of B3", cell(t, row, "base_frame_z_mm"), 50, 1e-9)
		}
	}
}

// The SVG's title is the text that it is, nothing of the brief becomes markup, and both plans keep their size small.
func TestNothingOfTheBriefBecomesMarkup(t *testing.T) {
	f := kin.FamilyNamed("6-UPS")
	task := starterTask(f)
	a := appraised(f, task, 0.3)
	evil := wicked
	evil.Design, evil.Hash, evil.Program = `"><script>`, "</svg>", "<svg onload=x>"
	for name, b := range Files(task, a, evil) {
		if !strings.HasSuffix(name, ".svg") {
			continue
		}
		if s := string(b); strings.Contains(s, "<script") || strings.Count(s, "<svg") != 1 || strings.Count(s, "</svg>") != 1 {
			t.Errorf("%s holds markup of the brief", name)
		}
		dec := xml.NewDecoder(strings.NewReader(string(b)))
		for {
			tok, err := dec.Token()
			if err != nil {
				if err.Error() != "EOF" {
					t.Fatal(err)
				}
				break
			}
			if e, ok := tok.(xml.StartElement); ok {
				switch e.Name.Local {
				case "svg", "title", "rect", "g", "line", "circle", "path", "text":
				default:
					t.Errorf("%s: element %s", name, e.Name.Local)
				}
			}
		}
	}
}
