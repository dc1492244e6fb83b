package ask_test

import (
	"context"
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"tailgap/core/ask"
	"tailgap/core/sample"
)

// normalScores are n scores around 50 with SD spread, whole numbers or not.
func normalScores(n int, spread float64, whole bool) sample.Sample {
	r := rand.New(rand.NewPCG(1, 2))
	scores := make([]float64, n)
	for i := range scores {
		scores[i] = 50 + spread*r.NormFloat64()
		if whole {
			scores[i] = math.Round(scores[i])
		}
	}
	return of(scores)
}

// The answer with its sweeps, intervals, bands and verdicts: one sweep, or the
// two that part the people at different places (>= and <=).
func BenchmarkJudge(b *testing.B) {
	for _, c := range []struct {
		name    string
		from    sample.Sample
		cutoffs []string
	}{
		{"1000-whole-one-sweep", normalScores(1_000, 8, true), []string{">=60", ">=40"}},
		{"1000-whole", normalScores(1_000, 8, true), []string{">=60", "<=40"}},
		{"1000000-whole", normalScores(1_000_000, 6, true), []string{">=60", "<=40"}},
		{"10000-distinct", normalScores(10_000, 10, false), []string{">=60", "<=40"}},
		{"100000-distinct", normalScores(100_000, 10, false), []string{">=60", ">=40"}},
	} {
		q := ask.NewQuestion()
		q.Cutoffs = question(c.cutoffs...).Cutoffs
		q.TooHigh, q.TooLow = points(1), points(2)
		for _, workers := range []int{1, 0} {
			q.Workers = workers
			b.Run(fmt.Sprintf("%s/distinct=%d/workers=%d", c.name, len(sample.Count(c.from.Columns[0].Scores).Score), workers), func(b *testing.B) {
				b.ReportAllocs()
				for b.Loop() {
					if _, err := ask.Judge(context.Background(), q, c.from, nil); err != nil {
						b.Fatal(err)
					}
				}
			})
		}
	}
}
