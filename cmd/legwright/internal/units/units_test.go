package units

import (
	"encoding/json"
	"errors"
	"math"
	"math/rand/v2"
	"strings"
	"testing"
	"unicode"
)

// Factors from the SI Brochure (9th edition, 2019); the inch is 25.4 mm and standard gravity
// 9.80665 m/s² by definition; turns by hand.
func TestParse(t *testing.T) {
	for _, c := range []struct {
		text string
		kind Kind
		want float64
	}{
		{"650 mm", Length, 0.65},
		{"650.1mm", Length, 0.6501},
		{" 6.5e2  mm ", Length, 0.65},
		{"-1.5 cm", Length, -0.015},
		{"+.5 m", Length, 0.5},
		{"3. m", Length, 3},
		{"10 um", Length, 10e-6},
		{"10 µm", Length, 10e-6},
		{"10 μm", Length, 10e-6},
		{"1 in", Length, 0.0254},
		{"180 deg", Angle, math.Pi},
		{"180°", Angle, math.Pi},
		{"1 rad", Angle, 1},
		{"2 mrad", Angle, 0.002},
		{"3 kN", Force, 3000},
		{"0.1 MN", Force, 1e5},
		{"2 N m", Torque, 2},
		{"2 Nm", Torque, 2},
		{"2 N·m", Torque, 2},
		{"2 kN m", Torque, 2000},
		{"2 N mm", Torque, 0.002},
		{"2 t", Mass, 2000},
		{"250 g", Mass, 0.25},
		{"40 kg m2", Inertia, 40},
		{"40 kg m^2", Inertia, 40},
		{"40 kg·m²", Inertia, 40},
		{"40 kgm2", Inertia, 40},
		{"40 kg mm2", Inertia, 40e-6},
		{"0.4 m/s", Speed, 0.4},
		{"400 mm/s", Speed, 0.4},
		{"0.5 rad/s", AngularSpeed, 0.5},
		{"360 deg/s", AngularSpeed, 2 * math.Pi},
		{"60 rpm", AngularSpeed, 2 * math.Pi},
		{"4 m/s2", Acceleration, 4},
		{"4 m/s^2", Acceleration, 4},
		{"4 m/s²", Acceleration, 4},
		{"4000 mm/s2", Acceleration, 4},
		{"2 g", Acceleration, 19.6133},
		{"180 deg/s2", AngularAcceleration, math.Pi},
		{"1.5 kW", Power, 1500},
		{"30 N/um", Stiffness, 30e6},
		{"30 N/µm", Stiffness, 30e6},
		{"30 N/mm", Stiffness, 30e3},
		{"30 kN/mm", Stiffness, 30e6},
		{"5 kN m/rad", TurnStiffness, 5000},
		{"1 N m/deg", TurnStiffness, 180 / math.Pi},
		{"210 GPa", Pressure, 210e9},
		{"95 %", Ratio, 0.95},
		{"95%", Ratio, 0.95},
		{"0.95", Ratio, 0.95},
		{"1e-6", Ratio, 1e-6},
		{"7", Count, 7},
		{"-1", Sign, -1},
		{"200 mm/rad", Gain, 0.2},
	} {
		got, kind, err := Parse(c.text, c.kind)
		if err != nil || kind != c.kind || math.Abs(got-c.want) > 1e-15*math.Abs(c.want) {
			t.Errorf("%q as %v: %v, %v, %v; want %v", c.text, c.kind, got, kind, err, c.want)
		}
	}
}

func TestIsNumber(t *testing.T) {
	for _, s := range []string{"0", "-1", "+1.", ".5", "1.5e-3", "2E+7", "007"} {
		if !IsNumber(s) {
			t.Errorf("%q is a number", s)
		}
	}
	for _, s := range []string{"", "+", ".", "-.", "e5", "1e", "1e+", "1.2.3", "0x1", "1_0", "inf", "NaN", " 1", "1 "} {
		if IsNumber(s) {
			t.Errorf("%q is no number", s)
		}
	}
}

// A decimal number in a decimal unit is the float64 nearest to the quantity.
func TestParseNearest(t *testing.T) {
	for text, want := range map[string]float64{"0.3 mm": 0.0003, "1234.567 mm": 1.234567, "0.1 um": 1e-7, "70.7 kN": 70700, "14.3 %": 0.143, "3.3 N/um": 3.3e6} {
		got, _, err := Parse(text, Length, Force, Ratio, Stiffness)
		if err != nil || got != want {
			t.Errorf("%s: %v, %v; want %v", text, got, err, want)
		}
	}
}

func TestParseChoosesKind(t *testing.T) {
	for text, want := range map[string]Kind{"3 m/s": Speed, "3 rad/s": AngularSpeed} {
		if _, k, err := Parse(text, Speed, AngularSpeed); err != nil || k != want {
			t.Errorf("%s: %v, %v", text, k, err)
		}
	}
}

func TestParseRefuses(t *testing.T) {
	for _, c := range []struct {
		text string
		kind Kind
		want string
	}{
		{"", Length, `"" is not a quantity; write one such as 650 mm`},
		{"mm", Length, `"mm" is not a quantity`},
		{"650", Length, "650 has no unit; write it as a quantity, such as 650 mm"},
		{"650 kg", Length, "kg is a unit of mass, not of length; write one of mm, cm, m, um, in"},
		{"650 kn", Force, `unknown unit "kn"; did you mean 650 kN?`},
		{"650 furlong", Length, `unknown unit "furlong"; write one of mm`},
		{"6,5 mm", Length, "write a decimal point: 6.5 mm"},
		{"6 500 mm", Length, "has two numbers"},
		{"6_500 mm", Length, "has an underscore"},
		{"nan mm", Length, "is not a finite number"},
		{"-Inf mm", Length, "is not a finite number"},
		{"1e400 mm", Length, "beyond the range"},
		{"1e999999999999 mm", Length, "beyond the range"},
		{"1e308 MN", Force, "beyond the range"},
		{"1e-330 mm", Length, "too small"},
		{"0x10 mm", Length, "is not a decimal number"},
		{"1 mm mm", Length, `unknown unit "mm mm"`},
		{"5 mm", Ratio, "mm is a unit of length, not of ratio; write one of %, no unit"},
		{strings.Repeat("1", 200) + " mm", Length, "too long"},
	} {
		v, _, err := Parse(c.text, c.kind)
		var e *Error
		if !errors.As(err, &e) || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%q: %v, %v; want %s", c.text, v, err, c.want)
		}
	}
}

// Every kind but the bare ones has its SI unit, the unit of screens and the sample in the table.
func TestKindsComplete(t *testing.T) {
	for k := range kinds {
		if _, _, err := Parse(k.Sample(), k); err != nil {
			t.Errorf("sample of %v: %v", k, err)
		}
		if k.Bare() {
			continue
		}
		for _, symbol := range []string{forms[k].si, forms[k].display} {
			if _, ok := find(symbol, k); !ok {
				t.Errorf("%v has no unit %s", k, symbol)
			}
		}
		if si, _ := find(forms[k].si, k); si.Exp != 0 || si.Factor != 1 {
			t.Errorf("%s is not the SI unit of %v", forms[k].si, k)
		}
		if u, err := Lookup(Suffix(k), k); err != nil && !strings.Contains(Suffix(k), "_") || err == nil && u != Display(k) {
			t.Errorf("suffix %s of %v: %v", Suffix(k), k, err)
		}
	}
}

// No spelling may stand for two units of one kind.
func TestTableUnambiguous(t *testing.T) {
	seen := map[Kind]map[string]bool{}
	for _, u := range table {
		if seen[u.Kind] == nil {
			seen[u.Kind] = map[string]bool{}
		}
		s := respell.Replace(u.Symbol)
		if seen[u.Kind][s] {
			t.Errorf("%v has %s twice", u.Kind, s)
		}
		seen[u.Kind][s] = true
	}
}

func TestExactReadsBack(t *testing.T) {
	rnd := rand.New(rand.NewPCG(3, 4))
	for range 20000 {
		v := math.Float64frombits(rnd.Uint64())
		if math.IsNaN(v) || math.IsInf(v, 0) {
			continue
		}
		for _, k := range []Kind{Length, Angle, Ratio} {
			got, _, err := Parse(Exact(v, k), k)
			if err != nil || math.Float64bits(got) != math.Float64bits(v) {
				t.Fatalf("%v written %s, read %v, %v", v, Exact(v, k), got, err)
			}
		}
	}
}

func TestFormat(t *testing.T) {
	for _, c := range []struct {
		si   float64
		kind Kind
		want string
	}{
		{0.65, Length, "650 mm"},
		{0.0003, Length, "0.3 mm"},
		{0.6500004, Length, "650 mm"},
		{math.Pi / 15, Angle, "12 deg"},
		{3e7, Stiffness, "30 N/um"},
		{1234567, Force, "1234570 N"},
		{0.25, Ratio, "0.25"},
		{-0.4, Speed, "-400 mm/s"},
		{0, Force, "0 N"},
		{2e11, Pressure, "200 GPa"},
		{math.Inf(1), Length, "unbounded"},
		{math.NaN(), Length, "undefined"},
	} {
		if got := Format(c.si, c.kind, 6); got != c.want {
			t.Errorf("%v: %s, want %s", c.si, got, c.want)
		}
	}
	if got := Heading("base_radius", Length); got != "base_radius_mm" {
		t.Error(got)
	}
	if got := Heading("conditioning", Ratio); got != "conditioning" {
		t.Error(got)
	}
	if got := Digits(1e12, 4) + Digits(1e-9, 4); got != "1e+121e-09" {
		t.Error(got)
	}
}

func TestKindText(t *testing.T) {
	for k := range kinds {
		b, err := json.Marshal(k)
		if err != nil {
			t.Fatal(err)
		}
		var got Kind
		if err := json.Unmarshal(b, &got); err != nil || got != k {
			t.Errorf("%s: %v, %v", b, got, err)
		}
	}
	var k Kind
	if json.Unmarshal([]byte(`"weight"`), &k) == nil {
		t.Error("an unknown kind is read")
	}
}

// A quantity that is read is finite and reads back to the same bits from what Exact writes of it. One that is not is
// refused with what to write instead, in a text of bounded length.
func FuzzParse(f *testing.F) {
	for _, s := range []string{"650 mm", "1e400 m", "-.5e-3 N m", "nan deg", "0x1p-2", "1,5 mm", "µ", "-0 deg", "5e-324 m", "1.7976931348623157e308 rad",
		"0.1 %", "90°", "12 kg·m²", "3 h", "20 N/µm", "1e9999 mm", "+1"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, text string) {
		for k := range kinds {
			v, got, err := Parse(text, k)
			if err != nil {
				var e *Error
				if !errors.As(err, &e) || e.Problem == "" || e.Remedy == "" || len(err.Error()) > 1000 {
					t.Errorf("%q as %v: %v", text, k, err)
				}
				continue
			}
			written := Exact(v, k)
			back, _, err := Parse(written, k)
			if v-v != 0 || got != k || err != nil || math.Float64bits(back) != math.Float64bits(v) {
				t.Errorf("%q as %v is %v of %v, written %s, read back as %v: %v", text, k, v, got, written, back, err)
			}
			if Format(v, k, 6) == "" {
				t.Errorf("%q as %v is shown as nothing", text, k)
			}
		}
	})
}

// Control characters of a text do not reach the terminal with an error.
func TestErrorsPrint(t *testing.T) {
	for _, text := range []string{"0BB\n\x87", "1,5 \x1b[31m", "\x1b", "5 \u202emm", "1_0\n"} {
		_, _, err := Parse(text, Length)
		if err == nil || strings.IndexFunc(err.Error(), func(r rune) bool { return !unicode.IsPrint(r) }) >= 0 {
			t.Errorf("%q: %v", text, err)
		}
	}
}
