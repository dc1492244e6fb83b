package verdict

import (
	"math"

	"gonum.org/v1/gonum/stat/distuv"
)

// Verdict is what can be said of a gap and a tolerance.
type Verdict string

// The verdicts.
const (
	Holds     Verdict = "holds"     // the whole interval is inside the tolerance
	Fails     Verdict = "fails"     // the whole interval is outside
	Unsettled Verdict = "unsettled" // neither
)

// Limits are an estimate of (curve share - weight·counted share) and its
// interval, proportions. FixedLow and FixedHigh are the parts of the squared
// distances from the gap to Low and High that more people would not take away,
// in 0..1: what a curve from norms adds.
type Limits struct{ Gap, Low, High, FixedLow, FixedHigh float64 }

// Of gives the verdict; limits must return the Limits at a weight. It is two
// one-sided tests (Schuirmann 1987) by means of an interval; "holds" at every
// one of several cutoffs needs no correction (intersection-union; Berger &
// Hsu 1996). A curve that is too high by more than a part of the count is too
// high, so it takes both to fail: where curve and weighted count move in step,
// the interval at that weight can be narrow while the gap's is wide.
func Of(t Tolerance, limits func(weight float64) Limits) Verdict {
	holds := true
	if t.High != nil {
		l := limits(t.High.Weight)
		if l.Low > t.High.At && (!t.High.Moves || limits(1).Low > 0) {
			return Fails
		}
		holds = holds && l.High <= t.High.At
	}
	if t.Low != nil {
		l := limits(t.Low.Weight)
		if l.High < t.Low.At && (!t.Low.Moves || limits(1).High < 0) {
			return Fails
		}
		holds = holds && l.Low >= t.Low.At
	}
	if holds {
		return Holds
	}
	return Unsettled
}

// unrealistic is the multiple of the people at hand above which more people
// are no advice.
const unrealistic = 100

// PeopleToSettle is how many more people, beside the n at hand, would give an
// 80% chance that the verdict is settled if the gap is as estimated:
//
//	n' = n r(1-f)/(1-rf),  r = (w/δ)² (1 + z_0.8/z_{1-α/2})²,
//
// δ the distance from the gap to the edge of the tolerance, w that from the gap
// to the limit which has to clear it, f the part of w² that stays; ok is false
// where no realistic number would do (more than 100 n). Where the gap is inside
// the tolerance both edges must be cleared.
func PeopleToSettle(t Tolerance, n int, level float64, limits func(weight float64) Limits) (more int, ok bool) {
	normal := distuv.UnitNormal
	power := 1 + normal.Quantile(0.8)/normal.Quantile((1+level)/2)
	needed, outside := 0.0, false
	for _, side := range []struct {
		edge *Edge
		sign float64
	}{{t.High, +1}, {t.Low, -1}} {
		if side.edge == nil {
			continue
		}
		l := limits(side.edge.Weight)
		room := side.sign * (side.edge.At - l.Gap) // below zero: outside this edge
		reach, fixed := l.High-l.Gap, l.FixedHigh  // of the limit that has to clear the edge
		if (side.sign > 0) == (room < 0) {
			reach, fixed = l.Gap-l.Low, l.FixedLow
		}
		ratio := reach / math.Abs(room) * power
		times := math.Inf(1)
		if ratio*ratio*fixed < 1 {
			times = ratio * ratio * (1 - fixed) / (1 - ratio*ratio*fixed)
		}
		switch {
		case room < 0:
			needed, outside = times, true
		case !outside:
			needed = max(needed, times)
		}
	}
	more64 := math.Ceil(float64(n)*needed) - float64(n)
	if !(more64 <= unrealistic*float64(n)) {
		return 0, false
	}
	return int(max(1, more64)), true
}
