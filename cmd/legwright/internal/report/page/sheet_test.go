package page

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/sheet"
	"legwright/cmd/legwright/internal/study"

	"github.com/chromedp/chromedp"
	"github.com/chromedp/chromedp/kb"
)

// drawn is a point of the drawing: what it stands for in the base frame, and where it is.
type drawn struct {
	Name string  `json:"name"`
	XYZ  string  `json:"xyz"`
	X    float64 `json:"x"`
	Y    float64 `json:"y"`
}

func (d drawn) point(t *testing.T) (p [3]float64) {
	t.Helper()
	for i, s := range strings.Fields(d.XYZ) {
		v, err := strconv.ParseFloat(s, 64)
		if err != nil {
			t.Fatal(err)
		}
		p[i] = v
	}
	return p
}

const joints = `[...document.querySelectorAll("#sheet [data-joint]")].map((c) => ({name: c.dataset.joint, xyz: c.dataset.xyz, x: Number(c.getAttribute("cx")), y: Number(c.getAttribute("cy"))}))`

// The joints drawn, at home and at every deciding pose, are those of the appraisal to 1e-9 m: base joints
// as they are, platform joints turned by R = Rz(yaw) Ry(pitch) Rx(roll) about the tool point and moved with it.
func TestDrawnJointsAreThoseOfTheAppraisal(t *testing.T) {
	for name, get := range map[string]func() (*searched, error){"tilt": tilt, "drives": drives} {
		t.Run(name, func(t *testing.T) {
			s := need(t, get)
			p := open(t, s.data, 1280, 900, false)
			families := map[string]bool{}
			for i := range s.front.Designs {
				d := &s.front.Designs[i]
				if families[d.Family] {
					continue
				}
				families[d.Family] = true
				eval[bool](p, fmt.Sprintf(`legwright.store.pick(%d), true`, i))
				compareJoints(t, p, d, study.Pose{}, s.tool)
				for m, w := range d.Worst {
					if w.Pose == nil {
						continue
					}
					eval[bool](p, fmt.Sprintf(`document.querySelector('[data-pose="%s"]').click(), true`, m))
					compareJoints(t, p, d, *w.Pose, s.tool)
				}
			}
			p.quiet()
		})
	}
}

func compareJoints(t *testing.T, p *tab, d *study.Design, at study.Pose, tool [3]float64) {
	t.Helper()
	height := float64(d.Dimensions["home_height"])
	got := map[string][3]float64{}
	for _, j := range eval[[]drawn](p, joints) {
		got[j.Name] = j.point(t)
	}
	if len(got) != 2*len(d.Joints.Base) {
		t.Fatalf("%d joints are drawn, want %d", len(got), 2*len(d.Joints.Base))
	}
	for k := range d.Joints.Base {
		near(t, fmt.Sprintf("%s base joint %d", d.ID, k+1), got[fmt.Sprintf("base%d", k+1)], d.Joints.Base[k])
		b := d.Joints.Platform[k]
		r := turn(at, [3]float64{b[0] - tool[0], b[1] - tool[1], b[2] - tool[2]})
		want := [3]float64{at.X + tool[0] + r[0], at.Y + tool[1] + r[1], at.Z + height + tool[2] + r[2]}
		near(t, fmt.Sprintf("%s platform joint %d at %+v", d.ID, k+1, at), got[fmt.Sprintf("platform%d", k+1)], want)
	}
}

// turn applies Rz(yaw) Ry(pitch) Rx(roll), one rotation after the other.
func turn(at study.Pose, v [3]float64) [3]float64 {
	s, c := math.Sincos(at.Roll)
	v = [3]float64{v[0], c*v[1] - s*v[2], s*v[1] + c*v[2]}
	s, c = math.Sincos(at.Pitch)
	v = [3]float64{c*v[0] + s*v[2], v[1], c*v[2] - s*v[0]}
	s, c = math.Sincos(at.Yaw)
	return [3]float64{c*v[0] - s*v[1], s*v[0] + c*v[1], v[2]}
}

func near(t *testing.T, what string, got, want [3]float64) {
	t.Helper()
	for i := range got {
		if math.Abs(got[i]-want[i]) > 1e-9 {
			t.Errorf("%s: drawn at %v, want %v", what, got, want)
			return
		}
	}
}

// The drawing is a parallel projection with one scale: seen from above, distances in plan are the real ones.
func TestProportionsAreReal(t *testing.T) {
	p := open(t, need(t, tilt).data, 1280, 900, false)
	eval[bool](p, `[...document.querySelectorAll("#sheet .fields button")].find((b) => b.textContent === "from above").click(), true`)
	all := eval[[]drawn](p, joints)
	scale := 0.0
	for i, a := range all {
		for _, b := range all[:i] {
			u, v := a.point(t), b.point(t)
			plan, paper := math.Hypot(u[0]-v[0], u[1]-v[1]), math.Hypot(a.X-b.X, a.Y-b.Y)
			if scale == 0 {
				scale = paper / plan
			}
			if math.Abs(paper-scale*plan) > 1e-7*paper {
				t.Errorf("%s to %s: %g on paper, want %g", a.Name, b.Name, paper, scale*plan)
			}
		}
	}
	p.quiet()
}

// Pointer, keys and buttons turn the machine, zoom it and set it back.
func TestTurnZoomReset(t *testing.T) {
	p := open(t, need(t, tilt).data, 1280, 900, false)
	const eye = `(({turn, tilt, zoom}) => [turn, tilt, zoom])(legwright.sheet.view.eye)`
	home := eval[[]float64](p, eye)
	p.do(chromedp.Focus(chromedp.CSS("#sheet .view")), chromedp.KeyEvent(kb.ArrowLeft), chromedp.KeyEvent(kb.ArrowUp), chromedp.KeyEvent("+"))
	turned := eval[[]float64](p, eye)
	for i, name := range []string{"turn", "tilt", "zoom"} {
		if turned[i] == home[i] {
			t.Errorf("keys do not change %s", name)
		}
	}
	p.do(chromedp.ScrollIntoView(chromedp.CSS("#sheet .view")))
	at := eval[[]float64](p, `(() => { const b = document.querySelector("#sheet .view").getBoundingClientRect(); return [b.x + b.width/2, b.y + b.height/2]; })()`)
	p.do(chromedp.DragAndDropXY(at[0], at[1], at[0]+60, at[1]+30, 5))
	if dragged := eval[[]float64](p, eye); dragged[0] == turned[0] || dragged[1] == turned[1] {
		t.Error("dragging does not turn the machine")
	}
	p.do(chromedp.Click(chromedp.CSS(`#sheet [data-do="reset"]`)))
	for i, v := range eval[[]float64](p, eye) {
		if v != home[i] {
			t.Errorf("after reset the eye is at %v, want %v", eval[[]float64](p, eye), home)
		}
	}
	p.quiet()
}

// The slider and the list of outer poses move the machine to the poses of the data.
func TestPoseControl(t *testing.T) {
	s := need(t, tilt)
	p := open(t, s.data, 1280, 900, false)
	i := eval[int](p, `legwright.store.picked`)
	detail := s.data.Designs[i].Detail
	if detail == nil {
		t.Fatal("the design shown first has no detail")
	}
	for _, k := range []int{1, len(s.data.Path) / 12, len(s.data.Path)/6 - 2} {
		eval[bool](p, fmt.Sprintf(`(() => { const x = document.querySelector('[data-do="path"]'); x.value = %d; x.dispatchEvent(new Event("input")); return true; })()`, k))
		q := eval[[]string](p, `[...document.querySelectorAll(".legs tbody tr")].map((r) => r.children[2].textContent)`)
		for leg, text := range q {
			v, err := strconv.ParseFloat(text, 64)
			if err != nil {
				t.Fatal(err)
			}
			want := 1e3 * 1e-5 * float64(detail.Path.Q[k*len(q)+leg])
			if math.Abs(v-want) > 0.051 {
				t.Errorf("pose %d, leg %d: length %v mm, want %v", k, leg+1, v, want)
			}
		}
	}
	// Arrow keys move the slider, which is a plain one.
	p.do(chromedp.Focus(chromedp.CSS(`[data-do="path"]`)), chromedp.KeyEvent(kb.Home), chromedp.KeyEvent(kb.ArrowRight))
	if got := eval[string](p, `document.querySelector("#sheet .status").textContent`); !strings.Contains(got, "pose 1 of") {
		t.Errorf("after a step from home the page says %q", got)
	}
	p.do(chromedp.Click(chromedp.CSS(`[data-do="play"]`)), chromedp.Sleep(400e6), chromedp.Click(chromedp.CSS(`[data-do="play"]`)))
	if k := eval[string](p, `document.querySelector('[data-do="path"]').value`); k == "1" {
		t.Error("the machine does not move by itself")
	}
	p.do(chromedp.Click(chromedp.CSS(`#sheet [data-do="home"]`)))
	if got := eval[string](p, `document.querySelector("#sheet .status").textContent`); got != "home" {
		t.Errorf("at home the page says %q", got)
	}
	// A design without detail names the command.
	for j := range s.data.Designs {
		if d := &s.data.Designs[j]; d.Detail == nil {
			eval[bool](p, fmt.Sprintf(`legwright.store.pick(%d), true`, j))
			if got, want := eval[string](p, `document.querySelector("#sheet .poses code").textContent`), "legwright report out --detail "+d.ID; got != want {
				t.Errorf("command %q, want %q", got, want)
			}
			break
		}
	}
	p.quiet()
}

// The files that the page links to are those that a study holds: of the designs that a search hands over, and of those that
// --detail names. The others show the command.
func TestHandOverLinks(t *testing.T) {
	s := need(t, tilt)
	has := map[int]bool{}
	for _, i := range s.front.HandedOver() {
		has[i] = true
	}
	other := 0 // the first without sheets
	for has[other] {
		other++
	}
	if other >= len(s.front.Designs)-1 {
		t.Fatal("hardly a design is without sheets, which tests nothing")
	}
	asked, err := s.again(s.front.Designs[other].ID)
	if err != nil {
		t.Fatal(err)
	}
	checkLinks(t, s.data, has)
	has[other] = true
	checkLinks(t, asked, has)
}

func checkLinks(t *testing.T, data *sheet.Data, has map[int]bool) {
	t.Helper()
	p := open(t, data, 1280, 900, false)
	for i, d := range data.Designs {
		links := eval[[]string](p, fmt.Sprintf(`legwright.store.pick(%d), [...document.querySelectorAll(".files a")].map((a) => a.getAttribute("href"))`, i))
		want := []string{"designs/" + d.ID + ".yaml"}
		command := []string{"legwright report out --detail " + d.ID}
		if has[i] {
			command = []string{}
			for _, n := range study.SheetNames() {
				want = append(want, "designs/"+d.ID+"/"+n)
			}
		}
		slices.Sort(links)
		slices.Sort(want)
		if !slices.Equal(links, want) {
			t.Fatalf("design %s: links %q, want %q", d.ID, links, want)
		}
		if got := eval[[]string](p, `[...document.querySelectorAll("#files code")].map((c) => c.textContent)`); !slices.Equal(got, command) {
			t.Fatalf("design %s: commands %q, want %q", d.ID, got, command)
		}
	}
	p.quiet()
}

// Two designs lie in one drawing, and their differences are those of the data.
func TestCompare(t *testing.T) {
	s := need(t, tilt)
	p := open(t, s.data, 1440, 900, false)
	a, b := eval[int](p, `legwright.store.picked`), len(s.data.Designs)-1
	eval[bool](p, fmt.Sprintf(`(() => { const x = document.querySelectorAll("#two select")[1]; x.value = %d; x.dispatchEvent(new Event("change")); return true; })()`, b))
	for _, layer := range []string{"a", "b"} {
		if n := eval[int](p, fmt.Sprintf(`document.querySelectorAll("#two .machine.%s [data-joint]").length`, layer)); n != 12 {
			t.Errorf("%d joints of machine %s, want 12", n, layer)
		}
	}
	goal := s.data.Goals[2].Measure // a length, shown in mm
	u, v := float64(s.data.Designs[a].Measures[goal]), float64(s.data.Designs[b].Measures[goal])
	row := eval[[]string](p, `[...document.querySelectorAll(".differences tbody tr")[2].children].map((c) => c.textContent)`)
	if !strings.HasPrefix(row[0], "footprint") {
		t.Fatalf("third row: %q", row)
	}
	for i, want := range []float64{1000 * u, 1000 * v, 1000 * (v - u)} {
		text, _, _ := strings.Cut(strings.ReplaceAll(row[i+1], "−", "-"), "(")
		if _, after, ok := strings.Cut(text, ","); ok { // ▲ better, or ▼ worse
			word := "worse"
			if v < u { // less footprint is better
				word = "better"
			}
			if !strings.Contains(row[i+1], word) {
				t.Errorf("the difference from %g to %g is %q, want %s", u, v, row[i+1], word)
			}
			text = after
		} else if i == 2 {
			t.Errorf("the difference %q says neither better nor worse", row[i+1])
		}
		got, err := strconv.ParseFloat(strings.TrimSpace(text), 64)
		if err != nil || math.Abs(got-want) > 0.5+0.005*math.Abs(want) {
			t.Errorf("column %d of the footprint: %q, want %g", i+1, row[i+1], want)
		}
	}
	eval[bool](p, `[...document.querySelectorAll("#two button")].find((x) => x.textContent === "swap").click(), true`)
	if got := eval[[]int](p, `[legwright.store.picked, legwright.store.other]`); got[0] != b || got[1] != a {
		t.Errorf("after swapping: %v, want %v", got, []int{b, a})
	}
	p.quiet()
}
