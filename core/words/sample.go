package words

import (
	"math"
	"strconv"
	"strings"

	"tailgap/core/ask"
	"tailgap/core/curve"
)

// Sample says what was read and used: "398 usable scores in 412 rows; left
// out: 9 blank (first on line 31), 5 coded 99 (first on line 77)".
func Sample(r ask.Result) string {
	text := Count(r.Sample.Used) + " usable " + plural(r.Sample.Used, "score") +
		" in " + Count(r.Sample.N) + " " + plural(r.Sample.N, "row")
	var dropped []string
	for _, d := range r.Sample.Dropped {
		if d.Count == 0 {
			continue
		}
		one := Count(d.Count) + " " + Line(d.Reason)
		if d.First != "" {
			one += " (first on " + Line(d.First) + ")"
		}
		dropped = append(dropped, one)
	}
	if len(dropped) == 0 {
		return text + "; none left out"
	}
	return text + "; left out: " + strings.Join(dropped, ", ")
}

// Moments says the sample in figures: "mean 24.1, SD 7.9 (divisor n-1),
// skewness -0.6, excess kurtosis 0.2; 34 distinct scores from 2 to 37".
func Moments(r ask.Result) string {
	s := r.Sample
	return MeanSD(s.Mean, s.SD) + " (divisor n-1), skewness " + shape(s.Skewness) +
		", excess kurtosis " + shape(s.ExcessKurtosis) + "; " + Count(s.Distinct) + " distinct " +
		plural(s.Distinct, "score") + " from " + Number(s.Min) + " to " + Number(s.Max)
}

// Scale says on what scale the scores stand: "scale from 0 to 37 (stated), in
// steps of 1 (detected)".
func Scale(r ask.Result) string {
	s := r.Sample
	text := "scale from " + Number(s.Low) + " to " + Number(s.High) + source(s.RangeSource)
	if s.Step == nil {
		return text + ", without a step" + source(s.StepSource)
	}
	return text + ", in steps of " + Number(*s.Step) + source(s.StepSource)
}

func source(s string) string {
	if s == "" {
		return ""
	}
	return " (" + s + ")"
}

// Curve says what curve was judged: "the normal curve fitted to these scores
// (mean 54.6, SD 13.1)", "the normal curve with mean 54.6 and SD 13.1, norms
// from 870 people".
func Curve(r ask.Result) string {
	if r.Curve.Source == "given" { // as it was given, not rounded
		return "the " + Line(r.Curve.Kind) + " curve " + GivenCurve(curve.Given{Mean: r.Curve.Mean, SD: r.Curve.SD, NormN: r.Curve.NormN})
	}
	return "the " + Line(r.Curve.Kind) + " curve fitted to these scores (" + MeanSD(r.Curve.Mean, r.Curve.SD) + ")"
}

// GivenCurve says what a given curve is given by: "with mean 54.6 and SD 13.1,
// norms from 870 people".
func GivenCurve(c curve.Given) string {
	text := "with mean " + Number(c.Mean) + " and SD " + Number(c.SD)
	if c.NormN != nil {
		text += ", norms from " + People(float64(*c.NormN))
	}
	return text
}

// MeanSD prints a computed mean and SD, both with the decimals that give the
// SD three significant digits, one at least: "mean 54.6, SD 13.1".
func MeanSD(mean, sd float64) string {
	decimals := 1
	if sd > 0 && !math.IsInf(sd, 0) {
		decimals = max(1, significantDecimals(sd, 3))
	}
	return "mean " + fixed(mean, decimals) + ", SD " + fixed(sd, decimals)
}

// shape prints a skewness or a kurtosis.
func shape(x float64) string { return fixed(x, 2) }

// fixed prints x with so many decimals, and never a zero with a sign.
func fixed(x float64, decimals int) string {
	switch {
	case math.IsNaN(x) || math.IsInf(x, 0):
		return unknown
	case decimals > 12 || math.Abs(x) >= 1e15:
		return Number(x)
	}
	text := strconv.FormatFloat(x, 'f', decimals, 64)
	if strings.Trim(text, "-0.") == "" {
		return strings.TrimPrefix(text, "-")
	}
	return text
}

func plural(n int, noun string) string {
	if n == 1 {
		return noun
	}
	return noun + "s"
}
