package gap_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/stat/distuv"
	"pgregory.net/rapid"

	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/sample"
	"tailgap/testdata"
)

// Published limits (sources in worked/values.json), and R 4.2.2's binom.test
// for every cutoff of the open data.
func TestClopperPearson(t *testing.T) {
	var worked struct {
		Intervals []struct {
			Count, N            int
			Method              string
			Level               float64
			Published, Computed struct{ Low, High float64 }
			Tolerance           float64
		} `json:"proportion_interval"`
	}
	testdata.JSON("worked/values.json", &worked)
	checked := 0
	for _, want := range worked.Intervals {
		if want.Method != "Clopper-Pearson" {
			continue
		}
		checked++
		low, high := gap.ClopperPearson(want.Count, want.N, (1-want.Level)/2)
		assert.InDelta(t, want.Published.Low, low, want.Tolerance, want)
		assert.InDelta(t, want.Published.High, high, want.Tolerance, want)
		close(t, want.Computed.Low, low, "low", want)
		close(t, want.Computed.High, high, "high", want)
	}
	assert.Equal(t, 4, checked)
	for _, path := range testdata.Expected() {
		var file struct {
			Summary struct{ N int }
			Cutoffs []struct {
				Least     int        `json:"count_ge"`
				Most      int        `json:"count_le"`
				LeastCP   [2]float64 `json:"clopper_pearson95_ge"`
				MostCP    [2]float64 `json:"clopper_pearson95_le"`
				Threshold float64    `json:"cutoff"`
			}
		}
		testdata.JSON(path, &file)
		require.Len(t, file.Cutoffs, 5, path)
		for _, want := range file.Cutoffs {
			for count, limits := range map[int][2]float64{want.Least: want.LeastCP, want.Most: want.MostCP} {
				low, high := gap.ClopperPearson(count, file.Summary.N, 0.025)
				close(t, limits[0], low, "low", path, want.Threshold)
				close(t, limits[1], high, "high", path, want.Threshold)
			}
		}
	}
}

// The definition itself: at its lower limit a count of k or more, and at its
// upper limit one of k or fewer, has the probability that may be missed.
func TestClopperPearsonIsWhatItSays(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(1, 400).Draw(t, "n")
		k := rapid.IntRange(0, n).Draw(t, "k")
		miss := rapid.SampledFrom([]float64{0.25, 0.1, 0.025, 0.005, 1e-4}).Draw(t, "miss")
		low, high := gap.ClopperPearson(k, n, miss)
		atMost := func(k int, p float64) float64 { // summed term by term
			total := 0.0
			for i := 0; i <= k; i++ {
				total += distuv.Binomial{N: float64(n), P: p}.Prob(float64(i))
			}
			return total
		}
		if k == 0 {
			assert.Zero(t, low)
		} else {
			assert.InEpsilon(t, 1-miss, atMost(k-1, low), 1e-7)
		}
		if k == n {
			assert.Equal(t, 1.0, high)
		} else {
			assert.InEpsilon(t, miss, atMost(k, high), 1e-7)
		}
	})
}

// normRow is one gap under a given curve computed by testdata/generate/norms.R
// from R's binom.test, pnorm and qt; interval.py recomputes it from binomial
// and noncentral t distributions.
type normRow struct {
	Cutoff, From, To float64
	Side             cutoff.Side
	HalfStep         bool `json:"half_step"`
	NormN            *int `json:"norm_n"`
	Weight           float64
	CurveShare       float64   `json:"curve_share"`
	SE               float64   `json:"se_points"`
	Low              []float64 `json:"low_points"`
	High             []float64 `json:"high_points"`
}

func TestGivenCurveAgreesWithR(t *testing.T) {
	var file struct {
		Levels  []float64
		Columns []struct {
			Dataset, Column    string
			Step               *float64
			Mean, SD           float64
			Cutoffs, Stretches []normRow
		}
	}
	testdata.JSON("interval/norms.json", &file)
	require.Equal(t, []float64{0.8, 0.9, 0.95, 0.99}, file.Levels)
	require.Len(t, file.Columns, 13)
	for _, c := range file.Columns {
		counts := sample.Count(testdata.Open(c.Dataset, c.Column))
		moments := counts.Moments()
		scale := sample.NewScale(counts, moments.SD, stepOf(c.Step), nil)
		check := func(r normRow, cut cutoff.Cutoff) {
			table := gap.NewTable(counts, moments, curve.Given{Mean: c.Mean, SD: c.SD, NormN: r.NormN}.Normal())
			region := table.Region(gap.Ends(scale, cut, r.HalfStep))
			e := table.Estimate(region)
			close(t, r.SE, 100*e.SE(r.Weight), "SE", c.Dataset, c.Column, r)
			for i, level := range file.Levels {
				a := table.Apart(region, e, cut.Side.Lower(), (1-level)/2)
				low, high := a.Limits(r.Weight)
				close(t, r.CurveShare, a.Curve, "curve share", c.Dataset, c.Column, r)
				assert.InDelta(t, r.Low[i], 100*low, 1e-9, "low, %s.%s %+v", c.Dataset, c.Column, r)
				assert.InDelta(t, r.High[i], 100*high, 1e-9, "high, %s.%s %+v", c.Dataset, c.Column, r)
			}
		}
		require.Len(t, c.Cutoffs, 24)
		for _, r := range c.Cutoffs {
			check(r, cutoff.Cutoff{Side: r.Side, At: r.Cutoff})
		}
		require.Len(t, c.Stretches, 3)
		for _, r := range c.Stretches {
			r.Weight = 1
			check(r, cutoff.Cutoff{Side: cutoff.Stretch, At: r.From, To: r.To})
		}
	}
}

// The limits of a curve from norms against those of the noncentral t
// distribution itself, integrated in R and again in SciPy: what the
// approximation is off, on the safe side where it is most, is a small part of
// the interval's width.
func TestNormLimitsAreNearlyExact(t *testing.T) {
	var file struct {
		Noncentral []struct {
			NormN               int `json:"norm_n"`
			Z, Level, Low, High float64
		} `json:"noncentral_t"`
	}
	testdata.JSON("interval/norms.json", &file)
	require.Len(t, file.Noncentral, 96)
	counts := sample.Count([]float64{1, 2})
	for _, want := range file.Noncentral {
		table := gap.NewTable(counts, counts.Moments(), curve.Normal{Mean: 0, SD: 1, NormN: want.NormN})
		region := table.Tail(gap.Threshold{Point: want.Z})
		a := table.Apart(region, table.Estimate(region), false, (1-want.Level)/2)
		off := map[int]float64{5: 0.1, 20: 0.04, 50: 0.02, 150: 0.01}[want.NormN]
		off *= want.High - want.Low
		assert.InDelta(t, want.High, -distuv.UnitNormal.Quantile(a.CurveLow), off, want)
		assert.InDelta(t, want.Low, -distuv.UnitNormal.Quantile(a.CurveHigh), off, want)
	}
}

// The more norm people, the nearer the interval comes to that of a known
// curve; the fewer, the wider it is. A stretch as well as a tail.
func TestNormPeopleWidenTheInterval(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		counts := sample.Count(append(rapid.SliceOfN(rapid.Map(rapid.IntRange(0, 30), func(i int) float64 { return float64(i) }), 2, 60).Draw(t, "scores"), 0, 30))
		at := rapid.Float64Range(-5, 35).Draw(t, "at")
		ends := []gap.Threshold{{At: at, Point: at}}
		if rapid.Bool().Draw(t, "stretch") {
			to := at + rapid.Float64Range(0, 10).Draw(t, "width")
			ends = append(ends, gap.Threshold{At: to, Point: to, Strict: true})
		}
		lower := len(ends) == 1 && rapid.Bool().Draw(t, "lower")
		weight := rapid.Float64Range(0.1, 3).Draw(t, "weight")
		miss := rapid.SampledFrom([]float64{0.1, 0.05, 0.025, 0.005}).Draw(t, "miss")
		apart := func(people int) gap.Apart {
			table := gap.NewTable(counts, counts.Moments(), curve.Normal{Mean: 15, SD: 6, NormN: people})
			region := table.Region(ends)
			return table.Apart(region, table.Estimate(region), lower, miss)
		}
		low, high := apart(0).Limits(weight)
		known := high - low
		partLow, partHigh := apart(0).CurveParts(weight)
		assert.Zero(t, partLow+partHigh)
		width := math.Inf(1)
		for _, people := range []int{5, 10, 50, 200, 1000, 1_000_000, 1_000_000_000_000} {
			a := apart(people)
			assert.LessOrEqual(t, a.CurveLow, a.Curve*(1+1e-12))
			assert.GreaterOrEqual(t, a.CurveHigh, a.Curve*(1-1e-12))
			low, high := a.Limits(weight)
			assert.LessOrEqual(t, high-low, width+1e-12)
			assert.GreaterOrEqual(t, high-low, known-1e-12)
			width = high - low
		}
		assert.InDelta(t, known, width, 1e-5)
	})
}
