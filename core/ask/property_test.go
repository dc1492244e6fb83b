package ask_test

import (
	"bytes"
	"context"
	"math"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"tailgap/core/ask"
	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/sample"
	"tailgap/core/verdict"
	"tailgap/testdata"
)

// What must hold for every question and every sample.

// aSample is scores of two people or more, not all equal: few distinct whole
// numbers or many, quarters, tenths, anything; piled up or spread out.
func aSample(t *rapid.T) []float64 {
	score := rapid.SampledFrom([]*rapid.Generator[float64]{
		rapid.Map(rapid.IntRange(0, 1), whole),
		rapid.Map(rapid.IntRange(-3, 3), whole),
		rapid.Map(rapid.IntRange(-50, 200), whole),
		rapid.Map(rapid.IntRange(-100, 100), func(i int) float64 { return float64(i) / 4 }),
		rapid.Map(rapid.IntRange(0, 300), func(i int) float64 { return float64(i) / 10 }),
		rapid.Map(rapid.IntRange(-1_000_000, 1_000_000), func(i int) float64 { return float64(i) / 997 }), // no decimals end
	}).Draw(t, "kind")
	scores := rapid.SliceOfN(score, 2, 60).Draw(t, "scores")
	if slices.Min(scores) == slices.Max(scores) {
		scores = append(scores, scores[0]+1)
	}
	if rapid.Bool().Draw(t, "piled up") {
		pile := rapid.SampledFrom(scores).Draw(t, "pile")
		for range rapid.IntRange(1, 60).Draw(t, "people there") {
			scores = append(scores, pile)
		}
	}
	return scores
}

func whole(i int) float64 { return float64(i) }

// aThreshold is a score seen, or beside one, or beyond either end.
func aThreshold(t *rapid.T, scores []float64) float64 {
	spread := slices.Max(scores) - slices.Min(scores)
	switch rapid.IntRange(0, 4).Draw(t, "where") {
	case 0:
		return slices.Max(scores) + rapid.SampledFrom([]float64{0, 0.5, 1, 2 * spread, 50 * spread}).Draw(t, "above")
	case 1:
		return slices.Min(scores) - rapid.SampledFrom([]float64{0, 0.5, 1, 2 * spread, 50 * spread}).Draw(t, "below")
	case 2:
		return rapid.SampledFrom(scores).Draw(t, "score") + rapid.SampledFrom([]float64{-0.5, -0.25, 0.25, 0.5}).Draw(t, "beside")
	}
	return rapid.SampledFrom(scores).Draw(t, "score")
}

// aQuestion asks about every side of one threshold, and a stretch from it, of
// any curve, with the half-step or without.
func aQuestion(t *rapid.T, scores []float64) ask.Question {
	q := question()
	q.Replicates, q.Level = 200, rapid.SampledFrom([]float64{0.8, 0.9, 0.95, 0.99}).Draw(t, "level")
	at, to := aThreshold(t, scores), aThreshold(t, scores)
	for _, side := range oneSided {
		q.Cutoffs = append(q.Cutoffs, cutoff.Cutoff{Side: side, At: at})
	}
	q.Cutoffs = append(q.Cutoffs, cutoff.Cutoff{Side: cutoff.Stretch, At: min(at, to), To: max(at, to)})
	q.HalfStep = rapid.Bool().Draw(t, "half-step")
	q.Curve = aCurve(t, scores)
	return q
}

// oneSided sides, each next to its complement.
var oneSided = []cutoff.Side{cutoff.AtLeast, cutoff.Below, cutoff.Above, cutoff.AtMost}

const fittedCurve = -1

func aCurve(t *rapid.T, scores []float64) *curve.Given {
	people := rapid.SampledFrom([]int{fittedCurve, 0, 20, 870}).Draw(t, "norm people")
	if people == fittedCurve {
		return nil
	}
	spread := slices.Max(scores) - slices.Min(scores)
	return norms(rapid.SampledFrom(scores).Draw(t, "mean"), spread*rapid.SampledFrom([]float64{0.125, 0.25, 1}).Draw(t, "SD"), people)
}

// readingsOf are all readings of a finding.
func readingsOf(f ask.Finding) []ask.Reading {
	readings := []ask.Reading{f.Reading, f.WithoutHalfStep}
	if f.HalfStep != nil {
		readings = append(readings, *f.HalfStep)
	}
	return readings
}

// For a given side the gap of "at least" is minus the gap of "below", and so
// are its limits: exactly with the half-step, where both read the curve midway
// between two scores, and without, where both read it at the cutoff.
func TestTheTwoSidesOfACutoffMirrorEachOther(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		scores := aSample(t)
		r := judge(t, aQuestion(t, scores), scores)
		for i := 0; i < 4; i += 2 {
			a, b := r.Cutoffs[i], r.Cutoffs[i+1]
			assert.Equal(t, len(scores), a.Counted+b.Counted)
			others := readingsOf(b)
			for j, reading := range readingsOf(a) {
				assert.InDelta(t, 1, reading.CurveShare+others[j].CurveShare, 1e-12)
				assert.InDelta(t, reading.GapPoints, -others[j].GapPoints, 1e-9)
				assert.InDelta(t, *reading.GapLow, -*others[j].GapHigh, 1e-9)
				assert.InDelta(t, *reading.GapHigh, -*others[j].GapLow, 1e-9)
			}
		}
	})
}

// Intervals hold the gap, bands hold the intervals, everything is in order and
// within 100 points, shares are shares, and nothing is NaN or infinite.
func TestLimitsAreInOrder(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		scores := aSample(t)
		q := aQuestion(t, scores)
		heads := 1e6
		q.TooHigh, q.TooLow, q.Heads = points(1), ofCount(20), &heads
		answer, err := ask.Judge(context.Background(), q, of(scores), nil)
		require.NoError(t, err)
		encode(t, answer) // refuses what is no number
		r := answer.Results[0]
		ordered := func(values ...float64) { assert.IsNonDecreasing(t, values) }
		for _, f := range r.Cutoffs {
			for _, reading := range readingsOf(f) {
				ordered(-100, *reading.GapLow, reading.GapPoints, *reading.GapHigh, 100)
				ordered(0, reading.CurveShare, 1)
			}
			ordered(0, float64(f.Counted), float64(len(scores)))
			if f.Ratio != nil {
				ordered(0, *f.RatioLow*(1-1e-9), *f.Ratio)
				if f.RatioHigh != nil {
					ordered(*f.Ratio, *f.RatioHigh*(1+1e-9))
				}
			}
		}
		for _, s := range r.Sweeps {
			for i := range s.Threshold {
				ordered(-100, s.BandLow[i], s.Low[i], s.GapPoints[i], s.High[i], s.BandHigh[i], 100)
				ordered(0, s.CurveShare[i], 1)
				ordered(0, s.CountedShare[i], 1)
			}
		}
	})
}

// The higher the threshold, the less is beyond it, by the curve and counted.
func TestSharesFallAsTheCutoffRises(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		scores := aSample(t)
		q := aQuestion(t, scores)
		q.Everyone = true
		for _, s := range judge(t, q, scores).Sweeps {
			for _, shares := range [][]float64{s.CurveShare, s.CountedShare} {
				shares = slices.Clone(shares)
				if s.Side.Lower() {
					slices.Reverse(shares)
				}
				assert.IsNonIncreasing(t, shares, s.Side.String())
			}
		}
	})
}

// The order of the rows changes nothing at all, nor does the number of workers.
func TestTheOrderOfRowsChangesNothing(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		scores := aSample(t)
		q := aQuestion(t, scores)
		q.TooHigh, q.TooLow = points(2), ofCount(20)
		asked := func(scores []float64) []byte {
			answer, err := ask.Judge(context.Background(), q, of(scores), nil)
			require.NoError(t, err)
			return encode(t, answer)
		}
		before := asked(scores)
		q.Workers = rapid.IntRange(1, 5).Draw(t, "workers")
		assert.True(t, bytes.Equal(before, asked(rapid.Permutation(scores).Draw(t, "order"))))
	})
}

// A wider tolerance never turns a verdict against the curve: what holds goes
// on to hold, and what doesn't fail doesn't begin to. In percent of the count
// each tolerance of a fitted curve has an interval of its own, and these need
// not nest: there what holds never fails, and what fails under any tolerance
// fails under none.
func TestAWiderToleranceIsNeverWorse(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		scores := aSample(t)
		q := aQuestion(t, scores)
		unit := points
		sizes := rapid.SliceOfN(rapid.Float64Range(0.01, 30), 2, 2).Draw(t, "sizes")
		inPercent := rapid.Bool().Draw(t, "of the count")
		if inPercent {
			unit, sizes = ofCount, rapid.SliceOfN(rapid.Float64Range(0.01, 99), 2, 2).Draw(t, "percent")
		}
		sizes = append(sizes, 0)
		slices.Sort(sizes)
		fixed := rapid.SampledFrom([]*verdict.Limit{nil, unit(5)}).Draw(t, "the other side")
		var ranks [][]int // by size, then cutoff
		for _, size := range sizes {
			q.TooHigh, q.TooLow = unit(size), fixed
			var row []int
			for _, f := range judge(t, q, scores).Cutoffs {
				row = append(row, slices.Index([]string{"fails", "unsettled", "holds"}, *f.Verdict))
			}
			ranks = append(ranks, row)
		}
		for j, c := range q.Cutoffs {
			none, narrow, wide := ranks[0][j], ranks[1][j], ranks[2][j]
			if inPercent && q.Curve == nil {
				assert.False(t, max(none, narrow) == 2 && wide == 0 || none == 2 && narrow == 0, "%s: what holds fails under %v", c, sizes)
				assert.False(t, none > 0 && min(narrow, wide) == 0, "%s: what doesn't fail under no tolerance fails under %v", c, sizes)
			} else {
				assert.IsNonDecreasing(t, []int{none, narrow, wide}, "%s under %v", c, sizes)
			}
		}
	})
}

// moved moves a question and scores by a factor and then a shift.
func moved(q ask.Question, scores []float64, factor, shift float64) (ask.Question, []float64) {
	move := func(x float64) float64 { return factor*x + shift }
	var cutoffs []cutoff.Cutoff
	for _, c := range q.Cutoffs {
		cutoffs = append(cutoffs, cutoff.Cutoff{Side: c.Side, At: move(c.At), To: move(c.To)})
	}
	q.Cutoffs = cutoffs
	if q.Curve != nil {
		given := *q.Curve
		given.Mean, given.SD = move(given.Mean), factor*given.SD
		q.Curve = &given
	}
	if !q.Step.None {
		q.Step.Size *= factor
	}
	if q.Range != nil {
		q.Range = &sample.Range{Low: move(q.Range.Low), High: move(q.Range.High)}
	}
	scores = slices.Clone(scores)
	for i := range scores {
		scores[i] = move(scores[i])
	}
	return q, scores
}

// Adding the same to all scores, cutoffs and curves, or multiplying all by the
// same, changes nothing but the scale, up to rounding. Scores are multiples of
// 1/4, and factor and shift such that they stay numbers that a float64 has
// exactly: the question is then the very same.
func TestScaleAndOriginDontMatter(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		quarters := rapid.Map(rapid.IntRange(-50, 50), func(i int) float64 { return float64(i) / 4 })
		scores := append(rapid.SliceOfN(quarters, 2, 60).Draw(t, "scores"), 15)
		q := aQuestion(t, scores)
		for i, c := range q.Cutoffs { // on eighths, between scores at most
			q.Cutoffs[i].At, q.Cutoffs[i].To = math.Round(8*c.At)/8, math.Round(8*c.To)/8
		}
		q.Step = rapid.SampledFrom([]sample.StepChoice{{None: true}, {Size: 0.25}, {Size: 0.5}, {Size: 2}}).Draw(t, "step")
		q.Range = rapid.SampledFrom([]*sample.Range{nil, {Low: -15, High: 20}}).Draw(t, "range")
		factor := rapid.SampledFrom([]float64{1, 0.125, 3, 64}).Draw(t, "factor")
		shift := rapid.SampledFrom([]float64{0, 0.25, -100, 4096}).Draw(t, "shift")
		want := judge(t, q, scores)
		other, otherScores := moved(q, scores, factor, shift)
		got := judge(t, other, otherScores)
		for i, f := range want.Cutoffs {
			g := got.Cutoffs[i]
			assert.Equal(t, f.Counted, g.Counted)
			others := readingsOf(g)
			for j, reading := range readingsOf(f) {
				assert.InDelta(t, reading.CurveShare, others[j].CurveShare, 1e-10)
				assert.InDelta(t, *reading.GapLow, *others[j].GapLow, 1e-6)
				assert.InDelta(t, *reading.GapHigh, *others[j].GapHigh, 1e-6)
			}
		}
		for i, s := range want.Sweeps {
			g := got.Sweeps[i]
			require.Len(t, g.Threshold, len(s.Threshold))
			for j := range s.Threshold {
				assert.InDelta(t, factor*s.Threshold[j]+shift, g.Threshold[j], 1e-9)
				assert.Equal(t, s.CountedShare[j], g.CountedShare[j])
				assert.InDelta(t, s.BandLow[j], g.BandLow[j], 1e-6)
				assert.InDelta(t, s.BandHigh[j], g.BandHigh[j], 1e-6)
			}
		}
	})
}

// reflected turns the scale around.
func reflected(q ask.Question, scores []float64) (ask.Question, []float64) {
	sides := map[cutoff.Side]cutoff.Side{
		cutoff.AtLeast: cutoff.AtMost, cutoff.Above: cutoff.Below, cutoff.AtMost: cutoff.AtLeast, cutoff.Below: cutoff.Above, cutoff.Stretch: cutoff.Stretch,
	}
	var cutoffs []cutoff.Cutoff
	for _, c := range q.Cutoffs {
		from, to := -c.At, -c.To
		if c.Side == cutoff.Stretch {
			from, to = to, from
		}
		cutoffs = append(cutoffs, cutoff.Cutoff{Side: sides[c.Side], At: from, To: to})
	}
	q.Cutoffs = cutoffs
	if q.Curve != nil {
		given := *q.Curve
		given.Mean = -given.Mean
		q.Curve = &given
	}
	scores = slices.Clone(scores)
	for i := range scores {
		scores[i] = -scores[i]
	}
	return q, scores
}

// Turned around, the scale has the same gaps, and where a given curve's limits
// need no replicates the same limits.
func TestReflectionMirrorsTheSides(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		scores := aSample(t)
		q := aQuestion(t, scores)
		q.Step = sample.StepChoice{None: true} // a detected one is counted from the lowest score
		want := judge(t, q, scores)
		other, otherScores := reflected(q, scores)
		got := judge(t, other, otherScores)
		for i, f := range want.Cutoffs {
			g := got.Cutoffs[i]
			assert.Equal(t, f.Counted, g.Counted)
			assert.InDelta(t, f.CurveShare, g.CurveShare, 1e-10)
			assert.InDelta(t, f.GapPoints, g.GapPoints, 1e-8)
			if q.Curve != nil {
				assert.InDelta(t, *f.GapLow, *g.GapLow, 1e-8)
				assert.InDelta(t, *f.GapHigh, *g.GapHigh, 1e-8)
			}
		}
	})
}

// A fitted curve's limits come from replicates, which are drawn anew when the
// scale is turned around: they are mirrored up to simulation error. With 4,000
// replicates the standard error of the 95% quantile of |T*|, were T* normal, is
// √(0.05·0.95/4000)/(2φ(1.96)) = 0.029, so the difference of two such limits
// has one of 0.042 standard errors of the gap, or 1.1% of the interval's width;
// five times that is allowed.
func TestReflectionMirrorsLimitsUpToSimulationError(t *testing.T) {
	for column, dataset := range map[string]string{"glu": "pima", "age": "pima", "tests": "mathexam", "waiting": "faithful", "height_cm": "crimtab"} {
		scores := testdata.Open(dataset, column)
		q := question()
		q.Replicates = 4000
		middle := scores[len(scores)/2]
		for _, at := range []float64{middle, slices.Min(scores) + 0.25*(middle-slices.Min(scores)), slices.Max(scores) - 0.25*(slices.Max(scores)-middle), slices.Max(scores) + 1} {
			q.Cutoffs = append(q.Cutoffs, cutoff.Cutoff{Side: cutoff.AtLeast, At: at}, cutoff.Cutoff{Side: cutoff.AtMost, At: at})
		}
		want := judge(t, q, scores)
		other, otherScores := reflected(q, scores)
		got := judge(t, other, otherScores)
		for i, f := range want.Cutoffs {
			g := got.Cutoffs[i]
			assert.InDelta(t, f.GapPoints, g.GapPoints, 1e-8)
			allowed := 0.055 * (*f.GapHigh - *f.GapLow)
			assert.InDelta(t, *f.GapLow, *g.GapLow, allowed, "%s %s", column, f.Cutoff)
			assert.InDelta(t, *f.GapHigh, *g.GapHigh, allowed, "%s %s", column, f.Cutoff)
		}
		for i, s := range want.Sweeps {
			for j := range s.Threshold {
				k := len(s.Threshold) - 1 - j
				allowed := 0.055 * (s.BandHigh[j] - s.BandLow[j])
				assert.InDelta(t, s.BandLow[j], got.Sweeps[i].BandLow[k], allowed, "%s %s%v", column, s.Side, s.Threshold[j])
				assert.InDelta(t, s.BandHigh[j], got.Sweeps[i].BandHigh[k], allowed, "%s %s%v", column, s.Side, s.Threshold[j])
			}
		}
	}
}

// Twice the people with the same scores: a given curve has the same shares and
// gaps, and its intervals lie inside those of half the people.
func TestTwiceThePeople(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		scores := aSample(t)
		q := aQuestion(t, scores)
		if q.Curve == nil {
			q.Curve = norms(0, 10, 0)
		}
		q.Step = sample.StepChoice{None: true} // a detected one depends on the SD, and so on n-1
		once, twice := judge(t, q, scores), judge(t, q, slices.Concat(scores, scores))
		for i, f := range once.Cutoffs {
			g := twice.Cutoffs[i]
			assert.Equal(t, 2*f.Counted, g.Counted)
			assert.Equal(t, f.CountedShare, g.CountedShare)
			assert.Equal(t, f.CurveShare, g.CurveShare)
			assert.Equal(t, f.GapPoints, g.GapPoints)
			assert.GreaterOrEqual(t, *g.GapLow, *f.GapLow-1e-9)
			assert.LessOrEqual(t, *g.GapHigh, *f.GapHigh+1e-9)
		}
		for i, s := range once.Sweeps {
			assert.Equal(t, s.GapPoints, twice.Sweeps[i].GapPoints)
		}
	})
}
