package resample

import (
	"context"
	"fmt"
	"math/rand/v2"
	"testing"

	"tailgap/core/curve"
	"tailgap/core/gap"
	"tailgap/core/sample"
	"tailgap/testdata"
)

// wholeNumbers are n scores with about 50 distinct values.
func wholeNumbers(n int) []float64 {
	r := rand.New(rand.NewPCG(1, 2))
	scores := make([]float64, n)
	for i := range scores {
		scores[i] = float64(int(50 + 8*r.NormFloat64()))
	}
	return scores
}

func planFor(scores []float64, workers int) Plan {
	counts := sample.Count(scores)
	moments := counts.Moments()
	table := gap.NewTable(counts, moments, curve.FitNormal(moments))
	plan := Plan{Table: table, Weights: []float64{1}, Level: 0.95, Replicates: 10_000, Seed: 1, Workers: workers}
	stride := max(1, len(counts.Score)/512)
	for i := 0; i < len(counts.Score); i += stride {
		plan.Regions = append(plan.Regions, table.Tail(gap.Threshold{At: counts.Score[i], Point: counts.Score[i]}))
	}
	plan.Groups = [][2]int{{0, len(plan.Regions)}}
	plan.Estimates = table.Estimates(plan.Regions)
	return plan
}

// One cutoff's interval of the scores that testdata/bench times others with.
func BenchmarkOneCutoff(b *testing.B) {
	counts := sample.Count(testdata.Column("bench/scores.csv", "score"))
	moments := counts.Moments()
	table := gap.NewTable(counts, moments, curve.FitNormal(moments))
	plan := Plan{Table: table, Weights: []float64{1}, Level: 0.95, Replicates: 10_000, Seed: 1}
	plan.Regions = []gap.Region{table.Tail(gap.Threshold{At: 60, Point: 60})}
	plan.Estimates = table.Estimates(plan.Regions)
	for _, workers := range []int{1, 2} {
		plan.Workers = workers
		b.Run(fmt.Sprintf("workers=%d", workers), func(b *testing.B) {
			for b.Loop() {
				quantiles, err := Run(context.Background(), plan, nil)
				if err != nil {
					b.Fatal(err)
				}
				Judge(plan, quantiles, true).Interval(0, false, 1, 1)
			}
		})
	}
}

// The whole curve of the same scores: every threshold of one sweep, with band.
func BenchmarkWholeCurve(b *testing.B) {
	for _, workers := range []int{1, 2} {
		plan := planFor(testdata.Column("bench/scores.csv", "score"), workers)
		b.Run(fmt.Sprintf("workers=%d", workers), func(b *testing.B) {
			for b.Loop() {
				if _, err := Run(context.Background(), plan, nil); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

func BenchmarkRun(b *testing.B) {
	for _, n := range []int{1_000, 1_000_000} {
		for _, workers := range []int{1, 2} {
			plan := planFor(wholeNumbers(n), workers)
			b.Run(fmt.Sprintf("scores=%d/distinct=%d/workers=%d", n, len(plan.Table.U), workers), func(b *testing.B) {
				b.ReportAllocs()
				for b.Loop() {
					if _, err := Run(context.Background(), plan, nil); err != nil {
						b.Fatal(err)
					}
				}
			})
		}
	}
	continuous := make([]float64, 10_000)
	r := rand.New(rand.NewPCG(3, 4))
	for i := range continuous {
		continuous[i] = r.NormFloat64()
	}
	plan := planFor(continuous, 2)
	b.Run("scores=10000/distinct=10000/workers=2", func(b *testing.B) {
		for b.Loop() {
			if _, err := Run(context.Background(), plan, nil); err != nil {
				b.Fatal(err)
			}
		}
	})
}
