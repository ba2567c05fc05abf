package handover

import (
	"encoding/json"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"legwright/kin"
)

// circlesOf are the circles on the layer of the joints, by pairs of group codes and values.
func circlesOf(t *testing.T, b []byte) (out [][2]float64) {
	t.Helper()
	lines := strings.Split(strings.TrimSuffix(string(b), "\n"), "\n")
	kind, layer := "", ""
	var at [2]float64
	for i := 0; i+1 < len(lines); i += 2 {
		v := lines[i+1]
		switch code := strings.TrimSpace(lines[i]); code {
		case "0":
			if kind == "CIRCLE" && layer == "JOINTS" {
				out = append(out, at)
			}
			kind = v
		case "8":
			layer = v
		case "10", "20":
			x, err := strconv.ParseFloat(v, 64)
			if err != nil {
				t.Fatal(err)
			}
			at[int(code[0]-'1')] = x
		}
	}
	return out
}

// In the DXF every joint lies where the hole table has it, in mm from the datum: real size. 1e-8 mm, as tables are
// written to 1e-9.
func TestDXFHasTheJointsInRealSize(t *testing.T) {
	everyFamily(t, func(t *testing.T, d *design, files map[string][]byte) {
		for _, plate := range []string{onBase, onPlatform} {
			same(t, circlesOf(t, files[plate+".dxf"]), drawn(t, files, plate))
		}
	})
}

// same checks circles against the places of joints, in any order.
func same(t *testing.T, circles [][2]float64, want map[string]kin.Vec) {
	t.Helper()
	if len(circles) != len(want) {
		t.Fatalf("%d circles for %d joints", len(circles), len(want))
	}
	for name, v := range want {
		found := false
		for _, c := range circles {
			found = found || (c[0]-v.X)*(c[0]-v.X)+(c[1]-v.Y)*(c[1]-v.Y) < 4e-12 // the tables are written to 1e-6 mm
		}
		if !found {
			t.Errorf("%s at %g, %g is not drawn", name, v.X, v.Y)
		}
	}
}

// Plans of every family are read without a fault by ezdxf, a reader that has nothing to do with this program, which finds
// the joints at the same places.
func TestDXFReadByAnother(t *testing.T) {
	const script = `
import json, sys
from ezdxf import recover
out = {}
for f in sys.argv[1:]:
    doc, audit = recover.readfile(f)
    out[f] = {"errors": len(audit.errors), "circles": [[e.dxf.center.x, e.dxf.center.y] for e in doc.modelspace().query('CIRCLE[layer=="JOINTS"]')]}
print(json.dumps(out))
`
	const python = "/usr/bin/python3"
	if exec.Command(python, "-c", "import ezdxf").Run() != nil {
		if os.Getenv("CI") != "" {
			t.Fatal("no ezdxf; install Debian's python3-ezdxf")
		}
		t.Skip("no ezdxf: install Debian's python3-ezdxf to have the plans read by another program")
	}
	dir := t.TempDir()
	args := []string{"-c", script}
	want := map[string]map[string]kin.Vec{}
	everyFamily(t, func(t *testing.T, d *design, files map[string][]byte) {
		for _, plate := range []string{onBase, onPlatform} {
			path := filepath.Join(dir, d.a.Plan.Family.Name+"-"+plate+".dxf")
			if err := os.WriteFile(path, files[plate+".dxf"], 0o666); err != nil {
				t.Fatal(err)
			}
			args, want[path] = append(args, path), drawn(t, files, plate)
		}
	})
	out, err := exec.Command(python, args...).Output()
	if err != nil {
		t.Fatal(err)
	}
	var got map[string]struct {
		Errors  int
		Circles [][2]float64
	}
	if err := json.Unmarshal(out, &got); err != nil {
		t.Fatal(err)
	}
	for path, w := range want {
		if got[path].Errors != 0 {
			t.Errorf("%s: %d faults", filepath.Base(path), got[path].Errors)
		}
		same(t, got[path].Circles, w)
	}
}

// A design that does not reach home, or no pose at all, has sheets too: they leave out what is not known.
func TestDesignThatReachesNothing(t *testing.T) {
	for name, dimension := range map[string]string{"delta": "home_height", "6-RUS": "home_height", "linear-delta": "rail_radius", "five-bar": "home_y", "level-arm": "home_reach"} {
		f := kin.FamilyNamed(name)
		task := starterTask(f)
		a := appraisedWith(f, task, 0.3, dimension, 20)
		files := Files(task, a, wicked)
		block, _, joints := read(t, files["joints.csv"])
		if !strings.Contains(block["home"], "does not reach home") {
			t.Errorf("%s: home %q", name, block["home"])
		}
		for _, row := range joints {
			if row["plate"] == onDrive {
				t.Errorf("%s: %s is known", name, row["point"])
			}
		}
		checkPlan(t, files["base.svg"], drawn(t, files, onBase))
	}
}
