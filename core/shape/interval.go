package shape

import (
	"math"
	"slices"

	"tailgap/core/resample"
)

// assembly gives the estimates their intervals. There are no replicates when
// everyone was counted.
type assembly struct {
	plan       *Plan
	features   Features
	estimates  *values
	replicates []values
	bins       bool // the replicates were drawn from bins, and heaps have no interval
	n, t       float64
}

func assemble(plan *Plan, f Features, estimates *values, replicates []values, bins bool) Findings {
	n := plan.Table.Counts.N
	a := assembly{plan, f, estimates, replicates, bins, float64(n), resample.StudentT(n, plan.Level)}
	out := Findings{Skewness: a.skewness(), ExcessKurtosis: a.excessKurtosis(), Features: f, Replicates: len(replicates)}
	for c := range estimates.cutoffs {
		out.Cutoffs = append(out.Cutoffs, a.effects(c))
	}
	return out
}

// of is a value of every replicate.
func (a *assembly) of(get func(*values) float64) []float64 {
	all := make([]float64, len(a.replicates))
	for i := range a.replicates {
		all[i] = get(&a.replicates[i])
	}
	return all
}

func (a *assembly) skewness() Value {
	value, variance := func(v *values) float64 { return v.skewness }, func(v *values) float64 { return v.skewnessVariance }
	out := Value{Estimate: a.estimates.skewness, Interval: a.studentised(value, variance)}
	if out.Interval != nil {
		most := (a.n - 2) / math.Sqrt(a.n-1)
		*out.Interval = between(*out.Interval, -most, most)
	}
	return out
}

func (a *assembly) excessKurtosis() Value {
	logarithm := func(v *values) float64 { return math.Log(v.kurtosis) }
	variance := func(v *values) float64 { return v.kurtosisVariance / (v.kurtosis * v.kurtosis) }
	out := Value{Estimate: a.estimates.kurtosis - 3}
	if i := a.studentised(logarithm, variance); i != nil {
		kurtosis := between(resample.Interval{Low: math.Exp(i.Low), High: math.Exp(i.High)}, 1, a.n-2+1/(a.n-1))
		out.Interval = &resample.Interval{Low: kurtosis.Low - 3, High: kurtosis.High - 3}
	}
	return out
}

// between is the interval cut off at the least and the most.
func between(i resample.Interval, least, most float64) resample.Interval {
	return resample.Interval{Low: math.Max(i.Low, least), High: math.Min(i.High, most)}
}

// effects are those at one cutoff.
func (a *assembly) effects(c int) (effects Effects) {
	parts := &a.estimates.cutoffs[c]
	for kind := range kinds {
		if !a.plan.applies(kind, c, a.features) || math.IsNaN(parts.value[kind]) {
			continue
		}
		value := func(v *values) float64 { return v.cutoffs[c].value[kind] }
		v := &Value{Estimate: parts.value[kind]}
		switch {
		case kind == MeanAndSD || kind == HalfStep:
			v.Interval = a.studentised(value, func(v *values) float64 { return v.cutoffs[c].variance[kind] })
		case kind == Asymmetry || kind == Rest:
			v.Interval = a.hull(value, ghosts(a.n, parts.outside))
		case kind == Farthest || kind == Heaps && a.bins:
		case kind == Heaps:
			v.Interval = a.hull(value, ghosts(a.n, parts.astride))
		default:
			v.Interval = a.hull(value, 0)
		}
		effects[kind] = v
	}
	return effects
}

// ghosts is the variance that four made-up people, two of them in the share q,
// add to half of that share (Agresti & Coull 1998).
func ghosts(n, q float64) float64 {
	shrunk := (n*q + 2) / (n + 4)
	return math.Max(0, shrunk*(1-shrunk)-q*(1-q)) / (4 * n)
}

// applies is true where a kind makes a part of a cutoff's gap.
func (p *Plan) applies(kind Kind, c int, f Features) bool {
	fitted := p.Table.Curve.Fitted
	switch kind {
	case MeanAndSD:
		return !fitted
	case HalfStep:
		for i, end := range p.Cutoffs[c].Judged {
			if end.Point != p.Cutoffs[c].Half[i].Point {
				return true
			}
		}
		return false
	case Floor:
		return fitted && f.Floor.People > 0
	case Ceiling:
		return fitted && f.Ceiling.People > 0
	case Heaps:
		return f.Heaps.Spacing > 0
	case Extremes:
		return fitted && f.Extremes > 0
	case Farthest:
		return fitted && f.Outlier
	}
	return true
}

// studentised is the interval of max(t, q) standard errors each way, q the
// level's quantile of the studentised replicates, of a value with n times its
// variance; nil where there is no standard error.
func (a *assembly) studentised(value, variance func(*values) float64) *resample.Interval {
	estimate, least := value(a.estimates), variance(a.estimates)
	if !(least > 0) {
		return nil
	}
	variances := a.of(variance)
	var squares []float64
	for i, x := range a.of(value) {
		d := x - estimate
		if square := d * d * a.n / math.Max(variances[i], 0.05*least); !math.IsNaN(square) {
			squares = append(squares, square)
		}
	}
	if !a.plan.enough(len(squares)) {
		return nil
	}
	slices.Sort(squares)
	margin := math.Max(a.t, math.Sqrt(squares[resample.Rank(len(squares), a.plan.Level)-1])) * math.Sqrt(least/a.n)
	return &resample.Interval{Low: estimate - margin, High: estimate + margin}
}

// hull is the interval that holds t standard errors of the replicates each
// way and their percentile interval; extra is added to their variance.
func (a *assembly) hull(value func(*values) float64, extra float64) *resample.Interval {
	all := slices.DeleteFunc(a.of(value), math.IsNaN)
	if !a.plan.enough(len(all)) {
		return nil
	}
	mean, squares := 0.0, 0.0
	for _, x := range all {
		mean += x / float64(len(all))
	}
	for _, x := range all {
		squares += (x - mean) * (x - mean)
	}
	estimate, rank := value(a.estimates), resample.Rank(len(all), (1+a.plan.Level)/2)
	margin := a.t * math.Sqrt(squares/float64(len(all)-1)+extra)
	slices.Sort(all)
	around := resample.Interval{Low: estimate - margin, High: estimate + margin}
	return new(around.Hull(resample.Interval{Low: all[len(all)-rank], High: all[rank-1]}))
}
