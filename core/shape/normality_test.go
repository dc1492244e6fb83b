package shape

import (
	"context"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/curve"
	"tailgap/core/gap"
	"tailgap/core/sample"
	"tailgap/testdata"
)

func table(scores []float64) gap.Table {
	counts := sample.Count(scores)
	moments := counts.Moments()
	return gap.NewTable(counts, moments, curve.FitNormal(moments))
}

// R's nortest (see testdata/expected). Its Lilliefors p above 0.1 comes from a
// polynomial of its own for Stephens's (1974) statistic, ours from Molin &
// Abdi's: they agree to two digits.
func TestNormalityAgreesWithR(t *testing.T) {
	paths := testdata.Expected()
	require.Len(t, paths, 13)
	for _, path := range paths {
		var want struct {
			Dataset, Column string
			Tests           struct {
				AndersonDarling struct {
					A2, P  float64
					A2Star float64 `json:"A2_star"`
				} `json:"anderson_darling"`
				Lilliefors struct{ D, P float64 }
			}
		}
		testdata.JSON(path, &want)
		got, err := Test(context.Background(), table(testdata.Open(want.Dataset, want.Column)), nil)
		require.NoError(t, err)
		a, l := want.Tests.AndersonDarling, want.Tests.Lilliefors
		assert.InEpsilon(t, a.A2, got.AndersonDarling.A2, 1e-9, path)
		assert.InEpsilon(t, a.A2Star, got.AndersonDarling.A2Star, 1e-9, path)
		assert.InEpsilon(t, a.P, got.AndersonDarling.P, 1e-9, path)
		assert.InEpsilon(t, l.D, got.Lilliefors.D, 1e-9, path)
		if l.P <= 0.1 {
			assert.InEpsilon(t, l.P, got.Lilliefors.P, 1e-9, path)
		} else {
			assert.InDelta(t, l.P, got.Lilliefors.P, 0.005, path)
		}
	}
}

// Published critical values, each confirmed by simulation (worked/normality.json).
func TestPublishedCriticalValues(t *testing.T) {
	type row struct {
		N                           float64
		Levels, Published, Computed []float64
		Source                      string
	}
	var file struct {
		AndersonDarling []row `json:"anderson_darling"`
		Lilliefors      []row
	}
	testdata.JSON("worked/normality.json", &file)
	for _, r := range file.AndersonDarling {
		for i, level := range r.Levels {
			assert.InDelta(t, level, andersonDarlingP(r.Published[i]), 0.02*level+0.0005, "%s, %v", r.Source, level)
		}
	}
	require.Len(t, file.Lilliefors, 11)
	for _, r := range file.Lilliefors {
		for i, level := range r.Levels {
			// The simulated quantile, because a table may have three digits only.
			assert.InEpsilon(t, level, lillieforsP(r.Computed[i], r.N), 0.11, "n = %v, %v", r.N, level)
		}
	}
}

// Critical values of any number of people (Abdi & Molin 2007): p does not
// drift with it.
func TestPOfVeryManyPeople(t *testing.T) {
	for _, n := range []float64{1001, 1e4, 1e6, 1e9} {
		for level, critical := range map[float64]float64{0.2: 0.741, 0.15: 0.775, 0.1: 0.819, 0.05: 0.895, 0.01: 1.035} {
			d := critical / ((0.83+n)/math.Sqrt(n) - 0.01)
			assert.InEpsilon(t, level, lillieforsP(d, n), 0.12, "n = %v, %v", n, level)
		}
	}
	assert.InDelta(t, 0.0572, lillieforsP(0.895/((0.83+1000)/math.Sqrt(1000)-0.01), 1000), 5e-5, "up to 1,000 Dallal & Wilkinson's own")
}

func TestPValuesFall(t *testing.T) {
	before := 1.0
	for a := 0.02; a < 12; a += 0.01 {
		p := andersonDarlingP(a)
		assert.LessOrEqual(t, p, before+0.005, a) // the pieces meet to half a percent
		before = p
	}
	for _, n := range []float64{5, 8, 30, 100, 1000, 1e6} {
		before := 1.0
		for d := 0.3 / math.Sqrt(n); d < 1; d *= 1.01 {
			p := lillieforsP(d, n)
			assert.LessOrEqual(t, p, before+1e-3, "n = %v, D = %v", n, d)
			assert.GreaterOrEqual(t, p, 0.0)
			before = p
		}
	}
}

func TestFewPeopleAreNotTested(t *testing.T) {
	few, err := Test(context.Background(), table([]float64{1, 2, 3, 5}), nil)
	require.NoError(t, err)
	assert.Equal(t, Tests{}, few)
	some, err := Test(context.Background(), table([]float64{1, 2, 3, 5, 9}), nil)
	require.NoError(t, err)
	assert.Nil(t, some.AndersonDarling)
	assert.NotNil(t, some.Lilliefors)
	given := table(testdata.Open("mathexam", "tests"))
	given.Curve = curve.Normal{Mean: 20, SD: 4}
	none, err := Test(context.Background(), given, nil)
	require.NoError(t, err)
	assert.Equal(t, Tests{}, none, "the p-values are for a fitted curve")
	ended, cancel := context.WithCancel(context.Background())
	cancel()
	_, err = Test(ended, table(testdata.Open("mathexam", "tests")), nil)
	assert.ErrorIs(t, err, context.Canceled)
}

// A score so far out that the share beyond it can't be written: its logarithm
// can, and A² is finite.
func TestFarTailsAreTested(t *testing.T) {
	scores := make([]float64, 5000)
	for i := range scores {
		scores[i] = float64(i%7) * 1e-3
	}
	scores[0] = 1e6 // 70 SDs out
	got, err := Test(context.Background(), table(scores), nil)
	require.NoError(t, err)
	assert.Greater(t, got.AndersonDarling.A2, 1000.0)
	assert.Less(t, got.AndersonDarling.A2, 1e6)
	assert.Equal(t, 3.7e-24, got.AndersonDarling.P)
	assert.Zero(t, got.Lilliefors.P)
}
