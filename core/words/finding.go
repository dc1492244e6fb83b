package words

import (
	"strings"

	"tailgap/core/ask"
)

// Sentence is what was found at one cutoff, without the verdict: "At 70 or
// above the curve puts 3.4%; 2.0% were counted. Too high by 1.4 points (95%
// interval 1.1 to 1.8): 17 by the curve for every 10 counted, 56 too many of
// 4,000."
func Sentence(q ask.Question, f ask.Finding) string {
	text := Shares(q, f) + " " + Capital(GapOf(f.Reading)) + " (" + Interval(q, f.Reading) + ")"
	consequences := nonEmpty(Ratio(f), Heads(q, f))
	if len(consequences) > 0 {
		text += ": " + strings.Join(consequences, ", ")
	}
	return text + "."
}

// Shares is the sentence's first half: "At 70 or above the curve puts 3.4%;
// 2.0% were counted." With the half-step judged it says so.
func Shares(q ask.Question, f ask.Finding) string {
	curve := "the curve"
	if judgedWithHalfStep(q, f) {
		curve += " with the half-step"
	}
	return Capital(f.Cutoff.Words()) + " " + curve + " puts " + Share(f.CurveShare) + "; " + counted(f) + "."
}

func counted(f ask.Finding) string {
	if f.Counted == 0 && f.CountedShare == 0 {
		return "none were counted"
	}
	return Share(f.CountedShare) + " were counted"
}

// Interval says the interval with its level, or that there is none: "95%
// interval 1.1 to 1.8", "exact".
func Interval(q ask.Question, r ask.Reading) string {
	if limits := Limits(r); limits != "" {
		return Level(q.Level) + " interval " + limits
	}
	return "exact"
}

// OtherReading says what the curve puts at the cutoff when it is read the
// other way than the one that is judged: "With the half-step: 3.1%, too high
// by 1.1 points (95% interval 0.8 to 1.5), which holds."; empty on a scale
// without a step.
func OtherReading(q ask.Question, f ask.Finding) string {
	if f.HalfStep == nil {
		return ""
	}
	name, other := "With", *f.HalfStep
	if judgedWithHalfStep(q, f) {
		name, other = "Without", f.WithoutHalfStep
	}
	text := name + " the half-step: " + Share(other.CurveShare) + ", " + GapOf(other) + " (" + Interval(q, other) + ")"
	if other.Verdict != nil {
		text += "; " + verdictThere(*other.Verdict)
	}
	return text + "."
}

// verdictThere is a verdict on a reading that is not the judged one.
func verdictThere(verdict string) string {
	if verdict == "unsettled" {
		return "that would be unsettled"
	}
	return "that " + verdict
}

// judgedWithHalfStep is true where the question asks for the half-step and
// the scale has one.
func judgedWithHalfStep(q ask.Question, f ask.Finding) bool { return q.HalfStep && f.HalfStep != nil }

func nonEmpty(texts ...string) []string {
	var kept []string
	for _, text := range texts {
		if text != "" {
			kept = append(kept, text)
		}
	}
	return kept
}
