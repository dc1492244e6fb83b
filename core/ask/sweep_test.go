package ask_test

import (
	"math"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/stat/distuv"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/sample"
	"tailgap/testdata"
)

func TestSweepsOfEverySideInUse(t *testing.T) {
	scores := testdata.Open("mathexam", "tests")
	q := question(">=24", "<=13", ">20", "<16", ">=20", "16..20")
	r := judge(t, q, scores)
	var sides []string
	for _, s := range r.Sweeps {
		sides = append(sides, s.Side.String())
		assert.Len(t, s.Threshold, 18, "9 to 26, the unobserved ones too")
		assert.Equal(t, 9.0, s.Threshold[0])
		assert.Equal(t, 26.0, s.Threshold[17])
		for i := range s.Threshold {
			assert.LessOrEqual(t, s.BandLow[i], s.Low[i])
			assert.GreaterOrEqual(t, s.BandHigh[i], s.High[i])
			assert.InDelta(t, s.GapPoints[i], 100*(s.CurveShare[i]-s.CountedShare[i]), 1e-12)
		}
		assert.Nil(t, s.Trusted, "no tolerance, nothing to trust")
	}
	assert.Equal(t, []string{">=", "<=", ">", "<"}, sides)
	for _, f := range r.Cutoffs {
		for _, s := range r.Sweeps {
			for i, at := range s.Threshold {
				if s.Side == f.Cutoff.Side && at == f.Cutoff.At {
					assert.Equal(t, f.GapPoints, s.GapPoints[i])
					assert.Equal(t, *f.GapLow, s.Low[i])
					assert.Equal(t, *f.GapHigh, s.High[i])
				}
			}
		}
	}
	mirror := func(a, b ask.Sweep) {
		for i := range a.Threshold {
			assert.InDelta(t, a.GapPoints[i], -b.GapPoints[i], 1e-12)
			assert.InDelta(t, a.BandLow[i], -b.BandHigh[i], 1e-12)
		}
	}
	mirror(r.Sweeps[0], r.Sweeps[3]) // >= and <
	mirror(r.Sweeps[2], r.Sweeps[1]) // > and <=
	largest := 0.0
	for _, s := range r.Sweeps {
		for _, g := range s.GapPoints {
			largest = math.Max(largest, math.Abs(g))
		}
	}
	assert.InDelta(t, largest, math.Abs(r.Worst.GapPoints), 1e-9)
	assert.Equal(t, ">=", judge(t, question("16..20"), scores).Sweeps[0].Side.String(), "a stretch alone is swept as at or above")
}

func TestSweepWithoutAStepShowsTheJumps(t *testing.T) {
	q := question(">=3.5")
	r := judge(t, q, testdata.Open("faithful", "eruptions"))
	s := r.Sweeps[0]
	require.Len(t, s.Threshold, 2*126)
	for i := 0; i < len(s.Threshold); i += 2 {
		assert.Equal(t, s.Threshold[i], s.Threshold[i+1])
		assert.Greater(t, s.CountedShare[i], s.CountedShare[i+1])
		assert.Equal(t, s.CurveShare[i], s.CurveShare[i+1])
	}
	worst := -1
	for i := range s.Threshold {
		if worst < 0 || math.Abs(s.GapPoints[i]) > math.Abs(s.GapPoints[worst])+1e-9 {
			worst = i
		}
	}
	side := []cutoff.Side{cutoff.AtLeast, cutoff.Above}[worst%2]
	assert.Equal(t, ask.Worst{Side: side, Threshold: s.Threshold[worst], GapPoints: s.GapPoints[worst]}, r.Worst)
}

func TestSweepIsThinnedAboveAThousandThresholds(t *testing.T) {
	scores := make([]float64, 3000)
	for i := range scores {
		scores[i] = distuv.UnitNormal.Quantile((float64(i) + 0.5) / 3000)
	}
	q := question(">=1.23456", "<0.5")
	q.Replicates = 200
	s := judge(t, q, scores).Sweeps[0]
	assert.Less(t, len(s.Threshold), 700)
	assert.Greater(t, len(s.Threshold), 560)
	assert.Contains(t, s.Threshold, 1.23456)
	assert.Contains(t, s.Threshold, 0.5)
	for i := range 25 {
		assert.Contains(t, s.Threshold, scores[i])
		assert.Contains(t, s.Threshold, scores[2999-i])
	}
	assert.IsNonDecreasing(t, s.Threshold)

	wide := question(">=50")
	wide.Step, wide.Range, wide.Replicates = sample.StepChoice{Size: 1}, &sample.Range{Low: 0, High: 1e9}, 200
	s = judge(t, wide, []float64{1, 2, 50, 51, 52, 60, 61, 1000}).Sweeps[0]
	assert.Less(t, len(s.Threshold), 50)
	assert.Equal(t, 1e9, s.Threshold[len(s.Threshold)-1])
}

func TestTrustedRange(t *testing.T) {
	q := question(">=30")
	q.TooHigh, q.TooLow = points(6), points(6)
	r := judge(t, q, testdata.Open("crimtab", "finger_cm"))
	s := r.Sweeps[0]
	require.NotEmpty(t, s.Trusted)
	for i, at := range s.Threshold {
		inside := s.BandLow[i] >= -6 && s.BandHigh[i] <= 6
		trivial := false
		within := false
		for _, stretch := range s.Trusted {
			if at >= stretch.From && at <= stretch.To {
				within, trivial = true, stretch.Trivial
			}
		}
		assert.Equal(t, inside, within, at)
		if within {
			small := s.CurveShare[i] <= 0.06 && s.CountedShare[i] <= 0.06 || s.CurveShare[i] >= 0.94 && s.CountedShare[i] >= 0.94
			assert.Equal(t, small, trivial, at)
		}
	}
}

func TestTrustedRangeWithoutAStep(t *testing.T) {
	for _, sign := range []string{">=", ">", "<=", "<"} {
		q := question(sign + "30")
		q.Step, q.Everyone = sample.StepChoice{None: true}, true
		q.TooHigh, q.TooLow = points(2), points(2)
		s := judge(t, q, testdata.Open("mathexam", "tests")).Sweeps[0]
		require.NotEmpty(t, s.Trusted)
		past := s.Side.Strict()
		for i, at := range s.Threshold {
			if (i%2 == 1) != past {
				continue
			}
			inside := math.Abs(s.GapPoints[i]) <= 2
			within := slices.ContainsFunc(s.Trusted, func(stretch ask.Stretch) bool { return at >= stretch.From && at <= stretch.To })
			assert.Equal(t, inside, within, "%s%v", sign, at)
		}
	}
}
