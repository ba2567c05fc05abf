package brief

import (
	"fmt"
	"math"
	"reflect"
	"strings"
	"testing"
)

// posesFor reads the text of a pose file for a family, nil for one with all freedoms.
func posesFor(text []byte, family *KnownFamily) ([][6]float64, error) {
	var families []*KnownFamily
	if family != nil {
		families = append(families, family)
	}
	poses, faults := parsePoses("p.csv", text, families)
	return poses, faults.Err()
}

func TestParsePoses(t *testing.T) {
	deg := math.Pi / 180
	want := [][6]float64{{0.01, 0, 0, 0, 0, 12 * deg}, {-0.02, 0, 0, 0, 0, -1 * deg}}
	for why, text := range map[string]string{
		"plain":        "x_mm,yaw_deg\n10,12\n-20,-1\n",
		"order":        "yaw_deg,x_mm\n12,10\n-1,-20\n",
		"Windows":      "\ufeffx_mm,yaw_deg\r\n10,12\r\n-20,-1\r\n",
		"no last line": "x_mm,yaw_deg\n10,12\n-20,-1",
		"blank lines":  "x_mm,yaw_deg\n\n10,12\n\n-20,-1\n\n",
		"blanks":       "x_mm , yaw_deg\n 10 , 12\n -20 , -1\n",
		"quotes":       "\"x_mm\",\"yaw_deg\"\n\"10\",12\n-20,-1\n",
		"units":        "x [cm],yaw (°)\n1,12\n-2,-1\n",
		"exponents":    "x_m,yaw_deg\n1e-2,1.2E+1\n-.02,-1.\n",
		"zeros":        "x_mm,z_mm,yaw_deg\n10,0,12\n-20,0.0,-1\n",
	} {
		got, err := posesFor([]byte(text), nil)
		if err != nil {
			t.Errorf("%s: %v", why, err)
		} else if !reflect.DeepEqual(got, want) {
			t.Errorf("%s: got %v, want %v", why, got, want)
		}
	}
}

func TestPosesRefused(t *testing.T) {
	k := known()
	planar, _ := k.Family("3-RPR")
	for _, c := range []struct {
		why, text string
		family    *KnownFamily
		want      string
	}{
		{"empty", "", nil, "p.csv:1:1: the file is empty; write a line of headings"},
		{"no rows", "x_mm,y_mm\n", nil, "p.csv:2:1: the file holds no pose"},
		{"no unit", "x,y_mm\n1,2\n", nil, "p.csv:1:1: x: the unit is missing; write x_mm"},
		{"other unit", "x_deg\n1\n", nil, "p.csv:1:1: x_deg: deg is a unit of angle, not of length; write x_mm"},
		{"unknown unit", "x_mm,y_furlong\n1,2\n", nil, `p.csv:1:6: y_furlong: unknown unit "furlong"; write y_mm`},
		{"unknown column", "x_mm,jaw_deg\n1,2\n", nil, "p.csv:1:6: jaw_deg: unknown column; did you mean yaw_deg?"},
		{"no headings", "1,2,3\n4,5,6\n", nil, "p.csv:1:1: 1: unknown column; the columns are x, y, z"},
		{"column twice", "x_mm,x_m\n1,2\n", nil, "p.csv:1:6: x_m: a second column of x"},
		{"semicolons", "x_mm;y_mm\n1,5;2\n", nil, "p.csv:1:1: the columns are not parted by commas"},
		{"text", "x_mm,y_mm\n1,ten\n", nil, `p.csv:2:3: y_mm: "ten" is not a finite number; write a decimal number`},
		{"nothing", "x_mm,y_mm\n1,\n", nil, `p.csv:2:3: y_mm: "" is not a finite number`},
		{"NaN", "x_mm,y_mm\n1,NaN\n", nil, `p.csv:2:3: y_mm: "NaN" is not a finite number`},
		{"Inf", "x_mm,y_mm\n-Inf,1\n", nil, `p.csv:2:1: x_mm: "-Inf" is not a finite number`},
		{"1e400", "x_mm\n1e400\n", nil, "p.csv:2:1: x_mm: 1e400 is beyond the range"},
		{"hexadecimal", "x_mm\n0x10\n", nil, `p.csv:2:1: x_mm: "0x10" is not a finite number`},
		{"unit in the cell", "x_mm\n10 mm\n", nil, `p.csv:2:1: x_mm: "10 mm" is not a finite number`},
		{"short row", "x_mm,y_mm\n1,2\n3\n", nil, "p.csv:3:1: 1 numbers below 2 headings"},
		{"long row", "x_mm,y_mm\n1,2,3\n", nil, "p.csv:2:1: 3 numbers below 2 headings"},
		{"quote", "x_mm,y_mm\n1,\"2\n", nil, "p.csv:2:3: a quotation mark without its other"},
		{"latin-1", "x_mm,y_mm\n1,\xe4\n", nil, "p.csv:2:3: byte 0xe4 is not UTF-8 text"},
		{"far turn", "yaw_deg\n1000\n", nil, "p.csv:2:1: yaw_deg: 1000 is beyond half a turn"},
		{"no such freedom", "x_mm,z_mm\n1,0\n2,3\n", planar, "p.csv:3:3: z_mm: 3-RPR does not move in z; leave the column out or write 0"},
	} {
		t.Run(c.why, func(t *testing.T) {
			_, err := posesFor([]byte(c.text), c.family)
			if err == nil || !strings.Contains(err.Error(), c.want) {
				t.Errorf("got\n%v\nwant\n%s", err, c.want)
			}
		})
	}
	if p, err := posesFor([]byte("x_mm,z_mm\n1,0\n2,-0\n"), planar); err != nil || len(p) != 2 {
		t.Errorf("zero in a column without freedom: %v, %v", p, err)
	}
}

// Bad rows are told one by one up to a bound, then counted.
func TestPosesBadRowsBounded(t *testing.T) {
	_, err := posesFor([]byte("x_mm\n"+strings.Repeat("bad\n", 50)), nil)
	fs, ok := err.(Faults)
	if !ok || len(fs) != maxPoseFaults+1 {
		t.Fatalf("%d faults: %v", len(fs), err)
	}
	text := err.Error()
	for _, want := range []string{fmt.Sprintf("p.csv:%d:1: x_mm", 2), fmt.Sprintf("p.csv:%d:1: x_mm", maxPoseFaults+1), "30 more faults follow"} {
		if !strings.Contains(text, want) {
			t.Errorf("no %q in\n%s", want, text)
		}
	}
}
