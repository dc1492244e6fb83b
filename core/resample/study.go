package resample

import (
	"context"

	"tailgap/core/gap"
)

// study is one goroutine's share of the replicates: its scratch space, and
// the largest studentised gaps it has seen.
type study struct {
	plan      Plan
	drawer    drawer
	estimates []gap.Estimate
	scale     []target
	powers    []powers
	counts    []int32
	tails     []gap.Inside // sums over the distinct scores from this index up; one more entry than scores
	stream    stream
	region    []largest // by region, then weight
	group     []largest // by group, then weight
	sup       []fraction
}

// fraction is a squared studentised gap, with the division left undone: most
// are compared and forgotten.
type fraction struct{ square, variance float64 }

// target is what stays the same in every replicate of one region and weight.
type target struct {
	gap      float64 // E, the sample's
	binomial float64 // p̃(1-p̃), the sample's
	least    float64 // floor of V*: 0.05 n SE²
}

// powers of a distinct score in standard units.
type powers struct{ u1, u2, u3, u4 float64 }

func newStudy(plan Plan, d drawer, estimates []gap.Estimate) *study {
	distinct := len(plan.Table.U)
	s := &study{
		plan: plan, drawer: d, estimates: estimates,
		counts: make([]int32, distinct), tails: make([]gap.Inside, distinct+1),
		powers: make([]powers, distinct), sup: make([]fraction, len(plan.Weights)),
	}
	for i, u := range plan.Table.U {
		s.powers[i] = powers{u, u * u, u * u * u, u * u * u * u}
	}
	k := upperRank(plan.Replicates, plan.Level)
	for _, e := range estimates {
		p := e.Shrunk()
		for _, w := range plan.Weights {
			se := e.SE(w)
			s.scale = append(s.scale, target{e.Gap(w), p * (1 - p), 0.05 * e.N * se * se})
			s.region = append(s.region, newLargest(k))
		}
	}
	for range len(plan.Groups) * len(plan.Weights) {
		s.group = append(s.group, newLargest(k))
	}
	return s
}

// block runs the replicates of one block; false when the context ended.
func (s *study) block(ctx context.Context, block, size int) bool {
	s.stream.restart(s.plan.Seed, block)
	for range size {
		if ctx.Err() != nil {
			return false
		}
		s.replicate()
	}
	return true
}

// replicate draws one resample and records its studentised gaps.
func (s *study) replicate() {
	s.drawer.draw(&s.stream, s.counts)
	sums := s.sum()
	region := 0
	for g, group := range s.plan.Groups {
		for ; region < group[0]; region++ {
			s.judge(region, sums)
		}
		for w := range s.sup {
			s.sup[w] = fraction{0, 1}
		}
		for ; region < group[1]; region++ {
			s.judge(region, sums)
		}
		for w, largest := range s.sup {
			s.group[g*len(s.sup)+w].offer(largest.square / largest.variance)
		}
	}
	for ; region < len(s.plan.Regions); region++ {
		s.judge(region, sums)
	}
}

// sum fills the tails and returns the moments of the resample.
func (s *study) sum() gap.Sums {
	var tail gap.Inside
	var s3, s4 float64
	for i := len(s.counts) - 1; i >= 0; i-- {
		if s.counts[i] != 0 {
			count, p := float64(s.counts[i]), &s.powers[i]
			tail.K += count
			tail.S1 += count * p.u1
			tail.S2 += count * p.u2
			s3 += count * p.u3
			s4 += count * p.u4
		}
		s.tails[i] = tail
	}
	return gap.NewSums(tail.K, tail.S1, tail.S2, s3, s4)
}

// judge records the squared studentised gap of one region, at each weight.
func (s *study) judge(region int, sums gap.Sums) {
	r := &s.plan.Regions[region]
	from, to := &s.tails[r.From], &s.tails[r.To]
	inside := gap.Inside{K: from.K - to.K, S1: from.S1 - to.S1, S2: from.S2 - to.S2}
	e := s.plan.Table.At(r, &sums, inside)
	at := region * len(s.plan.Weights)
	for w, weight := range s.plan.Weights {
		target, sup := &s.scale[at+w], &s.sup[w]
		d := e.Gap(weight) - target.gap
		f := fraction{d * d * e.N, max(e.V+e.KappaUnfloored(weight)*target.binomial, target.least)}
		if kept := &s.region[at+w]; f.square >= kept.floor*f.variance {
			kept.offer(f.square / f.variance)
		}
		if f.square*sup.variance > sup.square*f.variance {
			*sup = f
		}
	}
}
