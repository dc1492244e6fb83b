package gap

import "math"

// unseen is a made-up person beyond one end of the scores seen, for the share
// of the population, about 1/n of it, that no sample of n shows.
type unseen struct {
	influence float64 // on the curve's share, times n
	inside    bool    // the region
}

const (
	// tailReach is how many mean excesses beyond the last score an unseen person
	// stands: 24^¼. Beyond any point of an exponential tail the excess X, in
	// units of its mean, has E X⁴ = 24; a score acts on the gap by its square,
	// and that counts by its square again.
	tailReach = 2.2133638394006434

	// outermostPart of the people at each end, but at least leastOutermost of
	// them, say how fast the scores thin out there.
	outermostPart  = 10
	leastOutermost = 5
)

// unseenPlaces are where the unseen stand at the lower and the upper end, in
// SDs from the mean: tailReach times the mean excess of the outermost tenth
// beyond the outermost score.
func (t Table) unseenPlaces() [2]float64 {
	last := len(t.U) - 1
	return [2]float64{
		t.U[0] + tailReach*t.meanExcess(func(i int) int { return i }),
		t.U[last] + tailReach*t.meanExcess(func(i int) int { return last - i }),
	}
}

// meanExcess is how far, on average, the outermost people are from the next
// one, below zero at the lower end; order numbers the distinct scores from
// the end inwards.
func (t Table) meanExcess(order func(i int) int) float64 {
	people := min(max(leastOutermost, (t.Counts.N+outermostPart-1)/outermostPart), t.Counts.N-1)
	sum, left := 0.0, people
	for i := 0; ; i++ {
		at := order(i)
		if count := t.Counts.Count[at]; count <= left {
			sum += float64(count) * t.U[at]
			left -= count
			continue
		}
		sum += float64(left) * t.U[at]
		return sum/float64(people) - t.U[at]
	}
}

// unseenBy are the unseen people as one region sees them. A given curve does
// not move by them, and the shrunken counted share allows for them already.
func (t Table) unseenBy(r *Region, sums *Sums, reading *Reading) (by []unseen) {
	if !t.Curve.Fitted {
		return nil
	}
	for _, u := range t.unseenAt {
		by = append(by, unseen{influence: reading.influence(u-sums.Mean, sums), inside: t.insideBy(r, u)})
	}
	return by
}

// insideBy is true where a score at or beyond one of the ends of those seen is
// inside the region.
func (t Table) insideBy(r *Region, u float64) bool {
	last := len(t.U) - 1
	switch u {
	case t.U[0]:
		return r.From == 0 && r.To > 0
	case t.U[last]:
		return r.From <= last && r.To == last+1
	}
	return u >= r.lowerGhost && !(r.Stretch && u >= r.upperGhost)
}

// Unseen is what the unseen people add to n times the variance of Gap(weight),
// for its limit below and for its limit above: each only on the side to which
// it would move the gap.
func (e *Estimate) Unseen(weight float64) (below, above float64) {
	for _, person := range e.unseen {
		influence := person.influence + weight*e.Counted
		if person.inside {
			influence -= weight
		}
		if added := influence * influence / e.N; influence < 0 {
			below += added
		} else {
			above += added
		}
	}
	return below, above
}

// SideSE are the standard errors of Gap(weight) for its limits below and
// above it, proportions: SE with the unseen people added.
func (e *Estimate) SideSE(weight float64) (below, above float64) {
	se := e.SE(weight)
	below, above = e.Unseen(weight)
	return math.Sqrt(se*se + below/e.N), math.Sqrt(se*se + above/e.N)
}
