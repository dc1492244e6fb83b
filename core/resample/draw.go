package resample

import "tailgap/core/sample"

// drawer draws resampled count tables: n people with replacement from the
// people of a count table.
type drawer struct {
	counts sample.Counts
	rows   []uint32 // for each person, the index of the score: index draws; nil: conditional binomials
}

// newDrawer chooses the faster way for the table: an index draw for each
// person, or a binomial draw for each distinct score.
func newDrawer(counts sample.Counts) drawer {
	d := drawer{counts: counts}
	if counts.N <= costOfBinomial*len(counts.Count) {
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
func (d *drawer) draw(r *stream, into []int32) {
	switch {
	case d.rows == nil:
		d.drawBinomials(r, into)
	case len(d.rows) > 1<<12:
		drawPeople(r, d.rows, into)
	default:
		drawFewPeople(r, d.rows, into)
	}
}

// drawPeople draws as many rows as there are, with replacement, by Lemire's
// (2019) multiply-shift with rejection, so that everyone has the same chance.
func drawPeople(r *stream, rows []uint32, into []int32) {
	clear(into)
	n := uint64(len(rows))
	reject := (1 << 32) % n
	for range rows {
		product := (r.Uint64() >> 32) * n
		for product&0xffffffff < reject {
			product = (r.Uint64() >> 32) * n
		}
		into[rows[product>>32]]++
	}
}

// drawFewPeople does the same with four draws from each 64 bits, of which 16
// are enough for one. This is the innermost loop of most answers, and calls
// and memory are slow in WebAssembly: so it is written out, and keeps the
// stream in its hands.
func drawFewPeople(r *stream, rows []uint32, into []int32) {
	clear(into)
	state := *r
	left, n := len(rows), uint32(len(rows))
	reject := (1 << 16) % n
	var random uint64
	for left >= 4 {
		random, state = state.next()
		first, second := uint32(random>>48)*n, uint32(random>>32&0xffff)*n
		third, fourth := uint32(random>>16&0xffff)*n, uint32(random&0xffff)*n
		if first&0xffff >= reject {
			into[rows[first>>16]]++
			left--
		}
		if second&0xffff >= reject {
			into[rows[second>>16]]++
			left--
		}
		if third&0xffff >= reject {
			into[rows[third>>16]]++
			left--
		}
		if fourth&0xffff >= reject {
			into[rows[fourth>>16]]++
			left--
		}
	}
	for left > 0 {
		random, state = state.next()
		if product := uint32(random>>48) * n; product&0xffff >= reject {
			into[rows[product>>16]]++
			left--
		}
	}
	*r = state
}

// drawBinomials draws a multinomial as binomials, each conditional on those before.
func (d *drawer) drawBinomials(r *stream, into []int32) {
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
