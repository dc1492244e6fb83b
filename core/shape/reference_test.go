package shape

import (
	"fmt"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/sample"
	"tailgap/testdata"
)

// planned is the plan for scores at cutoffs, without replicates.
func planned(scores []float64, step sample.StepChoice, given *curve.Given, halfStep bool, cutoffs ...cutoff.Cutoff) Plan {
	return plannedOf(sample.Count(scores), step, given, halfStep, cutoffs...)
}

func plannedOf(counts sample.Counts, step sample.StepChoice, given *curve.Given, halfStep bool, cutoffs ...cutoff.Cutoff) Plan {
	moments := counts.Moments()
	normal := curve.FitNormal(moments)
	if given != nil {
		normal = given.Normal()
	}
	scale := sample.NewScale(counts, moments.SD, step, nil)
	p := Plan{Table: gap.NewTable(counts, moments, normal), Scale: scale, Everyone: true, Level: 0.95, Replicates: 200, Seed: 1}
	for _, c := range cutoffs {
		p.Cutoffs = append(p.Cutoffs, Cutoff{Judged: gap.Ends(scale, c, halfStep), Half: gap.Ends(scale, c, true), Lower: c.Side.Lower()})
	}
	return p
}

// found are the estimates of a plan with features of our choice.
func found(p Plan, f Features) values {
	e := newEvaluator(&p, newSpans(p.fitted(), p.Scale.Step), f)
	count := make([]int32, len(p.Table.Counts.Count))
	for i, people := range p.Table.Counts.Count {
		count[i] = int32(people)
	}
	v := values{cutoffs: make([]parts, len(p.Cutoffs))}
	e.evaluate(&p, count, &v)
	return v
}

// Parts, and gaps without some of the people, against testdata/generate/shape.R,
// which works row by row.
func TestAgreesWithR(t *testing.T) {
	type at struct {
		Cutoff, Gap, Asymmetry, Rest float64
		HalfStep                     float64  `json:"half_step"`
		Lowest                       float64  `json:"without_lowest"`
		Highest                      float64  `json:"without_highest"`
		Farthest                     float64  `json:"without_farthest"`
		Hundredth                    float64  `json:"without_hundredth"`
		Fives                        *float64 `json:"spread_5"`
		Tens                         *float64 `json:"spread_10"`
	}
	var file struct {
		Columns []struct {
			Dataset, Column    string
			Step               *float64
			Skewness, Kurtosis float64
			SkewnessVariance   float64 `json:"skewness_variance"`
			KurtosisVariance   float64 `json:"kurtosis_variance"`
			Cutoffs            []at
		}
	}
	testdata.JSON("shape/shape.json", &file)
	require.Len(t, file.Columns, 13)
	for _, column := range file.Columns {
		scores := testdata.Open(column.Dataset, column.Column)
		step := sample.StepChoice{None: true}
		if column.Step != nil {
			step = sample.StepChoice{Size: *column.Step}
		}
		var cutoffs []cutoff.Cutoff
		for _, want := range column.Cutoffs {
			cutoffs = append(cutoffs, cutoff.Cutoff{Side: cutoff.AtLeast, At: want.Cutoff})
		}
		p := planned(scores, step, nil, false, cutoffs...)
		counts := p.Table.Counts
		f := Features{Outlier: true, Farthest: Find(p.Table, p.Scale).Farthest, Extremes: (counts.N + 99) / 100,
			Floor: sample.Pile{Score: counts.Min(), People: 1}, Ceiling: sample.Pile{Score: counts.Max(), People: 1}}
		v := found(p, f)
		assert.InDelta(t, column.Skewness, v.skewness, 1e-10)
		assert.InDelta(t, column.Kurtosis, v.kurtosis, 1e-10*column.Kurtosis)
		assert.InEpsilon(t, column.SkewnessVariance, v.skewnessVariance, 1e-9)
		assert.InEpsilon(t, column.KurtosisVariance, v.kurtosisVariance, 1e-9)
		for i, want := range column.Cutoffs {
			where, got := fmt.Sprintf("%s.%s %v", column.Dataset, column.Column, want.Cutoff), v.cutoffs[i].value
			for kind, expected := range map[Kind]float64{
				HalfStep: want.HalfStep, Asymmetry: want.Asymmetry, Rest: want.Rest,
				Floor: want.Gap - want.Lowest, Ceiling: want.Gap - want.Highest,
				Farthest: want.Gap - want.Farthest, Extremes: want.Gap - want.Hundredth,
			} {
				assert.InDelta(t, expected, got[kind], 1e-11, "%s, kind %d", where, kind)
			}
		}
		for steps, of := range map[float64]func(at) *float64{5: func(a at) *float64 { return a.Fives }, 10: func(a at) *float64 { return a.Tens }} {
			if column.Step == nil {
				continue
			}
			heaped := Features{Heaps: sample.Heaping{Spacing: steps * *column.Step, At: multiples(counts, steps**column.Step)}}
			v := found(p, heaped)
			for i, want := range column.Cutoffs {
				assert.InDelta(t, want.Gap-*of(want), v.cutoffs[i].value[Heaps], 1e-11, "%s.%s %v, heaps %v", column.Dataset, column.Column, want.Cutoff, steps)
			}
		}
	}
}

func multiples(c sample.Counts, spacing float64) (at []int) {
	for i, score := range c.Score {
		if r := score / spacing; math.Abs(r-math.Round(r)) < 1e-6 {
			at = append(at, i)
		}
	}
	return at
}
