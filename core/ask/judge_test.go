package ask_test

import (
	"context"
	"fmt"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/sample"
	"tailgap/core/verdict"
	"tailgap/testdata"
)

// question is one with few replicates and these cutoffs.
func question(cutoffs ...string) ask.Question {
	q := ask.NewQuestion()
	q.Replicates = 500
	for _, text := range cutoffs {
		c, err := cutoff.Parse(text)
		if err != nil {
			panic(err)
		}
		q.Cutoffs = append(q.Cutoffs, c)
	}
	return q
}

func points(size float64) *verdict.Limit  { return &verdict.Limit{Size: size} }
func ofCount(size float64) *verdict.Limit { return &verdict.Limit{Size: size, Unit: verdict.OfCount} }

func of(scores []float64) sample.Sample {
	return sample.Sample{Columns: []sample.Column{{Name: "score", Rows: len(scores), Scores: scores}}}
}

func judge(t require.TestingT, q ask.Question, scores []float64) ask.Result {
	answer, err := ask.Judge(context.Background(), q, of(scores), nil)
	require.NoError(t, err)
	return answer.Results[0]
}

func TestBothReadingsAndTheJudgedOne(t *testing.T) {
	scores := testdata.Open("mathexam", "tests")
	q := question(">=24", "<=13")
	q.TooHigh, q.TooLow = points(3), points(3)
	plain := judge(t, q, scores)
	q.HalfStep = true
	half := judge(t, q, scores)
	for i := range plain.Cutoffs {
		p, h := plain.Cutoffs[i], half.Cutoffs[i]
		assert.Equal(t, p.WithoutHalfStep, p.Reading)
		assert.Equal(t, *h.HalfStep, h.Reading)
		assert.InDelta(t, p.HalfStep.CurveShare, h.CurveShare, 0)
		assert.Equal(t, p.Counted, h.Counted)
		assert.Greater(t, h.CurveShare, p.CurveShare, "half a step short of the cutoff there is more of the curve")
	}
	none := q
	none.Step = sample.StepChoice{None: true}
	r := judge(t, none, scores)
	assert.Nil(t, r.Cutoffs[0].HalfStep)
	assert.Nil(t, r.Sample.Step)
	assert.Equal(t, r.Cutoffs[0].WithoutHalfStep, r.Cutoffs[0].Reading, "no step, no half-step")
}

func TestEveryoneIsExact(t *testing.T) {
	q := question(">=24", "<=13", "16..20")
	q.Everyone, q.TooHigh = true, points(3)
	r := judge(t, q, testdata.Open("mathexam", "tests"))
	for _, f := range r.Cutoffs {
		assert.Nil(t, f.GapLow)
		assert.Nil(t, f.GapHigh)
		assert.Nil(t, f.RatioLow)
		assert.Nil(t, f.PeopleToSettle)
		assert.Equal(t, "exact", f.Method)
		want := "holds"
		if f.GapPoints > 3 {
			want = "fails"
		}
		assert.Equal(t, want, *f.Verdict)
	}
	assert.Nil(t, r.Sweeps[0].Low)
	assert.Nil(t, r.Sweeps[0].BandHigh)
	assert.NotNil(t, r.Sweeps[0].Trusted)
}

// Trusted stretches are the thresholds whose band is inside the tolerance,
// split where they become trivial.
// Without a step a stretch begins and ends where the side itself is trusted:
// "above 29" being inside the tolerance says nothing of "at 29 or above".
// In percent of the count the verdict is of curve - 1.2·count and
// curve - 0.8·count, so it agrees with the ratio's limits up to the quantile:
// 0.88 to 1.12 and 1.43 to 2.39 here.
func TestPercentOfTheCount(t *testing.T) {
	scores := testdata.Open("pima", "age")
	q := question(">=40", "<=21", ">=200")
	verdicts := func(tooHigh, tooLow float64) []string {
		q.TooHigh, q.TooLow = ofCount(tooHigh), ofCount(tooLow)
		r := judge(t, q, scores)
		return []string{*r.Cutoffs[0].Verdict, *r.Cutoffs[1].Verdict}
	}
	assert.Equal(t, []string{"holds", "fails"}, verdicts(20, 20))
	assert.Equal(t, []string{"unsettled", "fails"}, verdicts(5, 20))
	assert.Equal(t, []string{"unsettled", "fails"}, verdicts(20, 5))
	assert.Equal(t, []string{"holds", "unsettled"}, verdicts(60, 20))
	assert.Equal(t, []string{"holds", "holds"}, verdicts(150, 20))

	r := judge(t, q, scores)
	assert.InDelta(t, 0.88, *r.Cutoffs[0].RatioLow, 0.02)
	assert.InDelta(t, 1.12, *r.Cutoffs[0].RatioHigh, 0.02)
	assert.InDelta(t, 1.43, *r.Cutoffs[1].RatioLow, 0.03)
	assert.InDelta(t, 2.39, *r.Cutoffs[1].RatioHigh, 0.08)
	assert.Equal(t, "unsettled", *r.Cutoffs[2].Verdict, "nobody was counted there")
	assert.Nil(t, r.Cutoffs[2].PeopleToSettle)
	q.Everyone = true
	assert.Equal(t, "fails", *judge(t, q, scores).Cutoffs[2].Verdict, "when everyone was counted, nobody is nobody")
}

// Where nobody was counted, a limit in percent of the count can't be judged,
// but one in points can still be passed for sure.
func TestNobodyCountedButTooHighInPoints(t *testing.T) {
	scores := make([]float64, 400)
	for i := range scores {
		scores[i] = float64(10 + 20*(i%2)) // two heaps, 10 and 30: the curve puts people above 35
	}
	q := question(">35")
	q.TooHigh, q.TooLow = points(1), ofCount(20)
	f := judge(t, q, scores).Cutoffs[0]
	require.Zero(t, f.Counted)
	require.Greater(t, *f.GapLow, 1.0)
	assert.Equal(t, "fails", *f.Verdict)
	q.TooHigh = points(50)
	assert.Equal(t, "unsettled", *judge(t, q, scores).Cutoffs[0].Verdict)
}

func TestHeads(t *testing.T) {
	q := question(">=24")
	heads := 4000.0
	q.Heads, q.TooHigh = &heads, &verdict.Limit{Size: 40, Unit: verdict.Heads}
	f := judge(t, q, testdata.Open("mathexam", "tests")).Cutoffs[0]
	assert.InDelta(t, f.GapPoints*40, f.Heads.Gap, 1e-9)
	assert.InDelta(t, *f.GapLow*40, *f.Heads.Low, 1e-9)
	assert.InDelta(t, *f.GapHigh*40, *f.Heads.High, 1e-9)
	q.TooHigh = points(1)
	assert.Equal(t, *f.Verdict, *judge(t, q, testdata.Open("mathexam", "tests")).Cutoffs[0].Verdict, "40 of 4,000 are a point")
}

func TestAnUnattainableCutoffIsReadFromTheNextScore(t *testing.T) {
	r := judge(t, question(">=20", ">=19.5"), testdata.Open("mathexam", "tests"))
	whole, between := r.Cutoffs[0], r.Cutoffs[1]
	assert.Equal(t, whole.Counted, between.Counted)
	assert.Equal(t, whole.HalfStep.CurveShare, between.HalfStep.CurveShare)
	assert.NotEqual(t, whole.CurveShare, between.CurveShare)
	assert.Contains(t, between.Notes, "19.5 is between two attainable scores, 19 and 20")
}

// A stretch no wider than a rounding is not less than nothing to the curve.
func TestANarrowStretchHasNoShareBelowNothing(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		q := question()
		q.Everyone, q.Step = true, sample.StepChoice{None: true}
		at := rapid.Float64Range(0, 2).Draw(t, "at")
		q.Cutoffs = []cutoff.Cutoff{{Side: cutoff.Stretch, At: at, To: at + rapid.Float64Range(0, 1e-15).Draw(t, "width")}}
		assert.GreaterOrEqual(t, judge(t, q, []float64{0.1, 0.2, 0.3, 0.7, 1.1, 1.2, 1.9}).Cutoffs[0].CurveShare, 0.0)
	})
}

// With the half-step the curve puts nobody on a stretch between two attainable
// scores, and never less than nobody.
func TestAStretchBetweenScoresHasNoShare(t *testing.T) {
	scores := []float64{0.1, 0.2, 0.3, 0.7, 1.1, 1.2, 1.9}
	rapid.Check(t, func(t *rapid.T) {
		at := float64(rapid.IntRange(0, 30).Draw(t, "score"))/10 + rapid.SampledFrom([]float64{0.03, 0.05, 0.09}).Draw(t, "past it")
		q := question()
		q.Step, q.HalfStep, q.Everyone = sample.StepChoice{Size: 0.1}, true, true
		q.Cutoffs = []cutoff.Cutoff{{Side: cutoff.Stretch, At: at, To: at}}
		f := judge(t, q, scores).Cutoffs[0]
		assert.Zero(t, f.CurveShare)
		assert.Zero(t, f.GapPoints)
	})
}

// Where the gap's interval is on one side of 0, the ratio's is on one side of 1.
func TestRatioAndGapAgreeOnTheDirection(t *testing.T) {
	few := []float64{6}
	for range 79 {
		few = append(few, 5)
	}
	above := judge(t, question(">5"), few).Cutoffs[0]
	require.Positive(t, *above.GapLow)
	assert.GreaterOrEqual(t, *above.RatioLow, 1.0)

	q := question(">=2.1")
	q.HalfStep = true
	below := judge(t, q, []float64{4, 3, 3}).Cutoffs[0]
	require.Negative(t, *below.GapHigh)
	require.NotNil(t, below.RatioHigh)
	assert.LessOrEqual(t, *below.RatioHigh, 1.0)
}

// Adding the same to every score and cutoff changes nothing, resamples of one
// score only included.
func TestAnswersMoveWithTheScores(t *testing.T) {
	at := func(shift float64, sign string) ask.Finding {
		scores := []float64{shift + 1}
		for range 79 {
			scores = append(scores, shift)
		}
		return judge(t, question(fmt.Sprintf("%s%v", sign, shift)), scores).Cutoffs[0]
	}
	for _, sign := range []string{">", ">=", "<=", "<"} {
		want := at(0, sign)
		for _, shift := range []float64{5, 50, -3, 1000} {
			got := at(shift, sign)
			assert.InDelta(t, *want.GapLow, *got.GapLow, 1e-8, "%s%v", sign, shift)
			assert.InDelta(t, *want.GapHigh, *got.GapHigh, 1e-8, "%s%v", sign, shift)
		}
	}
}
