package shape

import (
	"math"
	"slices"

	"tailgap/core/resample"
)

// assemble gives the estimates their intervals; replicates are nil when
// everyone was counted. Where the resamples were drawn from bins, heaps have
// none.
func assemble(plan *Plan, f Features, estimates *values, replicates []values, bins bool) Findings {
	n := float64(plan.Table.Counts.N)
	out := Findings{Features: f, Replicates: len(replicates)}
	t := resample.StudentT(plan.Table.Counts.N, plan.Level)
	of := func(get func(*values) float64) []float64 {
		all := make([]float64, len(replicates))
		for i := range replicates {
			all[i] = get(&replicates[i])
		}
		return all
	}
	out.Skewness = Value{estimates.skewness, plan.studentised(t, n, estimates.skewness, estimates.skewnessVariance,
		of(func(v *values) float64 { return v.skewness }), of(func(v *values) float64 { return v.skewnessVariance }))}
	if i := out.Skewness.Interval; i != nil {
		most := (n - 2) / math.Sqrt(n-1)
		*i = between(*i, -most, most)
	}
	out.ExcessKurtosis = Value{Estimate: estimates.kurtosis - 3}
	logarithm := func(v *values) float64 { return math.Log(v.kurtosis) }
	variance := func(v *values) float64 { return v.kurtosisVariance / (v.kurtosis * v.kurtosis) }
	if i := plan.studentised(t, n, logarithm(estimates), variance(estimates), of(logarithm), of(variance)); i != nil {
		i = &resample.Interval{Low: math.Exp(i.Low), High: math.Exp(i.High)}
		*i = between(*i, 1, n-2+1/(n-1))
		out.ExcessKurtosis.Interval = &resample.Interval{Low: i.Low - 3, High: i.High - 3}
	}
	for c := range estimates.cutoffs {
		var effects Effects
		estimate := &estimates.cutoffs[c]
		for kind := range kinds {
			if !plan.applies(kind, c, f) || math.IsNaN(estimate.value[kind]) {
				continue
			}
			v := Value{Estimate: estimate.value[kind]}
			all := of(func(v *values) float64 { return v.cutoffs[c].value[kind] })
			switch {
			case kind == MeanAndSD || kind == HalfStep:
				v.Interval = plan.studentised(t, n, v.Estimate, estimate.variance[kind], all,
					of(func(v *values) float64 { return v.cutoffs[c].variance[kind] }))
			case kind == Asymmetry || kind == Rest:
				v.Interval = plan.hull(t, v.Estimate, all, ghosts(n, estimate.outside))
			case kind == Farthest || kind == Heaps && bins:
			case kind == Heaps:
				v.Interval = plan.hull(t, v.Estimate, all, ghosts(n, estimate.astride))
			default:
				v.Interval = plan.hull(t, v.Estimate, all, 0)
			}
			effects[kind] = &v
		}
		out.Cutoffs = append(out.Cutoffs, effects)
	}
	return out
}

// ghosts is the variance that four made-up people, two of them in the share q,
// add to half of that share (Agresti & Coull 1998).
func ghosts(n, q float64) float64 {
	shrunk := (n*q + 2) / (n + 4)
	return math.Max(0, shrunk*(1-shrunk)-q*(1-q)) / (4 * n)
}

// between is the interval cut off at the least and the most.
func between(i resample.Interval, least, most float64) resample.Interval {
	return resample.Interval{Low: math.Max(i.Low, least), High: math.Min(i.High, most)}
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
// level's quantile of the studentised replicates; nil where there is no
// standard error.
func (p *Plan) studentised(t, n, estimate, variance float64, all, variances []float64) *resample.Interval {
	if !(variance > 0) {
		return nil
	}
	var squares []float64
	for i, x := range all {
		d := x - estimate
		if square := d * d * n / math.Max(variances[i], 0.05*variance); !math.IsNaN(square) {
			squares = append(squares, square)
		}
	}
	if !p.enough(len(squares)) {
		return nil
	}
	slices.Sort(squares)
	q := math.Sqrt(quantile(squares, p.Level))
	margin := math.Max(t, q) * math.Sqrt(variance/n)
	return &resample.Interval{Low: estimate - margin, High: estimate + margin}
}

// hull is the interval that holds t standard errors of the replicates each
// way and their percentile interval; extra is added to their variance.
func (p *Plan) hull(t, estimate float64, all []float64, extra float64) *resample.Interval {
	all = slices.DeleteFunc(all, math.IsNaN)
	if !p.enough(len(all)) {
		return nil
	}
	mean, squares := 0.0, 0.0
	for _, x := range all {
		mean += x / float64(len(all))
	}
	for _, x := range all {
		squares += (x - mean) * (x - mean)
	}
	margin := t * math.Sqrt(squares/float64(len(all)-1)+extra)
	slices.Sort(all)
	tail := (1 - p.Level) / 2
	around := resample.Interval{Low: estimate - margin, High: estimate + margin}
	return new(around.Hull(resample.Interval{Low: quantile(all, tail), High: quantile(all, 1-tail)}))
}

// quantile is the value of rank ⌈(b+1)·level⌉ of b sorted ones, the first or
// the last where there is none.
func quantile(sorted []float64, level float64) float64 {
	rank := int(math.Ceil(float64(len(sorted)+1)*level - 1e-9))
	return sorted[min(max(rank, 1), len(sorted))-1]
}
