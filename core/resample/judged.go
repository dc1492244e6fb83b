package resample

import (
	"math"

	"gonum.org/v1/gonum/stat/distuv"

	"tailgap/core/gap"
)

// Judged gives the limits of a plan's regions from what its replicates came
// to, by the method that the curve asks for. It keeps what it has worked out,
// and is for one goroutine.
type Judged struct {
	plan      Plan
	quantiles Quantiles
	t         float64 // Student's t at the plan's level
	sparse    sparse
	aparts    map[apartKey]gap.Apart
}

// Judge makes a Judged of a plan and its quantiles; step says whether the
// scores stand on a scale with a step.
func Judge(plan Plan, quantiles Quantiles, step bool) *Judged {
	n := plan.Table.Counts.N
	return &Judged{
		plan: plan, quantiles: quantiles, t: StudentT(n, plan.Level), sparse: bandSparse(n, plan.Level, step),
		aparts: map[apartKey]gap.Apart{},
	}
}

// The methods by which an interval is made.
const (
	Exact            = "exact binomial, Clopper-Pearson"
	ExactWithNorms   = "exact binomial and the norms' own sampling, MOVER"
	Studentised      = "ghost-studentised"
	StudentisedOrFew = "ghost-studentised, hull with score limits"
)

// Method names how a region's interval is made.
func (j *Judged) Method(region int) string {
	switch {
	case j.plan.Table.Curve.Known():
		return Exact
	case !j.plan.Table.Curve.Fitted:
		return ExactWithNorms
	case j.tail(region) && j.plan.Estimates[region].Few():
		return StudentisedOrFew
	}
	return Studentised
}

func (j *Judged) tail(region int) bool { return !j.plan.Regions[region].Stretch }

// Interval is the interval of curve share - weight·counted share of a region,
// or of what is short of a tail where lower is true, proportions. With a
// fitted curve it is made by the quantile of the replicates at the weight of,
// which must be one of the plan's.
func (j *Judged) Interval(region int, lower bool, weight, of float64) Interval {
	if !j.plan.Table.Curve.Fitted {
		return j.apartLimits(region, lower, weight, miss(j.plan.Level))
	}
	quantile := j.quantiles.Region[region][j.weightIndex(of)]
	return mirrored(intervalOf(j.plan.Estimates[region], weight, quantile, j.t, j.tail(region)), lower, weight)
}

// Band are the simultaneous limits for the sweep of a group at one of its
// thresholds, otherwise as Interval, which lies inside them. The weight must
// be one of the plan's.
func (j *Judged) Band(region, group int, lower bool, weight float64) Interval {
	quantile := j.quantiles.Group[group][j.weightIndex(weight)]
	if !j.plan.Table.Curve.Fitted {
		return j.apartLimits(region, lower, weight, bandMiss(quantile, j.plan.Level))
	}
	band := mirrored(bandOf(j.plan.Estimates[region], weight, quantile, j.sparse), lower, weight)
	return band.Hull(j.Interval(region, lower, weight, weight))
}

// FixedParts are the parts of the squared distances from the gap to its
// Interval's limits that more people would not take away: what a curve from
// norms adds (gap.Apart.CurveParts).
func (j *Judged) FixedParts(region int, lower bool, weight float64) (low, high float64) {
	if j.plan.Table.Curve.Fitted {
		return 0, 0
	}
	return j.apart(region, lower, miss(j.plan.Level)).CurveParts(weight)
}

// mirrored turns the limits of an upper tail into those of what is short of it.
func mirrored(i Interval, lower bool, weight float64) Interval {
	if lower {
		return i.Mirror(1 - weight)
	}
	return i
}

func (j *Judged) apartLimits(region int, lower bool, weight, miss float64) Interval {
	low, high := j.apart(region, lower, miss).Limits(weight)
	return Interval{Low: low, High: high}
}

type apartKey struct {
	region int
	lower  bool
	miss   float64
}

// apart has the two shares of a given curve's gap, with limits each missed
// with the probability miss. They are kept: an interval, a band, a verdict and
// a ratio ask for the same ones again and again.
func (j *Judged) apart(region int, lower bool, miss float64) gap.Apart {
	key := apartKey{region, lower, miss}
	a, known := j.aparts[key]
	if !known {
		a = j.plan.Table.Apart(j.plan.Regions[region], j.plan.Estimates[region], lower, miss)
		j.aparts[key] = a
	}
	return a
}

// weightIndex is the weight's among the plan's; a known curve's replicates are
// judged at one weight, which does for all.
func (j *Judged) weightIndex(weight float64) int {
	if j.plan.Table.Curve.Known() {
		return 0
	}
	for i, known := range j.plan.Weights {
		if known == weight {
			return i
		}
	}
	panic("resample: a weight that was not planned")
}

// margins are so many standard errors each way.
func margins(e *gap.Estimate, weight, quantile float64) Interval {
	below, above := e.SideSE(weight)
	return Interval{e.Gap(weight) - quantile*below, e.Gap(weight) + quantile*above}
}

// intervalOf is the ghost-studentised interval of Gap(weight): q standard
// errors (gap.Estimate.SideSE) each way, q being the larger of Student's t and
// the quantile of the studentised replicates; for a tail with fewer than ten
// people on either side, the hull of that and the score limits.
func intervalOf(e *gap.Estimate, weight, quantile, t float64, tail bool) Interval {
	i := margins(e, weight, math.Max(quantile, t))
	if tail && e.Few() {
		i = holdingScoreLimits(i, e, weight, t)
	}
	return i
}

// bandOf are the simultaneous limits at one threshold: quantile is that of the
// largest studentised replicate over the whole sweep.
func bandOf(e *gap.Estimate, weight, quantile float64, sparse sparse) Interval {
	i := margins(e, weight, quantile)
	if math.Min(e.Inside, e.N-e.Inside) < sparse.people {
		i = holdingScoreLimits(i, e, weight, sparse.t)
	}
	return i
}

// holdingScoreLimits is the interval widened to hold the score limits at t,
// which there are for weights above zero.
func holdingScoreLimits(i Interval, e *gap.Estimate, weight, t float64) Interval {
	if weight <= 0 {
		return i
	}
	low, high := e.ScoreLimits(weight, t)
	return i.Hull(Interval{low, high})
}

// sparse says where a band holds the score limits too: where fewer than people
// are on either side of a threshold, at the quantile t.
type sparse struct{ people, t float64 }

// bandSparse is a band's sparse at the level, for n people. On a scale with a
// step it is as for one cutoff. Without one the outermost thresholds stand at
// the outermost scores themselves, wherever those fell, which no replicate
// shows: few people there are too few more often, and what the level leaves is
// divided by ten.
func bandSparse(n int, level float64, step bool) sparse {
	if step {
		return sparse{gap.FewPeople, StudentT(n, level)}
	}
	return sparse{3 * gap.FewPeople, StudentT(n, 1-(1-level)/10)}
}

// miss is the probability with which an interval at the level may miss on each
// side.
func miss(level float64) float64 { return (1 - level) / 2 }

// bandMiss is the same for one threshold of a given curve's band: that of a
// normal quantity beyond the quantile of the largest studentised gap of the
// sweep. It is never larger than an interval's, which so lies in the band.
func bandMiss(quantile, level float64) float64 {
	return math.Min(distuv.UnitNormal.CDF(-quantile), miss(level))
}
