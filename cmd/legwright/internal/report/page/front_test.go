package page

import (
	"encoding/json"
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"legwright/cmd/legwright/internal/study"

	"github.com/chromedp/chromedp"
	"github.com/chromedp/chromedp/kb"
)

// A range on an axis filters the scatter, the lines and the table alike; the designs kept are those that
// the data say.
func TestFilterIsLinked(t *testing.T) {
	s := need(t, tilt)
	p := open(t, s.data, 1440, 900, false)
	// By keys: forty steps of one percent down from the top of the second goal's axis.
	p.do(chromedp.Focus(chromedp.CSS(`[data-axis="m:leg_force"][data-end="high"]`)))
	for range 4 {
		p.do(chromedp.KeyEvent(kb.PageDown)) // ten steps
	}
	var low, high = math.Inf(1), math.Inf(-1)
	for _, d := range s.front.Designs {
		v := float64(d.Measures["leg_force"])
		low, high = min(low, v), max(high, v)
	}
	bound := eval[float64](p, `legwright.store.ranges.get("m:leg_force")[1]`)
	if want := high - 0.4*(high-low); math.Abs(bound-want) > 1e-9*want {
		t.Errorf("bound %g, want %g", bound, want)
	}
	want := 0
	for _, d := range s.front.Designs {
		if float64(d.Measures["leg_force"]) <= bound {
			want++
		}
	}
	if want == 0 || want == len(s.front.Designs) {
		t.Fatalf("%d designs are left, which tests nothing", want)
	}
	for _, where := range []string{".scatter .dot:not(.out)", ".parallel .lines path:not(.out)"} {
		if got := eval[int](p, fmt.Sprintf(`document.querySelectorAll(%q).length`, where)); got != want {
			t.Errorf("%s: %d designs, want %d", where, got, want)
		}
	}
	// The table lists kept ones only, all of them once its groups are open; a printer is given all at once.
	eval[bool](p, `dispatchEvent(new Event("beforeprint")), true`)
	eval[bool](p, `[...document.querySelectorAll("#ranked button")].find((b) => b.textContent === "list all").click(), true`)
	eval[bool](p, `[...document.querySelectorAll(".twin:not([hidden])")].forEach((b) => b.click()), true`)
	rows := eval[[]int](p, `[...document.querySelectorAll(".ranked tbody tr[data-design]")].map((r) => Number(r.dataset.design))`)
	if len(rows) != want {
		t.Errorf("the table has %d rows, want %d", len(rows), want)
	}
	for _, i := range rows {
		if v := float64(s.data.Designs[i].Measures[s.data.Goals[1].Measure]); v > bound {
			t.Errorf("the table shows design %d with %g above %g", i, v, bound)
		}
	}
	// A chip takes the range away.
	p.do(chromedp.Click(chromedp.CSS(".chip")))
	if got := eval[int](p, `document.querySelectorAll(".dot.out, .lines .out").length`); got != 0 {
		t.Errorf("%d signs stay left out without a range", got)
	}
	p.quiet()
}

// Dragging along an axis keeps what lies between; a double click takes the range away.
func TestDragSetsRange(t *testing.T) {
	p := open(t, need(t, tilt).data, 1440, 900, false)
	p.do(chromedp.ScrollIntoView(chromedp.CSS(".parallel")))
	const rail = `document.querySelector(".rail .touch").getBoundingClientRect()`
	x, y, height := eval[float64](p, rail+".x+"+rail+".width/2"), eval[float64](p, rail+".y"), eval[float64](p, rail+".height")
	p.do(chromedp.DragAndDropXY(x, y+0.25*height, x, y+0.75*height, 8), chromedp.Sleep(100e6))
	got := eval[[]float64](p, `(() => { const a = legwright.model.axes[0], r = legwright.store.ranges.get(a.key); return r.map((v) => (v - a.low) / (a.high - a.low)); })()`)
	if math.Abs(got[0]-0.25) > 0.01 || math.Abs(got[1]-0.75) > 0.01 {
		t.Errorf("dragged over %v of the axis, want 0.25 to 0.75", got)
	}
	p.do(chromedp.MouseClickXY(x, y+0.5*height, chromedp.ClickCount(2)))
	if n := eval[int](p, `legwright.store.ranges.size`); n != 0 {
		t.Errorf("%d ranges after a double click, want none", n)
	}
	p.quiet()
}

// The order of the page is that of the program, digit for digit.
func TestOrderIsThatOfRank(t *testing.T) {
	for _, s := range []*searched{need(t, tilt), need(t, drives)} {
		p := open(t, s.data, 1280, 800, false)
		rnd := rand.New(rand.NewPCG(7, 11))
		for range 50 {
			weights := map[string]float64{}
			var list []float64
			for i, g := range s.front.Goals {
				w := math.Round(100*rnd.Float64()) / 20
				if i == 0 && w == 0 {
					w = 1
				}
				weights[g.Measure] = w
				list = append(list, w)
			}
			f := *s.front
			f.Designs = slices.Clone(s.front.Designs)
			study.Rank(&f, weights)
			text, err := json.Marshal(list)
			if err != nil {
				t.Fatal(err)
			}
			type order struct {
				IDs    []string  `json:"ids"`
				Scores []float64 `json:"scores"`
			}
			got := eval[order](p, fmt.Sprintf(`(() => { const {store, model} = legwright; store.weigh(%s);
				return {ids: store.order.map((i) => model.designs[i].id), scores: store.order.map((i) => store.score[i])}; })()`, text))
			for i := range f.Designs {
				if got.IDs[i] != f.Designs[i].ID || got.Scores[i] != float64(f.Designs[i].Score) {
					t.Fatalf("weights %v, place %d: design %s with %v, want %s with %v", list, i+1, got.IDs[i], got.Scores[i], f.Designs[i].ID, f.Designs[i].Score)
				}
			}
		}
		p.quiet()
	}
}

// A weight that is typed or slid orders the table at once; weights without a sum are refused in words.
func TestWeightsOrderTheTable(t *testing.T) {
	s := need(t, tilt)
	p := open(t, s.data, 1280, 800, false)
	eval[bool](p, `(() => { const n = document.querySelectorAll(".weight input[type=number]"); n.forEach((x, i) => { x.value = i === 2 ? "3" : "0.5"; x.dispatchEvent(new Event("input")); }); return true; })()`)
	f := *s.front
	f.Designs = slices.Clone(s.front.Designs)
	study.Rank(&f, map[string]float64{f.Goals[0].Measure: 0.5, f.Goals[1].Measure: 0.5, f.Goals[2].Measure: 3})
	if got := eval[string](p, `document.querySelector(".ranked tbody .pick").textContent`); got != f.Designs[0].ID {
		t.Errorf("first in the table: %s, want %s", got, f.Designs[0].ID)
	}
	if got, want := eval[string](p, `document.querySelector(".command code").textContent`), "legwright rank out --weight conditioning=0.5 --weight leg_force=0.5 --weight footprint=3"; got != want {
		t.Errorf("command %q, want %q", got, want)
	}
	eval[bool](p, `(() => { document.querySelectorAll(".weight input[type=range]").forEach((x) => { x.value = "0"; x.dispatchEvent(new Event("input")); }); return true; })()`)
	if got := eval[string](p, `document.querySelector("#filters .bad").textContent`); got == "" {
		t.Error("weights that are all 0 are not refused")
	}
	p.quiet()
}

// What is picked in one place is picked in all.
func TestPickingIsLinked(t *testing.T) {
	s := need(t, tilt)
	p := open(t, s.data, 1440, 900, false)
	check := func(how string, i int) {
		t.Helper()
		id := s.data.Designs[i].ID
		if got := eval[string](p, `document.querySelector("#now b").textContent`); got != id {
			t.Errorf("%s: the heading says %s, want %s", how, got, id)
		}
		if got := eval[string](p, `document.querySelector(".which .id").textContent`); got != id {
			t.Errorf("%s: the sheet is that of %s, want %s", how, got, id)
		}
		if got := eval[string](p, `document.querySelector(".halo text.a").textContent`); got != id {
			t.Errorf("%s: the scatter rings %s, want %s", how, got, id)
		}
		if got := eval[int](p, `document.querySelectorAll(".parallel .top path.a").length`); got != 1 {
			t.Errorf("%s: %d lines stand out, want 1", how, got)
		}
		if got := eval[string](p, `document.querySelector("#two select").value`); got != fmt.Sprint(i) {
			t.Errorf("%s: design %s is compared, want %d", how, got, i)
		}
	}
	last := s.data.First[len(s.data.First)-1].Design
	p.do(chromedp.Click(chromedp.CSS(fmt.Sprintf(`.few [data-pick="%s"]`, s.data.Designs[last].ID))))
	check("first screen", last)
	p.do(chromedp.Click(chromedp.CSS(`.ranked tbody tr:nth-child(3) .pick`)))
	check("table", eval[int](p, `Number(document.querySelector(".ranked tbody tr:nth-child(3)").dataset.design)`))
	p.do(chromedp.ScrollIntoView(chromedp.CSS(".scatter")))
	// The sign that stands most by itself.
	at := eval[[]float64](p, `(() => {
		const at = [...document.querySelectorAll(".dot")].map((d) => d.getBoundingClientRect()).map((m) => [m.x + m.width/2, m.y + m.height/2]);
		const room = at.map(([x, y], i) => Math.min(...at.filter((_, j) => j !== i).map(([u, v]) => Math.hypot(u - x, v - y))));
		const i = room.indexOf(Math.max(...room));
		return [i, ...at[i]];
	})()`)
	p.do(chromedp.MouseClickXY(at[1], at[2]))
	check("scatter", int(at[0]))
	// By keys alone.
	p.do(chromedp.Focus(chromedp.CSS(`.ranked tbody tr:nth-child(2) .pick`)), chromedp.KeyEvent("\r"))
	check("keys", eval[int](p, `Number(document.querySelector(".ranked tbody tr:nth-child(2)").dataset.design)`))
	p.quiet()
}

// Families that are left out are left out everywhere, and are told apart by shape and word.
func TestFamiliesByShapeAndWord(t *testing.T) {
	s := need(t, drives)
	p := open(t, s.data, 1440, 900, false)
	shapes := eval[int](p, `new Set([...document.querySelectorAll(".dot")].map((d) => d.getAttribute("d"))).size`)
	families := eval[int](p, `legwright.model.families.length`)
	if shapes != families || families < 2 {
		t.Errorf("%d shapes for %d families", shapes, families)
	}
	p.do(chromedp.Click(chromedp.CSS(`.families input`)))
	gone := eval[string](p, `legwright.model.families[0]`)
	want := 0
	for _, d := range s.front.Designs {
		if d.Family != gone {
			want++
		}
	}
	if got := eval[int](p, `document.querySelectorAll(".dot:not(.out)").length`); got != want {
		t.Errorf("%d designs without %s, want %d", got, gone, want)
	}
	p.quiet()
}

// A mark that warns or tells of a proof is no reason to be on the first screen: it stands in a row of its own.
func TestWarningsAreNoReasons(t *testing.T) {
	d := made(40, "Warnings")
	i := d.First[0].Design
	d.Designs[i].Marks = []string{"knee", "proved to 3 %", study.MarkCrosses}
	d.Designs[i].Proof, d.Designs[i].Proved = "proved", "every limit is proved over the duty"
	p := open(t, d, 1280, 800, false)
	rows := eval[[][]string](p, `[...document.querySelectorAll(".few tbody tr")].map((r) => [...r.children].slice(0, 2).map((c) => c.textContent))`)
	want := map[string]string{"why it is here": "knee", "checked": "proved to 3 %", "singularity within its strokes": "met"}
	for _, r := range rows {
		if w, ok := want[r[0]]; ok {
			if r[1] != w {
				t.Errorf("%s: %q, want %q", r[0], r[1], w)
			}
			delete(want, r[0])
		}
	}
	if len(want) > 0 {
		t.Errorf("rows missing: %v", want)
	}
	// The table says the same in a column of its own, with three states.
	d.Designs[1].Stroke = "no singularity was met"
	p = open(t, d, 1280, 800, false)
	for j, w := range map[int]string{i: "met", 1: "none found", 2: "not looked at"} {
		got := eval[string](p, fmt.Sprintf(`dispatchEvent(new Event("beforeprint")), [...document.querySelectorAll("#ranked button")].filter((b) => b.textContent === "list all").forEach((b) => b.click()),
			[...document.querySelectorAll(".twin:not([hidden])")].filter((b) => b.getAttribute("aria-expanded") === "false").forEach((b) => b.click()),
			document.querySelector('.ranked [data-design="%d"] .beyond').textContent`, j))
		if got != w {
			t.Errorf("design %d: %q, want %q", j, got, w)
		}
	}
	p.quiet()
}
