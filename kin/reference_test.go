package kin_test

import (
	"encoding/csv"
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"testing"

	"legwright/kin"

	"gonum.org/v1/gonum/mat"
)

// referenceFile is the path of a committed file of check values. Each file
// names the origin of its numbers.
func referenceFile(name string) string {
	return filepath.Join("..", "testdata", "reference", name)
}

// readJSON fills out from a reference file.
func readJSON(t *testing.T, name string, out any) {
	t.Helper()
	data, err := os.ReadFile(referenceFile(name))
	if err != nil {
		t.Fatal(err)
	}
	if err := json.Unmarshal(data, out); err != nil {
		t.Fatalf("%s: %v", name, err)
	}
}

// readCheck fills out from the entry with that id of a reference file that is a list.
func readCheck(t *testing.T, name, id string, out any) {
	t.Helper()
	var entries []json.RawMessage
	readJSON(t, name, &entries)
	for _, e := range entries {
		var head struct{ ID string }
		if json.Unmarshal(e, &head) == nil && head.ID == id {
			if err := json.Unmarshal(e, out); err != nil {
				t.Fatalf("%s: %s: %v", name, id, err)
			}
			return
		}
	}
	t.Fatalf("%s holds no check %s", name, id)
}

// readTable gives the rows of a reference file as numbers, and the place of each column.
func readTable(t *testing.T, name string) (rows [][]float64, column map[string]int) {
	t.Helper()
	f, err := os.Open(referenceFile(name))
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	r := csv.NewReader(f)
	r.Comment = '#'
	records, err := r.ReadAll()
	if err != nil {
		t.Fatalf("%s: %v", name, err)
	}
	column = map[string]int{}
	for k, h := range records[0] {
		column[h] = k
	}
	for _, rec := range records[1:] {
		row := make([]float64, len(rec))
		for k, text := range rec {
			if row[k], err = strconv.ParseFloat(text, 64); err != nil {
				t.Fatalf("%s: %v", name, err)
			}
		}
		rows = append(rows, row)
	}
	return rows, column
}

// vec is a point of a reference file with two or three coordinates.
func vec(p []float64) kin.Vec {
	v := kin.Vec{X: p[0], Y: p[1]}
	if len(p) > 2 {
		v.Z = p[2]
	}
	return v
}

func vecs(ps [][]float64) []kin.Vec {
	out := make([]kin.Vec, len(ps))
	for i, p := range ps {
		out[i] = vec(p)
	}
	return out
}

// near fails the test if got is farther than tol from want.
func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s = %.17g, want %.17g within %g", what, got, want, tol)
	}
}

// moved is the state of the machine at the pose; the test ends if it has none.
func moved(t *testing.T, m kin.Machine, p kin.Pose) *kin.State {
	t.Helper()
	s := new(kin.State)
	m.Move(&p, s)
	if s.Fail != kin.Reached {
		t.Fatalf("Move(%v): fail %d at leg %d", p, s.Fail, s.Leg)
	}
	return s
}

// atHome is the pose at home.
func atHome() kin.Pose { return kin.Pose{R: kin.Identity()} }

// ownJacobian is the n×n inverse Jacobian in the family's own freedoms.
func ownJacobian(m kin.Machine, s *kin.State) *mat.Dense {
	f := m.Frame().Freedoms
	var own [36]float64
	kin.Own(f, &s.J, &own)
	return mat.NewDense(len(f), len(f), own[:len(f)*len(f)])
}

// singularValues of a matrix, falling (gonum).
func singularValues(t *testing.T, a mat.Matrix) []float64 {
	t.Helper()
	var svd mat.SVD
	if !svd.Factorize(a, mat.SVDNone) {
		t.Fatal("no singular value decomposition")
	}
	return svd.Values(nil)
}

// conditioning is the least over the greatest singular value of the own inverse Jacobian.
func conditioning(t *testing.T, m kin.Machine, s *kin.State) float64 {
	t.Helper()
	v := singularValues(t, ownJacobian(m, s))
	return v[len(v)-1] / v[0]
}
