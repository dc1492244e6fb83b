package words_test

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/words"
)

func of(points, low, high float64) *ask.Effect {
	return &ask.Effect{Points: points, Low: &low, High: &high}
}

func measured(value, low, high float64) ask.Measured {
	return ask.Measured{Value: value, Low: &low, High: &high}
}

// shaped is a result with gaps at cutoffs, and what makes them.
func shaped(t *testing.T, gaps map[string]float64, effects map[string]ask.Effects, order ...string) ask.Result {
	r := ask.Result{Score: "minutes", Sample: ask.Described{Mean: 24.1, SD: 7.9}, Shape: &ask.Shape{
		Skewness: measured(0.92, 0.61, 1.23), ExcessKurtosis: measured(0.1, -0.3, 0.6)}}
	for _, text := range order {
		c, err := cutoff.Parse(text)
		require.NoError(t, err)
		low, high := gaps[text]-1.5, gaps[text]+1.5
		r.Cutoffs = append(r.Cutoffs, ask.Finding{Cutoff: c, Reading: ask.Reading{GapPoints: gaps[text], GapLow: &low, GapHigh: &high}})
		r.Shape.Cutoffs = append(r.Shape.Cutoffs, ask.ShapeAt{Cutoff: c, GapPoints: gaps[text], Effects: effects[text]})
	}
	return r
}

func TestShape(t *testing.T) {
	q := ask.NewQuestion()
	gaps := map[string]float64{">=45": -4.4, "<=20": 2.5, "30..40": 6}
	r := shaped(t, gaps, map[string]ask.Effects{
		">=45":   {Asymmetry: of(-2.1, -3, -1.2), Rest: of(-1.5, -3.1, 0.4), HalfStep: of(-0.8, -0.9, -0.7)},
		"<=20":   {Asymmetry: of(3.4, 2.2, 4.6), Rest: of(-0.9, -2, 0.2), HalfStep: of(0.05, 0.04, 0.06)},
		"30..40": {Asymmetry: of(0.2, -1.2, 1.7), Rest: of(5.8, 4, 7), HalfStep: of(0.02, 0.01, 0.03)},
	}, ">=45", "<=20", "30..40")
	assert.Equal(t, []string{
		"Skewness 0.92 (95% interval 0.61 or higher): the long upper tail accounts for 2.1 of the 4.4 points too low at 45 or above (1.2 to 3.0); " +
			"3.4 points too high at 20 or below (2.2 to 4.6), where the whole gap is 2.5 points too high; no sure part from 30 to 40.",
		"Excess kurtosis 0.10 (95% interval -0.30 or higher): tails and peak together account for 5.8 of the 6.0 points too high from 30 to 40 (4.0 to 7.0); " +
			"no sure part at 45 or above and at 20 or below.",
		"Reading the curve without the half-step accounts for 0.8 of the 4.4 points too low at 45 or above (0.7 to 0.9).",
	}, words.Shape(q, r))

	r.Shape.Skewness, r.Shape.ExcessKurtosis = measured(-0.9, -1.2, -0.6), measured(-1.1, -1.3, -0.8)
	said := strings.Join(words.Shape(q, r), " ")
	assert.Contains(t, said, "the long lower tail accounts for")
	assert.Contains(t, said, "Skewness -0.90 (95% interval -0.60 or lower): ")
	assert.Contains(t, said, "Excess kurtosis -1.10 (95% interval -1.30 or higher): tails and peak together account for")
	r.Shape.Skewness = measured(0.1, -0.2, 0.4)
	said = strings.Join(words.Shape(q, r), " ")
	assert.Contains(t, said, "Skewness 0.10 (95% interval -0.20 to 0.40): asymmetry accounts for")
	assert.Contains(t, said, "Excess kurtosis -1.10 (95% interval -1.30 to -0.80): tails and peak together account for")
	r.Shape.ExcessKurtosis = measured(2.1, 0.3, 3.9)
	assert.Contains(t, strings.Join(words.Shape(q, r), " "), "Excess kurtosis 2.10 (95% interval 0.30 or higher): tails and peak together account for")
}

func TestShapeOfNothing(t *testing.T) {
	q := ask.NewQuestion()
	assert.Empty(t, words.Shape(q, ask.Result{}))
	r := shaped(t, nil, nil)
	assert.Equal(t, []string{"Skewness 0.92 (95% interval 0.61 or higher).", "Excess kurtosis 0.10 (95% interval -0.30 or higher)."}, words.Shape(q, r))
	r.Shape.Cutoffs = []ask.ShapeAt{{}}
	assert.Empty(t, words.Shape(q, r), "the parts of no cutoff")
}

// Without an interval because everyone was counted, small parts are no parts to speak of.
func TestShapeOfEveryone(t *testing.T) {
	q := ask.NewQuestion()
	q.Everyone = true
	r := shaped(t, map[string]float64{">=45": -4.4, "<=20": 2.5}, map[string]ask.Effects{
		">=45": {Asymmetry: &ask.Effect{Points: -2.1}}, "<=20": {Asymmetry: &ask.Effect{Points: 0.02}}}, ">=45", "<=20")
	r.Shape.Skewness, r.Shape.ExcessKurtosis = ask.Measured{Value: 0.92}, ask.Measured{Value: -0.04}
	assert.Equal(t, []string{
		"Skewness 0.92: the long upper tail accounts for 2.1 of the 4.4 points too low at 45 or above; no part to speak of at 20 or below.",
		"Excess kurtosis -0.04.",
	}, words.Shape(q, r))
}

func TestWhatGoesAway(t *testing.T) {
	q := ask.NewQuestion()
	gaps := map[string]float64{">=45": -4.4, "<=20": 2.5, ">=60": 0.3}
	r := shaped(t, gaps, map[string]ask.Effects{
		">=45": {Floor: of(-3.1, -4, -2), Heaps: of(1.2, 0.5, 1.9), Extremes: of(-5, -6, -4), Farthest: &ask.Effect{Points: -0.6}},
		"<=20": {Floor: of(0.1, 0.05, 0.15), Heaps: of(0.4, -0.5, 1.3), Extremes: of(1, 0.5, 1.5), Farthest: &ask.Effect{Points: 0.1}},
		">=60": {Ceiling: of(0.2, 0.1, 0.3)},
	}, ">=45", "<=20", ">=60")
	s := r.Shape
	s.Floor, s.Ceiling = &ask.Pile{Score: 0, People: 147, Share: 0.359}, &ask.Pile{Score: 83, People: 1204, Share: 0.2}
	s.Heaps, s.Extremes, s.Farthest = &ask.Heaps{Spacing: 5, Share: 0.709}, &ask.Extremes{People: 4, ShareOfSquares: 0.72}, &ask.Farthest{Score: 412, Z: 9.04}
	all := words.Shape(q, r)
	assert.Len(t, all, 6, "the two least of eight go unsaid")
	said := strings.Join(all, "\n")
	for _, want := range []string{
		"Without the 147 people (35.9%) at 0, the lowest score, 3.1 of the 4.4 points too low at 45 or above go away (2.0 to 4.0).",
		"Were the people heaped on multiples of 5 (70.9% are there) spread over the scores around, the gap at 45 or above grows from 4.4 to 5.6 points too low (by 0.5 to 1.9).",
		"Without the 4 most extreme scores, which make 72.0% of the sum of squares, the gap at 45 or above turns from 4.4 points too low to 0.6 points too high (by 4.0 to 6.0); 1.0 of the 2.5 points too high at 20 or below go away (0.5 to 1.5).",
		"Without the single most extreme score, 412 (9.0 SDs from the mean), 0.6 of the 4.4 points too low at 45 or above go away.",
	} {
		assert.Contains(t, said, want)
	}
	assert.NotContains(t, said, "1,204", "the ceiling does least")
}

func TestManyCutoffs(t *testing.T) {
	q := ask.NewQuestion()
	gaps, effects := map[string]float64{}, map[string]ask.Effects{}
	order := []string{">=1", ">=2", ">=3", ">=4", ">=5", ">=6", ">=7", ">=8", ">=9", ">=10"}
	for i, text := range order {
		gaps[text] = 10
		size := float64(i + 1)
		if i >= 5 {
			effects[text] = ask.Effects{Asymmetry: of(size, size-0.5, size+0.5), Rest: of(0.1, -1, 1)}
		} else {
			effects[text] = ask.Effects{Asymmetry: of(0.1, -1, 1), Rest: of(0.1, -1, 1)}
		}
	}
	said := words.Shape(q, shaped(t, gaps, effects, order...))
	assert.Contains(t, said[0], "10.0 of the 10.0 points too high at 10 or above (9.5 to 10.5), 9.0 of the 10.0 points too high at 9 or above (8.5 to 9.5) and "+
		"8.0 of the 10.0 points too high at 8 or above (7.5 to 8.5), and less at 2 other cutoffs; no sure part at 5 others.")
	assert.Equal(t, "Excess kurtosis 0.10 (95% interval -0.30 or higher): no sure part at any cutoff.", said[1])
}

func TestNormality(t *testing.T) {
	r := ask.Result{Shape: &ask.Shape{Tests: ask.Tests{
		AndersonDarling: &ask.AndersonDarling{A2: 1.30988, A2Star: 1.31173, P: 0.00211}, Lilliefors: &ask.Lilliefors{D: 0.03956, P: 0.0457}}}}
	assert.Equal(t, "Anderson-Darling A* 1.31, p 0.002; Lilliefors D 0.040, p 0.046.", words.Normality(r))
	r.Sample.Step = new(1.0)
	assert.Equal(t, "Anderson-Darling A* 1.31, p 0.002; Lilliefors D 0.040, p 0.046; the steps of the scale alone can make p small.", words.Normality(r))
	assert.True(t, words.Tested(r))
	r.Shape.Tests = ask.Tests{Lilliefors: &ask.Lilliefors{D: 0.2, P: 0.5}, LeftOut: "the Anderson-Darling test needs at least 8 people"}
	assert.Equal(t, "Lilliefors D 0.200, p 0.50; the Anderson-Darling test needs at least 8 people.", words.Normality(r))
	r.Shape.Tests = ask.Tests{LeftOut: "the tests need at least 5 people"}
	assert.Equal(t, "No test of normality: the tests need at least 5 people.", words.Normality(r))
	assert.False(t, words.Tested(r))
	assert.Empty(t, words.Normality(ask.Result{}))
	assert.Contains(t, words.NoAnswer(), "does not answer whether the curve will do at a cutoff")
	for p, want := range map[float64]string{1e-30: "p under 0.001", 0.0009: "p under 0.001", 0.001: "p 0.001", 0.0996: "p 0.100", 0.45: "p 0.45", 0.999: "p over 0.99", 2: "p not known"} {
		assert.Equal(t, want, words.PValue(p))
	}
}

func TestWorm(t *testing.T) {
	q := ask.NewQuestion()
	w := ask.Worm{Score: []float64{1, 2, 3, 4, 5, 6}, Quantile: []float64{-2, -1, 0, 1, 2, 3},
		Deviation: []float64{-0.6, -0.4, 0.1, 0.5, 0.1, -0.9}, Limit: []float64{0.3, 0.3, 0.3, 0.3, 0.3, 0.3}}
	r := ask.Result{Shape: &ask.Shape{Worm: w}}
	assert.Equal(t, []string{
		"Higher than the curve has them, beyond the 95% limits of a score by itself: the scores at 4; lower: those from 1 to 2 and at 6.",
		"The curve is most clearly off at 6, a score 0.90 SDs lower than the curve has it.",
	}, words.Worm(q, r))
	r.Shape.Worm.Limit = []float64{0.5, 0.3, 0.3, 0.3, 0.3, 0.8} // widest at the ends
	assert.Equal(t, "The curve is most clearly off at 4, a score 0.50 SDs higher than the curve has it.", words.Worm(q, r)[1])
	r.Shape.Worm.Limit = nil
	assert.Equal(t, []string{"The curve is most clearly off at 6, a score 0.90 SDs lower than the curve has it."}, words.Worm(q, r))
	r.Shape.Worm.Limit = []float64{1, 1, 1, 1, 1, 1}
	assert.Equal(t, []string{"No score lies beyond the 95% limits of a score by itself."}, words.Worm(q, r))
	r.Shape.Worm.Deviation = r.Shape.Worm.Deviation[:3]
	assert.Empty(t, words.Worm(q, r))
	assert.Empty(t, words.Worm(q, ask.Result{}))
}
