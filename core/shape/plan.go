package shape

import (
	"math"

	"tailgap/core/curve"
	"tailgap/core/gap"
	"tailgap/core/resample"
	"tailgap/core/sample"
)

// Replicates is how many bootstrap samples the intervals are made from. The
// standard error of 1,000 replicates is itself known to 2%.
const Replicates = 1000

// Cutoff is a cutoff as it is judged, and as it is read with the half-step:
// the same on a scale without a step. For the lower sides these are the upper
// tails of which they are the complement.
type Cutoff struct {
	Judged, Half []gap.Threshold
	Lower        bool
}

// Plan says of what the shape is wanted.
type Plan struct {
	Table      gap.Table
	Scale      sample.Scale
	Cutoffs    []Cutoff
	Everyone   bool // no intervals
	Level      float64
	Replicates int // of the intervals
	Seed       uint64
	Workers    int // goroutines; 0: one for each core. The findings are the same for any.
}

// Kind is one thing that makes a part of a gap.
type Kind int

// The kinds. The first four add up to the gap.
const (
	MeanAndSD Kind = iota
	HalfStep
	Asymmetry
	Rest
	Floor
	Ceiling
	Heaps
	Extremes
	Farthest
	kinds
)

// Value is an estimate with its interval; nil where there is none.
type Value struct {
	Estimate float64
	Interval *resample.Interval
}

// Findings are what came out.
type Findings struct {
	Skewness, ExcessKurtosis Value
	Features                 Features
	Cutoffs                  []Effects // one for each of the plan's
	Replicates               int       // that the intervals are from; 0: no intervals
}

// Effects are the parts of one cutoff's gap by kind, proportions; nil where a
// kind does not apply.
type Effects [kinds]*Value

// Features are what is there to be left out.
type Features struct {
	Floor, Ceiling sample.Pile
	Heaps          sample.Heaping
	Extremes       int     // the most extreme hundredth of the people, where the sum of squares is mostly theirs; else 0
	ExtremeShare   float64 // of the sum of squares
	Outlier        bool    // the farthest score is one
	Farthest       float64
}

// Find finds the features of a sample.
func Find(t gap.Table, s sample.Scale) Features {
	var f Features
	f.Floor, f.Ceiling = sample.Piles(t.Counts, t.Moments, s)
	f.Heaps = sample.Heaps(t.Counts, t.Moments, s)
	if share, people := sample.Extremes(t.Counts, t.Moments); people > 1 { // one is Farthest
		f.Extremes, f.ExtremeShare = people, share
	}
	f.Farthest = t.Counts.Min()
	if t.Counts.Max()-t.Moments.Mean > t.Moments.Mean-f.Farthest {
		f.Farthest = t.Counts.Max()
	}
	f.Outlier = outlying(t.Counts.N, (f.Farthest-t.Moments.Mean)/t.Moments.SD)
	return f
}

// piled is true for a score, up to noise, at which people are piled up.
func (f *Features) piled(score, noise float64) bool {
	at := func(p sample.Pile) bool { return p.People > 0 && math.Abs(score-p.Score) < noise }
	return at(f.Floor) || at(f.Ceiling)
}

// fitted is the table with the curve that is fitted to its scores.
func (p *Plan) fitted() gap.Table {
	return gap.NewTable(p.Table.Counts, p.Table.Moments, curve.FitNormal(p.Table.Moments))
}
