package words

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/verdict"
)

func points(size float64) *verdict.Limit { return &verdict.Limit{Size: size, Unit: verdict.Points} }

// asked is a question with 4,000 heads and a tolerance of 1 point too high
// and 2 points too low.
func asked() ask.Question {
	q := ask.NewQuestion()
	q.Heads, q.TooHigh, q.TooLow = some(4000.0), points(1), points(2)
	return q
}

// seventy is a finding at 70 or above, without a step.
func seventy(said string) ask.Finding {
	r := ask.Reading{Z: 1.83, CurveShare: 0.034, GapPoints: 1.4, GapLow: some(1.1), GapHigh: some(1.8), Verdict: &said}
	return ask.Finding{
		Cutoff: cutoff.Cutoff{Side: cutoff.AtLeast, At: 70}, Reading: r, WithoutHalfStep: r,
		Counted: 20, CountedShare: 0.02, Ratio: some(1.7), Heads: &ask.HeadCount{Gap: 56, Low: some(44.0), High: some(72.0)},
	}
}

func TestSentence(t *testing.T) {
	f := seventy("fails")
	assert.Equal(t, "At 70 or above the curve puts 3.4%; 2.0% were counted. Too high by 1.4 points (95% interval 1.1 to 1.8): "+
		"17 by the curve for every 10 counted, 56 too many of 4,000.", Sentence(asked(), f))

	assert.Equal(t, "At 70 or above the curve puts 3.4%; 2.0% were counted. Too high by 1.4 points (95% interval 1.1 to 1.8): "+
		"17 by the curve for every 10 counted.", Sentence(ask.NewQuestion(), f), "no heads")

	all := f
	all.GapLow, all.GapHigh = nil, nil
	assert.Contains(t, Sentence(asked(), all), "Too high by 1.4 points (exact): 17 by")

	none := f
	none.Counted, none.CountedShare, none.Ratio, none.Heads = 0, 0, nil, nil
	assert.Equal(t, "At 70 or above the curve puts 3.4%; none were counted. Too high by 1.4 points (95% interval 1.1 to 1.8).", Sentence(asked(), none))

	low := f
	low.Cutoff = cutoff.Cutoff{Side: cutoff.Stretch, At: 20, To: 30}
	low.GapPoints, low.GapLow, low.GapHigh = -3.9, some(-8.0), some(0.2)
	low.Ratio, low.Heads = some(0.126), &ask.HeadCount{Gap: -157}
	assert.Equal(t, "From 20 to 30 the curve puts 3.4%; 2.0% were counted. Too low by 3.9 points (95% interval 8.0 too low to 0.2 too high): "+
		"8 times too low, 157 too few of 4,000.", Sentence(asked(), low))
}

func TestHalfStepIsSaid(t *testing.T) {
	q, f := asked(), seventy("fails")
	f.HalfStep = &ask.Reading{CurveShare: 0.031, GapPoints: 1.1, GapLow: some(0.8), GapHigh: some(1.5), Verdict: some("unsettled")}
	assert.True(t, strings.HasPrefix(Sentence(q, f), "At 70 or above the curve puts 3.4%;"))
	assert.Equal(t, "With the half-step: 3.1%, too high by 1.1 points (95% interval 0.8 to 1.5); that would be unsettled.", OtherReading(q, f))

	q.HalfStep = true
	f.Reading = *f.HalfStep
	assert.True(t, strings.HasPrefix(Sentence(q, f), "At 70 or above the curve with the half-step puts 3.1%;"))
	assert.Equal(t, "Without the half-step: 3.4%, too high by 1.4 points (95% interval 1.1 to 1.8); that fails.", OtherReading(q, f))

	f.HalfStep, f.Reading = nil, f.WithoutHalfStep
	assert.True(t, strings.HasPrefix(Sentence(q, f), "At 70 or above the curve puts 3.4%;"), "no step, no half-step")
	assert.Empty(t, OtherReading(q, f))
}

// A card shows the parts that the sentence is built from, never others.
func TestSentenceIsBuiltFromItsParts(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		q := asked()
		counted := proportions().Draw(t, "counted")
		share := proportions().Draw(t, "curve")
		gap := 100 * (share - counted)
		f := ask.Finding{
			Cutoff:  cutoff.Cutoff{Side: cutoff.Side(rapid.IntRange(0, 4).Draw(t, "side")), At: 20, To: 30},
			Reading: reading(gap, gap-rapid.Float64Range(0, 5).Draw(t, "below"), gap+rapid.Float64Range(0, 5).Draw(t, "above")),
			Counted: 1, CountedShare: counted, Heads: &ask.HeadCount{Gap: 40 * gap},
		}
		f.CurveShare = share
		if counted > 0 {
			f.Ratio = some(share / counted)
		}
		sentence := Sentence(q, f)
		for _, part := range []string{Share(share), Share(counted), GapOf(f.Reading), Limits(f.Reading), Ratio(f), Heads(q, f)} {
			assert.Contains(t, strings.ToLower(sentence), strings.ToLower(part))
		}
		assert.NotContains(t, sentence, "-0")
		assert.NotContains(t, sentence, unknown)
	})
}
