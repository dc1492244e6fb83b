package resample_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/resample"
)

// Fieller's (1954) limits are the roots of a quadratic in the weight w,
//
//	(N - wS)² = q²[v + (w²-2wD)P]/n,  P = p̃(1-p̃),
//
// as long as κ's floor does not come in.
func TestRatioLimitsAreFiellers(t *testing.T) {
	table, scale := column{Dataset: "pima", Column: "glu"}.table(nil)
	for _, at := range []float64{80, 120, 140, 170} {
		e := table.Estimate(table.Region(gap.Ends(scale, cutoff.Cutoff{Side: cutoff.AtLeast, At: at}, false)))
		require.False(t, e.Few())
		const q = 2.1
		p := e.Shrunk() * (1 - e.Shrunk())
		c := q * q / e.N
		square := e.Counted*e.Counted - c*p
		half := e.Curve*e.Counted - c*e.D*p
		root := math.Sqrt(half*half - square*(e.Curve*e.Curve-c*e.V))

		low, high := resample.RatioLimits(e.Curve/e.Counted, func(weight float64) resample.Interval {
			margin := q * e.SE(weight)
			return resample.Interval{Low: e.Gap(weight) - margin, High: e.Gap(weight) + margin}
		})
		require.NotNil(t, high)
		assert.InEpsilon(t, (half-root)/square, *low, 1e-9, at)
		assert.InEpsilon(t, (half+root)/square, *high, 1e-9, at)
	}
}

func TestRatioLimitsThatAreNone(t *testing.T) {
	low, high := resample.RatioLimits(2, func(weight float64) resample.Interval {
		return resample.Interval{Low: -1 - weight, High: 1}
	})
	assert.Zero(t, *low, "the curve's share can't be told from zero")
	assert.Nil(t, high, "the counted share can't be told from zero")
}
