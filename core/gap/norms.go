package gap

import (
	"math"

	"gonum.org/v1/gonum/stat/distuv"

	"tailgap/core/curve"
)

// Norms are a given curve's mean and SD as another sample of norm people
// would have made them, in SDs of the curve: Mean 0 and SD 1 are the norms as
// they are printed. They mean nothing where a curve is not from norms.
type Norms struct{ Mean, SD float64 }

// printed are the norms as they are.
var printed = Norms{Mean: 0, SD: 1}

// z moves a point's z by the norms as printed to these norms.
func (n Norms) z(point float64) float64 {
	z := (point - n.Mean) / n.SD
	return math.Max(-farthest, math.Min(farthest, z)) // an SD of next to nothing
}

// normVariance is the variance of the curve's share that comes from the norm
// people. The share moves by a for each SD that the norms' mean moves, and by
// b for each part of itself that their SD grows by.
func (t Table) normVariance(a, b float64) float64 {
	n := float64(t.Curve.NormN)
	return a*a/n + b*b/(2*(n-1))
}

// curveLimits are limits of a given curve's share of a region, each missed
// with the probability miss: the share itself where the norms are known.
//
// For a tail they are the shares at the limits of the true curve's z. With
// norms from n people √n·z is noncentral t with n-1 degrees of freedom and
// noncentrality √n times the true z (Owen 1968); Johnson & Welch's (1940)
// approximation of that distribution gives its limits at once,
//
//	z(1 - 1/(4(n-1))) ± q·√(1/n + z²/(2(n-1))),  q = Φ⁻¹(1-miss),
//
// which are missed on either side at most 3.0% of the time where 2.5% are
// wanted, for n from 2 and z to 4.
// For a stretch they are the delta method's on the scale of log odds, with
// Student's t with n-1 degrees of freedom.
func (t Table) curveLimits(r Region, e *Estimate, lower bool, miss float64) (low, high float64) {
	n := float64(t.Curve.NormN)
	switch {
	case n == 0:
		share := e.share(lower)
		return share, share
	case r.Stretch:
		odds := math.Log(e.Curve / (1 - e.Curve))
		margin := -distuv.StudentsT{Sigma: 1, Nu: n - 1}.Quantile(miss) * math.Sqrt(e.V/e.N) / (e.Curve * (1 - e.Curve))
		if !(margin > 0) || math.IsInf(odds, 0) || math.IsInf(margin, 0) { // a share of none or all
			return e.Curve, e.Curve
		}
		return 1 / (1 + math.Exp(margin-odds)), 1 / (1 + math.Exp(-margin-odds))
	}
	middle := e.z * (1 - 1/(4*(n-1)))
	margin := -distuv.UnitNormal.Quantile(miss) * math.Hypot(1/math.Sqrt(n), e.z/math.Sqrt(2*(n-1)))
	if lower {
		return curve.UpperTail(margin - middle), curve.UpperTail(-margin - middle)
	}
	return curve.UpperTail(middle + margin), curve.UpperTail(middle - margin)
}

func (e *Estimate) share(lower bool) float64 {
	if lower {
		return e.CurveShort()
	}
	return e.Curve
}
