package calibration

import (
	"context"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/sample"
)

// What the study judges is what a user gets: interval and band of a sample
// are those of ask.Judge with the same seed.
func TestStudyJudgesAsAnAnswerDoes(t *testing.T) {
	for _, name := range []string{"negative binomial, mean 10", "lognormal, log-SD 0.8"} {
		for _, halfStep := range []bool{false, true} {
			p := named(name)[0]
			if halfStep && p.Step == 0 {
				continue
			}
			study := Study{Distances: []float64{-1, 0, 2}, Replicates: 399, Level: 0.9, HalfStep: halfStep}
			scores := make([]float64, 60)
			p.Draw(rand.New(rand.NewPCG(1, 2)), scores)
			j := study.judging(p, scores, rand.New(rand.NewPCG(3, 4)))
			sweep, shown := j.sweep()
			regions := j.regions(p, j.split)
			cutoffs := len(regions)
			for _, threshold := range sweep {
				regions = append(regions, []gap.Threshold{threshold})
			}
			done, ok := j.resample(context.Background(), 1, regions, cutoffs)
			require.True(t, ok)

			question := ask.NewQuestion()
			question.Step = sample.StepChoice{None: p.Step == 0, Size: p.Step}
			question.Replicates, question.Level, question.Seed, question.HalfStep = 399, 0.9, j.seed, halfStep
			for _, ends := range regions[:cutoffs] {
				question.Cutoffs = append(question.Cutoffs, cutoff.Cutoff{Side: cutoff.AtLeast, At: ends[0].At})
			}
			answer, err := ask.Judge(context.Background(), question, sample.Sample{Columns: []sample.Column{{Name: "x", Rows: 60, Scores: scores}}}, nil)
			require.NoError(t, err)
			r := answer.Results[0]
			for i, f := range r.Cutoffs {
				assert.InDelta(t, *f.GapLow, 100*max(-1, done.interval(i).Low), 1e-9, "%s %v", p.Name, f.Cutoff)
				assert.InDelta(t, *f.GapHigh, 100*min(1, done.interval(i).High), 1e-9, "%s %v", p.Name, f.Cutoff)
			}
			require.Len(t, r.Sweeps[0].Threshold, shown)
			for i := range shown {
				assert.InDelta(t, r.Sweeps[0].BandLow[i], 100*max(-1, done.band(cutoffs+i).Low), 1e-9, p.Name)
				assert.InDelta(t, r.Sweeps[0].BandHigh[i], 100*min(1, done.band(cutoffs+i).High), 1e-9, p.Name)
			}
		}
	}
}
