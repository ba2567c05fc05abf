package brief

import (
	"math"
	"math/rand/v2"
	"path/filepath"
	"reflect"
	"strings"
	"testing"

	"legwright/cmd/legwright/internal/units"
)

const slider = `brief: ../brief.yaml
family: 6-PUS
dimensions: {base_radius: 500 mm, platform_radius: 300 mm, base_half_angle: 9 deg, platform_half_angle: 9 deg, home_height: 1 m, rail_slope: 30 deg, rod_length: 1 m, travel_min: -20 mm, travel: 300 mm}
`

const pushed = `family: 3-RPR
dimensions: {home_heading: 30 deg, leg_min: 300 mm, stroke: 200 mm}
joints:
  base: [[1 m, 0 m, 0 m], [0 m, 1 m, 0 m], [-1 m, 0 m, 0 m]]
  platform: [[10 cm, 0 m, 0 m], [0 m, 10 cm, 0 m], [-10 cm, 0 m, 0 m]]
`

func TestParseDesign(t *testing.T) {
	deg := math.Pi / 180
	d, err := ParseDesign("study/designs/007.yaml", []byte(slider), known())
	if err != nil {
		t.Fatal(err)
	}
	if want := filepath.Join("study", "brief.yaml"); d.BriefFile() != want {
		t.Errorf("brief %s, want %s", d.BriefFile(), want)
	}
	want := map[string]float64{"base_radius": 0.5, "platform_radius": 0.3, "base_half_angle": 9 * deg,
		"platform_half_angle": 9 * deg, "home_height": 1, "rail_slope": 30 * deg, "rod_length": 1, "travel_min": -0.02, "travel": 0.3}
	if got := d.Values(); !reflect.DeepEqual(got, want) {
		t.Errorf("got %v, want %v", got, want)
	}
	d, err = ParseDesign("d.yaml", []byte(pushed), known())
	if err != nil {
		t.Fatal(err)
	}
	if d.Joints.Base[2] != [3]float64{-1, 0, 0} || d.Joints.Platform[1] != [3]float64{0, 0.1, 0} {
		t.Errorf("joints %+v", d.Joints)
	}
	toml := "family = '3-RPR'\nhome = ['0 m', '0 m', '0 m', '0 deg', '0 deg', '30 deg']\n[dimensions]\nleg_min = '300 mm'\nstroke = '200 mm'\nbase_radius = '1 m'\nplatform_radius = '200 mm'\nleg_azimuths = ['90 deg', '200 deg', '330 deg']\n"
	d, err = ParseDesign("d.toml", []byte(toml), known())
	if err != nil {
		t.Fatal(err)
	}
	if v := d.Values()["leg_azimuths_2"]; v != 200*deg || d.Home[5] != 30*deg {
		t.Errorf("azimuth %v, home %v", v, d.Home)
	}
}

func TestDesignRefused(t *testing.T) {
	for _, c := range []struct{ why, text, old, new, want string }{
		{"unknown key", slider, "brief:", "breif:", `d.yaml:1:1: breif: unknown key "breif"; did you mean brief?`},
		{"two families", slider, "6-PUS", "[6-PUS, 6-UPS]", "family: a design has one family"},
		{"no family", slider, "family: 6-PUS\n", "", "family: is missing"},
		{"no dimensions", slider, slider[strings.Index(slider, "dimensions"):], "", "d.yaml:1:1: dimensions: is missing"},
		{"range", slider, "base_radius: 500 mm", "base_radius: [500 mm, 600 mm]", "a design has one value for each dimension"},
		{"sized", slider, "travel: 300 mm", "travel: sized", "dimensions.travel: a design has one value"},
		{"no unit", slider, "travel: 300 mm", "travel: 300", "dimensions.travel: 300 has no unit"},
		{"dimension missing", slider, ", rod_length: 1 m", "", "dimensions.rod_length: is missing"},
		{"misspelt", slider, "rod_length", "rod_lenght", `unknown key "rod_lenght"; did you mean rod_length?`},
		{"joints twice", pushed, "home_heading", "base_radius: 1 m, home_heading", "d.yaml:2:14: dimensions.base_radius: joints on line 3 gives it outright; leave one of them out"},
		{"home twice", pushed, "joints:", "home: [0 m, 0 m, 0 m, 0 deg, 0 deg, 9 deg]\njoints:", "dimensions.home_heading: home on line 3 gives it outright"},
		{"two joints", pushed, ", [-1 m, 0 m, 0 m]", "", "joints.base: has 2 items; write one for each leg, 3 in all"},
		{"no base", pushed, "base:", "bas:", `joints.bas: unknown key "bas"; did you mean base?`},
		{"no platform", pushed, pushed[strings.Index(pushed, "  platform"):], "", "joints.platform: is missing"},
		{"flat joint", pushed, "[1 m, 0 m, 0 m]", "[1 m, 0 m]", "joints.base[0]: has 2 items"},
		{"rails", pushed, "joints:", "rails: []\njoints:", "3-RPR takes no rails outright"},
		{"no rail", slider, "dimensions:", "rails: [{point: [0 m, 0 m, 0 m]}]\ndimensions:", "rails: has 1 items; write one for each leg, 6 in all"},
		{"home of five", pushed, "joints:", "home: [0 m, 0 m, 0 m, 0 deg, 0 deg]\njoints:", "home: has 5 items"},
	} {
		t.Run(c.why, func(t *testing.T) {
			if _, err := ParseDesign("d.yaml", []byte(c.text), known()); err != nil {
				t.Fatal(err)
			}
			_, err := ParseDesign("d.yaml", []byte(strings.Replace(c.text, c.old, c.new, 1)), known())
			if err == nil || !strings.Contains(err.Error(), c.want) {
				t.Errorf("got\n%v\nwant\n%s", err, c.want)
			}
		})
	}
}

// What Encode writes reads back to the same bits, whatever the numbers and texts.
func TestEncodeReadsBack(t *testing.T) {
	rnd := rand.New(rand.NewPCG(1, 2))
	number := func() float64 { return (rnd.Float64() - 0.5) * math.Pow(10, rnd.Float64()*40-20) }
	point := func() [3]float64 { return [3]float64{number(), number(), math.Copysign(0, -1)} }
	for range 200 {
		d := Design{Brief: "../a \"b\": #c.yaml", ID: "007\u007f", Title: "é\n\u2028\U0001f529 '#: {", Family: "6-PUS", Joints: &DesignJoints{}, Home: &[6]float64{}}
		for _, k := range []struct {
			name string
			kind units.Kind
		}{{"rod_length", units.Length}, {"travel_min", units.Length}, {"travel", units.Length}} {
			d.Dimensions = append(d.Dimensions, DesignDimension{k.name, k.kind, []float64{math.Abs(number())}})
		}
		for i := range 6 {
			d.Joints.Platform = append(d.Joints.Platform, point())
			d.Joints.Base = append(d.Joints.Base, point())
			d.Rails = append(d.Rails, Rail{point(), point()})
			d.Home[i] = number()
		}
		roundTrip(t, d)
	}
	roundTrip(t, Design{Family: "3-RPR", Dimensions: []DesignDimension{
		{"base_radius", units.Length, []float64{1}},
		{"platform_radius", units.Length, []float64{0.1 + 0.2}},
		{"leg_azimuths", units.Angle, []float64{1, 1e-17, -3}},
		{"home_heading", units.Angle, []float64{math.Nextafter(1, 2)}},
		{"leg_min", units.Length, []float64{5e-324}},
		{"stroke", units.Length, []float64{math.MaxFloat64}},
	}})
	roundTrip(t, Design{Family: "6-RUS", Dimensions: []DesignDimension{
		{"base_radius", units.Length, []float64{1}},
		{"platform_radius", units.Length, []float64{1}},
		{"base_half_angle", units.Angle, []float64{1}},
		{"platform_half_angle", units.Angle, []float64{1}},
		{"home_height", units.Length, []float64{1}},
		{"crank_length", units.Length, []float64{1}},
		{"rod_length", units.Length, []float64{1}},
		{"mode", units.Sign, []float64{-1}},
		{"angle_min", units.Angle, []float64{-1}},
		{"angle_range", units.Angle, []float64{1}},
	}})
}

func roundTrip(t *testing.T, d Design) {
	t.Helper()
	text := d.Encode()
	got, err := ParseDesign("d.yaml", text, known())
	if err != nil {
		t.Fatalf("%v\n%s", err, text)
	}
	got.places = places{}
	if !reflect.DeepEqual(*got, d) {
		t.Fatalf("got  %+v\nwant %+v\n%s", *got, d, text)
	}
	if math.Signbit(d.Dimensions[0].Values[0]) != math.Signbit(got.Dimensions[0].Values[0]) ||
		d.Joints != nil && !math.Signbit(got.Joints.Base[0][2]) {
		t.Fatal("the sign of zero is lost")
	}
}

func TestEncodeRefusesNaN(t *testing.T) {
	defer func() {
		if recover() == nil {
			t.Error("no panic")
		}
	}()
	(&Design{Family: "delta", Dimensions: []DesignDimension{{"arm", units.Length, []float64{math.NaN()}}}}).Encode()
}
