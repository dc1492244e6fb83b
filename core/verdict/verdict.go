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
// interval, proportions.
type Limits struct{ Gap, Low, High float64 }

// Of gives the verdict; limits must return the Limits at a weight. It is two
// one-sided tests (Schuirmann 1987) by means of an interval; "holds" at every
// one of several cutoffs needs no correction (intersection-union; Berger &
// Hsu 1996).
func Of(t Tolerance, limits func(weight float64) Limits) Verdict {
	holds := true
	if t.High != nil {
		l := limits(t.High.Weight)
		if l.Low > t.High.At {
			return Fails
		}
		holds = holds && l.High <= t.High.At
	}
	if t.Low != nil {
		l := limits(t.Low.Weight)
		if l.High < t.Low.At {
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
//	n' = n (w/δ)² (1 + z_0.8/z_{1-α/2})²,
//
// δ the distance from the gap to the edge of the tolerance, w that from the gap
// to the limit which has to clear it; ok is false where no realistic number would do (more than
// 100 n). Where the gap is inside the tolerance both edges must be cleared.
func PeopleToSettle(t Tolerance, n int, level float64, limits func(weight float64) Limits) (more int, ok bool) {
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
		reach := l.High - l.Gap                    // of the limit that has to clear the edge
		if (side.sign > 0) == (room < 0) {
			reach = l.Gap - l.Low
		}
		ratio := reach / math.Abs(room)
		switch {
		case room < 0:
			needed, outside = ratio*ratio, true
		case !outside:
			needed = max(needed, ratio*ratio)
		}
	}
	normal := distuv.UnitNormal
	power := 1 + normal.Quantile(0.8)/normal.Quantile((1+level)/2)
	more64 := math.Ceil(float64(n)*needed*power*power) - float64(n)
	if !(more64 <= unrealistic*float64(n)) {
		return 0, false
	}
	return int(max(1, more64)), true
}
