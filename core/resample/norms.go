package resample

import (
	"math"

	"tailgap/core/gap"
)

// norms draws the mean and the SD of as many norm people again, from the
// normal curve itself: the mean is normal with variance 1/n and (n-1)SD² is
// chi-squared with n-1 degrees of freedom, in SDs of the curve.
func (s *study) norms() gap.Norms {
	n := float64(s.plan.Table.Curve.NormN)
	mean := s.normal.NormFloat64() / math.Sqrt(n)
	sd := math.Sqrt(2 * s.gamma((n-1)/2) / (n - 1))
	return gap.Norms{Mean: mean, SD: math.Max(sd, math.SmallestNonzeroFloat64)}
}

// gamma draws from the gamma distribution with the shape, which must be 1 or
// more, and scale 1 (Marsaglia & Tsang 2000).
func (s *study) gamma(shape float64) float64 {
	d := shape - 1.0/3
	c := 1 / math.Sqrt(9*d)
	for {
		x := s.normal.NormFloat64()
		root := 1 + c*x
		if root <= 0 {
			continue
		}
		v := root * root * root
		if math.Log(1-s.stream.uniform()) < x*x/2+d-d*v+d*math.Log(v) {
			return d * v
		}
	}
}
