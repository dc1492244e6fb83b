package resample

import "math"

// spread is how the sums of powers over the people drawn in a cell vary: about
// people times means, by root(people) times two independent standard normal
// numbers. With the first goes u, and what of the other powers is linear in
// it; with the second what is left of u², and what of u³ and u⁴ is linear in
// that.
type spread struct {
	u1, u2, u3, u4 float64
	v2, v3, v4     float64
}

// residual is the covariance matrix of what is left of u³ and u⁴ then, summed
// over all people: only their totals are needed. Its root turns two more
// normal numbers into those.
type residual struct{ three, both, four float64 }

func (r *residual) add(other residual) {
	r.three += other.three
	r.both += other.both
	r.four += other.four
}

// root is the matrix's Cholesky root.
func (r residual) root() residual {
	if r.three <= 0 {
		return residual{four: math.Sqrt(r.four)}
	}
	root := residual{three: math.Sqrt(r.three)}
	root.both = r.both / root.three
	root.four = math.Sqrt(math.Max(0, r.four-root.both*root.both))
	return root
}

// of turns two normal numbers into what is left of the totals of u³ and u⁴;
// the residual is a root.
func (r *residual) of(first, second float64) (three, four float64) {
	return r.three * first, r.both*first + r.four*second
}

// described is what the scores in one cell come to.
type described struct {
	people int
	means  powers
	spread spread
	rest   residual
}

// describe computes a cell from its scores in standard units and the people
// who have them. Every variance is a sum of squares of what it is the variance
// of, not a difference of larger numbers, so that it is right in cells of any
// width.
func describe(u []float64, count []int) (d described) {
	var sums powers
	for i, c := range count {
		p, n := powersOf(u[i]), float64(c)
		d.people += c
		sums.u1, sums.u2, sums.u3, sums.u4 = sums.u1+n*p.u1, sums.u2+n*p.u2, sums.u3+n*p.u3, sums.u4+n*p.u4
	}
	people := float64(d.people)
	d.means = powers{sums.u1 / people, sums.u2 / people, sums.u3 / people, sums.u4 / people}
	if len(u) == 1 {
		return d
	}
	along := d.means.slopes(u, count)
	beside := d.means.slopesBeside(u, count, along)
	sd := math.Sqrt(along.variance / people)
	d.spread.u1, d.spread.u2, d.spread.u3, d.spread.u4 = sd, along.u2*sd, along.u3*sd, along.u4*sd
	sd = math.Sqrt(beside.variance / people)
	d.spread.v2, d.spread.v3, d.spread.v4 = sd, beside.u3*sd, beside.u4*sd
	for i, c := range count {
		three, four := d.means.left(u[i], along, beside)
		n := float64(c)
		d.rest.add(residual{n * three * three, n * three * four, n * four * four})
	}
	return d
}

// slopes are of the powers on one variable, whose sum of squares is variance.
type slopes struct{ variance, u2, u3, u4 float64 }

// slopes of the powers on u.
func (m powers) slopes(u []float64, count []int) (on slopes) {
	for i, c := range count {
		p := powersOf(u[i])
		t := float64(c) * (p.u1 - m.u1)
		on.variance += t * (p.u1 - m.u1)
		on.u2 += t * (p.u2 - m.u2)
		on.u3 += t * (p.u3 - m.u3)
		on.u4 += t * (p.u4 - m.u4)
	}
	return on.perVariance()
}

// slopesBeside are the slopes of u³ and u⁴ on what u leaves of u².
func (m powers) slopesBeside(u []float64, count []int, along slopes) (on slopes) {
	for i, c := range count {
		p := powersOf(u[i])
		t := p.u1 - m.u1
		left := p.u2 - m.u2 - along.u2*t
		q := float64(c) * left
		on.variance += q * left
		on.u3 += q * (p.u3 - m.u3 - along.u3*t)
		on.u4 += q * (p.u4 - m.u4 - along.u4*t)
	}
	return on.perVariance()
}

func (on slopes) perVariance() slopes {
	if on.variance <= 0 {
		return slopes{}
	}
	return slopes{on.variance, on.u2 / on.variance, on.u3 / on.variance, on.u4 / on.variance}
}

// left is what both leave of u³ and u⁴ for one score.
func (m powers) left(u float64, along, beside slopes) (three, four float64) {
	p := powersOf(u)
	t := p.u1 - m.u1
	q := p.u2 - m.u2 - along.u2*t
	return p.u3 - m.u3 - along.u3*t - beside.u3*q, p.u4 - m.u4 - along.u4*t - beside.u4*q
}
