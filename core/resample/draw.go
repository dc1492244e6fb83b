package resample

import "tailgap/core/sample"

// drawer draws resampled count tables: n people with replacement from the
// people of a count table.
type drawer struct {
	counts sample.Counts
	rows   []uint32 // for each person, the index of the score: index draws; nil: conditional binomials
}

// costOfBinomial is about how many index draws one binomial draw costs.
const costOfBinomial = 40

// newDrawer chooses the faster way for the table: an index draw for each
// person, or a binomial draw for each distinct score.
func newDrawer(counts sample.Counts) drawer {
	d := drawer{counts: counts}
	if counts.N <= costOfBinomial*len(counts.Score) {
		d.rows = make([]uint32, 0, counts.N)
		for i, count := range counts.Count {
			for range count {
				d.rows = append(d.rows, uint32(i))
			}
		}
	}
	return d
}

// draw fills into with a resample's counts of the distinct scores.
func (d drawer) draw(r *stream, into []int32) {
	if d.rows == nil {
		d.drawBinomials(r, into)
		return
	}
	clear(into)
	// Lemire's (2019) multiply-shift with rejection, so that everyone has the
	// same chance; four draws from each 64 bits where 16 are enough for one.
	n, left := uint32(len(d.rows)), len(d.rows)
	if n > 1<<12 {
		reject := uint32((1 << 32) % uint64(n))
		for left > 0 {
			random := r.Uint64()
			left = d.take(random>>32, uint64(n), 32, reject, into, left)
			left = d.take(random&0xffffffff, uint64(n), 32, reject, into, left)
		}
		return
	}
	reject := uint32((1 << 16) % n)
	for left > 0 {
		random := r.Uint64()
		left = d.take(random>>48, uint64(n), 16, reject, into, left)
		left = d.take(random>>32&0xffff, uint64(n), 16, reject, into, left)
		left = d.take(random>>16&0xffff, uint64(n), 16, reject, into, left)
		left = d.take(random&0xffff, uint64(n), 16, reject, into, left)
	}
}

// take draws one person from so many random bits, unless they are rejected
// or nobody is left to draw.
func (d *drawer) take(random, n uint64, bits uint, reject uint32, into []int32, left int) int {
	product := random * n
	if uint32(product&(1<<bits-1)) < reject || left == 0 {
		return left
	}
	into[d.rows[product>>bits]]++
	return left - 1
}

// drawBinomials draws a multinomial as binomials, each conditional on those before.
func (d drawer) drawBinomials(r *stream, into []int32) {
	people, left := d.counts.N, d.counts.N
	for i, count := range d.counts.Count {
		drawn := 0
		if left > 0 {
			drawn = r.binomial(left, float64(count)/float64(people))
		}
		into[i] = int32(drawn)
		people -= count
		left -= drawn
	}
}
