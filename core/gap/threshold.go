package gap

import (
	"tailgap/core/cutoff"
	"tailgap/core/sample"
)

// Split is the threshold at a score on a scale: strict for "above" and "at
// or below", which part the people just above the score. With the half-step
// the curve is read half a step short of the lowest attainable score beyond
// the threshold, which is half a step beside every attainable score.
func Split(scale sample.Scale, at float64, strict, halfStep bool) Threshold {
	t := Threshold{At: at, Strict: strict, Point: at}
	switch {
	case !halfStep || scale.Step == 0:
	case strict:
		t.Point = scale.AtOrBelow(at) + scale.Step/2
	default:
		t.Point = scale.AtOrAbove(at) - scale.Step/2
	}
	return t
}

// Ends are the thresholds of a cutoff: one, as an upper tail, for a one-sided
// cutoff (for the lower sides the complement of what is asked for), two for
// a stretch.
func Ends(scale sample.Scale, c cutoff.Cutoff, halfStep bool) []Threshold {
	if c.Side == cutoff.Stretch {
		from, to := Split(scale, c.At, false, halfStep), Split(scale, c.To, true, halfStep)
		if halfStep && scale.AtOrAbove(c.At) > scale.AtOrBelow(c.To) {
			to.Point = from.Point // midway between the same two attainable scores, but for rounding
		}
		return []Threshold{from, to}
	}
	return []Threshold{Split(scale, c.At, c.Side.Strict(), halfStep)}
}

// Region is the region between the ends that Ends gave.
func (t Table) Region(ends []Threshold) Region {
	if len(ends) == 2 {
		return t.Between(ends[0], ends[1])
	}
	return t.Tail(ends[0])
}
