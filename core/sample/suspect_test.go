package sample_test

import (
	"testing"

	"github.com/stretchr/testify/assert"

	"tailgap/core/sample"
	"tailgap/testdata"
)

func with(scores []float64, value float64, times int) []float64 {
	for range times {
		scores = append(scores, value)
	}
	return scores
}

func spread(n int) []float64 {
	scores := make([]float64, n)
	for i := range scores {
		scores[i] = float64(10 + i%21)
	}
	return scores
}

func TestSuspectedCodes(t *testing.T) {
	assert.Empty(t, sample.SuspectedCodes(sample.Count(spread(200))))
	assert.Equal(t, []float64{999}, sample.SuspectedCodes(sample.Count(with(spread(200), 999, 5))))
	assert.Equal(t, []float64{999, -9}, sample.SuspectedCodes(sample.Count(with(with(spread(300), 999, 5), -9, 3))))
	assert.Empty(t, sample.SuspectedCodes(sample.Count(with(spread(200), 998, 5))), "998 is no usual code")
	skewed := with(with(with(nil, 0, 50), 10, 20), 37, 10)
	assert.Equal(t, []float64{-9}, sample.SuspectedCodes(sample.Count(with(skewed, -9, 6))), "alone below zero")
	assert.Equal(t, []float64{-9, -8}, sample.SuspectedCodes(sample.Count(with(with(skewed, -9, 6), -8, 2))))
	assert.Empty(t, sample.SuspectedCodes(sample.Count(with(with(skewed, -9, 6), -5, 2))), "-5 is a score, so -9 may be one")
	assert.Empty(t, sample.SuspectedCodes(sample.Count([]float64{95, 97, 98, 99, 96})), "99 among others like it")
}

// Newcomb's times have two gross outliers; the others of the open data none.
func TestExtremeShare(t *testing.T) {
	share := func(dataset, column string) (float64, int) {
		counts := sample.Count(testdata.Open(dataset, column))
		return sample.ExtremeShare(counts, counts.Moments())
	}
	newcomb, people := share("newcomb", "time")
	assert.Equal(t, 1, people)
	assert.InDelta(t, 70.2121212*70.2121212/(65*10.7453248*10.7453248), newcomb, 1e-6) // (-44-mean)² over (n-1)·SD², from R's mean and SD
	height, people := share("crimtab", "height_cm")
	assert.Equal(t, 30, people)
	assert.Less(t, height, 0.12)
}

func TestExtremes(t *testing.T) {
	people := func(scores ...float64) int {
		counts := sample.Count(scores)
		share, people := sample.Extremes(counts, counts.Moments())
		assert.Equal(t, people > 0, share > 0.5)
		return people
	}
	few := []float64{0, 1, 2, 0, 1, 2, 0, 1, 2, 0, 1, 2, 0, 1, 2, 0, 1, 2, 50}
	assert.Zero(t, people(few...), "19 people")
	assert.Equal(t, 1, people(append(few, 1)...))
	assert.Zero(t, people(append(few[:18:18], 0, 1, 2, 4)...))
}
