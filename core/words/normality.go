package words

import (
	"strconv"
	"strings"

	"tailgap/core/ask"
)

// Normality says what the tests of normality found: "Anderson-Darling A* 1.31,
// p 0.002; Lilliefors D 0.040, p 0.046; the steps of the scale alone can make p
// small."; or why there is none. NoAnswer belongs beside it where there is
// one.
func Normality(r ask.Result) string {
	if r.Shape == nil {
		return ""
	}
	t := r.Shape.Tests
	var tests []string
	if a := t.AndersonDarling; a != nil {
		tests = append(tests, "Anderson-Darling A* "+fixed(a.A2Star, 2)+", "+PValue(a.P))
	}
	if l := t.Lilliefors; l != nil {
		tests = append(tests, "Lilliefors D "+fixed(l.D, 3)+", "+PValue(l.P))
	}
	switch {
	case t.LeftOut == "" && tests == nil:
		return ""
	case tests == nil:
		return "No test of normality: " + Line(t.LeftOut) + "."
	case t.LeftOut != "":
		tests = append(tests, Line(t.LeftOut))
	}
	if r.Sample.Step != nil && (t.AndersonDarling != nil && t.AndersonDarling.P < lowP || t.Lilliefors != nil && t.Lilliefors.P < lowP) {
		tests = append(tests, "the steps of the scale alone can make p small")
	}
	return Capital(strings.Join(tests, "; ")) + "."
}

// lowP is a p-value low enough to be made something of.
const lowP = 0.1

// Tested is true where a test of normality was made.
func Tested(r ask.Result) bool {
	return r.Shape != nil && (r.Shape.Tests.AndersonDarling != nil || r.Shape.Tests.Lilliefors != nil)
}

// NoAnswer says what a test of normality is no answer to.
func NoAnswer() string {
	return "A normality test does not answer whether the curve will do at a cutoff: with many people it rejects over misses too small to matter, with few it passes misses that do. Look at the gap and its interval."
}

// PValue prints a p-value: "p 0.046", "p under 0.001".
func PValue(p float64) string {
	switch {
	case !(p >= 0 && p <= 1):
		return "p " + unknown
	case p < 0.001:
		return "p under 0.001"
	case p > 0.99:
		return "p over 0.99"
	case p < 0.1:
		return "p " + strconv.FormatFloat(p, 'f', 3, 64)
	}
	return "p " + strconv.FormatFloat(p, 'f', 2, 64)
}
