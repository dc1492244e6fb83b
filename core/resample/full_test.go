package resample_test

import (
	"context"
	"fmt"
	"math"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/resample"
	"tailgap/testdata"
)

// The whole method against testdata/generate/fullmethod.py, which draws rows
// in NumPy: each quantile is a mean over five seeds of 20,000 replicates,
// with its Monte Carlo SD beside it. Fitted, known and estimated curves, at four
// levels.
func TestWholeMethodAgreesWithNumPy(t *testing.T) {
	var file struct {
		Cutoffs []struct {
			Dataset, Column string
			Step            *float64
			Cutoff          float64
			Side            cutoff.Side
			HalfStep        bool `json:"half_step"`
			Weight          float64
			Mean            *float64 `json:"given_mean"`
			SD              *float64 `json:"given_sd"`
			NormN           *int     `json:"norm_n"`
			Level           float64
			SE              float64 `json:"se_points"`
			SEBelow         float64 `json:"se_below_points"`
			SEAbove         float64 `json:"se_above_points"`
			Quantile        float64 `json:"quantile_mean"`
			QuantileSD      float64 `json:"quantile_sd"`
			Low             float64 `json:"low_points"`
			High            float64 `json:"high_points"`
			BandThresholds  int     `json:"band_thresholds"`
			Band            float64 `json:"band_q_mean"`
			BandSD          float64 `json:"band_q_sd"`
			BandLow         float64 `json:"band_low_points"`
			BandHigh        float64 `json:"band_high_points"`
		}
	}
	testdata.JSON("interval/full.json", &file)
	require.Len(t, file.Cutoffs, 27)
	for _, want := range file.Cutoffs {
		where := fmt.Sprintf("%s.%s %v%v half-step %v weight %v level %v", want.Dataset, want.Column, want.Side, want.Cutoff, want.HalfStep, want.Weight, want.Level)
		var given *curve.Given
		if want.Mean != nil {
			given = &curve.Given{Mean: *want.Mean, SD: *want.SD, NormN: want.NormN}
		}
		table, scale := column{Dataset: want.Dataset, Column: want.Column, Step: want.Step}.table(given)
		plan := resample.Plan{Table: table, Weights: []float64{want.Weight}, Level: want.Level, Replicates: 20_000, Seed: 5}
		plan.Regions = []gap.Region{table.Region(gap.Ends(scale, cutoff.Cutoff{Side: want.Side, At: want.Cutoff}, want.HalfStep))}
		grid, _ := gap.Grid(table.Counts, scale, nil)
		if scale.Step > 0 {
			grid = slices.Concat([]float64{grid[0] - scale.Step}, grid, []float64{grid[len(grid)-1] + scale.Step})
		}
		for _, at := range grid {
			if scale.Step == 0 {
				plan.Regions = append(plan.Regions, table.Tail(gap.Split(scale, at, false, false)), table.Tail(gap.Split(scale, at, true, false)))
				continue
			}
			plan.Regions = append(plan.Regions, table.Tail(gap.Split(scale, at, want.Side.Strict(), want.HalfStep)))
		}
		plan.Groups = [][2]int{{1, len(plan.Regions)}}
		plan.Estimates = table.Estimates(plan.Regions)

		got, err := resample.Run(context.Background(), plan, nil)
		require.NoError(t, err)
		monteCarlo := 5 * math.Max(want.QuantileSD, 0.004)
		assert.InDeltaf(t, want.Quantile, got.Region[0][0], monteCarlo, "quantile, %s", where)
		assert.InDeltaf(t, want.Band, got.Group[0][0], 5*math.Max(want.BandSD, 0.004), "band's quantile, %s", where)

		e := table.Estimate(plan.Regions[0])
		below, above := e.SideSE(want.Weight)
		assert.InEpsilonf(t, want.SEBelow, 100*below, 1e-9, "standard error below, %s", where)
		assert.InEpsilonf(t, want.SEAbove, 100*above, 1e-9, "standard error above, %s", where)
		// The band's at the cutoff itself, which need be none of its thresholds.
		judged := resample.Judge(plan, got, scale.Step > 0)
		i := judged.Interval(0, want.Side.Lower(), want.Weight, want.Weight)
		band := judged.Band(0, 0, want.Side.Lower(), want.Weight)
		assert.InDeltaf(t, want.Low, 100*i.Low, monteCarlo*want.SEBelow, "low limit, %s", where)
		assert.InDeltaf(t, want.High, 100*i.High, monteCarlo*want.SEAbove, "high limit, %s", where)
		monteCarlo = 8 * math.Max(want.BandSD, 0.004) // its limits are no straight lines of the quantile
		assert.InDeltaf(t, want.BandLow, 100*band.Low, monteCarlo*want.SEBelow, "the band's low limit, %s", where)
		assert.InDeltaf(t, want.BandHigh, 100*band.High, monteCarlo*want.SEAbove, "the band's high limit, %s", where)
	}
}

// Where only bands are wanted they are the same, and the regions are left out.
func TestBandsOnly(t *testing.T) {
	people := 40
	table, _ := column{Dataset: "mathexam", Column: "tests"}.table(&curve.Given{Mean: 20, SD: 4, NormN: &people})
	plan := resample.Plan{Table: table, Weights: []float64{1, 1.2}, Level: 0.9, Replicates: 1000, Seed: 5}
	for at := 9.0; at <= 27; at++ {
		plan.Regions = append(plan.Regions, table.Tail(gap.Threshold{At: at, Point: at}))
	}
	plan.Groups, plan.Estimates = [][2]int{{2, 12}, {14, 19}}, table.Estimates(plan.Regions)
	all, err := resample.Run(context.Background(), plan, nil)
	require.NoError(t, err)
	plan.BandsOnly = true
	bands, err := resample.Run(context.Background(), plan, nil)
	require.NoError(t, err)
	assert.Len(t, all.Region, 19)
	assert.Empty(t, bands.Region)
	assert.Equal(t, all.Group, bands.Group)
}
