package resample

import (
	"context"
	"math"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/stat/distuv"
	"pgregory.net/rapid"

	"tailgap/core/sample"
)

// chiSquare compares counts with probabilities, pooling cells that expect
// fewer than 8, and returns the p-value.
func chiSquare(counts []int, probability func(i int) float64, draws int) float64 {
	var statistic, observed, expected float64
	cells := 0
	for i, count := range counts {
		observed += float64(count)
		expected += probability(i) * float64(draws)
		if expected >= 8 {
			statistic += (observed - expected) * (observed - expected) / expected
			cells++
			observed, expected = 0, 0
		}
	}
	return distuv.ChiSquared{K: float64(cells - 1)}.Survival(statistic)
}

// The sampler against gonum's binomial probabilities, across the switch from
// inversion to rejection and both sides of p = 1/2.
func TestBinomialHasItsDistribution(t *testing.T) {
	for _, c := range []struct {
		n int
		p float64
	}{{1, 0.3}, {7, 0.5}, {40, 0.05}, {40, 0.24}, {40, 0.26}, {40, 0.9}, {1000, 0.009}, {1000, 0.011}, {1000, 0.5}, {100_000, 0.3}, {1_000_000, 0.00002}} {
		const draws = 200_000
		var r stream
		r.restart(7, 1)
		counts := make([]int, c.n+1)
		sum, square := 0.0, 0.0
		for range draws {
			k := r.binomial(c.n, c.p)
			counts[k]++
			d := float64(k) - float64(c.n)*c.p
			sum, square = sum+d, square+d*d
		}
		binomial := distuv.Binomial{N: float64(c.n), P: c.p}
		assert.Greaterf(t, chiSquare(counts, func(i int) float64 { return binomial.Prob(float64(i)) }, draws), 1e-4, "n %d, p %v", c.n, c.p)
		variance := float64(c.n) * c.p * (1 - c.p)
		assert.InDeltaf(t, 0, sum/draws, 5*math.Sqrt(variance/draws), "mean, n %d, p %v", c.n, c.p)
		assert.InEpsilonf(t, variance, square/draws, 0.02, "variance, n %d, p %v", c.n, c.p)
	}
	var r stream
	assert.Equal(t, 0, r.binomial(0, 0.5))
	assert.Equal(t, 0, r.binomial(9, 0))
	assert.Equal(t, 9, r.binomial(9, 1))
}

// The alias tables have the probabilities of their Poisson distributions
// (gonum's), to 2⁻³² for each column, and nothing else.
func TestPoissonTables(t *testing.T) {
	for _, mean := range []float64{0.05, 0.9, 1, 3.7, 20, 333.3, 61_000} {
		var p poissons
		p.add(mean)
		table, got := p.scores[0], map[int]float64{}
		for number, column := range p.columns {
			own := (float64(column.threshold) + 0.5) / (1 << 32)
			got[int(table.least)+number] += own / float64(len(p.columns))
			got[int(table.least)+int(column.alias)] += (1 - own) / float64(len(p.columns))
		}
		poisson, total := distuv.Poisson{Lambda: mean}, 0.0
		for k, probability := range got {
			assert.InDelta(t, poisson.Prob(float64(k)), probability, 1e-9, "mean %v, %d", mean, k)
			total += probability
		}
		assert.InDelta(t, 1, total, 1e-9)
		assert.LessOrEqual(t, len(p.columns), int(40+40*math.Sqrt(mean)))
	}
}

// All ways of drawing a resample give multinomial counts.
func TestDrawIsMultinomial(t *testing.T) {
	counts := sample.Count([]float64{1, 1, 1, 2, 2, 4, 4, 4, 4, 7, 9})
	for name, d := range map[string]drawer{
		"index draws":           newDrawer(counts),
		"Poisson draws":         {counts, newDrawer(counts).rows, newPoissons(counts.Count, counts.N)},
		"conditional binomials": {counts: counts},
	} {
		const draws = 100_000
		var r stream
		r.restart(3, 0)
		into := make([]int32, len(counts.Score))
		tally := make([][]int, len(counts.Score))
		for i := range tally {
			tally[i] = make([]int, counts.N+1)
		}
		cross := 0.0
		n := float64(counts.N)
		for range draws {
			d.draw(&r, into)
			total := 0
			for i, k := range into {
				tally[i][k]++
				total += int(k)
			}
			require.Equal(t, counts.N, total, name)
			cross += (float64(into[0]) - 3) * (float64(into[2]) - 4)
		}
		for i, count := range counts.Count {
			binomial := distuv.Binomial{N: n, P: float64(count) / n}
			assert.Greaterf(t, chiSquare(tally[i], func(k int) float64 { return binomial.Prob(float64(k)) }, draws), 1e-4, "%s, score %v", name, counts.Score[i])
		}
		assert.InDeltaf(t, -3*4/n, cross/draws, 0.05, "covariance, %s", name)
	}
	assert.NotNil(t, newDrawer(counts).rows)
	many := sample.Counts{Score: []float64{1, 2}, Count: []int{500, 500}, N: 1000}
	assert.Nil(t, newDrawer(many).rows, "two distinct scores of 1,000 people are drawn by binomials")
	assert.NotNil(t, newDrawer(sample.Count(wholeNumbers(1000))).poissons, "some fifty of 1,000 people by Poisson numbers")
	assert.Nil(t, newDrawer(sample.Count(scoresOf("normal", 1000))).poissons, "a thousand by index")
}

func TestLargestIsTheOrderStatistic(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		values := rapid.SliceOfN(rapid.Float64Range(0, 5), 1, 300).Draw(t, "values")
		k := rapid.IntRange(1, len(values)).Draw(t, "k")
		parts := rapid.IntRange(1, 4).Draw(t, "parts")
		kept := make([]largest, parts)
		for i := range kept {
			kept[i] = newLargest(k)
		}
		for i, value := range values {
			kept[i%parts].offer(value)
		}
		all := newLargest(k)
		for i := range kept {
			kept[i].shrink()
			all.offerAll(kept[i].values)
		}
		sorted := slices.Sorted(slices.Values(values))
		assert.Equal(t, sorted[len(sorted)-k], all.least())
	})
}

// rank ⌈(b+1)·level⌉ counted from the lowest.
func TestUpperRank(t *testing.T) {
	for _, c := range []struct {
		b     int
		level float64
		kept  int
	}{{10_000, 0.95, 500}, {9_999, 0.95, 500}, {999, 0.99, 10}, {1000, 0.9, 100}, {200, 0.5, 100}} {
		assert.Equal(t, c.kept, upperRank(c.b, c.level), c)
	}
}

func TestQuantilesDoNotDependOnWorkers(t *testing.T) {
	for _, scores := range [][]float64{wholeNumbers(300), scoresOf("normal", 20_000)} { // direct and binned
		plan := planFor(scores, 1)
		plan.Replicates, plan.Weights = 400, []float64{1, 1.2, 0.8}
		one, err := Run(context.Background(), plan, nil)
		require.NoError(t, err)
		for _, workers := range []int{2, 3, 16, 100} {
			plan.Workers = workers
			many, err := Run(context.Background(), plan, nil)
			require.NoError(t, err)
			assert.Equal(t, one, many)
		}
		plan.Seed++
		other, err := Run(context.Background(), plan, nil)
		require.NoError(t, err)
		assert.NotEqual(t, one, other)
	}
}

func TestRunReportsProgressAndEndsWithTheContext(t *testing.T) {
	plan := planFor(wholeNumbers(300), 2)
	plan.Replicates = 1000
	last := 0
	_, err := Run(context.Background(), plan, func(done int) {
		assert.Greater(t, done, last)
		last = done
	})
	require.NoError(t, err)
	assert.Equal(t, 1000, last)

	ctx, cancel := context.WithCancel(context.Background())
	plan.Replicates = 1_000_000
	_, err = Run(ctx, plan, func(done int) {
		assert.Less(t, done, 100_000, "goes on long after the context ended")
		cancel()
	})
	assert.ErrorIs(t, err, context.Canceled)
}

// A panic in a goroutine ends the program; one in Run can be recovered.
func TestAPanicReachesTheCaller(t *testing.T) {
	plan := planFor(wholeNumbers(300), 2)
	plan.Regions[3].From = 1 << 20 // out of reach of a resample; the sample itself has no one there
	assert.Panics(t, func() {
		_, err := Run(context.Background(), plan, nil)
		assert.NoError(t, err)
	})
}
