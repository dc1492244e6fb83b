package resample_test

import (
	"fmt"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/floats/scalar"

	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/resample"
	"tailgap/core/sample"
	"tailgap/testdata"
)

// row is one gap computed by testdata/generate/interval.R, a separate
// implementation in R of the formulas that package gap documents, itself
// checked against one in SciPy.
type row struct {
	Cutoff, From, To float64
	Side             cutoff.Side
	HalfStep         bool    `json:"half_step"`
	Level            float64 `json:"level"`
	Weight           *float64
	Z                *float64
	CurveShare       float64 `json:"curve_share"`
	Counted          *float64
	V                float64  `json:"v"`
	D                float64  `json:"D"`
	PTilde           float64  `json:"p_tilde"`
	Kappa            float64  `json:"kappa"`
	SE               float64  `json:"se_points"`
	T                float64  `json:"t"`
	Low              *float64 `json:"i2_low_points"`
	High             *float64 `json:"i2_high_points"`
	TakesHull        *bool    `json:"takes_hull"`
}

type column struct {
	Dataset, Column string
	Step            *float64
	Cutoffs         []row
	Stretches       []row
	Combinations    []row
	Given           struct {
		Mean, SD float64
		Cutoffs  []row
	} `json:"given_curve"`
}

func (c column) table(shape *curve.Given) (gap.Table, sample.Scale) {
	counts := sample.Count(testdata.Open(c.Dataset, c.Column))
	moments := counts.Moments()
	normal := curve.FitNormal(moments)
	if shape != nil {
		normal = shape.Normal()
	}
	step := sample.StepChoice{None: true}
	if c.Step != nil {
		step = sample.StepChoice{Size: *c.Step}
	}
	return gap.NewTable(counts, moments, normal), sample.NewScale(counts, moments.SD, step, nil)
}

func near(t *testing.T, want, got float64, what string, where any) {
	t.Helper()
	assert.Truef(t, scalar.EqualWithinAbsOrRel(want, got, 1e-12, 1e-9), "%s: want %.15g, got %.15g (%v)", what, want, got, where)
}

func TestIntervalAgreesWithR(t *testing.T) {
	var file struct{ Columns []column }
	testdata.JSON("interval/interval.json", &file)
	require.Len(t, file.Columns, 13)
	checked := map[string]int{}
	for _, c := range file.Columns {
		fitted, scale := c.table(nil)
		given, _ := c.table(&curve.Given{Mean: c.Given.Mean, SD: c.Given.SD})
		for _, r := range c.Cutoffs {
			checked["cutoff"]++
			checkTail(t, fitted, scale, r, c.Dataset+"."+c.Column)
		}
		for _, r := range c.Combinations {
			checked["combination"]++
			checkTail(t, fitted, scale, r, c.Dataset+"."+c.Column+" weighted")
		}
		for _, r := range c.Given.Cutoffs {
			checked["given"]++
			checkTail(t, given, scale, r, c.Dataset+"."+c.Column+" given")
		}
		for _, r := range c.Stretches {
			checked["stretch"]++
			ends := gap.Ends(scale, cutoff.Cutoff{Side: cutoff.Stretch, At: r.From, To: r.To}, r.HalfStep)
			checkEstimate(t, fitted.Estimate(fitted.Region(ends)), 1, r, fmt.Sprint(c.Dataset, ".", c.Column, " ", r.From, "..", r.To))
		}
	}
	for _, kind := range []string{"cutoff", "combination", "given", "stretch"} {
		assert.Greater(t, checked[kind], 50, kind)
	}
}

func checkEstimate(t *testing.T, e *gap.Estimate, weight float64, r row, where string) {
	t.Helper()
	near(t, r.V, e.V, "v", where)
	near(t, r.D, e.D, "D", where)
	near(t, r.Kappa, e.Kappa(weight), "κ", where)
	near(t, r.SE, 100*e.SE(weight), "SE", where)
}

func checkTail(t *testing.T, table gap.Table, scale sample.Scale, r row, name string) {
	t.Helper()
	where := fmt.Sprintf("%s %v%v half-step %v level %v", name, r.Side, r.Cutoff, r.HalfStep, r.Level)
	ends := gap.Ends(scale, cutoff.Cutoff{Side: r.Side, At: r.Cutoff}, r.HalfStep)
	e := table.Estimate(table.Region(ends))
	weight := 1.0
	if r.Weight != nil {
		weight = *r.Weight
	}
	checkEstimate(t, e, weight, r, where)
	quantile := resample.StudentT(table.Counts.N, r.Level)
	near(t, r.T, quantile, "t", where)
	low, high := e.ScoreLimits(weight, quantile)
	limits := resample.Interval{Low: low, High: high}
	share, p := e.Curve, e.Shrunk()
	if r.Side.Lower() {
		limits, share, p = limits.Mirror(1-weight), e.CurveShort(), 1-p
	}
	near(t, r.CurveShare, share, "curve share", where)
	near(t, r.PTilde, p, "p̃", where)
	if r.Z != nil {
		near(t, *r.Z, table.Curve.Z(ends[0].Point), "z", where)
	}
	if r.TakesHull != nil {
		assert.Equal(t, *r.TakesHull, e.Few(), where)
	}
	require.NotNil(t, r.Low, where)
	near(t, *r.Low, 100*limits.Low, "low score limit", where)
	near(t, *r.High, 100*limits.High, "high score limit", where)
}
