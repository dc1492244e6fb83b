package shape

import (
	"context"
	"math"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/sample"
)

// anyCase draws scores, on whole numbers or not, with cutoffs.
type anyCase struct {
	scores   []float64
	step     sample.StepChoice
	given    *curve.Given
	halfStep bool
	cutoffs  []cutoff.Cutoff
}

func drawCase(t *rapid.T) anyCase {
	c := anyCase{halfStep: rapid.Bool().Draw(t, "half-step")}
	score := rapid.Map(rapid.IntRange(0, 30), func(i int) float64 { return float64(i) })
	if c.step = (sample.StepChoice{Size: 1}); rapid.Bool().Draw(t, "without a step") {
		// Fractions that another zero leaves exact, so that equal scores stay equal.
		c.step, score = sample.StepChoice{None: true}, rapid.Map(rapid.IntRange(0, 30<<8), func(i int) float64 { return float64(i) / (1 << 8) })
	}
	c.scores = rapid.SliceOfN(score, 3, 80).Draw(t, "scores")
	if slices.Min(c.scores) == slices.Max(c.scores) {
		c.scores = append(c.scores, c.scores[0]+1)
	}
	if rapid.Bool().Draw(t, "many at the floor") {
		for range 3 * len(c.scores) {
			c.scores = append(c.scores, slices.Min(c.scores))
		}
	}
	if rapid.Bool().Draw(t, "given") {
		c.given = &curve.Given{Mean: rapid.Float64Range(5, 25).Draw(t, "mean"), SD: rapid.Float64Range(1, 10).Draw(t, "SD")}
		if rapid.Bool().Draw(t, "from norms") {
			c.given.NormN = new(rapid.IntRange(5, 1000).Draw(t, "norm people"))
		}
	}
	for range rapid.IntRange(1, 4).Draw(t, "cutoffs") {
		side := cutoff.Side(rapid.IntRange(0, 4).Draw(t, "side"))
		at := float64(rapid.IntRange(-3, 33).Draw(t, "at"))
		c.cutoffs = append(c.cutoffs, cutoff.Cutoff{Side: side, At: at, To: at + float64(rapid.IntRange(0, 12).Draw(t, "to"))})
	}
	return c
}

func (c anyCase) plan() Plan { return planned(c.scores, c.step, c.given, c.halfStep, c.cutoffs...) }

func run(t require.TestingT, p Plan) Findings {
	f, err := Run(context.Background(), p, nil)
	require.NoError(t, err)
	return f
}

// estimate is an effect's, NaN where there is none.
func (e Effects) estimate(k Kind) float64 {
	if e[k] == nil {
		return math.NaN()
	}
	return e[k].Estimate
}

func equal(t require.TestingT, want, got float64, tolerance float64, args ...any) {
	if math.IsNaN(want) {
		assert.True(t, math.IsNaN(got), args...)
		return
	}
	assert.InDelta(t, want, got, tolerance, args...)
}

func TestPartsAddUpToTheGap(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		c := drawCase(t)
		p := c.plan()
		for i, effects := range run(t, p).Cutoffs {
			region := p.Table.Region(p.Cutoffs[i].Judged)
			want := p.Table.Estimates([]gapRegion{region})[0].Gap(1)
			if p.Cutoffs[i].Lower {
				want = -want
			}
			sum := 0.0
			for kind := MeanAndSD; kind <= Rest; kind++ {
				if effects[kind] != nil {
					sum += effects[kind].Estimate
				}
			}
			assert.InDelta(t, want, sum, 1e-12)
			assert.Equal(t, c.given != nil, effects[MeanAndSD] != nil)
			assert.Equal(t, !c.halfStep && c.step.Size > 0, effects[HalfStep] != nil)
		}
	})
}

// Another unit and another zero change nothing, intervals included.
func TestUnitsDontMatter(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		c := drawCase(t)
		factor := rapid.SampledFrom([]float64{0.5, 1, 4}).Draw(t, "factor")
		shift := 40 * factor * float64(rapid.IntRange(-4, 4).Draw(t, "shift")) // keeps round numbers round
		other := c
		other.scores, other.cutoffs = slices.Clone(c.scores), slices.Clone(c.cutoffs)
		other.step.Size *= factor
		for i := range other.scores {
			other.scores[i] = other.scores[i]*factor + shift
		}
		for i := range other.cutoffs {
			other.cutoffs[i].At, other.cutoffs[i].To = c.cutoffs[i].At*factor+shift, c.cutoffs[i].To*factor+shift
		}
		if c.given != nil {
			other.given = &curve.Given{Mean: c.given.Mean*factor + shift, SD: c.given.SD * factor, NormN: c.given.NormN}
		}
		p, q := c.plan(), other.plan()
		p.Everyone, q.Everyone = false, false
		want, got := run(t, p), run(t, q)
		same(t, &want.Skewness, &got.Skewness)
		same(t, &want.ExcessKurtosis, &got.ExcessKurtosis)
		for i := range want.Cutoffs {
			for kind := range kinds {
				same(t, want.Cutoffs[i][kind], got.Cutoffs[i][kind])
			}
		}
	})
}

func same(t require.TestingT, want, got *Value) {
	if want == nil || got == nil {
		assert.Equal(t, want == nil, got == nil)
		return
	}
	assert.InDelta(t, want.Estimate, got.Estimate, 1e-7)
	if want.Interval == nil || got.Interval == nil {
		assert.Equal(t, want.Interval == nil, got.Interval == nil)
		return
	}
	assert.InDelta(t, want.Interval.Low, got.Interval.Low, 1e-6+1e-6*math.Abs(want.Interval.Low))
	assert.InDelta(t, want.Interval.High, got.Interval.High, 1e-6+1e-6*math.Abs(want.Interval.High))
}

// A scale turned round has its skewness turned round; at the mirrored cutoff
// everything stays.
func TestReflection(t *testing.T) {
	mirrored := map[cutoff.Side]cutoff.Side{cutoff.AtLeast: cutoff.AtMost, cutoff.AtMost: cutoff.AtLeast,
		cutoff.Above: cutoff.Below, cutoff.Below: cutoff.Above, cutoff.Stretch: cutoff.Stretch}
	rapid.Check(t, func(t *rapid.T) {
		c := drawCase(t)
		turned := c
		turned.scores, turned.cutoffs = slices.Clone(c.scores), slices.Clone(c.cutoffs)
		for i := range turned.scores {
			turned.scores[i] *= -1
		}
		for i, from := range c.cutoffs {
			turned.cutoffs[i] = cutoff.Cutoff{Side: mirrored[from.Side], At: -from.At, To: from.To}
			if from.Side == cutoff.Stretch {
				turned.cutoffs[i].At, turned.cutoffs[i].To = -from.To, -from.At
			}
		}
		if c.given != nil {
			turned.given = &curve.Given{Mean: -c.given.Mean, SD: c.given.SD, NormN: c.given.NormN}
		}
		want, got := run(t, c.plan()), run(t, turned.plan())
		assert.InDelta(t, -want.Skewness.Estimate, got.Skewness.Estimate, 1e-9)
		assert.InDelta(t, want.ExcessKurtosis.Estimate, got.ExcessKurtosis.Estimate, 1e-9)
		for i := range want.Cutoffs {
			for kind, as := range map[Kind]Kind{MeanAndSD: MeanAndSD, HalfStep: HalfStep, Asymmetry: Asymmetry, Rest: Rest, Heaps: Heaps, Floor: Ceiling, Ceiling: Floor} {
				equal(t, want.Cutoffs[i].estimate(kind), got.Cutoffs[i].estimate(as), 1e-9, "kind %d at %v", kind, c.cutoffs[i])
			}
		}
	})
}

// As far on the other side of the mean, asymmetry does the opposite and the
// rest the same.
func TestTheOtherSideOfTheMean(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		scores := rapid.SliceOfNDistinct(rapid.Float64Range(0, 30), 5, 60, rapid.ID).Draw(t, "scores")
		mean := sample.Count(scores).Moments().Mean
		at := rapid.Float64Range(0, 30).Draw(t, "at")
		both := run(t, planned(scores, sample.StepChoice{None: true}, nil, false,
			cutoff.Cutoff{Side: cutoff.AtLeast, At: at}, cutoff.Cutoff{Side: cutoff.AtMost, At: 2*mean - at})).Cutoffs
		if slices.ContainsFunc(scores, func(x float64) bool { return math.Abs(x-at) < 1e-6 || math.Abs(x-2*mean+at) < 1e-6 }) {
			return // which side a score on the border is counted to is a rounding
		}
		assert.InDelta(t, both[0].estimate(Asymmetry), -both[1].estimate(Asymmetry), 1e-12)
		assert.InDelta(t, both[0].estimate(Rest), both[1].estimate(Rest), 1e-9)
	})
}

// Twice as many of everyone change asymmetry not at all, and what is fitted by
// no more than the SD's divisor does.
func TestTwiceTheCounts(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		c := drawCase(t)
		twice := c
		twice.scores = append(slices.Clone(c.scores), c.scores...)
		want, got := run(t, c.plan()), run(t, twice.plan())
		assert.InDelta(t, want.Skewness.Estimate, got.Skewness.Estimate, 1e-9)
		for i := range want.Cutoffs {
			assert.InDelta(t, want.Cutoffs[i].estimate(Asymmetry), got.Cutoffs[i].estimate(Asymmetry), 1e-9)
			assert.InDelta(t, want.Cutoffs[i].estimate(Rest), got.Cutoffs[i].estimate(Rest), 0.25/float64(len(c.scores)))
		}
	})
}
