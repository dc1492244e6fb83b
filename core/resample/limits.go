package resample

import (
	"math"

	"gonum.org/v1/gonum/stat/distuv"
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

// RatioLimits are the limits of curve share over counted share: the weights
// at which the interval of curve share - weight·counted share still holds 0
// (Fieller 1954), given the estimated ratio and the interval at any weight.
// In a small sample these weights need not be one run: the limits are those of
// the run around the ratio, and on its side of 1 where the gap's interval lies
// on one side of 0. A high limit of nil says that there is none, because the
// counted share can't be told from zero.
func RatioLimits(ratio float64, interval func(weight float64) Interval) (low, high *float64) {
	const smallest, largest = 1e-9, 1e6
	above := func(weight float64) bool { return interval(weight).Low > 0 }
	below := func(weight float64) bool { return interval(weight).High < 0 }

	low = new(float64)
	bottom := ratio * smallest
	if ratio > 1 && above(1) {
		bottom = 1
	}
	if above(bottom) {
		*low = border(ratio, bottom, above)
	}
	inside, reach := ratio, math.Max(ratio, 1e-12)*2
	if ratio < 1 && below(1) {
		reach = 1
	}
	for !below(reach) {
		if reach > ratio*largest {
			return low, nil
		}
		inside, reach = reach, reach*2
	}
	top := border(inside, reach, below)
	return low, &top
}

// border is the last number, on the way from inside to out, that isn't out:
// found by halving the way, again and again.
func border(inside, out float64, isOut func(float64) bool) float64 {
	for range 100 {
		if middle := (inside + out) / 2; isOut(middle) {
			out = middle
		} else {
			inside = middle
		}
	}
	return inside
}
