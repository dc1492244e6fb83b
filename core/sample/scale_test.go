package sample_test

import (
	"fmt"
	"math"
	"strconv"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"tailgap/core/sample"
	"tailgap/testdata"
)

func scaleOf(scores []float64, step sample.StepChoice, ends *sample.Range) sample.Scale {
	counts := sample.Count(scores)
	return sample.NewScale(counts, counts.Moments().SD, step, ends)
}

// Steps as testdata/open/SOURCES.md tells them. Eruptions were recorded to
// the thousandth of a minute, where half a step would move nothing.
func TestStepOfOpenData(t *testing.T) {
	steps := map[[2]string]float64{
		{"pima", "glu"}: 1, {"pima", "bmi"}: 0.1, {"pima", "age"}: 1, {"pima", "bp"}: 1,
		{"crimtab", "height_cm"}: 2.54, {"crimtab", "finger_cm"}: 0.1,
		{"mathexam", "tests"}: 1, {"mathexam", "nsolved"}: 1,
		{"faithful", "waiting"}: 1, {"faithful", "eruptions"}: 0,
		{"newcomb", "time"}: 1, {"cd4", "baseline"}: 0.01, {"cd4", "oneyear"}: 0.01,
	}
	for column, step := range steps {
		assert.Equal(t, step, scaleOf(testdata.Open(column[0], column[1]), sample.StepChoice{}, nil).Step, column)
	}
}

func TestStepDetection(t *testing.T) {
	fives := make([]float64, 0, 12)
	for i := range 12 {
		fives = append(fives, float64(5*i*i))
	}
	tests := []struct {
		name   string
		scores []float64
		step   float64
	}{
		{"whole numbers", []float64{1, 2, 5, 9, 4, 3}, 1},
		{"few scores that happen to be even", []float64{2, 4, 8}, 1},
		{"twelve multiples of five", fives, 5},
		{"halves", []float64{0.5, 1, 1.5, 3}, 0.1},
		{"noise of a sum", []float64{0.1 + 0.2, 0.5, 0.7}, 0.1},
		{"thirds", []float64{1.0 / 3, 2.0 / 3, 1, 2}, 0},
		{"noise beside the number itself", []float64{0.1 + 0.2, 0.3, 0.5, 0.7}, 0.1},
		{"a step far below the SD", []float64{0, 1000, 50, 333}, 0},
		{"tiny scores, all near 0", []float64{1e-12, 2e-12, 7e-12}, 0},
		{"hundredths of large numbers", []float64{1.7e9, 1.7e9 + 0.01, 1.7e9 + 0.05, 1.7e9 + 0.11}, 0.01},
		{"large whole numbers", []float64{1e15, 1e15 + 1, 1e15 + 4}, 1},
		{"nothing but noise", []float64{1, 1 + 0x1p-52}, 0},
	}
	for _, test := range tests {
		assert.Equal(t, test.step, scaleOf(test.scores, sample.StepChoice{}, nil).Step, test.name)
	}
}

func TestScaleAsStated(t *testing.T) {
	s := scaleOf([]float64{3, 4.5, 6}, sample.StepChoice{Size: 1}, &sample.Range{Low: 0, High: 10})
	assert.Equal(t, 1.0, s.Step)
	assert.Equal(t, "stated", s.StepSource)
	assert.Equal(t, "stated", s.RangeSource)
	assert.Equal(t, 1, s.OffStep(), "4.5 is off the step")
	assert.Equal(t, 5.0, s.AtOrAbove(4.5))
	assert.Equal(t, 4.0, s.AtOrBelow(4.5))
	assert.Equal(t, 4.0, s.AtOrBelow(4))
	none := scaleOf([]float64{3, 4, 6}, sample.StepChoice{None: true}, nil)
	assert.Zero(t, none.Step)
	assert.Equal(t, 4.2, none.AtOrAbove(4.2))
}

// Far from zero a score has fewer binary digits left for its decimals.
func TestStepsOfLargeNumbers(t *testing.T) {
	scores := make([]float64, 60)
	for i := range scores {
		scores[i], _ = strconv.ParseFloat(fmt.Sprintf("1700000000.%02d", i), 64)
	}
	s := scaleOf(scores, sample.StepChoice{}, nil)
	assert.Equal(t, 0.01, s.Step)
	assert.Zero(t, s.OffStep())
	assert.True(t, s.Attainable(1700000000.37))
	assert.False(t, s.Attainable(1700000000.375))
}

// On any decimal step, attainable scores are what a person would write.
func TestAttainableScoresAreDecimals(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		decimals := rapid.IntRange(0, 3).Draw(t, "decimals")
		unit := math.Pow10(decimals)
		low := rapid.IntRange(-500, 500).Draw(t, "low")
		scores := []float64{float64(low) / unit, float64(low+1) / unit, float64(low+7) / unit}
		s := scaleOf(scores, sample.StepChoice{Size: 1 / unit}, nil)
		k := rapid.IntRange(0, 2000).Draw(t, "k")
		assert.Equal(t, float64(low+k)/unit, s.Score(float64(k)))
		assert.Equal(t, float64(k), s.Index(float64(low+k)/unit))
	})
}

func TestChoicesReadAndWrite(t *testing.T) {
	for _, text := range []string{"auto", "none", "1", "0.5", "2.54"} {
		choice, err := sample.ParseStep(text)
		assert.NoError(t, err)
		assert.Equal(t, text, choice.String())
	}
	for _, text := range []string{"", "0", "-1", "NaN", "Inf", "one"} {
		_, err := sample.ParseStep(text)
		assert.EqualError(t, err, `the step "`+text+`" can't be read; write auto, none or a number above zero`)
	}
	ends, err := sample.ParseRange(" -5 : 83.5 ")
	assert.NoError(t, err)
	assert.Equal(t, sample.Range{Low: -5, High: 83.5}, ends)
	for text, sentence := range map[string]string{
		"83":      `the range "83" can't be read; write it as 0:83`,
		"a:b":     `the range "a:b" can't be read; write it as 0:83`,
		"0:NaN":   `the range "0:NaN" can't be read; write it as 0:83`,
		"0:1e999": `the range "0:1e999" can't be read; write it as 0:83`,
		"83:0":    `the range "83:0" ends before it starts; write the lower end first, as in 0:83`,
	} {
		_, err := sample.ParseRange(text)
		assert.EqualError(t, err, sentence)
	}
	var header sample.Header
	assert.NoError(t, header.UnmarshalText([]byte("no")))
	assert.EqualError(t, header.UnmarshalText([]byte("maybe")), `the header setting "maybe" can't be read; write auto, yes or no`)
}
