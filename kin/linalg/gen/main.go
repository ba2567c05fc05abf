// Command gen writes the straight-line code of package linalg.
package main

import (
	"flag"
	"fmt"
	"os"
)

func main() {
	out := flag.String("o", "", "file to write")
	flag.Parse()
	src, err := source()
	if err == nil {
		err = os.WriteFile(*out, src, 0o666)
	}
	if err != nil {
		fmt.Fprintln(os.Stderr, "gen:", err)
		os.Exit(1)
	}
}
