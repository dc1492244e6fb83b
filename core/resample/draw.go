package resample

import (
	"math"

	"tailgap/core/sample"
)

// drawer draws resampled count tables: n people with replacement from the
// people of a count table.
type drawer struct {
	counts   sample.Counts
	rows     []uint32  // for each person, the index of the score; nil: conditional binomials
	poissons *poissons // draw most people score by score; nil: everyone is drawn by index
}

// newDrawer chooses the fastest way for the table: an index draw for each
// person; a Poisson draw for each distinct score and a few people by index; or
// a binomial draw for each distinct score.
func newDrawer(counts sample.Counts) drawer {
	d := drawer{counts: counts}
	way, _ := fastest(counts.N, len(counts.Count))
	if way == byBinomials {
		return d
	}
	d.rows = make([]uint32, 0, counts.N)
	for i, count := range counts.Count {
		for range count {
			d.rows = append(d.rows, uint32(i))
		}
	}
	if way == byPoissons {
		d.poissons = newPoissons(counts.Count, counts.N)
	}
	return d
}

// The ways to draw a resample.
const (
	byIndex = iota
	byPoissons
	byBinomials
)

// What a draw costs, in index draws of one person.
const (
	costOfBinomial = 40
	costOfPoisson  = 3
)

// fastest is the way with the least cost for n people with so many scores.
func fastest(n, scores int) (way, cost int) {
	missing := int(2 * shortBy * math.Sqrt(float64(n))) // twice: of many people, a row is seldom at hand
	way, cost = byIndex, n
	if c := costOfPoisson*scores + missing; c < cost && n > 4*shortBy*shortBy {
		way, cost = byPoissons, c
	}
	if c := costOfBinomial * scores; c < cost {
		way, cost = byBinomials, c
	}
	return way, cost
}

// draw fills into with a resample's counts of the distinct scores.
func (d *drawer) draw(r *stream, into []int32) {
	if d.rows == nil {
		d.drawBinomials(r, into)
		return
	}
	missing := len(d.rows)
	if d.poissons == nil {
		clear(into)
	} else {
		drawn := d.poissons.draw(r, into)
		for drawn > len(d.rows) {
			drawn = d.poissons.draw(r, into)
		}
		missing -= drawn
	}
	if len(d.rows) > 1<<12 {
		drawPeople(r, d.rows, missing, into)
	} else {
		drawFewPeople(r, d.rows, missing, into)
	}
}

// drawPeople draws so many rows, with replacement, by Lemire's (2019)
// multiply-shift with rejection, so that everyone has the same chance.
func drawPeople(r *stream, rows []uint32, people int, into []int32) {
	n := uint64(len(rows))
	reject := (1 << 32) % n
	for range people {
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
func drawFewPeople(r *stream, rows []uint32, left int, into []int32) {
	state := *r
	n := uint32(len(rows))
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
