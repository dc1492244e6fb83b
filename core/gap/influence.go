package gap

import (
	"math"

	"tailgap/core/curve"
)

// SampleSums are the power sums of the sample itself.
func (t Table) SampleSums() Sums {
	m := t.Moments
	sd := m.SD
	sums := newSums(float64(m.N), 0, m.M2/(sd*sd), m.M3/(sd*sd*sd), m.M4/(sd*sd*sd*sd))
	sums.Norms = printed
	return sums
}

// SampleInside are the sums of the sample over a region.
func (t Table) SampleInside(r Region) Inside {
	var in Inside
	for i := r.From; i < r.To; i++ {
		count, u := float64(t.Counts.Count[i]), t.U[i]
		in.K += count
		in.S1 += count * u
		in.S2 += count * u * u
	}
	return in
}

// Estimate is the region's estimate from the sample.
func (t Table) Estimate(r Region) *Estimate {
	sums := t.SampleSums()
	return t.estimate(r, &sums, t.SampleInside(r))
}

// Estimates are the regions' estimates from the sample, in their order: in one
// pass over the scores for all of them.
func (t Table) Estimates(regions []Region) []*Estimate {
	tails := make([]Inside, len(t.U)+1)
	for i := len(t.U) - 1; i >= 0; i-- {
		count, u := float64(t.Counts.Count[i]), t.U[i]
		tails[i] = Inside{tails[i+1].K + count, tails[i+1].S1 + count*u, tails[i+1].S2 + count*u*u}
	}
	sums := t.SampleSums()
	estimates := make([]*Estimate, len(regions))
	for i, r := range regions {
		in, beyond := tails[r.From], tails[r.To]
		estimates[i] = t.estimate(r, &sums, Inside{in.K - beyond.K, in.S1 - beyond.S1, in.S2 - beyond.S2})
	}
	return estimates
}

func (t Table) estimate(r Region, sums *Sums, in Inside) *Estimate {
	var e Estimate
	reading := t.ReadRegion(&r, sums)
	if t.Curve.NormN > 0 {
		reading.v = sums.N * t.normVariance(reading.slope, reading.spread)
	}
	e.Set(&r, sums, &reading, in)
	e.unseen = t.unseenBy(&r, sums, &reading)
	return &e
}

// Influence is the influence function of the gap of an upper tail, one value
// for each distinct score, for a fitted normal curve: what one more person
// with that score would change in the gap, times n. A given curve's share
// does not move, so only the counted share's part is left.
//
//	ψ(x) = φ(z)[u + (z/2)(u²-1)] - (1{x beyond the cutoff} - S),  u = (x-mean)/SD
func (t Table) Influence(r Region) []float64 {
	counted := t.SampleInside(r).K / float64(t.Counts.N)
	psi := make([]float64, len(t.U))
	for i, u := range t.U {
		psi[i] = counted
		if i >= r.From && i < r.To {
			psi[i]--
		}
		if t.Curve.Fitted {
			psi[i] += shareInfluence(r.Lower.u, u)
			if r.Stretch {
				psi[i] -= shareInfluence(r.Upper.u, u)
			}
		}
	}
	return psi
}

func shareInfluence(z, u float64) float64 {
	return curve.Density(z) * (u + z/2*(u*u-1))
}

// PlugInSE is the root of the mean squared influence over n, a proportion:
// the delta method's standard error of the gap. It is right in the middle of
// the scale and collapses in an empty tail; SE is the one that is reported.
func (t Table) PlugInSE(r Region) float64 {
	total, n := 0.0, float64(t.Counts.N)
	for i, psi := range t.Influence(r) {
		total += float64(t.Counts.Count[i]) * psi * psi
	}
	return math.Sqrt(total / n / n)
}
