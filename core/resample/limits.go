package resample

import (
	"math"

	"gonum.org/v1/gonum/stat/distuv"

	"tailgap/core/gap"
)

// Interval has the limits of a gap, proportions.
type Interval struct{ Low, High float64 }

// Mirror is the interval of total minus the quantity.
func (i Interval) Mirror(total float64) Interval { return Interval{total - i.High, total - i.Low} }

// Hull is the smallest interval that holds both.
func (i Interval) Hull(other Interval) Interval {
	return Interval{math.Min(i.Low, other.Low), math.Max(i.High, other.High)}
}

// StudentT is the two-sided quantile of Student's t with n-1 degrees of
// freedom at the level: 0.95 gives the 97.5% quantile.
func StudentT(n int, level float64) float64 {
	t := distuv.StudentsT{Mu: 0, Sigma: 1, Nu: float64(n - 1)}
	return -t.Quantile((1 - level) / 2)
}

// IntervalOf is the ghost-studentised interval of Gap(weight): q standard
// errors each way, q being the larger of Student's t and the quantile of the
// studentised replicates; for a tail with fewer than ten people on either
// side, the hull of that and the score limits.
func IntervalOf(e gap.Estimate, weight, quantile, t float64, tail bool) Interval {
	margin := math.Max(quantile, t) * e.SE(weight)
	i := Interval{e.Gap(weight) - margin, e.Gap(weight) + margin}
	if tail && e.Few() && weight > 0 {
		low, high := e.ScoreLimits(weight, t)
		i = i.Hull(Interval{low, high})
	}
	return i
}
