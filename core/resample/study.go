package resample

import (
	"context"
	"math"
	"math/rand/v2"

	"tailgap/core/gap"
)

// study is one goroutine's share of the replicates: its scratch space, and
// the largest studentised gaps it has seen.
type study struct {
	plan     Plan
	cells    *cells
	targets  []target    // by region, then weight
	points   []gap.Point // each place where the curve is read, once
	readings []gap.Reading
	ends     [][2]int     // by region, the places of its ends among the points; a tail has one
	spans    [][2]int     // by region, the first cell inside and the first beyond
	counts   []int32      // people drawn, by cell
	tails    []gap.Inside // sums over the cells from this one up; one more entry than cells
	stream   stream
	normal   *rand.Rand // normal numbers from the stream
	region   []largest  // by region, then weight; none where only bands are wanted
	group    []largest  // by group, then weight
	sup      []fraction
}

// fraction is a squared studentised gap, with the division left undone: most
// are compared and forgotten.
type fraction struct{ square, variance float64 }

// target is what stays the same in every replicate of one region and weight.
type target struct {
	gap      float64 // E, the sample's
	binomial float64 // p̃(1-p̃), the sample's
	least    float64 // floor of V*, part of n SE²
	below    float64 // what people unseen add to V*, where the resample's gap is above the sample's
	above    float64 // and where it is below
}

// leastShare is the part of n·SE² that V* is never below. With a given curve
// V* is n·SE² itself: what it can't see in an empty tail, or in norms that
// happen to have a small SD, the limits of the two shares allow for.
func leastShare(plan Plan) float64 {
	if plan.Table.Curve.Fitted {
		return 0.05
	}
	return 1
}

func newStudy(plan Plan, c *cells) *study {
	s := &study{
		plan: plan, cells: c,
		counts: make([]int32, len(c.means)), tails: make([]gap.Inside, len(c.means)+1),
		sup: make([]fraction, len(plan.Weights)),
	}
	s.normal = rand.New(&s.stream)
	k := upperRank(plan.Replicates, plan.Level)
	for _, e := range plan.Estimates {
		p := e.Shrunk()
		for _, w := range plan.Weights {
			se := e.SE(w)
			below, above := e.Unseen(w)
			s.targets = append(s.targets, target{e.Gap(w), p * (1 - p), leastShare(plan) * e.N * se * se, below, above})
			if !plan.BandsOnly {
				s.region = append(s.region, newLargest(k))
			}
		}
	}
	known := map[gap.Point]int{}
	for _, r := range plan.Regions {
		ends := [2]int{s.point(r.Lower, known)}
		if r.Stretch {
			ends[1] = s.point(r.Upper, known)
		}
		s.ends = append(s.ends, ends)
		s.spans = append(s.spans, [2]int{c.cell(r.From), c.cell(r.To)})
	}
	s.readings = make([]gap.Reading, len(s.points))
	for range len(plan.Groups) * len(plan.Weights) {
		s.group = append(s.group, newLargest(k))
	}
	return s
}

// largest is what is kept for one of the plan's places: those of the regions
// first, then those of the groups.
func (s *study) largest(place int) *largest {
	if place < len(s.region) {
		return &s.region[place]
	}
	return &s.group[place-len(s.region)]
}

// point is the index of the point, which is added when it is new.
func (s *study) point(p gap.Point, known map[gap.Point]int) int {
	index, seen := known[p]
	if !seen {
		index = len(s.points)
		known[p] = index
		s.points = append(s.points, p)
	}
	return index
}

// work is a Worker.
func (s *study) work(ctx context.Context, block int, tell func(done int)) {
	s.block(ctx, block, s.plan.replicates(blocks{{block, block + 1}}), tell)
}

// toldAtOnce is how many replicates are made between two tellings of progress,
// which cost as much as some short replicates: a block of them, unless there
// is so much to judge that a block takes many milliseconds.
func (s *study) toldAtOnce() int {
	if len(s.targets) > 1000 {
		return blockSize / 4
	}
	return blockSize
}

// block runs the replicates of one block, telling how many more are done;
// false when the context ended.
func (s *study) block(ctx context.Context, block, size int, tell func(done int)) bool {
	s.stream.restart(s.plan.Seed, block)
	untold, atOnce := 0, s.toldAtOnce()
	for i := range size {
		if ctx.Err() != nil {
			return false
		}
		s.replicate()
		if untold++; untold == atOnce || i == size-1 {
			tell(untold)
			untold = 0
		}
	}
	return true
}

// replicate draws one resample and records its studentised gaps.
func (s *study) replicate() {
	s.cells.drawer.draw(&s.stream, s.counts)
	sums := s.sum()
	if s.plan.Table.Curve.NormN > 0 {
		sums.Norms = s.norms()
	}
	for i := range s.points {
		s.readings[i].Set(&s.plan.Table, &s.points[i], &sums)
	}
	region := 0
	for g, group := range s.plan.Groups {
		if !s.plan.BandsOnly {
			s.judge(region, group[0], &sums)
		}
		for w := range s.sup {
			s.sup[w] = fraction{0, 1}
		}
		s.judge(group[0], group[1], &sums)
		for w, largest := range s.sup {
			s.group[g*len(s.sup)+w].offer(largest.square / largest.variance)
		}
		region = group[1]
	}
	if !s.plan.BandsOnly {
		s.judge(region, len(s.plan.Regions), &sums)
	}
}

// sum fills the tails and returns the moments of the resample.
func (s *study) sum() gap.Sums {
	var all gap.Inside
	var s3, s4 float64
	if s.cells.spread == nil {
		all, s3, s4 = s.sumScores()
	} else {
		all, s3, s4 = s.sumCells()
	}
	return gap.NewSums(all.K, all.S1, all.S2, s3, s4)
}

// sumScores adds up the scores drawn.
func (s *study) sumScores() (tail gap.Inside, s3, s4 float64) {
	for i := len(s.counts) - 1; i >= 0; i-- {
		if s.counts[i] != 0 {
			count, p := float64(s.counts[i]), &s.cells.means[i]
			tail.K += count
			tail.S1 += count * p.u1
			tail.S2 += count * p.u2
			s3 += count * p.u3
			s4 += count * p.u4
		}
		s.tails[i] = tail
	}
	return tail, s3, s4
}

// sumCells adds up the people drawn in cells of many scores: their mean, and
// how they vary about it.
func (s *study) sumCells() (tail gap.Inside, s3, s4 float64) {
	s3, s4 = s.cells.rest.of(s.normal.NormFloat64(), s.normal.NormFloat64())
	for i := len(s.counts) - 1; i >= 0; i-- {
		if s.counts[i] != 0 {
			count, p, by := float64(s.counts[i]), &s.cells.means[i], &s.cells.spread[i]
			tail.K += count
			tail.S1 += count * p.u1
			tail.S2 += count * p.u2
			s3 += count * p.u3
			s4 += count * p.u4
			if by.u1 > 0 {
				root := math.Sqrt(count)
				along, beside := root*s.normal.NormFloat64(), root*s.normal.NormFloat64()
				tail.S1 += by.u1 * along
				tail.S2 += by.u2*along + by.v2*beside
				s3 += by.u3*along + by.v3*beside
				s4 += by.u4*along + by.v4*beside
			}
		}
		s.tails[i] = tail
	}
	return tail, s3, s4
}

// judge records the squared studentised gaps of the regions from (in) to
// (out), at each weight.
func (s *study) judge(from, to int, sums *gap.Sums) {
	var e gap.Estimate
	at := from * len(s.plan.Weights)
	for i := from; i < to; i++ {
		s.estimate(&e, i, sums)
		for w, weight := range s.plan.Weights {
			target, sup := &s.targets[at], &s.sup[w]
			d := e.Gap(weight) - target.gap
			f := fraction{d * d * e.N, e.V + e.KappaUnfloored(weight)*target.binomial}
			if f.variance < target.least {
				f.variance = target.least
			}
			if d > 0 {
				f.variance += target.below
			} else {
				f.variance += target.above
			}
			if !s.plan.BandsOnly {
				if kept := &s.region[at]; f.square >= kept.floor*f.variance {
					kept.offer(f.square / f.variance)
				}
			}
			if f.square*sup.variance > sup.square*f.variance {
				*sup = f
			}
			at++
		}
	}
}

// estimate sets one region's estimate from the resample.
func (s *study) estimate(e *gap.Estimate, region int, sums *gap.Sums) {
	r, ends, span := &s.plan.Regions[region], s.ends[region], s.spans[region]
	above, beyond := &s.tails[span[0]], &s.tails[span[1]]
	inside := gap.Inside{K: above.K - beyond.K, S1: above.S1 - beyond.S1, S2: above.S2 - beyond.S2}
	if !r.Stretch {
		e.Set(r, sums, &s.readings[ends[0]], inside)
		return
	}
	reading := s.readings[ends[0]]
	reading.Subtract(&s.readings[ends[1]], sums)
	e.Set(r, sums, &reading, inside)
}
