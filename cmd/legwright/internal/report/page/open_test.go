package page

import (
	"bytes"
	"encoding/json"
	"regexp"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/sheet"
)

// The page of real studies and of a large front opens from a file, says nothing on the console and
// asks for nothing.
func TestOpensAlone(t *testing.T) {
	for name, d := range map[string]*sheet.Data{"one family": need(t, tilt).data, "three families": need(t, drives).data, "500 designs": made(500, "Large front"), "one design": made(1, "Alone"), "none": made(0, "Nothing found")} {
		t.Run(name, func(t *testing.T) {
			p := open(t, d, 1280, 800, false)
			if got, want := eval[string](p, `document.querySelector("h1").textContent`), d.Title; got != want {
				t.Errorf("heading %q, want %q", got, want)
			}
			if len(d.Designs) > 0 {
				if got := eval[int](p, `document.querySelectorAll(".few thead th").length`); got != len(d.First) {
					t.Errorf("%d designs on the first screen, want %d", got, len(d.First))
				}
			}
			if over := eval[float64](p, `document.documentElement.scrollWidth - innerWidth`); over > 0 {
				t.Errorf("the page is %g px broader than the window", over)
			}
			p.quiet()
		})
	}
}

// Where nothing is feasible the page says what would have to give, and shows no empty parts.
func TestNothingFeasible(t *testing.T) {
	d := made(0, "Nothing found")
	d.Help = []string{"leg_force: raise the limit to 3100 N"}
	d.Nearest = []sheet.Nearest{{Number: 3, Text: "6-UPS, base_radius 700 mm", Broken: [][4]string{{"leg_force", "3100 N", "at most 3000 N", "-3.3 %"}}}}
	p := open(t, d, 1280, 800, false)
	if got, want := eval[string](p, `[...document.querySelectorAll(".nearest tbody td, .nearest tbody th")].map((c) => c.textContent).join("; ")`), "3; "+strings.Join(d.Nearest[0].Broken[0][:], "; "); got != want {
		t.Errorf("nearest designs %q, want %q", got, want)
	}
	if got := eval[string](p, `document.querySelector("#choose li").textContent`); got != d.Help[0] {
		t.Errorf("the page advises %q, want %q", got, d.Help[0])
	}
	if got := eval[int](p, `[...document.querySelectorAll("main > section")].filter((s) => s.checkVisibility()).length`); got != 2 {
		t.Errorf("%d parts are shown, want 2", got)
	}
	p.quiet()
}

// At both ends of the widths nothing but framed tables is broader than the window.
func TestWidths(t *testing.T) {
	for _, width := range []int64{360, 768, 2560} {
		p := open(t, need(t, drives).data, width, 900, true)
		if over := eval[float64](p, `document.documentElement.scrollWidth - innerWidth`); over > 0 {
			t.Errorf("at %d px the page is %g px too broad", width, over)
		}
		p.quiet()
	}
}

// The policy in the page keeps even its own script from asking for anything.
func TestPolicyForbidsNetwork(t *testing.T) {
	p := open(t, made(3, "Policy"), 1280, 800, false)
	got := eval[string](p, `new Promise((done) => {
		document.addEventListener("securitypolicyviolation", (e) => done(e.effectiveDirective));
		const i = new Image(); i.src = "http://127.0.0.1:9/x.png"; document.body.append(i);
		setTimeout(() => done("nothing"), 3000);
	})`, awaited)
	if got != "img-src" {
		t.Errorf("an image from outside was stopped by %q, want img-src", got)
	}
	got = eval[string](p, `new Promise((done) => {
		document.addEventListener("securitypolicyviolation", (e) => done(e.effectiveDirective));
		const s = document.createElement("script"); s.textContent = "window.planted = 1"; document.body.append(s);
		setTimeout(() => done("nothing"), 3000);
	})`, awaited)
	if !strings.HasPrefix(got, "script-src") || eval[bool](p, `"planted" in window`) {
		t.Errorf("a script added later was stopped by %q, want script-src", got)
	}
}

// Planted text stays text wherever a study's words are shown.
func TestPlantedTextStaysText(t *testing.T) {
	const planted = `</script><script>window.planted = 1</script><img src=x onerror="window.planted = 2"> ]]> javascript:alert(1) "quotes" & ` +
		"\u202Edesrever\u202C \u2066kept apart\u2069 \u2028line\u2029 end"
	d := made(40, planted)
	d.Notes, d.Steps, d.Cases[0], d.Zones[0].Name, d.Folder = []string{planted}, []string{planted}, planted, planted, planted
	d.Designs[0].Marks, d.Designs[0].Notes = []string{planted}, []string{planted}
	d.Brief.Limits, d.Brief.File = []string{planted}, planted
	b, err := WritePage(d)
	if err != nil {
		t.Fatal(err)
	}
	if n := bytes.Count(b, []byte("</script>")); n != 2 {
		t.Errorf("%d ends of scripts in the file, want 2", n)
	}
	if bytes.ContainsAny(b, "\u2028\u2029") {
		t.Error("a line separator is in the file as such")
	}
	p := open(t, d, 1280, 800, false)
	if got := eval[string](p, `document.querySelector("h1").textContent`); got != planted {
		t.Errorf("heading %q, want %q", got, planted)
	}
	if got := eval[string](p, `getComputedStyle(document.querySelector("h1 bdi")).unicodeBidi`); !strings.HasPrefix(got, "isolate") {
		t.Errorf("marks of direction in the title reach its neighbours: unicode-bidi is %s", got)
	}
	if eval[bool](p, `"planted" in window || document.images.length > 0 || document.scripts.length !== 2`) {
		t.Error("planted text became markup")
	}
	if got := eval[int](p, `[...document.querySelectorAll("a")].filter((a) => !/^(#|designs\/)/.test(a.getAttribute("href"))).length`); got != 0 {
		t.Errorf("%d links lead elsewhere", got)
	}
	p.quiet()
}

// What stands in the file is what the data say: the block reads back to the same JSON.
func TestDataInTheFile(t *testing.T) {
	d := made(20, "Round <trip> & back")
	b, err := WritePage(d)
	if err != nil {
		t.Fatal(err)
	}
	block := regexp.MustCompile(`(?s)<script id="data" type="application/json">(.*?)</script>`).FindSubmatch(b)
	if block == nil {
		t.Fatal("no data in the file")
	}
	var got, want any
	text, err := json.Marshal(d)
	if err != nil {
		t.Fatal(err)
	}
	if err := json.Unmarshal(block[1], &got); err != nil {
		t.Fatal(err)
	}
	if err := json.Unmarshal(text, &want); err != nil {
		t.Fatal(err)
	}
	a, _ := json.Marshal(got)
	c, _ := json.Marshal(want)
	if !bytes.Equal(a, c) {
		t.Error("the data in the file are not those given")
	}
	if strings.Contains(string(b), "http://") && strings.Count(string(b), "http://") != strings.Count(string(b), "http://www.w3.org/2000/svg") {
		t.Error("the file names an address")
	}
}
