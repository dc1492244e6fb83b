package ask_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/stat/distuv"

	"tailgap/core/ask"
	"tailgap/core/curve"
	"tailgap/core/gap"
	"tailgap/testdata"
)

// norms are a given curve from so many people; 0: known exactly.
func norms(mean, sd float64, people int) *curve.Given {
	given := &curve.Given{Mean: mean, SD: sd}
	if people > 0 {
		given.NormN = &people
	}
	return given
}

// A curve that is known leaves only the count random: the interval is the
// curve's share less the exact limits of the counted share, the ratio's the
// curve's share over them.
func TestKnownCurve(t *testing.T) {
	q := question(">=200", ">=150", "<80", "100..120")
	q.Curve = norms(120, 30, 0)
	r := judge(t, q, testdata.Open("pima", "glu"))
	assert.Nil(t, r.Curve.NormN)
	share := distuv.UnitNormal.CDF(-(200 - 120) / 30.0)
	assert.InDelta(t, share, r.Cutoffs[0].CurveShare, 1e-14)
	assert.Equal(t, 0, r.Cutoffs[0].Counted)
	assert.Nil(t, r.Cutoffs[0].Ratio)
	// Nobody in 532: the upper limit is 1 - 0.025^(1/532).
	assert.InDelta(t, 100*(share-1+math.Pow(0.025, 1.0/532)), *r.Cutoffs[0].GapLow, 1e-10)
	assert.InDelta(t, 100*share, *r.Cutoffs[0].GapHigh, 1e-12)
	for _, f := range r.Cutoffs[1:] {
		low, high := gap.ClopperPearson(f.Counted, 532, 0.025)
		assert.InDelta(t, 100*(f.CurveShare-high), *f.GapLow, 1e-12)
		assert.InDelta(t, 100*(f.CurveShare-low), *f.GapHigh, 1e-12)
		assert.InEpsilon(t, f.CurveShare/high, *f.RatioLow, 1e-9)
		assert.InEpsilon(t, f.CurveShare/low, *f.RatioHigh, 1e-9)
		assert.Equal(t, "exact binomial, Clopper-Pearson", f.Method)
	}
}

// Replicates are for the band alone: what is not in a sweep is not drawn for.
func TestKnownCurveNeedsNoReplicatesForItsIntervals(t *testing.T) {
	for _, people := range []int{0, 60} {
		q := question(">=200", "<80", "100..120")
		q.Curve, q.TooHigh, q.TooLow = norms(120, 30, people), points(5), ofCount(20)
		one := judge(t, q, testdata.Open("pima", "glu"))
		q.Seed, q.Replicates = 99, 900
		other := judge(t, q, testdata.Open("pima", "glu"))
		assert.Equal(t, one.Cutoffs, other.Cutoffs)
		assert.Equal(t, one.Sweeps[0].Low, other.Sweeps[0].Low)
		assert.NotEqual(t, one.Sweeps[0].BandLow, other.Sweeps[0].BandLow)
	}
}

// A verdict in percent of the count is that of the ratio's limits: with the
// exact limits the two agree to the last digit.
func TestKnownCurvesVerdictIsTheRatios(t *testing.T) {
	scores := testdata.Open("pima", "glu")
	q := question(">=150")
	q.Curve = norms(130, 30, 0)
	f := judge(t, q, scores).Cutoffs[0]
	high := 100 * (*f.RatioHigh - 1)
	for _, c := range []struct {
		percent float64
		want    string
	}{{high * (1 + 1e-6), "holds"}, {high * (1 - 1e-6), "unsettled"}} {
		q.TooHigh = ofCount(c.percent)
		assert.Equal(t, c.want, *judge(t, q, scores).Cutoffs[0].Verdict)
	}
}

// Norms from people widen everything; of very many people they are as good as
// known. The curve that is read is the same.
func TestNormsFromPeople(t *testing.T) {
	scores := testdata.Open("pima", "glu")
	q := question(">=200", "<80", "100..120")
	asked := func(people int) ask.Result {
		q.Curve = norms(120, 30, people)
		return judge(t, q, scores)
	}
	known, few, many := asked(0), asked(60), asked(1_000_000_000_000)
	require.Equal(t, 60, *few.Curve.NormN)
	for i, f := range few.Cutoffs {
		k, m := known.Cutoffs[i], many.Cutoffs[i]
		assert.InDelta(t, k.GapPoints, f.GapPoints, 1e-12)
		assert.Less(t, *f.GapLow, *k.GapLow)
		assert.Greater(t, *f.GapHigh, *k.GapHigh)
		assert.InDelta(t, *k.GapLow, *m.GapLow, 1e-4)
		assert.InDelta(t, *k.GapHigh, *m.GapHigh, 1e-4)
		assert.Equal(t, "exact binomial and the norms' own sampling, MOVER", f.Method)
	}
	for i := range few.Sweeps[0].Threshold {
		f, k := few.Sweeps[0], known.Sweeps[0]
		assert.LessOrEqual(t, f.Low[i], k.Low[i])
		assert.LessOrEqual(t, f.BandLow[i], f.Low[i])
		assert.GreaterOrEqual(t, f.BandHigh[i], f.High[i])
	}
}

// More people can't make up for norms that are too uncertain themselves, and
// need to be more than if the norms were known.
func TestPeopleToSettleUnderNorms(t *testing.T) {
	scores := testdata.Open("pima", "glu")
	asked := func(people int) *int {
		q := question(">=150")
		q.Curve, q.TooHigh, q.TooLow = norms(122, 31, people), points(4), points(4)
		f := judge(t, q, scores).Cutoffs[0]
		require.Equal(t, "unsettled", *f.Verdict)
		return f.PeopleToSettle
	}
	known, many, few := asked(0), asked(3000), asked(60)
	require.NotNil(t, known)
	require.NotNil(t, many)
	assert.Greater(t, *many, *known)
	assert.Nil(t, few)
}

// Where everyone was counted the gap is that of the curve as it is printed.
func TestEveryoneUnderAGivenCurve(t *testing.T) {
	scores := testdata.Open("pima", "glu")
	for _, people := range []int{0, 60} {
		q := question(">=150", "100..120")
		q.Curve, q.Everyone, q.TooHigh = norms(120, 30, people), true, points(1)
		r := judge(t, q, scores)
		for _, f := range r.Cutoffs {
			assert.Nil(t, f.GapLow)
			assert.Nil(t, f.RatioHigh)
			assert.Equal(t, "exact", f.Method)
			assert.NotEqual(t, "unsettled", *f.Verdict)
		}
		assert.Nil(t, r.Sweeps[0].Low)
		assert.Nil(t, r.Sweeps[0].BandLow)
	}
}

// Limits of a lower level lie inside those of a higher one, whatever the curve
// is, and so do bands.
func TestLevelsNest(t *testing.T) {
	for name, given := range map[string]*curve.Given{"fitted": nil, "known": norms(20, 4, 0), "norms": norms(20, 4, 200)} {
		var before ask.Result
		for i, level := range []float64{0.8, 0.9, 0.95, 0.99} {
			q := question(">=24", "<=13", ">26", "16..20")
			q.Curve, q.Level, q.Replicates = given, level, 2000
			r := judge(t, q, testdata.Open("mathexam", "tests"))
			for j, f := range r.Cutoffs {
				if i > 0 {
					assert.LessOrEqual(t, *f.GapLow, *before.Cutoffs[j].GapLow, "%s at %v", name, level)
					assert.GreaterOrEqual(t, *f.GapHigh, *before.Cutoffs[j].GapHigh, "%s at %v", name, level)
				}
			}
			for j, s := range r.Sweeps {
				for k := range s.Threshold {
					if i > 0 {
						assert.LessOrEqual(t, s.BandLow[k], before.Sweeps[j].BandLow[k], "%s at %v", name, level)
						assert.GreaterOrEqual(t, s.BandHigh[k], before.Sweeps[j].BandHigh[k], "%s at %v", name, level)
					}
				}
			}
			before = r
		}
	}
}
