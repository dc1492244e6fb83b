package ask

import (
	"fmt"
	"math"

	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/numeral"
	"tailgap/core/sample"
)

// notes are what must be borne in mind at one cutoff.
func (w *work) notes(c cutoff.Cutoff, f Finding) []string {
	notes := []string{}
	add := func(format string, values ...any) { notes = append(notes, fmt.Sprintf(format, values...)) }
	counts := w.table.Counts
	wide := "the interval there is wide, and the ratio says little"
	if w.question.Everyone {
		wide = "the ratio says little"
	}
	switch rest := counts.N - f.Counted; {
	case f.Counted < gap.FewPeople:
		add("%s counted %s: %s", people(f.Counted), c.Words(), wide)
	case rest < gap.FewPeople && !w.question.Everyone:
		add("%s counted on the other side of this cutoff: the interval there is wide", people(rest))
	}
	for _, at := range thresholdsOf([]cutoff.Cutoff{c}) {
		if at < counts.Min() || at > counts.Max() {
			add("%s is outside the scores seen (%s to %s)", numeral.Plain(at), numeral.Plain(counts.Min()), numeral.Plain(counts.Max()))
		}
		if !w.scale.Attainable(at) {
			add("%s is between two attainable scores, %s and %s", numeral.Plain(at), numeral.Plain(w.scale.AtOrBelow(at)), numeral.Plain(w.scale.AtOrAbove(at)))
		}
	}
	if c.Side == cutoff.Stretch && c.At == c.To && (w.scale.Step == 0 || !w.halfStep) {
		add("a curve has no share at a single score: %s", map[bool]string{true: "read it with the half-step", false: "ask for a stretch with two ends"}[w.scale.Step > 0])
	}
	if f.HalfStep != nil && f.Verdict != nil && *f.HalfStep.Verdict != *f.WithoutHalfStep.Verdict {
		add("the half-step decides the verdict: with it the curve %s, without it %s", verdictWord(*f.HalfStep.Verdict), verdictWord(*f.WithoutHalfStep.Verdict))
	}
	if f.Verdict != nil && *f.Verdict == "holds" && w.tolerance.Trivial(f.CurveShare, f.CountedShare) {
		add("it holds only because a gap as large as the tolerance is not possible here; look at the ratio")
	}
	return notes
}

func verdictWord(verdict string) string {
	if verdict == "unsettled" {
		return "is unsettled"
	}
	return verdict
}

func people(n int) string {
	switch n {
	case 0:
		return "nobody was"
	case 1:
		return "1 person was"
	}
	return numeral.Count(n) + " people were"
}

// warnings are what must be borne in mind about one column. The bounds are
// common practice.
func (w *work) warnings() []string {
	warnings := append([]string{}, w.column.Doubts...)
	add := func(format string, values ...any) { warnings = append(warnings, fmt.Sprintf(format, values...)) }
	counts, m := w.table.Counts, w.table.Moments
	for _, code := range sample.SuspectedCodes(counts) {
		add("%s may be a missing code and not a score; if it is one, name it as missing", numeral.Plain(code))
	}
	if share, extreme := sample.Extremes(counts, m); extreme > 0 {
		add("the SD is mostly the %s: %.0f%% of the sum of squares comes from there", extremes(extreme), 100*share)
	}
	if heaps := sample.Heaps(counts, m, w.scale); heaps.Spacing > 0 {
		add("scores pile up on multiples of %s: %.0f%% of the people are there; a cutoff on or beside such a score moves many people at once", numeral.Plain(heaps.Spacing), 100*heaps.Share)
	}
	if outside := outside(counts, w.scale); outside > 0 {
		used := "they were used as they are"
		if outside == 1 {
			used = "it was used as it is"
		}
		add("%s outside the stated range %s to %s; %s", scores(outside), numeral.Plain(w.scale.Low), numeral.Plain(w.scale.High), used)
	}
	if off := w.scale.OffStep(); off > 0 {
		add("%s not a whole number of steps of %s from the lowest score; check the step", scores(off), numeral.Plain(w.scale.Step))
	}
	if w.scale.Low == 0 && counts.Min() >= 0 && m.Mean < 2*m.SD {
		add("the mean is less than 2 SD above 0, where the scores begin: the curve puts people below 0, where there are none")
	}
	if excess := m.ExcessKurtosis(); excess > 10 && w.table.Curve.Fitted && !w.question.Everyone {
		add("the tails are very heavy (excess kurtosis %.0f): intervals and bands are too narrow", excess)
	}
	if w.question.Curve != nil && math.Abs(m.Mean-w.table.Curve.Mean) > 2*w.table.Curve.SD {
		add("the mean of these scores is more than 2 SD from the given curve's: check that both are on the same scale")
	}
	return warnings
}

func extremes(n int) string {
	if n == 1 {
		return "single most extreme score"
	}
	return numeral.Count(n) + " most extreme scores"
}

func scores(n int) string {
	if n == 1 {
		return "1 score is"
	}
	return numeral.Count(n) + " scores are"
}

func outside(counts sample.Counts, scale sample.Scale) int {
	if scale.RangeSource != "stated" {
		return 0
	}
	return counts.People(0, counts.IndexAtLeast(scale.Low)) + counts.People(counts.IndexAbove(scale.High), len(counts.Score))
}
