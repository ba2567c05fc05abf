package sheet

import (
	"encoding/json"
	"math"
	"testing"
)

// Numbers take few letters and say what cannot be said as null.
func TestNumbersAsText(t *testing.T) {
	tenth := 0.1
	for _, c := range []struct {
		v    any
		want string
	}{
		{Exact(tenth + 0.2), "0.30000000000000004"}, {Exact(math.Inf(1)), "null"}, {Exact(1e22), "1e+22"}, {Exact(0), "0"},
		{Num(tenth + 0.2), "0.3"}, {Num(123456789), "123456800"}, {Num(math.NaN()), "null"}, {Num(1.23456789e-7), "1.234568e-07"}, {Num(math.Copysign(0, -1)), "0"},
		{Fine(1.23456789012345), "1.2345678901"}, {Fine(-1e-11), "0"}, {Fine(math.Inf(-1)), "null"}, {Fine(-0.5), "-0.5"},
		{Pointer(math.Inf(1)), "null"}, {Pointer(2), "2"},
	} {
		b, err := json.Marshal(c.v)
		if err != nil || string(b) != c.want {
			t.Errorf("%T %v is %s (%v), want %s", c.v, c.v, b, err, c.want)
		}
	}
	for _, c := range []struct {
		v, step float64
		want    int
	}{{0.123456, 1e-5, 12346}, {-0.1, 1e-5, -10000}, {math.NaN(), 1, 0}} {
		if got := Count(c.v, c.step); got != c.want {
			t.Errorf("Count(%v, %v) = %d, want %d", c.v, c.step, got, c.want)
		}
	}
}

// Exact numbers read back to the same bits, others as near as they say.
func FuzzNumbers(f *testing.F) {
	for _, v := range []float64{0, 1, -1e-300, 1e300, 0.1, 123456.789, 5e-324} {
		f.Add(v)
	}
	f.Fuzz(func(t *testing.T, v float64) {
		if !finite(v) {
			t.Skip()
		}
		back := func(x any) (out float64) {
			b, err := json.Marshal(x)
			if err != nil {
				t.Fatal(err)
			}
			if err := json.Unmarshal(b, &out); err != nil {
				t.Fatal(err)
			}
			return out
		}
		if got := back(Exact(v)); got != v {
			t.Errorf("exact %v is %v", v, got)
		}
		if got := back(Num(v)); math.Abs(got-v) > 5.1e-7*math.Abs(v) {
			t.Errorf("%v is %v", v, got)
		}
		if got := back(Fine(v)); math.Abs(got-v) > 5.1e-11+1e-15*math.Abs(v) {
			t.Errorf("%v is %v", v, got)
		}
	})
}
