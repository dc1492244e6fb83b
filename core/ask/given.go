package ask

import "tailgap/core/gap"

// apart has the two shares of a given curve's gap, with limits each missed
// with the probability miss. They are kept: an interval, a band, a verdict and
// a ratio ask for the same ones again and again.
func (s shown) apart(miss float64) gap.Apart {
	k := apartKey{s.region, s.lower, miss}
	a, known := s.aparts[k]
	if !known {
		a = s.table.Apart(s.plan.Regions[s.region], s.estimate(), s.lower, miss)
		s.aparts[k] = a
	}
	return a
}

type apartKey struct {
	region int
	lower  bool
	miss   float64
}
