package shape

import (
	"math"

	"tailgap/core/gap"
)

// evaluator computes skewness, kurtosis and the parts of the gaps from the
// counts of the entries of its spans: the sample's, or a resample's. Each
// goroutine has its own.
type evaluator struct {
	spans
	features Features
	regions  []regions
	heaps    []heap
	before   []float64 // people before each entry; one more than there are
	surplus  []float64 // of each heap
	left     []int32   // counts without some of the people,
	leftFrom []float64 // and how many of these are before each entry

	pause func() bool // between passes over all entries, unless nil; false: leave the rest
}

// regions are one cutoff's: as judged, and as read with the half-step, by the
// fitted curve and by the given one.
type regions struct {
	judged, half           gap.Region
	thresholds             []gap.Threshold
	givenJudged, givenHalf float64 // shares by the given curve, which do not move
	normVariance           float64 // of givenHalf, times n: where the curve is from norms
	ends                   []end   // of half
	stepped                bool    // judged and half are read at different points
	sign                   float64 // -1 for the lower sides
}

// end is where a region ends: the point in standard units, and whether a
// reflected score that falls on it is beyond it.
type end struct {
	point    float64
	included bool
}

// values are what is computed. A value that can't be is NaN. Proportions.
type values struct {
	moments
	cutoffs []parts
}

// parts are one cutoff's, by kind. Of those that only move with mean and SD
// variance has n times the variance. Outside and astride are Q of the package
// comment, of the counted and reflected people and of those at a heap.
type parts struct {
	value    [kinds]float64
	variance [HalfStep + 1]float64
	outside  float64
	astride  float64
}

func newEvaluator(plan *Plan, s spans, f Features) *evaluator {
	entries := len(s.table.U)
	e := &evaluator{spans: s, features: f, before: make([]float64, entries+1),
		left: make([]int32, entries), leftFrom: make([]float64, entries+1)}
	for _, c := range plan.Cutoffs {
		r := regions{judged: s.table.Region(c.Judged), half: s.table.Region(c.Half), thresholds: c.Judged, sign: 1}
		for i := range c.Half {
			r.stepped = r.stepped || c.Judged[i].Point != c.Half[i].Point
			point := (c.Half[i].Point - s.table.Moments.Mean) / s.table.Moments.SD
			r.ends = append(r.ends, end{point, !c.Half[i].Strict})
		}
		if c.Lower {
			r.sign = -1
		}
		if !plan.Table.Curve.Fitted {
			given := gap.NewTable(s.table.Counts, s.table.Moments, plan.Table.Curve)
			half := given.Estimate(given.Region(c.Half))
			r.givenJudged, r.givenHalf, r.normVariance = given.Estimate(given.Region(c.Judged)).Curve, half.Curve, half.V
		}
		e.regions = append(e.regions, r)
	}
	e.heaps = e.newHeaps(plan.Scale)
	e.surplus = make([]float64, len(e.heaps))
	return e
}

// evaluate computes the values into into, whose cutoffs are there already.
// It is false where the counts are all but on one score: nothing is computed then.
func (e *evaluator) evaluate(plan *Plan, count []int32, into *values) bool {
	all := e.sum(count, e.before)
	sums := all.sums()
	if !spread(&sums) {
		return false
	}
	if !e.goOn() {
		return false
	}
	into.moments = e.moments(count, sums.N, sums.Mean)
	if !e.goOn() {
		return false
	}
	for i := range into.cutoffs {
		e.parts(plan, &e.regions[i], count, &sums, &into.cutoffs[i])
	}
	if plan.Table.Curve.Fitted {
		e.withoutPile(Floor, e.features.Floor, count, into)
		e.withoutPile(Ceiling, e.features.Ceiling, count, into)
		e.withoutExtremes(Extremes, e.features.Extremes, count, sums.Mean, into)
		if e.features.Outlier {
			e.withoutOne(Farthest, e.features.Farthest, count, into)
		}
	}
	if !e.goOn() {
		return false
	}
	e.withoutHeaps(plan, count, all, into)
	return true
}

func (e *evaluator) goOn() bool { return e.pause == nil || e.pause() }

// power are sums of powers of the entries.
type power struct{ s0, s1, s2, s3, s4 float64 }

func (p *power) add(count, u float64) {
	p.s0 += count
	p.s1 += count * u
	p.s2 += count * u * u
	p.s3 += count * u * u * u
	p.s4 += count * u * u * u * u
}

func (p *power) sums() gap.Sums { return gap.NewSums(p.s0, p.s1, p.s2, p.s3, p.s4) }

// sum adds up the people's powers, and fills before with how many of them are
// before each entry.
func (e *evaluator) sum(count []int32, before []float64) power {
	var p power
	for i, u := range e.table.U {
		before[i] = p.s0
		if count[i] != 0 {
			p.add(float64(count[i]), u)
		}
	}
	before[len(count)] = p.s0
	return p
}

// parts splits one cutoff's gap.
func (e *evaluator) parts(plan *Plan, r *regions, count []int32, sums *gap.Sums, into *parts) {
	judged, half := e.table.ReadRegion(&r.judged, sums), e.table.ReadRegion(&r.half, sums)
	counted := (e.before[r.half.To] - e.before[r.half.From]) / sums.N
	reflected := e.reflected(r, count, sums)
	into.outside = math.Max(0, math.Min(counted+reflected, 2-counted-reflected))
	into.value[Asymmetry] = r.sign * (reflected - counted) / 2
	into.value[Rest] = r.sign * (half.Share() - (counted+reflected)/2)
	if plan.Table.Curve.Fitted {
		step := judged.Less(&half, sums)
		into.value[HalfStep], into.variance[HalfStep] = r.sign*step.Share(), step.Variance()
		return
	}
	into.value[HalfStep] = r.sign * (r.givenJudged - r.givenHalf)
	into.value[MeanAndSD], into.variance[MeanAndSD] = r.sign*(r.givenHalf-half.Share()), half.Variance()+r.normVariance
}

// reflected is the share of the scores that are in the region when they are
// reflected about their mean.
func (e *evaluator) reflected(r *regions, count []int32, sums *gap.Sums) float64 {
	people := e.below(2*sums.Mean-r.ends[0].point, r.ends[0].included, count, e.before)
	if len(r.ends) == 2 {
		people -= e.below(2*sums.Mean-r.ends[1].point, r.ends[1].included, count, e.before)
	}
	return people / sums.N
}

// difference is what a cutoff's gap loses when the people are counted, and the
// curve fitted, otherwise.
func (e *evaluator) difference(r *regions, v *parts, sums *gap.Sums, inside float64) float64 {
	reading := e.table.ReadRegion(&r.judged, sums)
	without := r.sign * (reading.Share() - inside/sums.N)
	return v.gap() - without
}

// gap is the sum of the parts.
func (p *parts) gap() float64 {
	return p.value[MeanAndSD] + p.value[HalfStep] + p.value[Asymmetry] + p.value[Rest]
}
