package opt

import (
	"math/rand"
	randv2 "math/rand/v2"
)

// source makes a PCG generator of math/rand/v2 usable by eaopt, which wants
// math/rand. Its streams are the same in every Go release.
type source struct{ *randv2.PCG }

func (s source) Int63() int64    { return int64(s.Uint64() >> 1) }
func (s source) Seed(seed int64) { s.PCG.Seed(uint64(seed), 0) }

// Purposes of streams.
const (
	streamSample = iota
	streamBreed
	streamMain
)

// stream returns the random numbers of one purpose, space and generation.
func stream(seed uint64, purpose, space, generation int) *rand.Rand {
	return rand.New(source{randv2.NewPCG(seed, uint64(purpose)<<60|uint64(space)<<40|uint64(generation))})
}
