package study

import (
	"bytes"
	"encoding/binary"
	"errors"
	"io"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"time"
)

// openLog opens the log of a folder that is locked for the test.
func openLog(t *testing.T, dir string, key byte, fresh bool) (*Log, *Kept) {
	t.Helper()
	f := &Folder{dir: dir}
	l, k, err := f.OpenLog([32]byte{key}, fresh)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { l.Close() })
	return l, k
}

// blocks reads all that a log holds.
func blocks(t *testing.T, l *Log) (out []string) {
	t.Helper()
	for b := l.Blocks(); ; {
		p, err := b.Next()
		if errors.Is(err, io.EOF) {
			return out
		}
		if err != nil {
			t.Fatal(err)
		}
		out = append(out, string(p))
	}
}

var payloads = []string{"first", strings.Repeat("second ", 20), "", "\x00\xff fourth"}

// written is a log of the payloads, and where each block ends.
func written(t *testing.T) (text []byte, ends []int) {
	t.Helper()
	dir := t.TempDir()
	l, _ := openLog(t, dir, 7, true)
	for i, p := range payloads {
		ends = append(ends, int(l.size))
		if err := l.Append([]byte(p), i+1, time.Duration(i+1)*time.Second); err != nil {
			t.Fatal(err)
		}
	}
	ends = append(ends, int(l.size))
	text, err := os.ReadFile(filepath.Join(dir, logFile))
	if err != nil || len(text) != int(l.size) {
		t.Fatalf("%d bytes, want %d: %v", len(text), l.size, err)
	}
	return text, ends
}

// A log gives back what was appended, tells the sums, and goes on where it ended.
func TestLog(t *testing.T) {
	text, _ := written(t)
	dir := t.TempDir()
	os.WriteFile(filepath.Join(dir, logFile), text, 0o666)
	l, k := openLog(t, dir, 7, false)
	if k.Records != 10 || k.Spent != 4*time.Second || k.Lost != 0 || k.Other {
		t.Errorf("kept %+v", k)
	}
	if got := blocks(t, l); !slices.Equal(got, payloads) {
		t.Errorf("blocks %q", got)
	}
	if err := l.Append([]byte("more"), 3, time.Minute); err != nil {
		t.Fatal(err)
	}
	l.Close()
	l, k = openLog(t, dir, 7, false)
	if got := blocks(t, l); !slices.Equal(got, append(slices.Clone(payloads), "more")) || k.Records != 13 || k.Spent != time.Minute {
		t.Errorf("blocks %q, kept %+v", got, k)
	}
	if l, k = openLog(t, dir, 7, true); k.Records != 0 || len(blocks(t, l)) != 0 {
		t.Error("a fresh log holds something")
	}
}

// Wherever a log is cut short the whole blocks before count, the rest is told and cut off, and it can
// be gone on with.
func TestLogCutShort(t *testing.T) {
	text, ends := written(t)
	for cut := 0; cut < len(text); cut += 3 {
		dir := t.TempDir()
		os.WriteFile(filepath.Join(dir, logFile), text[:cut], 0o666)
		l, k := openLog(t, dir, 7, false)
		whole := 0
		for whole+1 < len(ends) && ends[whole+1] <= cut {
			whole++
		}
		rest := cut - ends[whole]
		if cut < ends[0] {
			rest = cut
		}
		if got := blocks(t, l); len(got) != whole || !slices.Equal(got, payloads[:whole]) {
			t.Fatalf("cut at %d: blocks %q, want %d", cut, got, whole)
		}
		if int(k.Lost) != rest || k.Other != (cut > 0 && cut < ends[0]) {
			t.Fatalf("cut at %d: kept %+v, want %d lost", cut, k, rest)
		}
		if err := l.Append([]byte("on"), 1, 0); err != nil {
			t.Fatal(err)
		}
		l.Close()
		if l, k = openLog(t, dir, 7, false); k.Lost != 0 || len(blocks(t, l)) != whole+1 {
			t.Fatalf("cut at %d: what was appended then is lost", cut)
		}
	}
}

// A flipped bit anywhere never gives another block than was written: the blocks before it count, the one it is
// in and those after do not.
func TestLogWithFlippedBits(t *testing.T) {
	text, ends := written(t)
	for at := range text {
		bit := at % 8
		bad := bytes.Clone(text)
		bad[at] ^= 1 << bit
		dir := t.TempDir()
		os.WriteFile(filepath.Join(dir, logFile), bad, 0o666)
		l, k := openLog(t, dir, 7, false)
		whole := 0
		for whole+1 < len(ends) && ends[whole+1] <= at {
			whole++
		}
		if got := blocks(t, l); !slices.Equal(got, payloads[:whole]) || k.Lost == 0 {
			t.Fatalf("bit %d of byte %d flipped: blocks %q, kept %+v", bit, at, got, k)
		}
		l.Close()
	}
}

// The log of another run counts for nothing.
func TestLogOfAnotherRun(t *testing.T) {
	text, _ := written(t)
	dir := t.TempDir()
	os.WriteFile(filepath.Join(dir, logFile), text, 0o666)
	if l, k := openLog(t, dir, 8, false); !k.Other || k.Records != 0 || len(blocks(t, l)) != 0 {
		t.Errorf("kept %+v", k)
	}
}

// A block with a time beyond all bounds ends the log, rather than giving a run that has taken less than no time.
func TestLogOfImpossibleTime(t *testing.T) {
	text, ends := written(t)
	binary.LittleEndian.PutUint64(text[ends[2]+8:], 1<<62)
	copy(text[ends[2]+16:], binary.LittleEndian.AppendUint32(nil, checksum(text[ends[2]:ends[2]+16], text[ends[2]+blockHead:ends[3]])))
	dir := t.TempDir()
	os.WriteFile(filepath.Join(dir, logFile), text, 0o666)
	l, k := openLog(t, dir, 7, false)
	if got := blocks(t, l); !slices.Equal(got, payloads[:2]) || k.Spent != 2*time.Second || k.Lost != int64(len(text)-ends[2]) {
		t.Errorf("blocks %q, kept %+v", got, k)
	}
}
