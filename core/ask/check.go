package ask

import (
	"fmt"
	"math"

	"tailgap/core/cutoff"
	"tailgap/core/verdict"
)

// Limits of what can be asked; beyond them an answer would be noise, or
// would never come.
const (
	minReplicates = 200
	maxReplicates = 1_000_000
	maxCutoffs    = 1000
	maxWorkers    = 1024
	maxHeads      = 1e12
	// minNormN is the fewest norm people for whom the limits were seen to keep
	// their level, stretches and bands included (see core/gap).
	minNormN = 5
	minLevel = 0.5
)

// Check returns an error, a sentence for the person who asks, when the
// question can't be answered whatever the data.
func (q Question) Check() error {
	if q.Format != QuestionFormat {
		return fmt.Errorf("the question has the format %.60q; this program reads %q", q.Format, QuestionFormat)
	}
	if !(q.Level > 0 && q.Level < 1) {
		return fmt.Errorf("the level %v is not between 0 and 1; write 0.95 for 95%% intervals", q.Level)
	}
	if q.Level < minLevel {
		return fmt.Errorf("an interval at the level %v misses more often than it hits and settles nothing; ask for %v or more, such as 0.95", q.Level, minLevel)
	}
	if q.Replicates < minReplicates || q.Replicates > maxReplicates {
		return fmt.Errorf("%d replicates can't be used; ask for between %d and %d", q.Replicates, minReplicates, maxReplicates)
	}
	if float64(q.Replicates+1)*(1-q.Level) < 1 {
		return fmt.Errorf("a level of %v needs more than %d replicates: ask for %.0f or more", q.Level, q.Replicates, math.Ceil(1/(1-q.Level)))
	}
	if q.Workers < 0 || q.Workers > maxWorkers {
		return fmt.Errorf("%d workers can't share the work; ask for 1 to %d, or 0 for one for each core", q.Workers, maxWorkers)
	}
	if q.Curve != nil && (!(q.Curve.SD > 0) || !finite(q.Curve.SD) || !finite(q.Curve.Mean)) {
		return fmt.Errorf("a curve with mean %v and SD %v can't be drawn; the SD must be above zero and both must be finite", q.Curve.Mean, q.Curve.SD)
	}
	if q.Curve != nil && q.Curve.NormN != nil && (*q.Curve.NormN < minNormN || *q.Curve.NormN > maxHeads) {
		return fmt.Errorf("norms from %d people can't be used; say how many people their mean and SD were estimated from, %d or more, or leave it out if they are to count as exact", *q.Curve.NormN, minNormN)
	}
	if err := q.checkCutoffs(); err != nil {
		return err
	}
	return q.checkStakes()
}

func (q Question) checkCutoffs() error {
	if len(q.Cutoffs) > maxCutoffs {
		return fmt.Errorf("%d cutoffs are more than one answer takes; ask for at most %d", len(q.Cutoffs), maxCutoffs)
	}
	seen := map[cutoff.Cutoff]bool{}
	for _, c := range q.Cutoffs {
		if seen[c] {
			return fmt.Errorf("the cutoff %s is there twice; leave one out", c)
		}
		seen[c] = true
	}
	return nil
}

func (q Question) checkStakes() error {
	if q.Heads != nil && !(*q.Heads > 0 && *q.Heads <= maxHeads) {
		return fmt.Errorf("%v heads can't be counted; say how many people the share will be applied to, a number above zero and up to a million million", *q.Heads)
	}
	for _, limit := range []*verdict.Limit{q.TooHigh, q.TooLow} {
		switch {
		case limit == nil:
		case !(limit.Size >= 0) || !finite(limit.Size):
			return fmt.Errorf("the tolerance %s can't be used; it must be zero or more", limit)
		case limit.Unit == verdict.Heads && q.Heads == nil:
			return fmt.Errorf("the tolerance %s needs to know of how many people; say it with heads, such as 4000", limit)
		}
	}
	if l := q.TooLow; l != nil && l.Unit == verdict.OfCount && l.Size >= 100 {
		return fmt.Errorf("no curve is too low by more than all of the count, so %s says nothing; leave out the limit on too low, or make it smaller", l)
	}
	return nil
}

func finite(x float64) bool { return !math.IsNaN(x) && !math.IsInf(x, 0) }
