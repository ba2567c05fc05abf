package linalg

import (
	"os"
	"os/exec"
	"regexp"
	"testing"
)

// On a processor with fused multiply-add the compiler may join a product and a
// sum, unless the product is wrapped in float64(). The listing for such a
// processor shows that none is left: results are the same everywhere.
func TestNoFusedMultiplyAdd(t *testing.T) {
	if testing.Short() {
		t.Skip("compiles the package for another processor")
	}
	if _, err := exec.LookPath("go"); err != nil {
		t.Skip("no go command")
	}
	cmd := exec.Command("go", "build", "-gcflags=-S", "-o", os.DevNull, ".")
	cmd.Env = append(os.Environ(), "GOARCH=arm64", "CGO_ENABLED=0")
	out, err := cmd.CombinedOutput()
	if err != nil {
		t.Fatalf("%v\n%s", err, out)
	}
	if !regexp.MustCompile(`\bFMULD\b`).Match(out) {
		t.Fatal("the listing has no products")
	}
	for _, l := range regexp.MustCompile(`(?m)^.*\bFN?M(ADD|SUB)D\b.*$`).FindAll(out, 10) {
		t.Errorf("fused: %s", l)
	}
}
