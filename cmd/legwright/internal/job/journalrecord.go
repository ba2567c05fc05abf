package job

import (
	"encoding/binary"
	"math"

	"legwright/opt"
)

// A record of the log is 4 bytes length, 8 bytes hash of the design, then the result:
//
//	1 byte  flags
//	8 bytes violation, if flagged
//	8 bytes for each goal, if flagged: else all are NaN
//	8 bytes for each limit, if flagged: else all are 0
//	the text of a fault, to the end
const (
	hasViolation = 1 << iota
	hasGoals
	hasExcess
)

// encode appends a result to b.
func encode(b []byte, r *opt.Result) []byte {
	flags := byte(0)
	if math.Float64bits(r.Violation) != 0 {
		flags |= hasViolation
	}
	for _, v := range r.Goals {
		if math.Float64bits(v) != math.Float64bits(math.NaN()) {
			flags |= hasGoals
		}
	}
	for _, v := range r.Excess {
		if math.Float64bits(v) != 0 {
			flags |= hasExcess
		}
	}
	b = append(b, flags)
	if flags&hasViolation != 0 {
		b = appendFloats(b, r.Violation)
	}
	if flags&hasGoals != 0 {
		b = appendFloats(b, r.Goals...)
	}
	if flags&hasExcess != 0 {
		b = appendFloats(b, r.Excess...)
	}
	return append(b, r.Fault...)
}

func appendFloats(b []byte, vs ...float64) []byte {
	for _, v := range vs {
		b = binary.LittleEndian.AppendUint64(b, math.Float64bits(v))
	}
	return b
}

// decode reads what encode wrote into r, whose slices have the lengths of the problem; false if b is
// not of that form.
func decode(b []byte, r *opt.Result) bool {
	if len(b) == 0 {
		return false
	}
	flags := b[0]
	b = b[1:]
	floats := func(dst []float64) bool {
		if len(b) < 8*len(dst) {
			return false
		}
		for i := range dst {
			dst[i] = math.Float64frombits(binary.LittleEndian.Uint64(b[8*i:]))
		}
		b = b[8*len(dst):]
		return true
	}
	var violation [1]float64
	switch {
	case flags&^(hasViolation|hasGoals|hasExcess) != 0,
		flags&hasViolation != 0 && !floats(violation[:]),
		flags&hasGoals != 0 && !floats(r.Goals),
		flags&hasExcess != 0 && !floats(r.Excess):
		return false
	}
	r.Violation, r.Fault = violation[0], string(b)
	return true
}
