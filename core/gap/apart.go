package gap

import (
	"math"

	"gonum.org/v1/gonum/mathext"
)

// Apart is a gap whose curve comes from other people than the count, or from
// none: a given curve. The two shares then have limits of their own, each
// missed with the same probability.
type Apart struct {
	Curve, CurveLow, CurveHigh       float64
	Counted, CountedLow, CountedHigh float64
}

// Apart are the shares of a region, or of what is short of a tail, under a
// given curve, with limits each missed with the probability miss: those of
// the counted share exact (ClopperPearson), those of the curve's from the
// norms that it comes from.
func (t Table) Apart(r Region, e *Estimate, lower bool, miss float64) Apart {
	inside := e.Inside
	if lower {
		inside = e.N - e.Inside
	}
	a := Apart{Curve: e.share(lower), Counted: inside / e.N}
	a.CurveLow, a.CurveHigh = t.curveLimits(r, e, lower, miss)
	a.CountedLow, a.CountedHigh = ClopperPearson(int(inside), int(e.N), miss)
	return a
}

// Limits are those of Curve - weight·Counted, put together as in MOVER (Zou &
// Donner 2008). Where the curve is known they are exact for every weight: the
// curve's share less weight times the exact limits of the counted share.
func (a Apart) Limits(weight float64) (low, high float64) {
	gap := a.Curve - weight*a.Counted
	return gap - math.Hypot(a.Curve-a.CurveLow, weight*(a.CountedHigh-a.Counted)),
		gap + math.Hypot(a.CurveHigh-a.Curve, weight*(a.Counted-a.CountedLow))
}

// CurveParts are the parts of the squared distances from the gap to its Limits
// that the curve's own limits make up: more people counted would not take them
// away.
func (a Apart) CurveParts(weight float64) (low, high float64) {
	part := func(curve, counted float64) float64 {
		if curve == 0 {
			return 0
		}
		return curve * curve / (curve*curve + counted*counted)
	}
	return part(a.Curve-a.CurveLow, weight*(a.CountedHigh-a.Counted)), part(a.CurveHigh-a.Curve, weight*(a.Counted-a.CountedLow))
}

// ClopperPearson are the exact limits of a share of which k in n people were
// counted, 0 <= k <= n (Clopper & Pearson 1934): each is the share at which a
// count as far out as k has the probability miss. So whatever the share and
// for any n neither limit is missed more often than that. In the sparsest
// tails of millions of people gonum's quantiles of the beta distribution are
// good to 8 digits, elsewhere to 10 or more.
func ClopperPearson(k, n int, miss float64) (low, high float64) {
	lower := func(k int) float64 {
		if k == 0 {
			return 0
		}
		return mathext.InvRegIncBeta(float64(k), float64(n-k+1), miss)
	}
	return lower(k), 1 - lower(n-k)
}
