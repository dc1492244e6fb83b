package ask_test

import (
	"context"
	"encoding/json"
	"fmt"
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/curve"
	"tailgap/core/sample"
	"tailgap/core/verdict"
	"tailgap/testdata"
)

func TestQuestionsThatCantBeAnswered(t *testing.T) {
	number := func(x float64) *float64 { return &x }
	for sentence, change := range map[string]func(q *ask.Question){
		`the question has the format "tailgap/question/2"; this program reads "tailgap/question/1"`:                                                              func(q *ask.Question) { q.Format = "tailgap/question/2" },
		`the level 95 is not between 0 and 1; write 0.95 for 95% intervals`:                                                                                      func(q *ask.Question) { q.Level = 95 },
		`the level 0 is not between 0 and 1; write 0.95 for 95% intervals`:                                                                                       func(q *ask.Question) { q.Level = 0 },
		`the level 1 is not between 0 and 1; write 0.95 for 95% intervals`:                                                                                       func(q *ask.Question) { q.Level = 1 },
		`an interval at the level 0.3 misses more often than it hits and settles nothing; ask for 0.5 or more, such as 0.95`:                                     func(q *ask.Question) { q.Level = 0.3 },
		`the level NaN is not between 0 and 1; write 0.95 for 95% intervals`:                                                                                     func(q *ask.Question) { q.Level = math.NaN() },
		`199 replicates can't be used; ask for between 200 and 1000000`:                                                                                          func(q *ask.Question) { q.Replicates = 199 },
		`1000001 replicates can't be used; ask for between 200 and 1000000`:                                                                                      func(q *ask.Question) { q.Replicates = 1_000_001 },
		`a level of 0.999 needs more than 200 replicates: ask for 1000 or more`:                                                                                  func(q *ask.Question) { q.Level, q.Replicates = 0.999, 200 },
		`-1 workers can't share the work; ask for 1 to 1024, or 0 for one for each core`:                                                                         func(q *ask.Question) { q.Workers = -1 },
		`a curve with mean 50 and SD 0 can't be drawn; the SD must be above zero and both must be finite`:                                                        func(q *ask.Question) { q.Curve = &curve.Given{Mean: 50} },
		`a curve with mean +Inf and SD 1 can't be drawn; the SD must be above zero and both must be finite`:                                                      func(q *ask.Question) { q.Curve = &curve.Given{Mean: math.Inf(1), SD: 1} },
		`norms from 4 people can't be used; say how many people their mean and SD were estimated from, 5 or more, or leave it out if they are to count as exact`: func(q *ask.Question) { q.Curve = norms(50, 10, 4) },
		`the cutoff >=5 is there twice; leave one out`:                                                                                                           func(q *ask.Question) { q.Cutoffs = append(question(">=5").Cutoffs, question(">= 5").Cutoffs...) },
		`0 heads can't be counted; say how many people the share will be applied to, a number above zero and up to a million million`:                            func(q *ask.Question) { q.Heads = number(0) },
		`the tolerance 40heads needs to know of how many people; say it with heads, such as 4000`:                                                                func(q *ask.Question) { q.TooLow = &verdict.Limit{Size: 40, Unit: verdict.Heads} },
		`no curve is too low by more than all of the count, so 100%count says nothing; leave out the limit on too low, or make it smaller`:                       func(q *ask.Question) { q.TooHigh, q.TooLow = ofCount(100), ofCount(100) },
		`the tolerance -1pt can't be used; it must be zero or more`:                                                                                              func(q *ask.Question) { q.TooHigh = points(-1) },
	} {
		q := question()
		change(&q)
		assert.EqualError(t, q.Check(), sentence)
		_, err := ask.Judge(context.Background(), q, of([]float64{1, 2, 3}), nil)
		assert.EqualError(t, err, sentence)
	}
}

func TestSamplesThatCantBeJudged(t *testing.T) {
	for sentence, scores := range map[string][]float64{
		"score has no usable score":                                                                                           {},
		"score has one usable score; a spread needs at least two people":                                                      {7},
		"all 3 scores of score are equal; without any spread there is no curve":                                               {7, 7, 7},
		"score has an infinite score; take it out or code it as missing":                                                      {7, math.Inf(1)},
		"the scores of score are too large, or too close together for their size, to compute with; give them in another unit": {1e200, -1e200},
	} {
		_, err := ask.Judge(context.Background(), question(), of(scores), nil)
		assert.EqualError(t, err, sentence)
	}
	for _, scores := range [][]float64{{1e-200, 2e-200}, {1e16, 1e16 + 2}, {math.MaxFloat64, 1}, {0, 5e-324}} {
		answer, err := ask.Judge(context.Background(), question(">=1"), of(scores), nil)
		if err == nil {
			for _, value := range []float64{answer.Results[0].Sample.SD, answer.Results[0].Cutoffs[0].CurveShare, *answer.Results[0].Cutoffs[0].GapLow} {
				assert.False(t, math.IsNaN(value) || math.IsInf(value, 0), scores)
			}
		}
	}
	_, err := ask.Judge(context.Background(), question(), sample.Sample{}, nil)
	assert.EqualError(t, err, "there is no score to judge; choose a column")
}

// Far from all scores, or on a scale of one giant step, there are answers
// still: nobody is there, by the curve or by the count.
func TestCutoffsFarOut(t *testing.T) {
	scores := testdata.Open("mathexam", "tests")
	for _, change := range []func(q *ask.Question){
		func(q *ask.Question) {},
		func(q *ask.Question) { q.Curve = &curve.Given{Mean: 20, SD: 5} },
		func(q *ask.Question) { q.Step, q.HalfStep = sample.StepChoice{Size: 1e300}, true },
		func(q *ask.Question) {
			q.Step, q.Range = sample.StepChoice{None: true}, &sample.Range{Low: -1e307, High: 1e307}
		},
	} {
		q := question(">=1e300", "<-1e300", "-1e300..1e300")
		q.TooHigh, q.TooLow = points(1), ofCount(20)
		change(&q)
		r := judge(t, q, scores)
		_, err := json.Marshal(r)
		assert.NoError(t, err, "no number is NaN or infinite")
		for i, share := range []float64{0, 0, 1} {
			assert.Equal(t, share, r.Cutoffs[i].WithoutHalfStep.CurveShare)
			assert.Equal(t, share, r.Cutoffs[i].CountedShare)
		}
	}
	for sentence, change := range map[string]func(q *ask.Question){
		"the cutoff <50 is too many SDs from the curve's mean to compute with; check it, the curve and the step": func(q *ask.Question) { q.Curve = &curve.Given{Mean: 20, SD: 1e-320} },
		"the steps of 1e-09 on the scale of score are too many to count; check the step and the range": func(q *ask.Question) {
			q.Step, q.Range = sample.StepChoice{Size: 1e-9}, &sample.Range{Low: 0, High: 1e300}
		},
		"the steps of 1e-320 on the scale of score are too many to count; check the step and the range": func(q *ask.Question) { q.Step.Size = 1e-320 },
	} {
		q := question("<50")
		change(&q)
		_, err := ask.Judge(context.Background(), q, of(scores), nil)
		assert.EqualError(t, err, sentence)
	}
}

// With two distinct scores there is a threshold at which both move the curve's
// share alike: its variance is 0 there, or a rounding below.
func TestTwoScoresOfOneInfluence(t *testing.T) {
	q := question()
	q.HalfStep, q.Range = true, &sample.Range{Low: -100000.00018667625, High: -99999.99971988852}
	r := judge(t, q, []float64{-99999.999999, -99999.999999, -99999.999999, -99999.999901})
	_, err := json.Marshal(r)
	assert.NoError(t, err)
}

func TestReplicatesThatFillTheMemory(t *testing.T) {
	scores := make([]float64, 2000)
	for i := range scores {
		scores[i] = math.Sqrt(float64(i))
	}
	q := question(">=20")
	q.TooHigh, q.TooLow = ofCount(20), ofCount(20)
	q.Replicates, q.Level = 1_000_000, 0.5
	_, err := ask.Judge(context.Background(), q, of(scores), nil)
	require.ErrorContains(t, err, "1000000 replicates at a level of 0.5 take too much memory for score; ask for at most ")
	var most int
	_, err = fmt.Sscanf(err.Error()[strings.LastIndex(err.Error(), " "):], "%d", &most)
	require.NoError(t, err)
	assert.Greater(t, most, 10_000, "the usual number is never too many")
	given, stopped := q, false
	given.Curve = norms(30, 10, 200)
	ctx, cancel := context.WithCancel(context.Background())
	_, err = ask.Judge(ctx, given, of(scores), func(int, int) { stopped = true; cancel() })
	assert.ErrorIs(t, err, context.Canceled, "of a given curve only those for the band are kept")
	assert.True(t, stopped)
	q.Everyone = true
	_, err = ask.Judge(context.Background(), q, of(scores), nil)
	assert.NoError(t, err, "there are none to keep")
}

func TestQuestionFiles(t *testing.T) {
	q := question(">=70", "20..30")
	q.Missing, q.Scores = []string{"-9"}, []string{"vocabulary"}
	q.TooHigh, q.TooLow = points(1), ofCount(20)
	q.Range, q.Curve = &sample.Range{Low: 0, High: 83}, norms(54.6, 13.1, 870)
	text, err := ask.WriteQuestion(q)
	require.NoError(t, err)
	assert.Contains(t, string(text), `">=70"`, "signs are left readable")
	assert.Contains(t, string(text), `"norm_n": 870`)
	back, err := ask.ReadQuestion(text)
	require.NoError(t, err)
	assert.Equal(t, q, back)

	short, err := ask.ReadQuestion([]byte(`{"format":"tailgap/question/1","cutoffs":[">=70"]}`))
	require.NoError(t, err)
	assert.Equal(t, 0.95, short.Level)
	assert.Equal(t, 10_000, short.Replicates)

	for _, text := range []string{`{"format":"tailgap/question/1","level":null,"range":null,"curve":null,"cutoffs":null}`, "\ufeff" + `{"format":"tailgap/question/1"}`} {
		usual, err := ask.ReadQuestion([]byte(text))
		require.NoError(t, err)
		assert.Equal(t, ask.NewQuestion(), usual)
	}

	for text, sentence := range map[string]string{
		`{`:                                  `this is not a question file, which is a JSON object with a format: line 1 is not JSON`,
		`[]`:                                 `this is not a question file, which is a JSON object with a format: it holds a list in brackets`,
		`{"cutoffs":[]}`:                     `the question file has no format; this program reads "tailgap/question/1"`,
		`{"format":"tailgap/question/9"}`:    `the question file has the format "tailgap/question/9"; this program reads "tailgap/question/1"`,
		`{"format":"tailgap/question/1"} {}`: `this is not a question file, which is a JSON object with a format: line 1 is not JSON`,
		`{"format":"tailgap/question/1","colour":1}`:                                 `the question file can't be read: there is no "colour" in a question`,
		`{"format":"tailgap/question/1","cutoffs":["x"]}`:                            `the question file can't be read: the cutoff "x" can't be read; write it as >=50, >50, <=20, <20 or 20..30, decimals with a point`,
		`{"format":"tailgap/question/1","too_high":"1%"}`:                            `the question file can't be read: the tolerance "1%" could mean two things; write 1pt for percentage points or 1%count for a part of the counted share`,
		`{"format":"tailgap/question/1","level":"high"}`:                             `the question file can't be read: "level" can't be a text in quotes; write a number`,
		`{"format":"tailgap/question/1","step":1}`:                                   `the question file can't be read: "step" can't be a number; write a text in quotes`,
		`{"format":"tailgap/question/1","seed":-1}`:                                  `the question file can't be read: "seed" can't be the number -1; write a whole number from 0 up`,
		`{"format":"tailgap/question/1","curve":[50,10]}`:                            `the question file can't be read: "curve" can't be a list in brackets; write an object in braces`,
		`{"format":"tailgap/question/1","scores":"vocabulary"}`:                      `the question file can't be read: "scores" can't be a text in quotes; write a list in brackets`,
		`{"format":"tailgap/question/1","everyone":{}}`:                              `the question file can't be read: "everyone" can't be an object in braces; write true or false`,
		`{"format":"tailgap/question/1","cutoffs":[null]}`:                           `the question file can't be read: "cutoffs" holds a null; write a value, or leave it out`,
		`{"format":"tailgap/question/1","curve":{"sd":13.1}}`:                        `the question file can't be read: a given curve needs both mean and sd; without a curve it is fitted to the scores`,
		`{"format":"tailgap/question/1","curve":{"mean":null,"sd":13.1}}`:            `the question file can't be read: "mean" holds a null; write a value, or leave it out`,
		`{"format":"tailgap/question/1","curve":{"norm_n":870}}`:                     `the question file can't be read: a given curve needs both mean and sd; without a curve it is fitted to the scores`,
		`{"format":"tailgap/question/1","curve":{"mean":50,"sd":10,"norm_n":null}}`:  `the question file can't be read: "norm_n" holds a null; write a value, or leave it out`,
		`{"format":"tailgap/question/1","curve":{"mean":50,"sd":10,"norm_n":870.5}}`: `the question file can't be read: "curve.norm_n" can't be the number 870.5; write a whole number from 0 up`,
		`{"format":"tailgap/question/1","curve":{"mean":50,"sd":10,"norm_n":3}}`:     `norms from 3 people can't be used; say how many people their mean and SD were estimated from, 5 or more, or leave it out if they are to count as exact`,
		`{"format":"tailgap/question/1","level":0.9,"Level":0.5}`:                    `the question file can't be read: "Level" is there twice in the question; leave one out`,
		`{"format":"tailgap/question/1","curve":{"mean":1,"mean":2,"sd":1}}`:         `the question file can't be read: "mean" is there twice in "curve"; leave one out`,
		`{"format":"tailgap/question/1","level":1.5}`:                                `the level 1.5 is not between 0 and 1; write 0.95 for 95% intervals`,
		`{"format":"tailgap/question/1","header":"perhaps"}`:                         `the question file can't be read: the header setting "perhaps" can't be read; write auto, yes or no`,
	} {
		_, err := ask.ReadQuestion([]byte(text))
		assert.EqualError(t, err, sentence)
	}
}

// Whatever bytes a question file has: an error or a question that can be
// written and read again as the same.
func FuzzReadQuestion(f *testing.F) {
	q := question(">=70", "20..30")
	text, _ := ask.WriteQuestion(q)
	f.Add(text)
	f.Add([]byte(`{"format":"tailgap/question/1","heads":1e308,"seed":18446744073709551615,"step":"0.1"}`))
	f.Fuzz(func(t *testing.T, text []byte) {
		q, err := ask.ReadQuestion(text)
		if err != nil {
			return
		}
		written, err := ask.WriteQuestion(q)
		require.NoError(t, err)
		back, err := ask.ReadQuestion(written)
		require.NoError(t, err)
		assert.Equal(t, q, back)
	})
}

func TestWarnings(t *testing.T) {
	spread := func(n int) []float64 {
		var scores []float64
		for i := range n {
			scores = append(scores, float64(10+i%21))
		}
		return scores
	}
	warn := func(q ask.Question, scores []float64) []string { return judge(t, q, scores).Warnings }
	assert.Empty(t, warn(question(">=20"), spread(210)))
	assert.Contains(t, warn(question(">=20"), append(spread(210), 999, 999)),
		"999 may be a missing code and not a score; if it is one, name it as missing")
	assert.Contains(t, warn(question(">=20"), append(spread(60), 500)),
		"the SD is mostly the single most extreme score: 97% of the sum of squares comes from there")
	heaped := spread(210)
	for i := range 60 {
		heaped = append(heaped, float64(10+5*(i%5)))
	}
	assert.Contains(t, warn(question(">=20"), heaped),
		"scores pile up on multiples of 5: 41% of the people are there; a cutoff on or beside such a score moves many people at once")
	ranged := question(">=20")
	ranged.Range = &sample.Range{Low: 0, High: 29}
	assert.Contains(t, warn(ranged, spread(210)), "10 scores are outside the stated range 0 to 29; they were used as they are")
	stepped := question(">=20")
	stepped.Step = sample.StepChoice{Size: 2}
	assert.Contains(t, warn(stepped, spread(210)), "100 scores are not a whole number of steps of 2 from the lowest score; check the step")
	assert.Contains(t, warn(question(">=2"), []float64{0, 0, 0, 0, 1, 1, 2, 5, 9}),
		"the mean is less than 2 SD above 0, where the scores begin: the curve puts people below 0, where there are none")
	given := question(">=20")
	given.Curve = &curve.Given{Mean: 500, SD: 100}
	assert.Contains(t, warn(given, spread(210)), "the mean of these scores is more than 2 SD from the given curve's: check that both are on the same scale")
}

func TestNotes(t *testing.T) {
	var scores []float64
	for i := range 200 {
		scores = append(scores, float64(10+i%21))
	}
	q := question(">=30", ">=31", "<=8", ">10")
	q.TooHigh, q.TooLow = points(2), points(2)
	r := judge(t, q, scores)
	assert.Contains(t, r.Cutoffs[0].Notes, "9 people were counted at 30 or above: the interval there is wide, and the ratio says little")
	assert.Contains(t, r.Cutoffs[1].Notes, "31 is outside the scores seen (10 to 30)")
	assert.Contains(t, r.Cutoffs[2].Notes, "nobody was counted at 8 or below: the interval there is wide, and the ratio says little")
	assert.NotContains(t, r.Cutoffs[3].Notes, "9 people were counted on the other side of this cutoff: the interval there is wide")
	single := question("20..20")
	assert.Contains(t, judge(t, single, scores).Cutoffs[0].Notes, "a curve has no share at a single score: read it with the half-step")
	single.HalfStep = true
	assert.Empty(t, judge(t, single, scores).Cutoffs[0].Notes)
	far := question(">=60")
	far.TooHigh, far.TooLow = points(5), points(5)
	assert.Contains(t, judge(t, far, scores).Cutoffs[0].Notes,
		"it holds only because a gap as large as the tolerance is not possible here; look at the ratio")
}
