// Package words says an Answer in sentences and printed figures: every
// number that a person reads, on the page, in the report, in a figure or in
// the terminal, is worded here and nowhere else.
package words

import "tailgap/core/ask"

// Share prints a proportion as a percentage: "3.4%", "0.13%".
func Share(p float64) string { return "" }

// Points prints a gap without its sign: "1.4 points", "1 point".
func Points(gap float64) string { return "" }

// Number prints a score or another plain number, shortest form: "70", "25.5".
func Number(x float64) string { return "" }

// Count prints a whole number with thousands marked: "4,000".
func Count(n int) string { return "" }

// Gap prints a gap's direction and size: "too high by 1.4 points".
func Gap(points float64) string { return "" }

// Limits prints the interval around a gap in the direction Gap gives it:
// "1.1 to 1.8"; empty when the gap is exact.
func Limits(r ask.Reading) string { return "" }

// Sentence is the one sentence for a cutoff.
func Sentence(q ask.Question, f ask.Finding) string { return "" }

// Ratio says the ratio: "17 by the curve for every 10 counted"; empty when
// there is none.
func Ratio(f ask.Finding) string { return "" }

// Heads says the gap in people: "56 too many of 4,000"; empty when no heads
// were asked for.
func Heads(q ask.Question, f ask.Finding) string { return "" }

// Verdict says the verdict and its reason: "fails: too high by more than 1
// point"; empty without a tolerance.
func Verdict(q ask.Question, f ask.Finding) string { return "" }

// Settle says how many more people would settle an unsettled verdict, or that
// no realistic number would; empty otherwise.
func Settle(f ask.Finding) string { return "" }

// Tolerance says the question's tolerance: "at most 1 point too high or 2
// points too low"; empty without one.
func Tolerance(q ask.Question) string { return "" }

// Sample says what was read and used, in one sentence.
func Sample(r ask.Result) string { return "" }

// Curve says what curve was judged, in one sentence.
func Curve(r ask.Result) string { return "" }

// Trusted says where the curve can be trusted on one sweep, a sentence for
// each stretch; empty without a tolerance.
func Trusted(q ask.Question, r ask.Result, s ask.Sweep) []string { return nil }

// Worst says where the gap is largest.
func Worst(r ask.Result) string { return "" }

// Cautions are what anyone who uses the figures must bear in mind.
func Cautions() []string { return nil }
