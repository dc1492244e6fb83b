package figure

import (
	"tailgap/core/ask"
	"tailgap/core/verdict"
)

// corridor is the tolerance in points at each threshold of a sweep; a side
// without a limit is nil.
type corridor struct{ high, low []float64 }

// newCorridor draws a limit in percent of the count as that part of the
// counted share at each threshold, the others as constants.
func newCorridor(q ask.Question, s ask.Sweep) corridor {
	return corridor{high: limitAlong(q.TooHigh, q.Heads, s, 1), low: limitAlong(q.TooLow, q.Heads, s, -1)}
}

func limitAlong(l *verdict.Limit, heads *float64, s ask.Sweep, sign float64) []float64 {
	if l == nil {
		return nil
	}
	points, known := l.Points(heads)
	if !known && l.Unit != verdict.OfCount {
		return nil
	}
	along := make([]float64, len(s.Threshold))
	for i := range along {
		if !known {
			points = l.Size * s.CountedShare[i]
		}
		along[i] = sign * points
	}
	return along
}

// How much of the height the gap itself keeps: the band and the corridor may
// reach this many times as far from zero as the gap does, and no farther,
// since at 20 people the band would press the gap flat.
const farthest = 4.0

// leastReach keeps a gap that is nowhere worth speaking of from being blown
// up to the height of the figure, in points.
const leastReach = 0.02

// heights is the extent of a sweep's figure in points: all of the gap and
// of the cutoffs' gaps, and of the limits about them what lies near.
func heights(r ask.Result, s ask.Sweep, c corridor) (low, high float64) {
	low, high = extent(s.GapPoints)
	for _, f := range r.Cutoffs {
		if onSweep(f, s) {
			low, high = min(low, f.GapPoints), max(high, f.GapPoints)
		}
	}
	base := max(leastReach, max(-low, high))
	for _, values := range [...][]float64{s.BandLow, s.BandHigh, c.low, c.high, limits(r, s)} {
		l, h := extent(values)
		low = min(low, max(l, -farthest*base))
		high = max(high, min(h, farthest*base))
	}
	// Both directions stay in sight, and nothing touches the frame.
	span := max(high-low, leastReach)
	return min(low, -0.06*span) - 0.06*span, max(high, 0.06*span) + 0.06*span
}

// limits are the ends of the cutoffs' intervals.
func limits(r ask.Result, s ask.Sweep) (all []float64) {
	for _, f := range r.Cutoffs {
		if onSweep(f, s) && f.GapLow != nil && f.GapHigh != nil {
			all = append(all, *f.GapLow, *f.GapHigh)
		}
	}
	return all
}

// extent is the least and the greatest value, with zero among them.
func extent(values []float64) (low, high float64) {
	for _, v := range values {
		low, high = min(low, v), max(high, v)
	}
	return low, high
}

// onSweep tells whether a cutoff's gap belongs on a sweep: one of its side,
// or a stretch, which has no sweep of its own.
func onSweep(f ask.Finding, s ask.Sweep) bool {
	return f.Cutoff.Side == s.Side || len(ends(f.Cutoff)) == 2
}
