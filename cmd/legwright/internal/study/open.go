package study

import (
	"errors"
	"fmt"
	"io"
	"os"
)

// readFile reads a plain file of at most bound bytes; a larger one is refused before memory is asked for.
func readFile(path string, bound int64) ([]byte, error) {
	info, err := os.Stat(path)
	switch {
	case err != nil:
		return nil, err
	case !info.Mode().IsRegular():
		return nil, errors.New("it is no plain file")
	case info.Size() > bound:
		return nil, fmt.Errorf("it has %d bytes, more than %d", info.Size(), bound)
	}
	f, err := os.Open(path)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	b, err := io.ReadAll(io.LimitReader(f, bound+1))
	if err == nil && int64(len(b)) > bound {
		return nil, fmt.Errorf("it has more than %d bytes", bound)
	}
	return b, err
}
