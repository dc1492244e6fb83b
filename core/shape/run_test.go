package shape

import (
	"context"
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/resample"
	"tailgap/core/sample"
	"tailgap/testdata"
)

type gapRegion = gap.Region

func atLeast(at ...float64) (all []cutoff.Cutoff) {
	for _, a := range at {
		all = append(all, cutoff.Cutoff{Side: cutoff.AtLeast, At: a})
	}
	return all
}

// Whatever the scores, no number that is none comes out, and every interval
// holds its estimate.
func TestDegenerateScores(t *testing.T) {
	repeat := func(x float64, n int) []float64 {
		all := make([]float64, n)
		for i := range all {
			all[i] = x
		}
		return all
	}
	ramp := make([]float64, 200)
	for i := range ramp {
		ramp[i] = float64(i % 20)
	}
	for name, scores := range map[string][]float64{
		"two people":             {1, 2},
		"three":                  {1, 2, 4},
		"two values":             append(repeat(0, 50), repeat(1, 30)...),
		"one at the top":         append(repeat(0, 50), 1),
		"all but one at a floor": append(repeat(0, 5000), 37),
		"one far out":            append(ramp, 1e9),
		"one absurdly far out":   append(ramp, 1e15),
		"heaps only":             append(append(repeat(0, 40), repeat(10, 40)...), repeat(20, 40)...),
	} {
		for _, step := range []sample.StepChoice{{}, {None: true}, {Size: 1}} {
			for _, halfStep := range []bool{false, true} {
				p := planned(scores, step, nil, halfStep, append(atLeast(-5, 0, 0.5, 1, 10, 1e9, 1e12), cutoff.Cutoff{Side: cutoff.Stretch, At: 0, To: 10})...)
				p.Everyone = false
				f := run(t, p)
				checked(t, name, &f.Skewness)
				checked(t, name, &f.ExcessKurtosis)
				for _, effects := range f.Cutoffs {
					for _, v := range effects {
						checked(t, name, v)
					}
				}
			}
		}
	}
}

func checked(t *testing.T, name string, v *Value) {
	t.Helper()
	if v == nil {
		return
	}
	assert.False(t, math.IsNaN(v.Estimate) || math.IsInf(v.Estimate, 0), name)
	if v.Interval != nil {
		assert.LessOrEqual(t, v.Interval.Low, v.Estimate+1e-12, name)
		assert.GreaterOrEqual(t, v.Interval.High, v.Estimate-1e-12, name)
		assert.False(t, math.IsInf(v.Interval.Low, 0) || math.IsInf(v.Interval.High, 0), name)
	}
}

// Symmetric scores have no asymmetry anywhere, wherever their mean lies
// between two attainable scores.
func TestSymmetricScoresHaveNoAsymmetry(t *testing.T) {
	for _, scores := range [][]float64{{1, 2, 2, 3, 3, 3, 4, 4, 5}, {1, 2, 2, 3, 3, 4}} {
		for _, effects := range run(t, planned(scores, sample.StepChoice{Size: 1}, nil, true, atLeast(0, 1, 2, 3, 4, 5, 6)...)).Cutoffs {
			assert.InDelta(t, 0, effects[Asymmetry].Estimate, 1e-12)
		}
	}
}

func TestTheSameForAnyWorkers(t *testing.T) {
	p := planned(testdata.Open("pima", "age"), sample.StepChoice{}, nil, false, atLeast(25, 40, 60)...)
	p.Everyone, p.Workers = false, 1
	one := run(t, p)
	for _, workers := range []int{2, 5, 64} {
		p.Workers = workers
		assert.Equal(t, one, run(t, p))
	}
	p.Seed++
	assert.NotEqual(t, one, run(t, p))
}

func TestCancelAndProgress(t *testing.T) {
	p := planned(testdata.Open("pima", "age"), sample.StepChoice{}, nil, false, atLeast(25)...)
	for _, p.Everyone = range []bool{false, true} {
		last, total := 0, 0
		_, err := Run(context.Background(), p, func(done, of int) {
			assert.Greater(t, done, last)
			last, total = done, of
		})
		require.NoError(t, err)
		assert.Equal(t, total, last)
	}
	p.Everyone = false
	ctx, cancel := context.WithCancel(context.Background())
	p.Replicates = 1 << 20
	_, err := Run(ctx, p, func(int, int) { cancel() })
	assert.ErrorIs(t, err, context.Canceled)
	_, err = Run(ctx, p, nil)
	assert.ErrorIs(t, err, context.Canceled)
}

// Bins move no estimate by more than 0.005 points, whether
// or not the counts are those that the bins were made for.
func TestBins(t *testing.T) {
	source := rand.New(rand.NewPCG(8, 8))
	scores := make([]float64, 50_000)
	for i := range scores {
		scores[i] = math.Exp(0.8 * source.NormFloat64())
	}
	p := planned(scores, sample.StepChoice{None: true}, nil, false, atLeast(0.3, 1, 2, 5, 10)...)
	features := Find(p.Table, p.Scale)
	features.Extremes = 500
	whole := newEvaluator(&p, newSpans(p.fitted(), 0), features)
	binned := newEvaluator(&p, whole.binned(whole.edges()), features)
	require.Greater(t, len(whole.table.U), 40_000)
	require.Less(t, len(binned.table.U), 5000)

	drawer := resample.NewDrawer(p.Table.Counts)
	var stream resample.Stream
	stream.Restart(1, 0)
	count := make([]int32, len(whole.table.U))
	for range 5 {
		drawer.Draw(&stream, count)
		inBins := make([]int32, len(binned.table.U))
		for i, from := range whole.table.U {
			bin := 0
			for bin < len(inBins)-1 && from > binned.high[bin] {
				bin++
			}
			inBins[bin] += count[i]
		}
		a, b := values{cutoffs: make([]parts, 5)}, values{cutoffs: make([]parts, 5)}
		whole.evaluate(&p, count, &a)
		binned.evaluate(&p, inBins, &b)
		assert.InEpsilon(t, a.skewness, b.skewness, 1e-4)
		assert.InEpsilon(t, a.kurtosisVariance, b.kurtosisVariance, 1e-3)
		for i := range a.cutoffs {
			for _, kind := range []Kind{HalfStep, Asymmetry, Rest, Extremes} {
				assert.InDelta(t, a.cutoffs[i].value[kind], b.cutoffs[i].value[kind], 5e-5, "kind %d at cutoff %d", kind, i)
			}
		}
	}
}

// Heaps of more distinct scores than are resampled one by one have an estimate
// and no interval.
func TestHeapsAmongManyScores(t *testing.T) {
	source := rand.New(rand.NewPCG(9, 9))
	scores := make([]float64, 30_000)
	for i := range scores {
		scores[i] = math.Round(10_000 + 2500*source.NormFloat64())
		if i%2 == 0 {
			scores[i] = 10 * math.Round(scores[i]/10)
		}
	}
	p := planned(scores, sample.StepChoice{Size: 1}, nil, false, atLeast(12_500)...)
	require.Greater(t, len(p.Table.U), mostEntries)
	p.Everyone, p.Replicates = false, 100
	f := run(t, p)
	require.Equal(t, 10.0, f.Features.Heaps.Spacing)
	effects := f.Cutoffs[0]
	require.NotNil(t, effects[Heaps])
	assert.Nil(t, effects[Heaps].Interval)
	require.NotNil(t, effects[Rest])
	assert.NotNil(t, effects[Rest].Interval)
}

// A pile beside a heap is none of the scores around it: with the same people
// everywhere else the heap on 5 has the surplus that it has without the pile.
func TestPileBesideHeap(t *testing.T) {
	counts := map[float64]int{3: 60, 4: 4, 5: 20, 6: 4, 7: 4}
	for score := 8.0; score <= 40; score++ {
		counts[score] = 4
		if math.Mod(score, 5) == 0 {
			counts[score] = 20
		}
	}
	var scores []float64
	for score, people := range counts {
		for range people {
			scores = append(scores, score)
		}
	}
	p := planned(scores, sample.StepChoice{Size: 1}, nil, false, atLeast(5)...)
	features := Find(p.Table, p.Scale)
	require.Equal(t, sample.Pile{Score: 3, People: 60}, features.Floor)
	require.Equal(t, 5.0, features.Heaps.Spacing)
	e := newEvaluator(&p, newSpans(p.fitted(), 1), features)
	count := make([]int32, len(p.Table.U))
	for i, people := range p.Table.Counts.Count {
		count[i] = int32(people)
	}
	v := values{cutoffs: make([]parts, 1)}
	require.True(t, e.evaluate(&p, count, &v))
	require.Equal(t, 5.0, p.Table.Counts.Score[e.heaps[0].at])
	assert.InDelta(t, 20-4, e.surplus[0], 1e-12)
}

// Newcomb's time of -44 is an outlier; the others of the open data that are
// further than Grubbs's limit for their number are named here.
func TestOutliers(t *testing.T) {
	// Grubbs (1969), Table I, 1% two-sided: n = 10, 2.482; 50, 3.483; 100, 3.754.
	for n, limit := range map[int]float64{10: 2.482, 50: 3.483, 100: 3.754} {
		assert.False(t, outlying(n, limit-0.002), n)
		assert.True(t, outlying(n, limit+0.002), n)
		assert.True(t, outlying(n, -limit-0.002), n)
	}
	p := planned(testdata.Open("newcomb", "time"), sample.StepChoice{}, nil, false)
	f := Find(p.Table, p.Scale)
	assert.True(t, f.Outlier)
	assert.Equal(t, -44.0, f.Farthest)
	assert.Zero(t, f.Extremes, "one score is the farthest, not the most extreme few")
}

// Of two scores equally far out the one that is named is left out.
func TestOutlierLeftOutIsTheOneNamed(t *testing.T) {
	scores := []float64{-50, 50}
	for i := range 99 {
		scores = append(scores, float64(i%3-1))
	}
	p := planned(scores, sample.StepChoice{Size: 1}, nil, false, atLeast(40)...)
	f := run(t, p)
	require.True(t, f.Features.Outlier)
	require.Equal(t, -50.0, f.Features.Farthest)
	others := planned(scores[1:], sample.StepChoice{Size: 1}, nil, false, atLeast(40)...)
	left := others.Table.Estimate(others.Table.Region(others.Cutoffs[0].Judged)).Gap(1)
	gap := p.Table.Estimate(p.Table.Region(p.Cutoffs[0].Judged)).Gap(1)
	assert.InDelta(t, gap-left, f.Cutoffs[0][Farthest].Estimate, 1e-12)
}

// What the given mean and SD account for is no surer than the norm people make
// them: with many scores the interval is all but that of the norms alone.
func TestNormPeopleWidenWhatTheirCurveAccountsFor(t *testing.T) {
	source := rand.New(rand.NewPCG(4, 4))
	scores := make([]float64, 100_000)
	for i := range scores {
		scores[i] = math.Round(50 + 10*source.NormFloat64())
	}
	people := 20
	width := func(given *curve.Given) float64 {
		p := planned(scores, sample.StepChoice{Size: 1}, given, true, atLeast(60)...)
		p.Everyone = false
		i := run(t, p).Cutoffs[0][MeanAndSD].Interval
		return i.High - i.Low
	}
	z := (59.5 - 52) / 10
	alone := 2 * 1.95996 * curve.Density(z) * math.Sqrt(1.0/20+z*z/(2*19))
	assert.InEpsilon(t, alone, width(&curve.Given{Mean: 52, SD: 10, NormN: &people}), 0.01)
	assert.Less(t, width(&curve.Given{Mean: 52, SD: 10}), alone/10)
}
