package resample

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
)

// The first ten numbers from the state 1, 2, 3, 4, and SplitMix64's first
// from 1234567 and 0: computed by a C program of the authors' published text
// (Blackman & Vigna, xoshiro256plusplus.c 1.0 and splitmix64.c), the first
// three again in Python.
func TestStreamIsXoshiro(t *testing.T) {
	r := stream{1, 2, 3, 4}
	for _, want := range []uint64{
		41943041, 58720359, 3588806011781223, 3591011842654386, 9228616714210784205,
		9973669472204895162, 14011001112246962877, 12406186145184390807, 15849039046786891736, 10450023813501588000,
	} {
		assert.Equal(t, want, r.Uint64())
	}
	state := uint64(1234567)
	for _, want := range []uint64{
		6457827717110365317, 3203168211198807973, 9817491932198370423, 4593380528125082431, 16408922859458223821,
	} {
		assert.Equal(t, want, mix(state))
		state += weyl
	}
	assert.Equal(t, uint64(16294208416658607535), mix(0))
}

// The same C program: SplitMix64 from seed 1, its first number and the block
// the state of another, whose first number is the state of the one that fills
// the generator.
func TestStreamStartsFromSeedAndBlock(t *testing.T) {
	var r stream
	r.restart(1, 7)
	for _, want := range []uint64{10953763850337304509, 15834056129625131878, 5096704163627402919} {
		assert.Equal(t, want, r.Uint64())
	}
	seen := map[stream]bool{}
	for _, seed := range []uint64{0, 1, 2, math.MaxUint64} {
		for block := range 200 {
			r.restart(seed, block)
			assert.False(t, seen[r], "seed %d, block %d", seed, block)
			seen[r] = true
		}
	}
}
