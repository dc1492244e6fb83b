package sample_test

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/floats/scalar"
	"pgregory.net/rapid"

	"tailgap/core/sample"
	"tailgap/testdata"
)

func near(t *testing.T, want, got, relative float64, what string) {
	t.Helper()
	assert.Truef(t, scalar.EqualWithinAbsOrRel(want, got, 1e-300, relative), "%s: want %.17g, got %.17g", what, want, got)
}

// NIST StRD univariate summary statistics: certified mean and SD. NumAcc3 and
// NumAcc4 have values such as 1000000.2, whose rounding to float64 alone
// limits any SD to 9.5 and 8.3 correct digits (testdata/nist/CHECK.md): they
// are held to that.
func TestMomentsOfNIST(t *testing.T) {
	var certified map[string]struct {
		N         int
		Certified struct{ Mean, SD float64 }
	}
	testdata.JSON("nist/certified.json", &certified)
	require.Len(t, certified, 9)
	sd := map[string]float64{"NumAcc3": 1e-9, "NumAcc4": 1e-8}
	for name, want := range certified {
		m := sample.Count(testdata.NIST(name, want.N)).Moments()
		require.Equal(t, want.N, m.N, name)
		near(t, want.Certified.Mean, m.Mean, 1e-12, name+" mean")
		limit := sd[name]
		if limit == 0 {
			limit = 1e-12
		}
		near(t, want.Certified.SD, m.SD, limit, name+" SD")
	}
}

// R 4.2.2 (mean, sd) and e1071 (skewness, kurtosis type 1) on the open data.
func TestMomentsOfOpenData(t *testing.T) {
	for _, path := range testdata.Expected() {
		var want struct {
			Dataset, Column string
			Summary         map[string]float64 // g1 and G1 differ by case only
		}
		testdata.JSON(path, &want)
		counts := sample.Count(testdata.Open(want.Dataset, want.Column))
		m := counts.Moments()
		for name, got := range map[string]float64{
			"n": float64(m.N), "distinct": float64(len(counts.Score)), "min": counts.Min(), "max": counts.Max(),
			"mean": m.Mean, "sd": m.SD, "skew_g1": m.Skewness(), "exkurt_g2": m.ExcessKurtosis(),
		} {
			require.Contains(t, want.Summary, name)
			near(t, want.Summary[name], got, 1e-12, path+" "+name)
		}
	}
}

func TestCountKeepsPeople(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		scores := rapid.SliceOfN(rapid.Map(rapid.IntRange(-20, 20), func(i int) float64 { return float64(i) / 4 }), 1, 60).Draw(t, "scores")
		counts := sample.Count(scores)
		assert.Equal(t, len(scores), counts.People(0, len(counts.Score)))
		at := rapid.SampledFrom(scores).Draw(t, "at")
		atLeast, above := 0, 0
		for _, score := range scores {
			if score >= at {
				atLeast++
			}
			if score > at {
				above++
			}
		}
		assert.Equal(t, atLeast, counts.People(counts.IndexAtLeast(at), len(counts.Score)))
		assert.Equal(t, above, counts.People(counts.IndexAbove(at), len(counts.Score)))
	})
}
