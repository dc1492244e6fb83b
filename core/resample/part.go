package resample

import (
	"cmp"
	"errors"
	"fmt"
	"hash/fnv"
	"math"
	"slices"

	"tailgap/core/sample"
)

// Part is what is kept of the replicates of a range of blocks: for each region
// and weight, and for each group and weight, the largest squared studentised
// gaps. The parts of a plan can be made anywhere, in any split and order, and
// give the same quantiles: see Merge.
type Part struct {
	plan     uint64 // fingerprint of the plan
	from, to int    // blocks
	kept     [][]float64
}

// newPart puts together what the studies kept of some blocks.
func newPart(plan Plan, from, to int, studies []*study) (Part, error) {
	part := Part{from: from, to: to, kept: make([][]float64, plan.places())}
	count := plan.kept(from, to)
	for i := range part.kept {
		all := newLargest(max(1, count))
		for _, s := range studies {
			all.offerAll(s.largest(i).values)
		}
		all.shrink()
		if len(all.values) != count {
			return Part{}, errors.New("the studentised gap of a replicate is not a number")
		}
		part.kept[i] = all.values
	}
	return part, nil
}

// places is how many quantiles the plan asks for.
func (p Plan) places() int { return (len(p.Regions) + len(p.Groups)) * len(p.Weights) }

// kept is how many values the blocks from (in) to (out) leave for each place.
func (p Plan) kept(from, to int) int {
	return min(upperRank(p.Replicates, p.Level), p.replicates(from, to))
}

// fingerprint tells plans apart by all that a replicate depends on, so that no
// part is taken for one of another question's, or of other people's.
func (p Plan) fingerprint() uint64 {
	var hash uint64
	for i, score := range p.Table.Counts.Score {
		hash = mix(mix(hash^math.Float64bits(score)) ^ uint64(p.Table.Counts.Count[i]))
	}
	p.Table.Counts, p.Table.U = sample.Counts{}, nil // they, and
	p.Estimates, p.Workers = nil, 0                  // these follow from the rest, or make no difference
	rest := fnv.New64a()
	fmt.Fprint(rest, p)
	return mix(hash ^ rest.Sum64())
}

// Merge returns the quantiles of all replicates from parts that together have
// each block of the plan once. It returns an error for any other parts, and
// for parts of another plan.
func Merge(plan Plan, parts []Part) (Quantiles, error) {
	parts = slices.SortedFunc(slices.Values(parts), func(a, b Part) int { return cmp.Or(a.from-b.from, a.to-b.to) })
	fingerprint, next := plan.fingerprint(), 0
	for _, part := range parts {
		if part.plan != fingerprint || !part.fits(plan) {
			return Quantiles{}, errors.New("the parts are of other replicates than these: of another question, or other data")
		}
		if part.from != next {
			return Quantiles{}, fmt.Errorf("the parts don't have every one of the %d blocks of replicates once", plan.Blocks())
		}
		next = part.to
	}
	if next != plan.Blocks() {
		return Quantiles{}, fmt.Errorf("the parts have %d of the %d blocks of replicates", next, plan.Blocks())
	}
	return merge(plan, parts), nil
}

func (p Part) fits(plan Plan) bool {
	return p.from <= p.to && p.to <= plan.Blocks() && len(p.kept) == plan.places() &&
		!slices.ContainsFunc(p.kept, func(kept []float64) bool { return len(kept) != plan.kept(p.from, p.to) })
}

func merge(plan Plan, parts []Part) Quantiles {
	quantiles := make([]float64, plan.places())
	for i := range quantiles {
		all := newLargest(upperRank(plan.Replicates, plan.Level))
		for _, part := range parts {
			all.offerAll(part.kept[i])
		}
		quantiles[i] = math.Sqrt(all.least())
	}
	rows := slices.Collect(slices.Chunk(quantiles, len(plan.Weights)))
	return Quantiles{Region: rows[:len(plan.Regions)], Group: rows[len(plan.Regions):]}
}
