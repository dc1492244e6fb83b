package shape

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/sample"
	"tailgap/testdata"
)

// Places and limits of the paper's formula, with R 4.2.2's qnorm and dnorm:
// q <- qnorm((1:5 - 0.5) / 5); 1.959963984540054 * sqrt(pnorm(q) * (1 - pnorm(q)) / 5) / dnorm(q)
func TestWorm(t *testing.T) {
	w := NewWorm(table([]float64{1, 2, 4, 8, 16}), 0.95)
	assert.Equal(t, []float64{1, 2, 4, 8, 16}, w.Score)
	want := []float64{-1.2815515655446006, -0.52440051270804066, 0, 0.52440051270804066, 1.2815515655446006}
	limits := []float64{1.49834337, 1.15525344, 1.09855809, 1.15525344, 1.49834337}
	for i, q := range want {
		assert.InDelta(t, q, w.Quantile[i], 1e-9)
		assert.InDelta(t, (w.Score[i]-6.2)/6.09918027279076-q, w.Deviation[i], 1e-9) // R: mean 6.2, sd 6.09918027279076
		assert.InDelta(t, limits[i], w.Limit[i], 1e-6)
	}
	tied := NewWorm(table([]float64{1, 1, 1, 2}), 0.95)
	assert.InDelta(t, -0.31863936396437514, tied.Quantile[0], 1e-9) // qnorm(1.5/4)
	assert.InDelta(t, 1.15034938037600787, tied.Quantile[1], 1e-9)  // qnorm(3.5/4)
}

func TestManyMarksAreThinnedEvenly(t *testing.T) {
	source := rand.New(rand.NewPCG(3, 4))
	scores := make([]float64, 20000)
	for i := range scores {
		scores[i] = source.NormFloat64()
	}
	tab := table(scores)
	w := NewWorm(tab, 0.95)
	assert.LessOrEqual(t, len(w.Score), mostMarks)
	assert.Greater(t, len(w.Score), mostMarks*3/4)
	assert.Equal(t, tab.Counts.Min(), w.Score[0])
	assert.Equal(t, tab.Counts.Max(), w.Score[len(w.Score)-1])
	widest := 0.0
	for i := 1; i < len(w.Quantile); i++ {
		step := w.Quantile[i] - w.Quantile[i-1]
		assert.Positive(t, step)
		if math.Abs(w.Quantile[i]) < 2.5 {
			widest = math.Max(widest, step)
		}
	}
	assert.Less(t, widest, 2.5*(w.Quantile[len(w.Quantile)-1]-w.Quantile[0])/mostMarks)
}

// A cutoff stands between the marks of the scores on its two sides.
func TestPlace(t *testing.T) {
	tab := table(testdata.Open("mathexam", "nsolved"))
	scale := sample.NewScale(tab.Counts, tab.Moments.SD, sample.StepChoice{}, nil)
	w := NewWorm(tab, 0.95)
	for i, score := range tab.Counts.Score {
		place, ok := Place(tab, gap.Ends(scale, cutoff.Cutoff{Side: cutoff.AtLeast, At: score}, false)[0])
		if i == 0 {
			assert.False(t, ok, "everyone is at or above the lowest score")
			continue
		}
		assert.True(t, ok)
		assert.Greater(t, place, w.Quantile[i-1])
		assert.Less(t, place, w.Quantile[i])
	}
}

// What words.ReadWorm says of a mark above, or below, the line is so for every
// sample.
func TestTheWormsSideSaysWhereTheCurveHasTooFew(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawCase(t).plan()
		w := NewWorm(p.Table, 0.95)
		people, before := float64(p.Table.Counts.N), 0.0
		for i, count := range p.Table.Counts.Count {
			z := p.Table.Curve.Z(w.Score[i])
			if w.Deviation[i] > 1e-9 {
				assert.Less(t, curve.UpperTail(z), (people-before)/people)
			}
			before += float64(count)
			if w.Deviation[i] < -1e-9 {
				assert.Less(t, curve.UpperTail(-z), before/people)
			}
		}
	})
}
