package gap

import "tailgap/core/curve"

// Reading is the curve's share of a region as a sample, or a resample, makes
// it, with what a sample's scores do to it: the influence of a score x is
// a(x-mean) + b((x-mean)²-M2). A given curve has no influence.
type Reading struct {
	share, z, slope float64
	a, b, v         float64
	spread          float64 // what the share moves by as the norms' SD grows; their mean moves it by slope
}

// Set reads the table's curve beyond a point. A fitted curve moves with the
// sums, one from norms with these; any other stays.
func (c *Reading) Set(t *Table, p *Point, s *Sums) {
	switch {
	case t.Curve.Known():
		*c = Reading{share: p.tail, z: p.z}
	case !t.Curve.Fitted:
		z := s.Norms.z(p.z)
		share, slope := curve.Tail(z)
		*c = Reading{share: share, z: z, slope: slope, spread: slope * z}
	case s.M2 <= 0: // a resample of one score only: its curve is a step
		*c = Reading{share: step(p.u, s.Mean)}
	default:
		c.z = (p.u - s.Mean) * s.perSD
		c.share, c.slope = curve.Tail(c.z)
		c.a = c.slope * s.perSD
		c.b = 0.5 * c.a * c.z * s.perSD
		c.v = s.variance(c.a, c.b)
	}
}

// ReadRegion reads the curve's share of a region.
func (t *Table) ReadRegion(r *Region, s *Sums) Reading {
	var reading, upper Reading
	reading.Set(t, &r.Lower, s)
	if r.Stretch {
		upper.Set(t, &r.Upper, s)
		reading.Subtract(&upper, s)
	}
	return reading
}

// Subtract takes another reading's share away: what is left is a stretch.
func (c *Reading) Subtract(other *Reading, s *Sums) {
	if c.z < 0 && other.z < 0 { // from the lower tails, whose digits the upper ones have lost
		c.share = curve.UpperTail(-other.z) - curve.UpperTail(-c.z)
	} else {
		c.share -= other.share
	}
	c.share = max(0, c.share) // below 0 by rounding only
	c.slope -= other.slope
	c.spread -= other.spread
	c.a -= other.a
	c.b -= other.b
	c.v = s.variance(c.a, c.b)
}

// influence of a score that is d from the mean.
func (c *Reading) influence(d float64, s *Sums) float64 { return c.a*d + c.b*(d*d-s.M2) }

// variance is n times the variance of the mean of a(x-mean) + b((x-mean)²-M2).
// It is 0 where two scores have the same influence, and below by rounding only.
func (s *Sums) variance(a, b float64) float64 {
	return max(0, s.bessel*(a*(a*s.M2+2*b*s.M3)+b*b*s.fourth))
}

func step(point, mean float64) float64 {
	if mean >= point-1e-9 { // SDs of the sample; the mean is a sum and may be off by a rounding
		return 1
	}
	return 0
}

// Share is the curve's share.
func (c *Reading) Share() float64 { return c.share }

// Less is the difference of two readings, whichever is larger.
func (c *Reading) Less(other *Reading, s *Sums) Reading {
	d := Reading{share: c.share - other.share, a: c.a - other.a, b: c.b - other.b}
	d.v = s.variance(d.a, d.b)
	return d
}

// Variance is n times the variance of the share; 0 for a given curve.
func (c *Reading) Variance() float64 { return c.v }
