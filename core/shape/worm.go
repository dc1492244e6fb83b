package shape

import (
	"math"

	"tailgap/core/curve"
	"tailgap/core/gap"
)

// Worm is a detrended normal quantile plot (van Buuren & Fredriks 2001). Each
// distinct score has a mark: Quantile is the standard score that a normal
// curve has at the score's place among the people (half of those with the
// same score counted as below it), Deviation how many SDs of the curve the
// score itself lies above that, and Limit how far from it, up or down, a single
// score lies at most with the probability of the level if the curve is the
// scores' own,
//
//	t·√(Φ(q)(1-Φ(q))/n)/φ(q),  t the normal quantile of the level
//
// approximately: they are of a large sample, and hold mark by mark, not for all
// of the worm together. For a fitted curve they are somewhat too wide.
type Worm struct{ Score, Quantile, Deviation, Limit []float64 }

// mostMarks is how many marks a worm has; more are thinned to it, so that
// what is left is spaced evenly over the quantiles. The ends are kept.
const mostMarks = 300

// NewWorm is the worm of a table's scores and curve.
func NewWorm(t gap.Table, level float64) Worm {
	var w Worm
	counts, n := t.Counts, float64(t.Counts.N)
	last := len(counts.Score) - 1
	from := placeOf(float64(counts.Count[0])/2, n)
	apart := (placeOf(n-float64(counts.Count[last])/2, n) - from) / (mostMarks - 1)
	before, next := 0, 0.0 // people below this score, and below the next mark
	for i, score := range counts.Score {
		below := float64(before) + float64(counts.Count[i])/2
		before += counts.Count[i]
		if below < next && i != last {
			continue
		}
		q := placeOf(below, n)
		if last >= mostMarks {
			next = n * curve.UpperTail(-from-apart*(math.Floor((q-from)/apart)+1))
		}
		z := math.Max(-farthest, math.Min(farthest, t.Curve.Z(score)))
		share := curve.UpperTail(q)
		w.Score = append(w.Score, score)
		w.Quantile = append(w.Quantile, q)
		w.Deviation = append(w.Deviation, z-q)
		w.Limit = append(w.Limit, curve.Quantile((1-level)/2)*math.Sqrt(share*(1-share)/n)/curve.Density(q))
	}
	return w
}

// farthest is the standard score that stands for all beyond it.
const farthest = 1e30

// placeOf is the standard score below which a normal curve has so many of n
// people.
func placeOf(people, n float64) float64 { return curve.Quantile(1 - people/n) }

// Place is where a threshold parts the worm: the standard score beyond which
// a normal curve has the counted share. There is none where all people are on
// one side.
func Place(t gap.Table, at gap.Threshold) (place float64, ok bool) {
	people := float64(t.Counts.People(0, t.Region([]gap.Threshold{at}).From))
	n := float64(t.Counts.N)
	return placeOf(people, n), people > 0 && people < n
}
