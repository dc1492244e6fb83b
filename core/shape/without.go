package shape

import (
	"math"

	"tailgap/core/gap"
	"tailgap/core/sample"
)

// withoutPile leaves out the people at one end.
func (e *evaluator) withoutPile(kind Kind, pile sample.Pile, count []int32, into *values) {
	if pile.People == 0 {
		return
	}
	copy(e.left, count)
	e.left[e.table.Counts.IndexAtLeast(pile.Score)] = 0
	e.without(kind, into)
}

// withoutExtremes leaves out so many people, always the one farthest from the
// mean of all; 0: none.
func (e *evaluator) withoutExtremes(kind Kind, people int, count []int32, mean float64, into *values) {
	if people == 0 {
		return
	}
	copy(e.left, count)
	low, high := 0, len(count)-1
	for range people {
		for e.left[low] == 0 && low < high {
			low++
		}
		for e.left[high] == 0 && low < high {
			high--
		}
		if mean-e.table.U[low] > e.table.U[high]-mean {
			e.left[low]--
		} else {
			e.left[high]--
		}
	}
	e.without(kind, into)
}

// withoutOne leaves out one of the people with a score.
func (e *evaluator) withoutOne(kind Kind, score float64, count []int32, into *values) {
	copy(e.left, count)
	e.left[e.table.Counts.IndexAtLeast(score)]--
	e.without(kind, into)
}

// without finds what each gap loses when only the people in left are there.
func (e *evaluator) without(kind Kind, into *values) {
	if !e.goOn() {
		return
	}
	all := e.sum(e.left, e.leftFrom)
	sums := all.sums()
	for i := range into.cutoffs {
		r, v := &e.regions[i], &into.cutoffs[i]
		v.value[kind] = math.NaN()
		if spread(&sums) {
			v.value[kind] = e.difference(r, v, &sums, e.leftFrom[r.judged.To]-e.leftFrom[r.judged.From])
		}
	}
}

// spread is true where there is an SD worth the name: 1/100,000 of the whole
// sample's or more. Below, the sums hold no digits of it.
func spread(s *gap.Sums) bool { return s.N >= 2 && s.M2 > 1e-10*(1+s.Mean*s.Mean) }

// heap is a round score with the scores around it, over which its surplus is
// spread, those with a pile of people left out: their entries and weights, and what spreading one person does to the
// sums and to the people inside each region.
type heap struct {
	at     int
	around []weighted
	s1, s2 float64
	inside []float64 // by region
}

type weighted struct {
	entry  int
	weight float64 // of the weights of all scores around, seen or not
}

// newHeaps are the heaps of the features; none where the entries are bins.
func (e *evaluator) newHeaps(scale sample.Scale) (heaps []heap) {
	if e.bins { // Heaps.At numbers scores
		return nil
	}
	for _, at := range e.features.Heaps.At {
		if h, ok := e.newHeap(scale, at); ok {
			heaps = append(heaps, h)
		}
	}
	return heaps
}

// newHeap is the heap at an entry; none where the scale has no score around it.
func (e *evaluator) newHeap(scale sample.Scale, at int) (h heap, ok bool) {
	counts, index := e.table.Counts, scale.Index(e.table.Counts.Score[at])
	lowest, highest := math.Min(scale.Low, counts.Min()), math.Max(scale.High, counts.Max())
	steps := e.features.Heaps.Spacing / scale.Step / 2
	h.at = at
	total, inside := 0.0, make([]float64, len(e.regions))
	for k := -math.Floor(steps + 0.1); k <= steps+0.1; k++ {
		score := scale.Score(index + k)
		if score < lowest-scale.Step/4 || score > highest+scale.Step/4 || e.features.piled(score, scale.Step/4) {
			continue
		}
		weight := 1.0
		if math.Abs(k) > steps-0.1 {
			weight = 0.5
		}
		u := (score - e.table.Moments.Mean) / e.table.Moments.SD
		total, h.s1, h.s2 = total+weight, h.s1+weight*u, h.s2+weight*u*u
		for i := range e.regions {
			inside[i] += weight * e.regions[i].holds(score, scale.Step/4)
		}
		entry := counts.IndexAtLeast(score - scale.Step/4)
		if k != 0 && entry < len(counts.Score) && counts.Score[entry] < score+scale.Step/4 {
			h.around = append(h.around, weighted{entry, weight})
		}
	}
	for i := range h.around {
		h.around[i].weight /= total - 1
	}
	u := e.table.U[at]
	h.s1, h.s2 = h.s1/total-u, h.s2/total-u*u
	for i := range inside {
		inside[i] = inside[i]/total - e.regions[i].holds(counts.Score[at], scale.Step/4)
	}
	h.inside = inside
	return h, total > 1
}

// holds is 1 for a score inside the region as it is judged, up to noise, and 0
// for others.
func (r *regions) holds(score, noise float64) float64 {
	beyond := func(t gap.Threshold) bool {
		if t.Strict {
			return score > t.At+noise
		}
		return score > t.At-noise
	}
	if beyond(r.thresholds[0]) && !(len(r.thresholds) == 2 && beyond(r.thresholds[1])) {
		return 1
	}
	return 0
}

// withoutHeaps spreads each heap's surplus over the scores around it.
func (e *evaluator) withoutHeaps(plan *Plan, count []int32, all power, into *values) {
	if len(e.heaps) == 0 {
		return
	}
	for j, h := range e.heaps {
		surplus := float64(count[h.at])
		for _, w := range h.around {
			surplus -= w.weight * float64(count[w.entry])
		}
		e.surplus[j] = surplus
		all.s1 += surplus * h.s1
		all.s2 += surplus * h.s2
	}
	sums := all.sums()
	for i := range into.cutoffs {
		r, v := &e.regions[i], &into.cutoffs[i]
		inside := e.before[r.judged.To] - e.before[r.judged.From]
		astride := int32(0)
		for j, h := range e.heaps {
			inside += e.surplus[j] * h.inside[i]
			if h.inside[i] != 0 {
				astride += count[h.at]
				for _, w := range h.around {
					astride += count[w.entry]
				}
			}
		}
		v.astride = math.Min(1, float64(astride)/all.s0)
		if plan.Table.Curve.Fitted {
			v.value[Heaps] = math.NaN()
			if spread(&sums) {
				v.value[Heaps] = e.difference(r, v, &sums, inside)
			}
		} else {
			v.value[Heaps] = v.gap() - r.sign*(r.givenJudged-inside/all.s0)
		}
	}
}
