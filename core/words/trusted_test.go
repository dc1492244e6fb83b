package words

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

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

// band is how the first sentence ends where there is a band.
const band = " (judged by the 95% band, which holds for all thresholds at once)."

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
			[]string{"From 14 to 27 (at or above) the curve is within the tolerance, whatever threshold is taken" + band}},
		{"a thinned sweep", thinned(swept(cutoff.AtLeast, middle)),
			[]string{"From 14 to 27 (at or above) the curve is within the tolerance at every threshold looked at" + band}},
		{"one threshold", swept(cutoff.Below, ask.Stretch{From: 14, To: 14}),
			[]string{"At 14 (below) the curve is within the tolerance" + band}},
		{"nowhere", swept(cutoff.AtMost),
			[]string{"Nowhere on this scale (at or below) can the curve be trusted at this tolerance" + band}},
		{"an empty tail beside a stretch", swept(cutoff.AtLeast, middle, ask.Stretch{From: 38, To: 40, Trivial: true}),
			[]string{
				"From 14 to 27 (at or above) the curve is within the tolerance, whatever threshold is taken" + band,
				"From 38 to 40 (at or above): too few people here to matter at 1 point too high or too low; the curve is 8 times too low at worst.",
			}},
		{"only an empty tail", swept(cutoff.Above, ask.Stretch{From: 38, To: 38, Trivial: true}),
			[]string{
				"Nowhere on this scale (above) where there are people enough to matter can the curve be trusted at this tolerance" + band,
				"At 38 (above): too few people here to matter at 1 point too high or too low; 80 by the curve for every 100 counted.",
			}},
		{"nobody counted", swept(cutoff.AtLeast, middle, ask.Stretch{From: 40, To: 40, Trivial: true}),
			[]string{
				"From 14 to 27 (at or above) the curve is within the tolerance, whatever threshold is taken" + band,
				"At 40 (at or above): too few people here to matter at 1 point too high or too low; none were counted.",
			}},
		{"nearly everybody", swept(cutoff.AtLeast, ask.Stretch{From: 1, To: 1, Trivial: true}, middle),
			[]string{
				"From 14 to 27 (at or above) the curve is within the tolerance, whatever threshold is taken" + band,
				"At 1 (at or above): too few people on the other side to matter at 1 point too high or too low; the curve is 6 times too low.",
			}},
		{"several of each kind", swept(cutoff.AtLeast, ask.Stretch{From: 1, To: 1, Trivial: true}, middle, ask.Stretch{From: 30, To: 30},
			ask.Stretch{From: 38, To: 38, Trivial: true}, ask.Stretch{From: 39, To: 39, Trivial: true}, ask.Stretch{From: 40, To: 40, Trivial: true}),
			[]string{
				"From 14 to 27 and at 30 (at or above) the curve is within the tolerance, whatever threshold is taken" + band,
				"At 1 (at or above): too few people on the other side to matter at 1 point too high or too low; the curve is 6 times too low.",
				"At 38 and at 39 (at or above): too few people here to matter at 1 point too high or too low; the curve is 8 times too low at worst.",
				"At 40 (at or above): too few people here to matter at 1 point too high or too low; none were counted.",
			}},
		{"three places", swept(cutoff.AtLeast, ask.Stretch{From: 5, To: 9}, ask.Stretch{From: 11, To: 15}, ask.Stretch{From: 20, To: 20}),
			[]string{"From 5 to 9, from 11 to 15 and at 20 (at or above) the curve is within the tolerance, whatever threshold is taken" + band}},
		{"only single thresholds", swept(cutoff.AtLeast, ask.Stretch{From: 5, To: 5}, ask.Stretch{From: 7, To: 7}),
			[]string{"At 5 and at 7 (at or above) the curve is within the tolerance" + band}},
		{"both ends", swept(cutoff.AtLeast, ask.Stretch{From: 1, To: 40, Trivial: true}),
			[]string{
				"Nowhere on this scale (at or above) where there are people enough to matter can the curve be trusted at this tolerance" + band,
				"From 1 to 40 (at or above): too few people here or on the other side to matter at 1 point too high or too low; the curve is 8 times too low at worst.",
			}},
	} {
		t.Run(c.name, func(t *testing.T) {
			assert.Equal(t, c.expected, Trusted(q, ask.Result{}, c.sweep))
		})
	}
	two := ask.Result{Sweeps: []ask.Sweep{swept(cutoff.AtMost), swept(cutoff.Above)}}
	assert.Equal(t, []string{"Nowhere on this scale (at or below) can the curve be trusted at this tolerance" + band}, Trusted(q, two, two.Sweeps[0]))
	assert.Equal(t, []string{"Nowhere on this scale (above) can the curve be trusted at this tolerance (judged by the 95% band)."}, Trusted(q, two, two.Sweeps[1]))
	q.TooLow = nil
	assert.Equal(t, "At 39 (at or above): too small a share here to miss by more than 1 point too high; the curve is 8 times too low.",
		Trusted(q, ask.Result{}, swept(cutoff.AtLeast, ask.Stretch{From: 39, To: 39, Trivial: true}))[1])
	assert.Empty(t, Trusted(ask.NewQuestion(), ask.Result{}, swept(cutoff.AtLeast, middle)), "no tolerance")
}

func TestTrustedOfEveryone(t *testing.T) {
	q := ask.NewQuestion()
	q.TooHigh, q.Everyone = points(1), true
	assert.Equal(t, []string{"Nowhere on this scale (at or below) can the curve be trusted at this tolerance."}, Trusted(q, ask.Result{}, swept(cutoff.AtMost)))
	assert.Equal(t, []string{"At 14 (below) the curve is within the tolerance."},
		Trusted(q, ask.Result{}, swept(cutoff.Below, ask.Stretch{From: 14, To: 14})))
}

// Without a step and a band the trusted range can be in many pieces.
func TestTrustedInManyPieces(t *testing.T) {
	q := ask.NewQuestion()
	q.TooHigh, q.Everyone = points(1), true
	var pieces []ask.Stretch
	for i := range 8 {
		from := 10 * float64(i)
		pieces = append(pieces, ask.Stretch{From: from, To: from + float64(i%4)})
	}
	assert.Equal(t, []string{"At 0, from 10 to 11, from 20 to 22, from 30 to 33, at 40, from 50 to 51, from 60 to 62 and from 70 to 73 " +
		"(at or above) the curve is within the tolerance, whatever threshold is taken."}, Trusted(q, ask.Result{}, swept(cutoff.AtLeast, pieces...)))
	pieces = append(pieces, ask.Stretch{From: 80, To: 80.5})
	assert.Equal(t, []string{"From 10 to 11, from 20 to 22, from 30 to 33, from 50 to 51, from 60 to 62, from 70 to 73 and " +
		"in 3 stretches no longer than these (at or above) the curve is within the tolerance, whatever threshold is taken."},
		Trusted(q, ask.Result{}, swept(cutoff.AtLeast, pieces...)))
}

// However the range falls to pieces, it is told in a sentence for the curve
// that holds, and one for each of the six reasons why people are too few.
func TestTrustedIsBrief(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		q := ask.NewQuestion()
		q.TooLow, q.Everyone = points(1), rapid.Bool().Draw(t, "everyone")
		var s ask.Sweep
		for i := range rapid.IntRange(0, 400).Draw(t, "stretches") {
			at := float64(i)
			s.Threshold = append(s.Threshold, at)
			s.CurveShare = append(s.CurveShare, 0.4)
			s.CountedShare = append(s.CountedShare, rapid.SampledFrom([]float64{0, 0.01, 0.5, 0.6, 1}).Draw(t, "share"))
			s.Trusted = append(s.Trusted, ask.Stretch{From: at, To: at + rapid.SampledFrom([]float64{0, 0.5}).Draw(t, "span"), Trivial: rapid.Bool().Draw(t, "trivial")})
		}
		sentences := Trusted(q, ask.Result{}, s)
		assert.LessOrEqual(t, len(sentences), 7)
		for i, sentence := range sentences {
			assert.Less(t, len(sentence), 400)
			assert.Equal(t, i == 0 && !q.Everyone, strings.Contains(sentence, "band"))
		}
	})
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
