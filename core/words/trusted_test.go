package words

import (
	"testing"

	"github.com/stretchr/testify/assert"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
)

func swept(side cutoff.Side, trusted ...ask.Stretch) ask.Sweep {
	return ask.Sweep{
		Side:         side,
		Threshold:    []float64{1, 14, 27, 38, 39, 40},
		CurveShare:   []float64{0.9991, 0.7, 0.4, 0.0040, 0.0013, 0.0005},
		CountedShare: []float64{0.9950, 0.7, 0.4, 0.0050, 0.0103, 0},
		Trusted:      trusted,
	}
}

func TestTrusted(t *testing.T) {
	q := ask.NewQuestion()
	q.TooHigh, q.TooLow = points(1), points(1)
	middle := ask.Stretch{From: 14, To: 27}
	for _, c := range []struct {
		name     string
		sweep    ask.Sweep
		expected []string
	}{
		{"a stretch", swept(cutoff.AtLeast, middle),
			[]string{"From 14 to 27 (at or above) the curve is within the tolerance, whatever threshold is taken."}},
		{"a thinned sweep", thinned(swept(cutoff.AtLeast, middle)),
			[]string{"From 14 to 27 (at or above) the curve is within the tolerance at every threshold looked at."}},
		{"one threshold", swept(cutoff.Below, ask.Stretch{From: 14, To: 14}),
			[]string{"At 14 (below) the curve is within the tolerance."}},
		{"nowhere", swept(cutoff.AtMost),
			[]string{"Nowhere on this scale (at or below) can the curve be trusted at this tolerance."}},
		{"an empty tail beside a stretch", swept(cutoff.AtLeast, middle, ask.Stretch{From: 38, To: 40, Trivial: true}),
			[]string{
				"From 14 to 27 (at or above) the curve is within the tolerance, whatever threshold is taken.",
				"From 38 to 40 (at or above): too few people here to matter at 1 point too high or too low; the curve is 8 times too low at worst.",
			}},
		{"only an empty tail", swept(cutoff.Above, ask.Stretch{From: 38, To: 38, Trivial: true}),
			[]string{
				"Nowhere on this scale (above) where there are people enough to matter can the curve be trusted at this tolerance.",
				"At 38 (above): too few people here to matter at 1 point too high or too low; 80 by the curve for every 100 counted.",
			}},
		{"nobody counted", swept(cutoff.AtLeast, middle, ask.Stretch{From: 40, To: 40, Trivial: true}),
			[]string{
				"From 14 to 27 (at or above) the curve is within the tolerance, whatever threshold is taken.",
				"At 40 (at or above): too few people here to matter at 1 point too high or too low; none were counted.",
			}},
		{"nearly everybody", swept(cutoff.AtLeast, ask.Stretch{From: 1, To: 1, Trivial: true}, middle),
			[]string{
				"At 1 (at or above): too few people on the other side to matter at 1 point too high or too low; the curve is 6 times too low.",
				"From 14 to 27 (at or above) the curve is within the tolerance, whatever threshold is taken.",
			}},
		{"both ends", swept(cutoff.AtLeast, ask.Stretch{From: 1, To: 40, Trivial: true}),
			[]string{
				"Nowhere on this scale (at or above) where there are people enough to matter can the curve be trusted at this tolerance.",
				"From 1 to 40 (at or above): too few people here or on the other side to matter at 1 point too high or too low; the curve is 8 times too low at worst.",
			}},
	} {
		t.Run(c.name, func(t *testing.T) {
			assert.Equal(t, c.expected, Trusted(q, ask.Result{}, c.sweep))
		})
	}
	q.TooLow = nil
	assert.Equal(t, "At 39 (at or above): too small a share here to miss by more than 1 point too high; the curve is 8 times too low.",
		Trusted(q, ask.Result{}, swept(cutoff.AtLeast, ask.Stretch{From: 39, To: 39, Trivial: true}))[1])
	assert.Empty(t, Trusted(ask.NewQuestion(), ask.Result{}, swept(cutoff.AtLeast, middle)), "no tolerance")
}

func TestWorst(t *testing.T) {
	r := ask.Result{
		Sweeps: []ask.Sweep{{}},
		Worst:  ask.Worst{Side: cutoff.AtLeast, Threshold: 30, GapPoints: -8.9},
	}
	assert.Equal(t, "The gap is largest at 30 or above: too low by 8.9 points.", Worst(r))
	r.Worst = ask.Worst{Side: cutoff.Below, Threshold: 12.5, GapPoints: 0.13}
	assert.Equal(t, "The gap is largest below 12.5: too high by 0.13 points.", Worst(r))
	assert.Empty(t, Worst(ask.Result{}), "no sweep")
}

func thinned(s ask.Sweep) ask.Sweep {
	s.Thinned = true
	return s
}
