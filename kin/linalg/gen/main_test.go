package main

import (
	"bytes"
	"os"
	"testing"
)

// The committed file is what the generator writes.
func TestCommitted(t *testing.T) {
	want, err := source()
	if err != nil {
		t.Fatal(err)
	}
	got, err := os.ReadFile("../gram_generated.go")
	if err != nil {
		t.Fatal(err)
	}
	if !bytes.Equal(got, want) {
		t.Error("gram_generated.go is not what this generator writes; run go generate in kin/linalg")
	}
}
