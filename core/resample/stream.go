package resample

import "math/bits"

// stream is the source of random numbers for one block of replicates:
// xoshiro256++ (Blackman & Vigna 2021, "Scrambled linear pseudorandom number
// generators", ACM Transactions on Mathematical Software 47(4)), which needs
// no multiplication and so costs little in WebAssembly. Its numbers depend on
// the seed and the block alone, so that the split of the work over goroutines
// changes nothing.
type stream struct{ s0, s1, s2, s3 uint64 }

// restart puts the stream at the start of a block. Its state is the next four
// numbers of SplitMix64, as the authors of both generators advise, from a
// place that seed and block give; no two of the four are equal, so that they
// are never all zero.
func (r *stream) restart(seed uint64, block int) {
	from := mix(mix(seed) + uint64(block))
	for _, s := range []*uint64{&r.s0, &r.s1, &r.s2, &r.s3} {
		*s = mix(from)
		from += weyl
	}
}

// weyl is SplitMix64's step: 2⁶⁴ over the golden ratio.
const weyl = 0x9e3779b97f4a7c15

// mix is SplitMix64 (Steele, Lea & Flood 2014): the number that follows the
// state x.
func mix(x uint64) uint64 {
	x += weyl
	x = (x ^ x>>30) * 0xbf58476d1ce4e5b9
	x = (x ^ x>>27) * 0x94d049bb133111eb
	return x ^ x>>31
}

// next is the next 64 random bits, and the stream behind them.
func (r stream) next() (uint64, stream) {
	random := bits.RotateLeft64(r.s0+r.s3, 23) + r.s0
	s2, s3 := r.s2^r.s0, r.s3^r.s1
	return random, stream{r.s0 ^ s3, r.s1 ^ s2, s2 ^ r.s1<<17, bits.RotateLeft64(s3, 45)}
}

// Uint64 is the next 64 random bits.
func (r *stream) Uint64() uint64 {
	random, rest := r.next()
	*r = rest
	return random
}

// uniform is a number in [0,1) with 53 random bits.
func (r *stream) uniform() float64 { return float64(r.Uint64()>>11) / (1 << 53) }
