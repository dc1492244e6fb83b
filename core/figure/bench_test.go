package figure_test

import (
	"testing"

	"tailgap/core/figure"
)

// A sweep is drawn anew while a cutoff is dragged.
func BenchmarkSweep(b *testing.B) {
	for _, name := range []string{"vocabulary", "fine"} {
		a := recipes[name].answer()
		r := a.Results[0]
		b.Run(name, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				figure.Sweep(a.Question, r, r.Sweeps[0], figure.Options{Width: 1100, Selected: 0})
			}
		})
	}
}

func BenchmarkCounted(b *testing.B) {
	a := recipes["fine"].answer()
	r := a.Results[0]
	b.ReportAllocs()
	for b.Loop() {
		figure.Counted(a.Question, r, r.Cutoffs[0], figure.Options{Width: 1100, Selected: 0})
	}
}
