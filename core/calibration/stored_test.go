package calibration_test

import (
	"context"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/calibration"
	"tailgap/testdata"
)

func stored(t *testing.T, prefix string) map[string]calibration.Result {
	t.Helper()
	cells, err := testdata.Files.Open("calibration/" + prefix + "cells.csv")
	require.NoError(t, err)
	bands, err := testdata.Files.Open("calibration/" + prefix + "bands.csv")
	require.NoError(t, err)
	results, err := calibration.Read(cells, bands)
	require.NoError(t, err)
	byName := map[string]calibration.Result{}
	for _, r := range results {
		byName[r.Name] = r
	}
	return byName
}

// A slice of the study, simulated again, is what is stored. Platforms differ
// in the last digits, which may turn a sample of many.
func TestSliceIsAsStored(t *testing.T) {
	want := stored(t, "slice-")
	for _, named := range calibration.Slice() {
		tallies, err := named.Run(context.Background(), nil)
		require.NoError(t, err)
		require.Len(t, want[named.Name].Tallies, len(tallies), named.Name)
		for i, got := range tallies {
			old := want[named.Name].Tallies[i]
			require.Equal(t, old.Population, got.Population)
			require.Equal(t, old.N, got.N)
			require.Equal(t, old.Samples, got.Samples)
			if want[named.Name].Sweeps {
				assert.InDelta(t, old.Band, got.Band, 1, "%s: band, %s, n = %d", named.Name, got.Population, got.N)
			}
			require.Len(t, got.Cells, len(old.Cells))
			for c, cell := range got.Cells {
				was := old.Cells[c]
				where := []any{"%s: %s, n = %d, from %v", named.Name, got.Population, got.N, cell.From}
				assert.InDelta(t, was.Gap, cell.Gap, 1e-4*max(1, math.Abs(was.Gap)), where...)
				assert.InDelta(t, was.Width, cell.Width, 1e-3*was.Width, where...)
				assert.InDelta(t, was.Oracle, cell.Oracle, 1e-3*was.Oracle+1e-9, where...)
				assert.InDelta(t, was.TooHigh, cell.TooHigh, 1, where...)
				assert.InDelta(t, was.TooLow, cell.TooLow, 1, where...)
				assert.InDelta(t, was.FalseHolds, cell.FalseHolds, 1, where...)
				assert.InDelta(t, was.FalseFails, cell.FalseFails, 1, where...)
			}
		}
	}
}
