package study

import (
	"bufio"
	"encoding/binary"
	"errors"
	"fmt"
	"hash/crc32"
	"io"
	"io/fs"
	"math"
	"os"
	"path/filepath"
	"time"
)

// The log of a checkpoint is a header and then blocks, each written at once:
//
//	header  16 bytes "legwright-log/1\n", 32 bytes key of the run
//	block   4 bytes length of the payload, 4 bytes number of records, 8 bytes milliseconds that the
//	        run had taken, 4 bytes CRC-32C of these and the payload; the payload
//
// Numbers are little-endian. What follows the first block that is not whole counts for nothing.
const (
	logMagic  = "legwright-log/1\n"
	logHead   = len(logMagic) + 32
	blockHead = 4 + 4 + 8 + 4
	maxBlock  = 64 << 20 // bytes of a payload: refused before memory is asked for
)

var castagnoli = crc32.MakeTable(crc32.Castagnoli)

// Log is the part of a checkpoint that grows: what was evaluated, in blocks of bytes that the caller
// encodes. It is for one goroutine, its Blocks for another.
type Log struct {
	file *os.File
	size int64
}

// Kept is what a log held when it was opened.
type Kept struct {
	Records int
	Spent   time.Duration // that the run had taken
	Lost    int64         // bytes after the last whole block
	Other   bool          // the log was none of this run and was begun anew
	end     int64
}

// OpenLog opens the log of a run for appending; the key tells runs apart. With fresh it begins anew.
// What is not whole at its end is cut off, and Kept says how much that was.
func (f *Folder) OpenLog(key [32]byte, fresh bool) (*Log, *Kept, error) {
	path := filepath.Join(f.dir, logFile)
	fail := func(err error) (*Log, *Kept, error) {
		return nil, nil, fmt.Errorf("%s: the checkpoint cannot be opened (%w); give a folder that you may write to", Clean(path), bare(err))
	}
	file, err := os.OpenFile(path, os.O_RDWR|os.O_CREATE, 0o666)
	if err != nil {
		return fail(err)
	}
	kept := new(Kept)
	if !fresh {
		if kept, err = scan(file, key); err != nil {
			file.Close()
			return fail(err)
		}
	}
	l := &Log{file, kept.end}
	if err := l.settle(key); err != nil {
		file.Close()
		return nil, nil, l.failed(err)
	}
	return l, kept, nil
}

// ownLog tells whether the folder has a log of a checkpoint that this program wrote, whatever became of
// the rest of the checkpoint.
func ownLog(dir string) bool { return logHeader(dir, len(logMagic)) == logMagic }

// LogFits tells whether the folder has a log of the run with the key.
func (f *Folder) LogFits(key [32]byte) bool {
	return logHeader(f.dir, logHead) == logMagic+string(key[:])
}

// logHeader reads the first n bytes of a folder's log; "" if there are no such.
func logHeader(dir string, n int) string {
	file, err := os.Open(filepath.Join(dir, logFile))
	if err != nil {
		return ""
	}
	defer file.Close()
	b := make([]byte, n)
	if _, err := io.ReadFull(file, b); err != nil {
		return ""
	}
	return string(b)
}

// settle cuts the log to its whole blocks and writes the header if there is none.
func (l *Log) settle(key [32]byte) error {
	if err := l.file.Truncate(l.size); err != nil {
		return err
	}
	if l.size > 0 {
		return nil
	}
	n, err := l.file.WriteAt(append([]byte(logMagic), key[:]...), 0)
	if err == nil {
		err = l.file.Sync()
	}
	if err == nil {
		l.size = int64(n)
	}
	return err
}

// scan reads a log through and says what of it is whole.
func scan(file *os.File, key [32]byte) (*Kept, error) {
	info, err := file.Stat()
	if err != nil {
		return nil, err
	}
	k := new(Kept)
	if info.Size() == 0 {
		return k, nil
	}
	b := &Blocks{r: bufio.NewReaderSize(io.NewSectionReader(file, 0, info.Size()), 1<<20), left: info.Size()}
	if b.head() != string(logMagic)+string(key[:]) {
		k.Other, k.Lost = true, info.Size()
		return k, nil
	}
	k.end = int64(logHead)
	for {
		payload, err := b.Next()
		if errors.Is(err, io.EOF) {
			k.Lost = info.Size() - k.end
			return k, nil
		}
		if err != nil {
			return nil, err
		}
		k.Records += b.records
		k.Spent = b.spent
		k.end += int64(blockHead + len(payload))
	}
}

// Append adds a block to the log, whole or not at all, with the number of records in it and the time
// that the run has taken. After an error the log is as it was, and the next Append may succeed.
func (l *Log) Append(payload []byte, records int, spent time.Duration) error {
	if len(payload) > maxBlock {
		panic("study: block too large")
	}
	b := make([]byte, blockHead, blockHead+len(payload))
	binary.LittleEndian.PutUint32(b, uint32(len(payload)))
	binary.LittleEndian.PutUint32(b[4:], uint32(records))
	binary.LittleEndian.PutUint64(b[8:], uint64(spent.Milliseconds()))
	binary.LittleEndian.PutUint32(b[16:], checksum(b[:16], payload))
	b = append(b, payload...)
	_, err := l.file.WriteAt(b, l.size)
	if err == nil {
		err = l.file.Sync()
	}
	if err != nil {
		l.file.Truncate(l.size) // a rest that stays is cut off when the log is opened
		return l.failed(err)
	}
	l.size += int64(len(b))
	return nil
}

func (l *Log) failed(err error) error {
	var p *fs.PathError
	if errors.As(err, &p) {
		err = p.Err
	}
	return fmt.Errorf("%s: the checkpoint cannot be written (%w); make room on the disk", Clean(l.file.Name()), err)
}

// Close closes the file. Its Blocks must not be used afterwards.
func (l *Log) Close() error { return l.file.Close() }

// Blocks reads the blocks that the log holds now.
func (l *Log) Blocks() *Blocks {
	b := &Blocks{r: bufio.NewReaderSize(io.NewSectionReader(l.file, 0, l.size), 1<<20), left: l.size}
	b.head()
	return b
}

// Blocks reads a log block by block.
type Blocks struct {
	r       *bufio.Reader
	left    int64 // bytes of the file not read yet
	records int   // of the last block
	spent   time.Duration
}

// head reads the header; "" if it is not whole.
func (b *Blocks) head() string {
	h := make([]byte, logHead)
	if _, err := io.ReadFull(b.r, h); err != nil {
		return ""
	}
	b.left -= int64(logHead)
	return string(h)
}

// Next gives the payload of the next block, which is the caller's to keep; io.EOF after the last whole one.
func (b *Blocks) Next() ([]byte, error) {
	var h [blockHead]byte
	if _, err := io.ReadFull(b.r, h[:]); err != nil {
		return nil, ended(err)
	}
	b.left -= blockHead
	n := int64(binary.LittleEndian.Uint32(h[:]))
	if n > maxBlock || n > b.left {
		return nil, io.EOF
	}
	payload := make([]byte, n)
	if _, err := io.ReadFull(b.r, payload); err != nil {
		return nil, ended(err)
	}
	b.left -= n
	if binary.LittleEndian.Uint32(h[16:]) != checksum(h[:16], payload) {
		return nil, io.EOF
	}
	spent := binary.LittleEndian.Uint64(h[8:])
	if spent > math.MaxInt64/uint64(time.Millisecond) { // no time that a run takes
		return nil, io.EOF
	}
	b.records = int(binary.LittleEndian.Uint32(h[4:]))
	b.spent = time.Duration(spent) * time.Millisecond
	return payload, nil
}

func ended(err error) error {
	if errors.Is(err, io.ErrUnexpectedEOF) {
		return io.EOF
	}
	return err
}

func checksum(head, payload []byte) uint32 {
	return crc32.Update(crc32.Update(0, castagnoli, head), castagnoli, payload)
}
