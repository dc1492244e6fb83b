package gap_test

import (
	"math"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"tailgap/core/curve"
	"tailgap/core/gap"
	"tailgap/core/sample"
)

// aCount is a count table of whole scores, two at least.
func aCount(t *rapid.T) sample.Counts {
	scores := rapid.SliceOfN(rapid.Map(rapid.IntRange(0, 20), func(i int) float64 { return float64(i) }), 1, 60).Draw(t, "scores")
	return sample.Count(append(scores, -1))
}

// aTail is a threshold among or beyond the scores, with or without a half-step.
func aTail(t *rapid.T) gap.Threshold {
	at := rapid.Float64Range(-4, 24).Draw(t, "at")
	if rapid.Bool().Draw(t, "at a score") {
		at = math.Round(at)
	}
	return gap.Threshold{At: at, Strict: rapid.Bool().Draw(t, "strict"), Point: at + rapid.SampledFrom([]float64{0, 0.5}).Draw(t, "half-step")}
}

func doubled(counts sample.Counts) sample.Counts {
	twice := sample.Counts{Score: counts.Score, Count: slices.Clone(counts.Count), N: 2 * counts.N}
	for i := range twice.Count {
		twice.Count[i] *= 2
	}
	return twice
}

// Twice the people with the same scores, under a given curve: the same shares
// and gap, and a plug-in standard error smaller by √2.
//
// A fitted curve moves, because its SD has the divisor n-1: every z grows by
// c = √[(2n-1)/(2n-2)]. Read at the same z again its share is the same, but each
// score has the influence of one c times as many SDs from the mean, so the
// standard error shrinks by √2 but for the root mean square of that change,
// φ(z)[(c-1)u + (c²-1)(z/2)u²], over √n: a part of the order of 1/n.
func TestTwiceThePeopleHaveLessError(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		counts, at := aCount(t), aTail(t)
		twice := doubled(counts)
		given := curve.Normal{Mean: 8, SD: 6}
		once, again := gap.NewTable(counts, counts.Moments(), given), gap.NewTable(twice, twice.Moments(), given)
		a, b := once.Estimate(once.Tail(at)), again.Estimate(again.Tail(at))
		assert.Equal(t, a.Curve, b.Curve)
		assert.Equal(t, a.Counted, b.Counted)
		assert.Equal(t, a.Gap(1), b.Gap(1))
		assert.InDelta(t, once.PlugInSE(once.Tail(at)), math.Sqrt2*again.PlugInSE(again.Tail(at)), 1e-14)

		once, again = fittedTo(counts), fittedTo(twice)
		n := float64(counts.N)
		grown := math.Sqrt((2*n - 1) / (2*n - 2))
		assert.InEpsilon(t, grown, once.Moments.SD/again.Moments.SD, 1e-12)
		same := at // where the larger sample's curve has the same z
		same.Point = once.Moments.Mean + (at.Point-once.Moments.Mean)/grown
		a, b = once.Estimate(once.Tail(at)), again.Estimate(again.Tail(same))
		assert.InDelta(t, a.Curve, b.Curve, 1e-14)
		assert.Equal(t, a.Counted, b.Counted)
		seOnce, seTwice := once.PlugInSE(once.Tail(at)), math.Sqrt2*again.PlugInSE(again.Tail(same))
		z := once.Curve.Z(at.Point)
		change := 0.0
		for i, u := range once.U {
			d := curve.Density(z) * ((grown-1)*u + (grown*grown-1)*z/2*u*u)
			change += float64(counts.Count[i]) * d * d / n
		}
		assert.InDelta(t, seOnce, seTwice, math.Sqrt(change/n)*(1+1e-9)+1e-14)
	})
}

func fittedTo(counts sample.Counts) gap.Table {
	m := counts.Moments()
	return gap.NewTable(counts, m, curve.FitNormal(m))
}

// Turned around, the scale has the same gaps with the same standard errors,
// those for the two limits exchanged, under a fitted and under a given curve.
func TestReflectionMirrorsEstimates(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		counts, at := aCount(t), aTail(t)
		mirrored := sample.Counts{Score: slices.Clone(counts.Score), Count: slices.Clone(counts.Count), N: counts.N}
		slices.Reverse(mirrored.Score)
		slices.Reverse(mirrored.Count)
		for i := range mirrored.Score {
			mirrored.Score[i] *= -1
		}
		other := gap.Threshold{At: -at.At, Strict: !at.Strict, Point: -at.Point}
		weight := rapid.Float64Range(0.2, 3).Draw(t, "weight")
		for _, given := range []curve.Normal{{Fitted: true}, {Mean: 8, SD: 6}, {Mean: 8, SD: 6, NormN: 40}} {
			here, there := fittedTo(counts), fittedTo(mirrored)
			if !given.Fitted {
				here.Curve = given
				there.Curve = curve.Normal{Mean: -given.Mean, SD: given.SD, NormN: given.NormN}
			}
			a, b := here.Estimate(here.Tail(at)), there.Estimate(there.Tail(other))
			assert.InDelta(t, a.Gap(weight), 1-weight-b.Gap(weight), 1e-13)
			assert.InDelta(t, a.SE(weight), b.SE(weight), 1e-9)
			below, above := a.SideSE(weight)
			otherBelow, otherAbove := b.SideSE(weight)
			assert.InDelta(t, below, otherAbove, 1e-9)
			assert.InDelta(t, above, otherBelow, 1e-9)
		}
	})
}
