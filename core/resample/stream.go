package resample

import "math/rand/v2"

// stream is the source of random numbers for one block of replicates. Its
// numbers depend on the seed and the block alone, so that the split of the
// work over goroutines changes nothing.
type stream struct{ rand.PCG }

// restart puts the stream at the start of a block.
func (r *stream) restart(seed uint64, block int) {
	r.Seed(mix(seed), mix(seed^mix(uint64(block)+1)))
}

// mix spreads the bits of close numbers (SplitMix64's finaliser; Steele, Lea
// & Flood 2014).
func mix(x uint64) uint64 {
	x += 0x9e3779b97f4a7c15
	x = (x ^ x>>30) * 0xbf58476d1ce4e5b9
	x = (x ^ x>>27) * 0x94d049bb133111eb
	return x ^ x>>31
}

// uniform is a number in [0,1) with 53 random bits.
func (r *stream) uniform() float64 { return float64(r.Uint64()>>11) / (1 << 53) }
