package words

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"

	"tailgap/core/ask"
	"tailgap/core/sample"
)

func TestSample(t *testing.T) {
	dropped := []sample.Dropped{
		{Reason: "blank", Count: 9, First: "line 31"}, {Reason: "no number", Count: 0}, {Reason: "coded \x1b99", Count: 5, First: "line 77"},
	}
	assert.Equal(t, "398 usable scores in 412 rows; left out: 9 blank (first on line 31), 5 coded �99 (first on line 77)",
		Sample(ask.Result{Sample: ask.Described{N: 412, Used: 398, Dropped: dropped}}))
	assert.Equal(t, "1,000,000 usable scores in 1,000,000 rows; none left out",
		Sample(ask.Result{Sample: ask.Described{N: 1_000_000, Used: 1_000_000}}))
	assert.Equal(t, "1 usable score in 1 row; none left out", Sample(ask.Result{Sample: ask.Described{N: 1, Used: 1}}))
}

func TestScaleAndMoments(t *testing.T) {
	r := ask.Result{Sample: ask.Described{
		Mean: 24.106, SD: 8.187, Skewness: -0.0004, ExcessKurtosis: 1.5, Min: 2, Max: 37.5, Distinct: 1034,
		Low: 0, High: 40, RangeSource: "stated", Step: some(0.5), StepSource: "detected",
	}}
	assert.Equal(t, "mean 24.11, SD 8.19 (divisor n-1), skewness 0.00, excess kurtosis 1.50; 1,034 distinct scores from 2 to 37.5", Moments(r))
	assert.Equal(t, "scale from 0 to 40 (stated), in steps of 0.5 (detected)", Scale(r))
	r.Sample.Step, r.Sample.StepSource = nil, "stated"
	assert.Equal(t, "scale from 0 to 40 (stated), without a step (stated)", Scale(r))
}

func TestMeanSD(t *testing.T) {
	for _, c := range []struct {
		mean, sd float64
		expected string
	}{
		{54.613, 13.072, "mean 54.6, SD 13.1"}, {0.00123, 0.000456789, "mean 0.001230, SD 0.000457"},
		{-0.001, 1, "mean 0.00, SD 1.00"}, {100, 9.996, "mean 100.0, SD 10.0"}, {1e300, 1e299, "mean 1e+300, SD 1e+299"},
		{5, 1e-300, "mean 5, SD 1e-300"}, {math.NaN(), math.Inf(1), "mean not known, SD not known"},
	} {
		assert.Equal(t, c.expected, MeanSD(c.mean, c.sd))
	}
}

func TestCurve(t *testing.T) {
	assert.Equal(t, "the normal curve with mean 54.6 and SD 13.125",
		Curve(ask.Result{Curve: ask.Curve{Kind: "normal", Mean: 54.6, SD: 13.125, Source: "given"}}), "as it was given")
	people := 1870
	assert.Equal(t, "the normal curve with mean 54.6 and SD 13.125, norms from 1,870 people",
		Curve(ask.Result{Curve: ask.Curve{Kind: "normal", Mean: 54.6, SD: 13.125, Source: "given", NormN: &people}}))
	assert.Equal(t, "the normal curve fitted to these scores (mean 54.6, SD 13.1)",
		Curve(ask.Result{Curve: ask.Curve{Kind: "normal", Mean: 54.613, SD: 13.072, Source: "fitted"}}))
}
