package report

import (
	"bytes"
	"context"
	"strconv"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/demo"
	"tailgap/core/intake"
)

// demoAnswer is the demo's question answered on the demo's data.
func demoAnswer(t *testing.T, q ask.Question) ask.Answer {
	t.Helper()
	source := intake.Source{Name: demo.Name, Reader: bytes.NewReader(demo.CSV())}
	read, err := intake.Read(context.Background(), []intake.Source{source}, intake.Options{Scores: q.Scores, Missing: q.Missing, Header: q.Header})
	require.NoError(t, err)
	read.Demo = true
	a, err := ask.Judge(t.Context(), q, read, nil)
	require.NoError(t, err)
	return a
}

// The whole way from bytes to words. Text alone is compared: its figures are
// rounded, while the last digits of CSV and JSON differ between machines.
func TestDemo(t *testing.T) {
	q := demo.Question()
	checkGolden(t, "demo.txt", []byte(Text(demoAnswer(t, q))))

	several := q
	several.Scores = []string{"form_minutes", "years_away"}
	several.HalfStep = true
	several.Cutoffs = []cutoff.Cutoff{parsed(">=45"), parsed("<5")}
	checkGolden(t, "demo-several.txt", []byte(Text(demoAnswer(t, several))))
}

func TestDemoAnswerIsReadBack(t *testing.T) {
	a := demoAnswer(t, demo.Question())
	text, err := JSON(a)
	require.NoError(t, err)
	back, err := ReadJSON(text)
	require.NoError(t, err)
	assert.Equal(t, a, back)
	assert.Len(t, readCSV(t, a), 1+len(a.Question.Cutoffs))
}

// What the shape does at each cutoff stands in the CSV digit for digit, under
// its name in the JSON; what has a list of its own, such as the worm, does not.
func TestCSVHasTheEffectsOfTheJSON(t *testing.T) {
	a := demoAnswer(t, demo.Question())
	lines := readCSV(t, a)
	cells := func(row int) map[string]string {
		found := map[string]string{}
		for i, name := range lines[0] {
			found[name] = lines[row][i]
		}
		return found
	}
	shape := a.Results[0].Shape
	for i, at := range shape.Cutoffs {
		got := cells(i + 1)
		assert.Equal(t, strconv.FormatFloat(at.Asymmetry.Points, 'g', -1, 64), got["effect_asymmetry_points"])
		assert.Equal(t, strconv.FormatFloat(*at.Rest.High, 'g', -1, 64), got["effect_rest_high"])
		assert.Equal(t, "", got["effect_mean_and_sd_points"], "the curve is fitted")
		assert.Equal(t, strconv.FormatFloat(*shape.Skewness.Low, 'g', -1, 64), got["shape_skewness_low"])
		assert.Equal(t, strconv.FormatFloat(shape.Tests.Lilliefors.D, 'g', -1, 64), got["shape_tests_lilliefors_d"])
		assert.NotContains(t, got, "shape_worm_score")
	}
}

func TestReadJSONRefusesABrokenWorm(t *testing.T) {
	a := demoAnswer(t, demo.Question())
	a.Results[0].Shape.Worm.Deviation = a.Results[0].Shape.Worm.Deviation[1:]
	text, err := JSON(a)
	require.NoError(t, err)
	_, err = ReadJSON(text)
	assert.EqualError(t, err, "the answer can't be read: the worm of \"vocabulary\" has 37 scores but 36 of deviation")
}
