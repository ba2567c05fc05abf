package job

import (
	"encoding/binary"
	"errors"
	"fmt"
	"io"
	"math"
	"sync"
	"time"

	"legwright/cmd/legwright/internal/study"
	"legwright/opt"
)

// Journal is the memory of a run that survives its process: every evaluated design goes into the log of
// the study's folder at a slow beat, and a run that goes on takes from it what was evaluated before. The
// search is a function of its brief and settings, so it comes to the same state again, and on to the same
// bytes as a run that was never broken off, whatever the search keeps in memory.
//
// The log holds no variables: a record is found by a hash of them. The search asks in nearly the order
// of the log, since what workers do side by side is counted in a fixed order; what is read before it is
// asked for waits in a window. So a log of any length takes little memory.
type Journal struct {
	log    *study.Log
	beat   time.Duration
	warn   func(string)
	before time.Duration // that the run had taken when it was broken off
	window int           // most records read ahead

	mu     sync.Mutex // guards the rest, for recall
	blocks *study.Blocks
	rest   []byte // of the last block, not in the window yet
	ahead  map[uint64]*waiting
	count  int
	lost   func() // ends the search: the log is none of it
	err    error

	salt uint64 // of the stage: see Stage

	buf     []byte // records that the log does not hold yet
	records int
	begun   time.Time // when the first new record came
	flushed time.Time
	dead    bool // the log has a gap: nothing may follow
}

// waiting is a record read ahead; of equal designs there may be several.
type waiting struct {
	data []byte
	next *waiting
}

const (
	fullBlock = 1 << 20  // bytes of records that are written before the beat
	mostBytes = 64 << 20 // of records that wait while the disk is full
	mostAhead = 100_000  // records read ahead beside a polish
)

// errForeign says that the log does not hold what the search asks for.
var errForeign = errors.New("the checkpoint does not fit: its evaluations are not those that this program makes of the brief; begin anew with --force")

// NewJournal makes the journal of a run. The log is written to after each beat, or sooner if much has
// gathered; warn is told if that fails.
func NewJournal(log *study.Log, kept *study.Kept, beat time.Duration, warn func(string)) *Journal {
	j := &Journal{log: log, beat: beat, warn: warn, before: kept.Spent, ahead: map[uint64]*waiting{}}
	if kept.Records > 0 {
		j.blocks = log.Blocks()
	}
	return j
}

// key hashes a design: FNV-1a over 64-bit words, mixed (as is common for hash tables).
func key(space int, x []float64) uint64 {
	h := uint64(14695981039346656037) ^ uint64(space)
	for _, v := range x {
		h = (h ^ math.Float64bits(v+0)) * 1099511628211
		h ^= h >> 29
	}
	return h
}

// recall fills r from the log; false if the log does not have the design. It may be called by several
// workers at once.
func (j *Journal) recall(space int, x []float64, r *opt.Result) bool {
	j.mu.Lock()
	defer j.mu.Unlock()
	k := key(space, x) ^ j.salt
	for j.ahead[k] == nil {
		if j.blocks == nil || j.err != nil || !j.read() {
			return false
		}
	}
	w := j.ahead[k]
	if j.ahead[k] = w.next; w.next == nil {
		delete(j.ahead, k)
	}
	j.count--
	if !decode(w.data, r) {
		j.fail(errForeign)
		return false
	}
	r.Recalled = true
	return true
}

// read takes the next record into the window; false at the end of the log.
func (j *Journal) read() bool {
	if j.count > j.window {
		j.fail(errForeign)
		return false
	}
	for len(j.rest) == 0 {
		b, err := j.blocks.Next()
		if err != nil {
			j.blocks = nil
			if !errors.Is(err, io.EOF) {
				j.fail(err)
			}
			return false
		}
		j.rest = b
	}
	if len(j.rest) < 4 {
		j.fail(errForeign)
		return false
	}
	n := int(binary.LittleEndian.Uint32(j.rest))
	if n < 8 || n > len(j.rest)-4 {
		j.fail(errForeign)
		return false
	}
	data := j.rest[4 : 4+n]
	j.rest = j.rest[4+n:]
	k := binary.LittleEndian.Uint64(data)
	w := &waiting{data: data[8:]}
	if first := j.ahead[k]; first == nil {
		j.ahead[k] = w
	} else { // equal designs have equal results
		w.next, first.next = first.next, w
	}
	j.count++
	return true
}

// fail ends the search.
func (j *Journal) fail(err error) {
	if j.err == nil {
		j.err = err
		if j.lost != nil {
			j.lost()
		}
	}
}

// record notes an evaluated design. It is called by one goroutine at a time.
func (j *Journal) record(space int, x []float64, r *opt.Result) {
	if j.begun.IsZero() {
		j.begun = time.Now()
		j.flushed = j.begun
	}
	if j.dead {
		return
	}
	at := len(j.buf)
	j.buf = append(j.buf, 0, 0, 0, 0)
	j.buf = binary.LittleEndian.AppendUint64(j.buf, key(space, x)^j.salt)
	j.buf = encode(j.buf, r)
	binary.LittleEndian.PutUint32(j.buf[at:], uint32(len(j.buf)-at-4))
	j.records++
	due := time.Since(j.flushed) >= j.beat // of monotonic readings: a clock that jumps changes nothing
	if due || len(j.buf) >= fullBlock && (len(j.buf) < 2*fullBlock) {
		j.Flush()
	}
}

// Rewind makes the next search of the run take its results from the beginning of the log on: it repeats the one before, and
// goes further.
func (j *Journal) Rewind() {
	j.Flush()
	j.mu.Lock()
	defer j.mu.Unlock()
	j.blocks, j.rest, j.ahead, j.count = j.log.Blocks(), nil, map[uint64]*waiting{}, 0
}

// Stage tells that the next search of the run is another one, of another duty: equal designs have other results.
func (j *Journal) Stage() {
	j.mu.Lock()
	defer j.mu.Unlock()
	j.salt = mix(j.salt)
}

// Flush writes what is not in the log yet. A log that cannot be written is told of, and tried again at
// the next beat; what waits for it is bounded.
func (j *Journal) Flush() error {
	j.flushed = time.Now()
	if j.records == 0 || j.dead {
		return nil
	}
	err := j.log.Append(j.buf, j.records, j.spent())
	if err == nil {
		j.buf, j.records = j.buf[:0], 0
		return nil
	}
	if len(j.buf) > mostBytes-2*fullBlock {
		j.dead, j.buf = true, nil
		j.warn(fmt.Sprintf("%v. The search goes on, but no more of it is saved; a --resume would go on from the last checkpoint", err))
		return err
	}
	j.warn(fmt.Sprintf("%v. The search goes on; %d evaluations are not saved yet, and are tried again at the next checkpoint", err, j.records))
	return err
}

// spent is the time that the run has taken, over all its processes.
func (j *Journal) spent() time.Duration {
	if j.begun.IsZero() {
		return j.before
	}
	return j.before + time.Since(j.begun)
}

// attach puts the journal between a search and its problem; end ends the search.
func (j *Journal) attach(p *opt.Problem, set *opt.Settings, end func()) {
	j.lost = end
	j.window = mostAhead + int(max(0.05, set.Polish)*float64(set.Evaluations)) // jobs of a polish are recorded one after another
	if set.Time > 0 {
		set.Time = max(1, set.Time-j.spent())
	}
	set.Record = j.record
	evaluate := p.Evaluate
	p.Evaluate = func(worker, space int, x []float64, r *opt.Result) {
		if !j.recall(space, x, r) {
			evaluate(worker, space, x, r)
		}
	}
}
