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
// errors (gap.Estimate.SideSE) each way, q being the larger of Student's t and the quantile of the
// studentised replicates; for a tail with fewer than ten people on either
// side, the hull of that and the score limits.
func IntervalOf(e *gap.Estimate, weight, quantile, t float64, tail bool) Interval {
	i := margins(e, weight, math.Max(quantile, t))
	if tail && e.Few() && weight > 0 {
		low, high := e.ScoreLimits(weight, t)
		i = i.Hull(Interval{low, high})
	}
	return i
}

// Sparse says where a band holds the score limits too: where fewer than People
// are on either side of a threshold, at the quantile T.
type Sparse struct{ People, T float64 }

// BandSparse is a band's Sparse at the level, for n people. On a scale with a
// step it is as for one cutoff. Without one the outermost thresholds stand at
// the outermost scores themselves, wherever those fell, which no replicate
// shows: few people there are too few more often, and what the level leaves is
// divided by ten.
func BandSparse(n int, level float64, step bool) Sparse {
	if step {
		return Sparse{gap.FewPeople, StudentT(n, level)}
	}
	return Sparse{3 * gap.FewPeople, StudentT(n, 1-(1-level)/10)}
}

// BandOf are the simultaneous limits at one threshold: quantile is that of the
// largest studentised replicate over the whole sweep.
func BandOf(e *gap.Estimate, weight, quantile float64, sparse Sparse) Interval {
	i := margins(e, weight, quantile)
	if math.Min(e.Inside, e.N-e.Inside) < sparse.People && weight > 0 {
		low, high := e.ScoreLimits(weight, sparse.T)
		i = i.Hull(Interval{low, high})
	}
	return i
}

func margins(e *gap.Estimate, weight, quantile float64) Interval {
	below, above := e.SideSE(weight)
	return Interval{e.Gap(weight) - quantile*below, e.Gap(weight) + quantile*above}
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
