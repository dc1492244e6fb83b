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
	// Two draws from each 64 bits by Lemire's (2019) multiply-shift, without
	// its rejection step: the chances of two people differ by less than
	// n/2³², far below what any number of replicates could show.
	n := uint64(len(d.rows))
	for i := uint64(0); i+1 < n; i += 2 {
		bits := r.Uint64()
		into[d.rows[(bits>>32)*n>>32]]++
		into[d.rows[(bits&0xffffffff)*n>>32]]++
	}
	if n%2 == 1 {
		into[d.rows[(r.Uint64()>>32)*n>>32]]++
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
