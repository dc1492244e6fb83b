package resample

import (
	"errors"
	"fmt"
	"hash/fnv"
	"math"
	"slices"

	"tailgap/core/sample"
)

// Part is what is kept of the replicates of some blocks: for each region and
// weight, and for each group and weight, the largest squared studentised gaps.
// The parts of a plan can be made anywhere, in any split and order, and give
// the same quantiles: see Merge.
type Part struct {
	plan   uint64 // fingerprint of the plan
	blocks blocks
	kept   [][]float64
}

// newPart puts together what the studies kept of some blocks.
func newPart(plan Plan, made blocks, studies []*study) (Part, error) {
	part := Part{blocks: made, kept: make([][]float64, plan.places())}
	count := plan.kept(made)
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

// rows is how many regions, and how many groups, the plan asks quantiles of.
func (p Plan) rows() (regions, groups int) {
	if p.BandsOnly {
		return 0, len(p.Groups)
	}
	return len(p.Regions), len(p.Groups)
}

// places is how many quantiles the plan asks for.
func (p Plan) places() int {
	regions, groups := p.rows()
	return (regions + groups) * len(p.Weights)
}

// kept is how many values some blocks leave for each place.
func (p Plan) kept(made blocks) int {
	return min(upperRank(p.Replicates, p.Level), p.replicates(made))
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
	var all blocks
	fingerprint := plan.fingerprint()
	for _, part := range parts {
		if part.plan != fingerprint || !part.fits(plan) {
			return Quantiles{}, errors.New("the parts are of other replicates than these: of another question, or other data")
		}
		all = append(all, part.blocks...)
	}
	if !slices.Equal(all.joined(), blocks{{0, plan.Blocks()}}) {
		return Quantiles{}, fmt.Errorf("the parts don't have every one of the %d blocks of replicates once", plan.Blocks())
	}
	return merge(plan, parts), nil
}

func (p Part) fits(plan Plan) bool {
	return p.blocks.within(plan.Blocks()) && len(p.kept) == plan.places() &&
		!slices.ContainsFunc(p.kept, func(kept []float64) bool { return len(kept) != plan.kept(p.blocks) })
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
	regions, _ := plan.rows()
	return Quantiles{Region: rows[:regions], Group: rows[regions:]}
}
