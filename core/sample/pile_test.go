package sample_test

import (
	"testing"

	"github.com/stretchr/testify/assert"

	"tailgap/core/sample"
	"tailgap/testdata"
)

// piles are those of scores on a scale with ends that may be stated.
func piles(scores []float64, ends *sample.Range) (floor, ceiling sample.Pile) {
	counts := sample.Count(scores)
	moments := counts.Moments()
	return sample.Piles(counts, moments, sample.NewScale(counts, moments.SD, sample.StepChoice{}, ends))
}

func TestPiles(t *testing.T) {
	none := sample.Pile{}
	floor, ceiling := piles(spread(420), nil)
	assert.Equal(t, none, floor)
	assert.Equal(t, none, ceiling)

	floor, ceiling = piles(with(spread(420), 30, 60), nil) // 20 + 60 of 480, against 20
	assert.Equal(t, none, floor)
	assert.Equal(t, sample.Pile{Score: 30, People: 80}, ceiling)
	_, ceiling = piles(with(spread(420), 30, 60), &sample.Range{Low: 0, High: 40})
	assert.Equal(t, none, ceiling, "30 is not the end of this scale")

	floor, ceiling = piles(with(with(with(nil, 1, 9), 2, 41), 3, 50), nil)
	assert.Equal(t, none, floor, "9 people make no pile")
	assert.Equal(t, sample.Pile{Score: 3, People: 50}, ceiling, "half of the people")

	// 50 against 30 is 5 more than one and a half times as many: three
	// standard errors are 3·√(50+2.25·30) = 32.5.
	floor, _ = piles(with(with(spread(630), 10, 20), 11, 0), nil)
	assert.Equal(t, none, floor)
	floor, _ = piles(with(spread(630), 10, 58), nil) // 88 - 45 = 43 against 3·√(88+67.5) = 37.4
	assert.Equal(t, sample.Pile{Score: 10, People: 88}, floor)

	without := make([]float64, 0, 300) // a scale without a step
	for i := range 270 {
		without = append(without, 1+float64(i)*0.0137)
	}
	floor, _ = piles(with(without, 0, 30), nil)
	assert.Equal(t, sample.Pile{Score: 0, People: 30}, floor)
	floor, ceiling = piles(testdata.Open("faithful", "eruptions"), nil)
	assert.Equal(t, none, floor)
	assert.Equal(t, none, ceiling)
}

// heaps are those of scores with the step that is detected.
func heaps(scores []float64) sample.Heaping {
	counts := sample.Count(scores)
	moments := counts.Moments()
	return sample.Heaps(counts, moments, sample.NewScale(counts, moments.SD, sample.StepChoice{}, nil))
}

func TestHeaps(t *testing.T) {
	assert.Equal(t, sample.Heaping{Spacing: 5, Share: 200. / 520, At: []int{0, 5, 10, 15, 20}}, heaps(with(spread(420), 20, 100)),
		"the SD is below 10, so heaps on tens can't be told")
	assert.Zero(t, heaps(spread(420)))

	wide := make([]float64, 0, 1000) // 1..100 evenly
	for i := range 1000 {
		wide = append(wide, float64(1+i%100))
	}
	tens, fives := wide, wide
	for score := 10.0; score <= 90; score += 10 {
		tens, fives = with(tens, score, 20), with(with(fives, score, 30), score-5, 20)
	}
	assert.Equal(t, 10.0, heaps(tens).Spacing)
	assert.Equal(t, 5.0, heaps(fives).Spacing, "the fives between the tens are heaps too")
	assert.InDelta(t, (200+450)/1450., heaps(fives).Share, 1e-12)

	zeros := make([]float64, 0, 1000) // many at the floor, none heaped
	for i := range 500 {
		zeros = append(zeros, float64(i%50))
	}
	assert.Zero(t, heaps(with(zeros, 0, 300)), "a pile at an end is no heap")

	counts := sample.Count(wide)
	none := sample.NewScale(counts, 29, sample.StepChoice{None: true}, nil)
	assert.Zero(t, sample.Heaps(counts, counts.Moments(), none), "no step, no round scores")
}
