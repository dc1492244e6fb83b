package figure_test

import (
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"tailgap/core/ask"
	"tailgap/core/figure"
	"tailgap/core/words"
)

// wormed is a recipe's answer with a worm of its scores.
func (m recipe) wormed() ask.Answer {
	a := m.answer()
	r := &a.Results[0]
	n := float64(len(m.scores))
	c := counter{recipe: m, scores: m.scores}
	place := func(share float64) float64 { return math.Sqrt2 * math.Erfinv(2*share-1) }
	r.Shape = &ask.Shape{}
	seen := map[float64]bool{}
	for x := r.Sample.Min; x <= r.Sample.Max; x += max(m.step, 0.01) {
		for _, score := range m.scores {
			if math.Abs(score-x) < 1e-9 && !seen[score] {
				seen[score] = true
				q := place((c.below(score, false) + c.below(score, true)) / 2 / n)
				w := &r.Shape.Worm
				w.Score, w.Quantile = append(w.Score, score), append(w.Quantile, q)
				w.Deviation = append(w.Deviation, (score-r.Sample.Mean)/r.Sample.SD-q)
				if !m.everyone {
					w.Limit = append(w.Limit, 1.96*math.Sqrt(2*math.Pi)*math.Exp(q*q/2)*math.Sqrt(0.25*math.Exp(-q*q/1.6)/n))
				}
			}
		}
	}
	for _, f := range r.Cutoffs {
		at := ask.ShapeAt{Cutoff: f.Cutoff}
		for i, end := range []float64{f.Cutoff.At, f.Cutoff.To} {
			share := c.below(end, f.Cutoff.Side.Strict() || i == 1) / n
			if q := place(share); share > 0 && share < 1 && i == 0 {
				at.Quantile = &q
			} else if share > 0 && share < 1 && f.Cutoff.To > f.Cutoff.At {
				at.QuantileTo = &q
			}
		}
		r.Shape.Cutoffs = append(r.Shape.Cutoffs, at)
	}
	return a
}

func TestWormGolden(t *testing.T) {
	for name, w := range map[string]struct {
		answer string
		o      figure.Options
	}{
		"worm-wide":     {"vocabulary", figure.Options{Width: 1100, Selected: 1}},
		"worm-narrow":   {"vocabulary", figure.Options{Width: 320, Selected: -1, Prefix: "worm"}},
		"worm-stretch":  {"twenty", figure.Options{Width: 700, Selected: 0, Standalone: true}},
		"worm-everyone": {"everyone", figure.Options{Width: 640, Height: 300, Selected: -1}},
		"worm-crowd":    {"crowd", figure.Options{Width: 900, Selected: 2}},
	} {
		t.Run(name, func(t *testing.T) {
			a := recipes[w.answer].wormed()
			golden(t, name, figure.Worm(a.Question, a.Results[0], w.o))
		})
	}
	a := judged(t, func(q *ask.Question) {})
	golden(t, "worm-sheet", figure.WormSheet(a))
}

func TestWormSaysItsFinding(t *testing.T) {
	a := judged(t, func(q *ask.Question) {})
	r := a.Results[0]
	d := read(t, figure.Worm(a.Question, r, figure.Options{Width: 900, Selected: -1}))
	assert.Equal(t, "Worm plot: vocabulary", d.title)
	assert.Contains(t, d.desc, words.ReadWorm())
	for _, sentence := range words.Worm(a.Question, r) {
		assert.Contains(t, d.desc, sentence)
	}
	assert.Equal(t, len(r.Shape.Worm.Score), d.classes["beyond"], "a mark for each score")
	assert.Equal(t, []string{"0", "1"}, d.cutoffs)
	assert.Equal(t, 1, d.classes["limits"])
	sheet := read(t, figure.WormSheet(a))
	assert.Contains(t, sheet.desc, "DEMO")
	assert.Contains(t, sheet.desc, words.NoAnswer())
	for _, sentence := range words.Shape(a.Question, r) {
		assert.Contains(t, sheet.desc, sentence)
	}
}

// A cutoff stands between the marks of the scores on its two sides.
func TestCutoffsPartTheWorm(t *testing.T) {
	a := recipes["twenty"].wormed()
	svg := figure.Worm(a.Question, a.Results[0], figure.Options{Width: 700, Selected: -1})
	d := read(t, svg)
	assert.Len(t, d.cutoffs, 2)
	assert.Equal(t, 3, strings.Count(svg, `class="pole"`), "one for 60 or above, two for the stretch")
	for _, m := range []recipe{recipes["outside"], recipes["crowd"]} {
		a := m.wormed()
		d := read(t, figure.Worm(a.Question, a.Results[0], figure.Options{Width: 700, Selected: -1}))
		assert.NotZero(t, d.classes["aside"], "a cutoff with all people on one side stands at the edge")
	}
}

func TestEveryWormIsLegible(t *testing.T) {
	for name, m := range recipes {
		a := m.wormed()
		for _, width := range []int{0, 320, 360, 480, 700, 1100, 1600} {
			svg := figure.Worm(a.Question, a.Results[0], figure.Options{Width: width, Selected: 0})
			read(t, svg).legible(t)
			assert.Equal(t, svg, figure.Worm(a.Question, a.Results[0], figure.Options{Width: width, Selected: 0}), name)
		}
		read(t, figure.WormSheet(a)).legible(t)
	}
	rapid.Check(t, func(t *rapid.T) {
		a := anyRecipe(t).wormed()
		o := figure.Options{Width: rapid.IntRange(320, 1600).Draw(t, "width"), Selected: rapid.IntRange(-1, 3).Draw(t, "selected")}
		if svg := figure.Worm(a.Question, a.Results[0], o); len(a.Results[0].Shape.Worm.Score) > 0 {
			read(t, svg).legible(t)
		}
	})
}

func TestNoWorm(t *testing.T) {
	a := recipes["twenty"].answer()
	assert.Empty(t, figure.Worm(a.Question, a.Results[0], figure.Options{}))
	read(t, figure.WormSheet(a)).legible(t)
	read(t, figure.WormSheet(ask.Answer{})).legible(t)
	a = recipes["twenty"].wormed()
	a.Results[0].Shape.Cutoffs = nil
	read(t, figure.Worm(a.Question, a.Results[0], figure.Options{Width: 600})).legible(t)
	for _, x := range []float64{math.NaN(), math.Inf(1), math.MaxFloat64, 1e30} {
		a = recipes["twenty"].wormed()
		a.Results[0].Shape.Worm.Deviation[2] = x
		if svg := figure.Worm(a.Question, a.Results[0], figure.Options{Width: 600}); x == 1e30 {
			read(t, svg)
		} else {
			assert.Empty(t, svg)
		}
	}
}
