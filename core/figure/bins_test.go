package figure

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
)

// sweepOf counts scores as a sweep does.
func sweepOf(scores, thresholds []float64, side cutoff.Side, step float64) ask.Sweep {
	s := ask.Sweep{Side: side}
	add := func(x float64, after bool) {
		below := 0.0
		for _, score := range scores {
			if score < x || after && score == x {
				below++
			}
		}
		share := below / float64(len(scores))
		if !side.Lower() {
			share = 1 - share
		}
		s.Threshold, s.CountedShare = append(s.Threshold, x), append(s.CountedShare, share)
	}
	for _, x := range thresholds {
		if step > 0 {
			add(x, side.Strict())
		} else {
			add(x, false)
			add(x, true)
		}
	}
	return s
}

var sidesInUse = []cutoff.Side{cutoff.AtLeast, cutoff.Above, cutoff.AtMost, cutoff.Below}

// Every person stands in one bar, and those beyond the cutoff in the bars
// beyond it, whichever sweep they are taken back from.
func TestBarsHoldEveryone(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		whole := rapid.Bool().Draw(t, "whole")
		var scores []float64
		if whole {
			for _, x := range rapid.SliceOfN(rapid.IntRange(0, 300), 2, 60).Draw(t, "scores") {
				scores = append(scores, float64(x))
			}
		} else {
			scores = rapid.SliceOfN(rapid.Float64Range(-3, 40), 2, 60).Draw(t, "scores")
		}
		low, high := extent(scores)
		r := ask.Result{Sample: ask.Described{Used: len(scores), Low: low, High: high, Min: low, Max: high}}
		step := 0.0
		var thresholds []float64
		if whole {
			step = 1
			r.Sample.Step = &step
			for x := low; x <= high; x++ {
				thresholds = append(thresholds, x)
			}
		} else {
			thresholds = sortedDistinct(scores)
		}
		at := cutoff.Cutoff{Side: rapid.SampledFrom(append(sidesInUse, cutoff.Stretch)).Draw(t, "side"),
			At: rapid.SampledFrom(scores).Draw(t, "at"), To: rapid.SampledFrom(scores).Draw(t, "to")}
		if at.Side == cutoff.Stretch && at.To < at.At {
			at.At, at.To = at.To, at.At
		}
		side := rapid.SampledFrom(sidesInUse).Draw(t, "sweep")
		f := Frame{Left: 46, Right: rapid.Float64Range(300, 1600).Draw(t, "right"), Low: low, High: high}

		bars, width := bins(r, newCounting(r, sweepOf(scores, thresholds, side, step)), at, f)
		from, to := beyond(at, splits(r, at), Frame{Low: math.Inf(-1), High: math.Inf(1)})
		total, within := 0.0, 0.0
		for _, b := range bars {
			if at.Side != cutoff.Stretch {
				assert.InDelta(t, width, b.to-b.from, 1e-9*(1+math.Abs(b.to)))
			}
			total += b.share
			if middle := (b.from + b.to) / 2; from <= middle && middle <= to {
				within += b.share
			}
		}
		assert.InDelta(t, 1, total, 1e-9)
		counted := 0.0
		for _, x := range scores {
			if isBeyond(at, x) {
				counted++
			}
		}
		assert.InDelta(t, counted/float64(len(scores)), within, 1e-9)
	})
}

func isBeyond(c cutoff.Cutoff, x float64) bool {
	switch c.Side {
	case cutoff.AtLeast:
		return x >= c.At
	case cutoff.Above:
		return x > c.At
	case cutoff.AtMost:
		return x <= c.At
	case cutoff.Below:
		return x < c.At
	}
	return x >= c.At && x <= c.To
}

func sortedDistinct(scores []float64) []float64 {
	seen := map[float64]bool{}
	var distinct []float64
	for _, x := range scores {
		if !seen[x] {
			seen[x] = true
			distinct = append(distinct, x)
		}
	}
	for i := range distinct {
		for j := i; j > 0 && distinct[j] < distinct[j-1]; j-- {
			distinct[j], distinct[j-1] = distinct[j-1], distinct[j]
		}
	}
	return distinct
}

func TestOneBarForEachScore(t *testing.T) {
	step := 1.0
	r := ask.Result{Sample: ask.Described{Used: 4, Step: &step, Low: 0, High: 4}}
	scores := []float64{1, 1, 2, 4}
	want := []bin{{0.5, 1.5, 0.5}, {1.5, 2.5, 0.25}, {3.5, 4.5, 0.25}}
	for _, side := range sidesInUse {
		c := newCounting(r, sweepOf(scores, []float64{0, 1, 2, 3, 4}, side, 1))
		bars, width := bins(r, c, cutoff.Cutoff{Side: cutoff.AtLeast, At: 2}, Frame{Left: 50, Right: 600})
		assert.Equal(t, 1.0, width)
		assert.Equal(t, want, bars, side.String())
	}
}

// A sweep of many scores is thinned: what lies between two thresholds is
// taken as evenly spread, and nobody is lost.
func TestThinnedSweep(t *testing.T) {
	r := ask.Result{Sample: ask.Described{Used: 8, Low: 0, High: 7}}
	scores := []float64{0, 1, 2, 3, 4, 5, 6, 7}
	c := newCounting(r, sweepOf(scores, []float64{0, 4, 7}, cutoff.AtLeast, 0))
	assert.InDelta(t, 1.0/8+0.5*3/8, c.share(2, false), 1e-12)
	assert.InDelta(t, 0.5, c.share(4, false), 1e-12)
	assert.InDelta(t, 5.0/8, c.share(4, true), 1e-12)
	assert.InDelta(t, 0, c.share(0, false), 1e-12)
	assert.InDelta(t, 1, c.share(7, true), 1e-12)
	assert.InDelta(t, 1, c.share(9, false), 1e-12)
	assert.InDelta(t, 0, c.share(-1, true), 1e-12)
}

// On whole numbers a cutoff splits the people half-way between two scores,
// wherever it stands itself.
func TestSplits(t *testing.T) {
	step := 1.0
	r := ask.Result{Sample: ask.Described{Step: &step, Low: 0, High: 40}}
	for text, want := range map[string][]float64{
		">=30": {29.5}, ">30": {30.5}, "<=30": {30.5}, "<30": {29.5}, "20..30": {19.5, 30.5},
		">=29.5": {29.5}, ">29.5": {29.5}, "<=29.5": {29.5}, "<29.5": {29.5},
	} {
		c, err := cutoff.Parse(text)
		require.NoError(t, err)
		assert.Equal(t, want, splits(r, c), text)
		assert.Equal(t, ends(c), splits(ask.Result{}, c), text)
	}
}

// Both ends of a stretch are in it; a rest of less than half a bar joins the
// bar before.
func TestBarsOfAStretch(t *testing.T) {
	r := ask.Result{Sample: ask.Described{Used: 8, Low: 0, High: 50}}
	scores := []float64{0, 10, 10, 20, 23, 24, 30, 50}
	c := newCounting(r, sweepOf(scores, []float64{0, 10, 20, 23, 24, 30, 50}, cutoff.AtLeast, 0))
	f := Frame{Left: 50, Right: 1000}
	bars, width := bins(r, c, cutoff.Cutoff{Side: cutoff.Stretch, At: 10, To: 24}, f)
	assert.Equal(t, 10.0, width)
	assert.Equal(t, []bin{{0, 10, 1.0 / 8}, {10, 24, 5.0 / 8}, {24, 34, 1.0 / 8}, {44, 54, 1.0 / 8}}, bars)
	bars, _ = bins(r, c, cutoff.Cutoff{Side: cutoff.Stretch, At: 20, To: 20}, f)
	assert.Contains(t, bars, bin{20, 20, 1.0 / 8}, "a stretch of a single score")
}

func TestRoundUp(t *testing.T) {
	for x, want := range map[float64]float64{0.7: 1, 1: 1, 1.01: 2, 2.1: 5, 5.5: 10, 30: 50, 0.013: 0.02, 0: 1, math.Inf(1): 1} {
		assert.InEpsilon(t, want, roundUp(x), 1e-12)
	}
}
