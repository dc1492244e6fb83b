package calibration

import (
	"context"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/sample"
)

// What the study judges is what a user gets: interval and band of a sample
// are those of ask.Judge with the same seed.
func TestStudyJudgesAsAnAnswerDoes(t *testing.T) {
	for _, name := range []string{"negative binomial, mean 10", "lognormal, log-SD 0.8"} {
		for _, halfStep := range []bool{false, true} {
			for _, norms := range []*Norms{nil, {Shift: 0.3}, {Shift: 0.3, People: 50}} {
				if p := named(name)[0]; p.Step > 0 || !halfStep {
					agree(t, p, Study{Distances: []float64{-1, 0, 2}, Replicates: 399, Level: 0.9, HalfStep: halfStep, Norms: norms})
				}
			}
		}
	}
}

func agree(t *testing.T, p Population, study Study) {
	scores := make([]float64, 60)
	p.Draw(rand.New(rand.NewPCG(1, 2)), scores)
	j := study.judging(p, scores, rand.New(rand.NewPCG(3, 4)))
	sweep, shown := j.sweep()
	regions := j.regions(p, j.split)
	cutoffs := len(regions)
	for _, threshold := range sweep {
		regions = append(regions, []gap.Threshold{threshold})
	}
	judged, _, err := j.resample(context.Background(), 1, regions, cutoffs)
	require.NoError(t, err)

	question := ask.NewQuestion()
	question.Step = sample.StepChoice{None: p.Step == 0, Size: p.Step}
	question.Replicates, question.Level, question.Seed, question.HalfStep = study.Replicates, study.Level, j.seed, study.HalfStep
	if c := j.table.Curve; study.Norms != nil {
		question.Curve = &curve.Given{Mean: c.Mean, SD: c.SD}
		if c.NormN > 0 {
			question.Curve.NormN = &c.NormN
		}
	}
	for _, ends := range regions[:cutoffs] {
		question.Cutoffs = append(question.Cutoffs, cutoff.Cutoff{Side: cutoff.AtLeast, At: ends[0].At})
	}
	answer, err := ask.Judge(context.Background(), question, sample.Sample{Columns: []sample.Column{{Name: "x", Rows: 60, Scores: scores}}}, nil)
	require.NoError(t, err)
	r := answer.Results[0]
	for i, f := range r.Cutoffs {
		assert.InDelta(t, *f.GapLow, 100*max(-1, judged.Interval(i, false, 1, 1).Low), 1e-9, "%s %v", p.Name, f.Cutoff)
		assert.InDelta(t, *f.GapHigh, 100*min(1, judged.Interval(i, false, 1, 1).High), 1e-9, "%s %v", p.Name, f.Cutoff)
	}
	require.Len(t, r.Sweeps[0].Threshold, shown)
	for i := range shown {
		assert.InDelta(t, r.Sweeps[0].BandLow[i], 100*max(-1, judged.Band(cutoffs+i, 0, false, 1).Low), 1e-9, p.Name)
		assert.InDelta(t, r.Sweeps[0].BandHigh[i], 100*min(1, judged.Band(cutoffs+i, 0, false, 1).High), 1e-9, p.Name)
	}
}

func TestStudyEndsWithTheContext(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	study := Study{Distances: []float64{0}, Samples: 4, Replicates: 199, Level: 0.95, Cases: cases(named("Poisson(3)"), []int{20, 50, 100})}
	_, err := study.Run(ctx, func(int, Case) { cancel() })
	assert.ErrorIs(t, err, context.Canceled)
}
