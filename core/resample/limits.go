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
func IntervalOf(e *gap.Estimate, weight, quantile, t float64, tail bool) Interval {
	margin := math.Max(quantile, t) * e.SE(weight)
	i := Interval{e.Gap(weight) - margin, e.Gap(weight) + margin}
	if tail && e.Few() && weight > 0 {
		low, high := e.ScoreLimits(weight, t)
		i = i.Hull(Interval{low, high})
	}
	return i
}

// RatioLimits are the limits of curve share over counted share: the weights
// at which the interval of curve share - weight·counted share still holds 0
// (Fieller 1954), given the estimated ratio and the interval at any weight.
// In a small sample these weights need not be one run: the limits are those of
// the run around the ratio, and on its side of 1 where the gap's interval lies
// on one side of 0. A high limit of nil says that there is none, because the counted share
// can't be told from zero.
func RatioLimits(ratio float64, interval func(weight float64) Interval) (low, high *float64) {
	const smallest, largest, halvings = 1e-9, 1e6, 100
	bottom, top := ratio*smallest, ratio
	if ratio > 1 && interval(1).Low > 0 {
		bottom = 1
	}
	if interval(bottom).Low > 0 {
		for range halvings {
			middle := (bottom + top) / 2
			if interval(middle).Low > 0 {
				bottom = middle
			} else {
				top = middle
			}
		}
		low = &top
	} else {
		low = new(float64)
	}
	bottom, reach := ratio, math.Max(ratio, 1e-12)*2
	if ratio < 1 && interval(1).High < 0 {
		reach = 1
	}
	for interval(reach).High >= 0 {
		if reach > ratio*largest {
			return low, nil
		}
		bottom, reach = reach, reach*2
	}
	for range halvings {
		middle := (bottom + reach) / 2
		if interval(middle).High >= 0 {
			bottom = middle
		} else {
			reach = middle
		}
	}
	return low, &bottom
}
