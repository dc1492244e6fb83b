package figure_test

import (
	"math"
	"math/rand/v2"
	"slices"
	"strconv"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"tailgap/core/figure"
)

func TestTicksAreRoundAndFew(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		low := rapid.Float64Range(-1e6, 1e6).Draw(t, "low")
		span := math.Pow(10, rapid.Float64Range(-4, 7).Draw(t, "span"))
		most := rapid.IntRange(1, 30).Draw(t, "most")
		least := rapid.SampledFrom([]float64{0, 0.01, 1, 5}).Draw(t, "least")
		ticks := figure.Ticks(low, low+span, most, least)
		assert.LessOrEqual(t, len(ticks), most)
		if least == 0 && most >= 6 {
			assert.GreaterOrEqual(t, len(ticks), most/3, "a round step is never more than 2.5 times the one before")
		}
		for i, tick := range ticks {
			assert.True(t, tick >= low-1e-6*span && tick <= low+span*(1+1e-6), "%v lies outside", tick)
			if i == 0 {
				continue
			}
			step := tick - ticks[i-1]
			assert.GreaterOrEqual(t, step, least*(1-1e-6))
			assert.InEpsilon(t, ticks[1]-ticks[0], step, 1e-3, "all steps are the same")
			lead := step / math.Pow(10, math.Floor(math.Log10(step)+1e-4))
			nearest := min(math.Abs(lead-1), math.Abs(lead-2), math.Abs(lead-5))
			assert.Less(t, nearest, 1e-2, "step %v is not 1, 2 or 5 times a power of ten", step)
		}
	})
}

func TestTicksPrintShort(t *testing.T) {
	for _, tick := range figure.Ticks(-1, 1, 25, 0) {
		assert.LessOrEqual(t, len(strconv.FormatFloat(tick, 'f', -1, 64)), 4, "3 times 0.1 is 0.3")
	}
}

func TestTicksWhereThereIsNoRange(t *testing.T) {
	assert.Empty(t, figure.Ticks(1, 1, 5, 0))
	assert.Empty(t, figure.Ticks(2, 1, 5, 0))
	assert.Empty(t, figure.Ticks(math.NaN(), 1, 5, 0))
	assert.Empty(t, figure.Ticks(0, math.Inf(1), 5, 0))
	assert.Empty(t, figure.Ticks(0, 1, 0, 0))
	assert.LessOrEqual(t, len(figure.Ticks(1e18, 1e18+512, 10, 0)), 10)
}

func TestFrameTurnsScoresIntoPixelsAndBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		f := figure.Frame{Left: 46, Right: float64(rapid.IntRange(300, 1600).Draw(t, "right")),
			Low: rapid.Float64Range(-1e4, 1e4).Draw(t, "low")}
		f.High = f.Low + rapid.Float64Range(0.1, 1e4).Draw(t, "span")
		score := rapid.Float64Range(f.Low, f.High).Draw(t, "score")
		assert.InDelta(t, score, f.Score(f.X(score)), 1e-9*(1+math.Abs(f.Low)+math.Abs(f.High)))
		assert.InDelta(t, f.Left, f.X(f.Low), 1e-9)
		assert.InDelta(t, f.Right, f.X(f.High), 1e-9)
	})
	huge := figure.Frame{Left: 0, Right: 100, Low: -1.5e308, High: 1.5e308}
	assert.InDelta(t, 50, huge.X(0), 1e-9)
}

// anyRecipe draws an answer with cutoffs that may stand close together,
// outside the scale or on one spot.
func anyRecipe(t *rapid.T) recipe {
	m := recipe{name: rapid.SampledFrom([]string{"score", "words per minute", "x"}).Draw(t, "name"),
		halfStep: rapid.Bool().Draw(t, "half-step"), everyone: rapid.Bool().Draw(t, "everyone"), heads: 1000}
	n := rapid.IntRange(5, 80).Draw(t, "n")
	seed := rapid.Uint64().Draw(t, "seed")
	scale := rapid.SampledFrom([]float64{1, 20, 100}).Draw(t, "scale")
	if rapid.Bool().Draw(t, "stepped") {
		m.step = rapid.SampledFrom([]float64{1, 0.5, 5}).Draw(t, "step")
		m.scores = draw(n, seed, func(r *rand.Rand) float64 { return m.step * math.Round(scale*(1+0.3*r.NormFloat64())) })
	} else {
		m.scores = draw(n, seed, func(r *rand.Rand) float64 { return scale * (1 + 0.3*r.NormFloat64()) })
	}
	m.scores[0] = slices.Max(m.scores) + max(1, m.step) // never all equal
	m.tooHigh = rapid.SampledFrom([]string{"", "1pt", "20%count", "40heads", "60pt"}).Draw(t, "too high")
	m.tooLow = rapid.SampledFrom([]string{"", "0.1pt", "100%count", "5heads"}).Draw(t, "too low")
	unit := max(m.step, scale/100)
	for range rapid.IntRange(1, 7).Draw(t, "cutoffs") {
		at := unit * float64(rapid.IntRange(0, 300).Draw(t, "at"))
		text := strconv.FormatFloat(at, 'f', -1, 64)
		sign := rapid.SampledFrom([]string{">=", ">", "<=", "<", ".."}).Draw(t, "side")
		if sign == ".." {
			text += ".." + strconv.FormatFloat(at+unit*float64(rapid.IntRange(0, 80).Draw(t, "to")), 'f', -1, 64)
		} else {
			text = sign + text
		}
		m.cutoffs = append(m.cutoffs, text)
	}
	return m
}

func TestAnyFigureIsWellFormedAndLegible(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := anyRecipe(t)
		o := figure.Options{Width: rapid.IntRange(320, 1600).Draw(t, "width"),
			Height: rapid.SampledFrom([]int{0, 200, 500}).Draw(t, "height"), Selected: rapid.IntRange(-1, 3).Draw(t, "selected")}
		for _, svg := range m.all(o) {
			read(t, svg).legible(t)
		}
	})
}

func TestTextFitsItsWidth(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := rapid.String().Draw(t, "text")
		width := rapid.Float64Range(20, 400).Draw(t, "width")
		assert.LessOrEqual(t, figure.TextWidth(figure.Shorten(text, 13, width), 13), width)
		for _, line := range figure.Wrap(text, 13, width) {
			assert.LessOrEqual(t, figure.TextWidth(line, 13), width)
		}
	})
}
