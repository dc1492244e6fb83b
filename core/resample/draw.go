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
	if len(d.rows) <= 1<<12 {
		d.drawRows(r, into, 16)
	} else {
		d.drawRows(r, into, 32)
	}
}

// drawRows draws people by Lemire's (2019) multiply-shift with rejection, so
// that everyone has the same chance, from pieces of so many bits.
func (d drawer) drawRows(r *stream, into []int32, bits uint) {
	n := uint64(len(d.rows))
	mask := uint64(1)<<bits - 1
	reject := (mask + 1) % n
	for left := n; ; {
		random := r.Uint64()
		for range 64 / bits {
			product := (random & mask) * n
			random >>= bits
			if product&mask < reject {
				continue
			}
			into[d.rows[product>>bits]]++
			if left--; left == 0 {
				return
			}
		}
	}
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
