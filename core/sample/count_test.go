package sample_test

import (
	"context"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/sample"
)

// many are n scores, all different or tied on steps.
func many(n int, step float64) []float64 {
	r := rand.New(rand.NewPCG(1, 2))
	scores := make([]float64, n)
	for i := range scores {
		scores[i] = r.NormFloat64()
		if step > 0 {
			scores[i] = step * math.Round(scores[i]/step)
		}
	}
	return scores
}

// Whatever the number of runs that are merged, tables agree with a tally by
// map; and progress goes up to its total.
func TestCountAgreesWithATally(t *testing.T) {
	for _, n := range []int{0, 1, 2, 1 << 15, 1<<15 + 1, 3 << 15, 200_000} {
		for _, step := range []float64{0, 0.001, 0.5} {
			scores := many(n, step)
			before := slices.Clone(scores)
			tally := map[float64]int{}
			for _, score := range scores {
				tally[score]++
			}
			last, end := 0, 0
			counts, err := sample.CountContext(context.Background(), scores, func(done, total int) {
				assert.Greater(t, done, last)
				last, end = done, total
			})
			require.NoError(t, err)
			assert.Equal(t, end, last)
			assert.Equal(t, before, scores)
			want := sample.Counts{Score: []float64{}, Count: []int{}, N: n}
			for score := range tally {
				want.Score = append(want.Score, score)
			}
			slices.Sort(want.Score)
			zero := true
			for i, score := range counts.Score {
				want.Count = append(want.Count, tally[score])
				zero = zero && !(score == 0 && math.Signbit(counts.Score[i]))
			}
			assert.True(t, slices.Equal(want.Score, counts.Score) && slices.Equal(want.Count, counts.Count), "%d scores, step %v", n, step)
			assert.True(t, zero, "no score is -0")
		}
	}
}

// After the context has ended no further run is sorted or merged.
func TestCountEndsWithTheContext(t *testing.T) {
	scores := many(200_000, 0) // seven runs, three rounds of merging
	for _, until := range []int{1, 3, 7, 8, 15, 20} {
		ctx, cancel := context.WithCancel(context.Background())
		told := 0
		_, err := sample.CountContext(ctx, scores, func(done, total int) {
			if told++; told == until {
				cancel()
			}
		})
		require.ErrorIs(t, err, context.Canceled)
		require.Equal(t, until, told)
	}
}
