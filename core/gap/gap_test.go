package gap_test

import (
	"fmt"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/floats/scalar"

	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/sample"
	"tailgap/testdata"
)

// close holds a value to 1e-9 relative or 1e-12 absolute.
func close(t *testing.T, want, got float64, what string, where ...any) {
	t.Helper()
	assert.Truef(t, scalar.EqualWithinAbsOrRel(want, got, 1e-12, 1e-9), "%s: want %.15g, got %.15g (%s)", what, want, got, fmt.Sprint(where...))
}

func fitted(scores []float64) gap.Table {
	counts := sample.Count(scores)
	moments := counts.Moments()
	return gap.NewTable(counts, moments, curve.FitNormal(moments))
}

func stepOf(step *float64) sample.StepChoice {
	if step == nil {
		return sample.StepChoice{None: true}
	}
	return sample.StepChoice{Size: *step}
}

// R 4.2.2's pnorm, counts and influence-function standard errors for every
// column of the open data (testdata/expected).
func TestGapOfOpenData(t *testing.T) {
	paths := testdata.Expected()
	require.Len(t, paths, 13)
	for _, path := range paths {
		var want struct {
			Dataset, Column string
			Step            *float64
			Cutoffs         []map[string]any
		}
		testdata.JSON(path, &want)
		table := fitted(testdata.Open(want.Dataset, want.Column))
		scale := sample.NewScale(table.Counts, table.Moments.SD, stepOf(want.Step), nil)
		require.Len(t, want.Cutoffs, 5, path)
		for _, cut := range want.Cutoffs {
			at := cut["cutoff"].(float64)
			for _, side := range []struct {
				name  string
				side  cutoff.Side
				lower bool
			}{{"ge", cutoff.AtLeast, false}, {"le", cutoff.AtMost, true}} {
				for _, way := range []struct {
					name string
					half bool
				}{{"raw", false}, {"cc", true}} {
					if way.half && want.Step == nil {
						continue
					}
					ends := gap.Ends(scale, cutoff.Cutoff{Side: side.side, At: at}, way.half)
					region := table.Region(ends)
					e := table.Estimate(region)
					share, counted := e.Curve, e.Inside
					if side.lower {
						share, counted = e.CurveShort(), e.N-e.Inside
					}
					where := []any{path, at, side.name, way.name}
					number := func(name string) float64 {
						require.Contains(t, cut, name)
						return cut[name].(float64)
					}
					if !way.half {
						close(t, number("z"), table.Curve.Z(ends[0].Point), "z", where...)
					}
					assert.Equal(t, number("count_"+side.name), counted, where...)
					close(t, number("observed_"+side.name), counted/e.N, "counted share", where...)
					close(t, number("normal_"+side.name+"_"+way.name), share, "curve share", where...)
					close(t, number("diff_pp_"+side.name+"_"+way.name), 100*(share-counted/e.N), "gap", where...)
					boot := cut["bootstrap_normal_minus_observed"].(map[string]any)[side.name+"_"+way.name].(map[string]any)
					close(t, boot["delta_se_pp"].(float64), 100*table.PlugInSE(region), "plug-in SE", where...)
				}
			}
		}
	}
}
