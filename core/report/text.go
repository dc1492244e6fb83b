package report

import (
	"strings"
	"unicode/utf8"

	"tailgap/core/ask"
	"tailgap/core/words"
)

// Text is the answer for a terminal of 80 columns: for each score what was
// read, a sentence for each cutoff with its verdict, a table of the cutoffs
// with and without the half-step, and where the curve can be trusted; at the
// end how the figures came about and what they can't say. No colours and no
// character that moves a cursor, whatever the columns are called.
func Text(a ask.Answer) string {
	var t text
	if a.Demo {
		t.line(words.Demo())
		t.gap()
	}
	t.asked(a.Question)
	t.list("Warning: ", a.General())
	for _, result := range a.Results {
		t.gap()
		t.result(a.Question, result)
	}
	t.gap()
	t.list("Not shown: ", a.Suppressed)
	t.line(words.Method(a))
	t.line(strings.Join(words.Cautions(), " "))
	return t.String()
}

// text is the text so far.
type text struct {
	strings.Builder
	tested bool // what a test of normality is no answer to has been said
}

func (t *text) gap() {
	if t.Len() > 0 {
		t.WriteString("\n")
	}
}

func (t *text) line(s string) { t.WriteString(wrapped("", "", s)) }

// list writes each text as a paragraph of its own, opened with label and
// closed with a full stop.
func (t *text) list(label string, texts []string) {
	for _, one := range texts {
		t.WriteString(wrapped(label, "  ", strings.TrimSuffix(one, ".")+"."))
	}
}

// asked says what the answer is judged by.
func (t *text) asked(q ask.Question) {
	if tolerance := words.Tolerance(q); tolerance != "" {
		t.line("Tolerance: " + tolerance + ".")
	} else {
		t.line("No tolerance was stated, so there are no verdicts.")
	}
	if q.HalfStep {
		t.line("Judged with the half-step, on scales that have a step.")
	}
}

func (t *text) result(q ask.Question, r ask.Result) {
	name := words.Name(r.Score)
	if r.Group != nil {
		name += ", " + words.Name(*r.Group)
	}
	t.WriteString(name + "\n" + strings.Repeat("-", utf8.RuneCountInString(name)) + "\n")
	t.line(words.Sample(r) + ".")
	t.line(words.Capital(words.Moments(r)) + ".")
	t.line(words.Capital(words.Scale(r)) + ".")
	t.line("Curve: " + words.Curve(r) + ".")
	t.list("Warning: ", r.Warnings)
	t.findings(q, r)
	t.stretches(q, r)
	t.shape(q, r)
}

func (t *text) findings(q ask.Question, r ask.Result) {
	if len(r.Cutoffs) == 0 {
		t.gap()
		t.line("No cutoff was asked about.")
		return
	}
	for _, f := range r.Cutoffs {
		t.gap()
		t.line(words.Sentence(q, f))
		if f.Verdict != nil {
			t.line(loud(*f.Verdict, words.Verdict(q, f), words.Settle(q, f)))
		}
		t.list("Note: ", f.Notes)
	}
	t.gap()
	t.WriteString(cutoffTable(q, r))
	t.limits("Ratio, "+words.Level(q.Level)+" interval: ", r, words.RatioLimits)
	t.limits("Heads, "+words.Level(q.Level)+" interval: ", r, words.SignedHeadLimits)
}

// limits lists an interval that the table has no room for, cutoff by cutoff.
func (t *text) limits(label string, r ask.Result, worded func(ask.Finding) string) {
	var all []string
	for _, f := range r.Cutoffs {
		if limits := words.Brief(worded(f)); limits != "" {
			all = append(all, "at "+f.Cutoff.String()+" "+limits)
		}
	}
	if len(all) > 0 {
		t.line(label + strings.Join(all, "; ") + ".")
	}
}

// loud is a verdict with its first word in capitals, and what would settle it.
func loud(verdict, reason, settle string) string {
	said := strings.ToUpper(verdict) + strings.TrimPrefix(reason, verdict)
	if settle != "" {
		said += "; " + settle
	}
	return said + "."
}

// cutoffTable has a line for each cutoff and, on a scale with a step, one
// below it for the curve read with the half-step. What stands beside the
// reading that isn't judged is in brackets.
func cutoffTable(q ask.Question, r ask.Result) string {
	heading := []string{"cutoff", "curve", "counted", "gap", words.Level(q.Level) + " interval", "ratio", "heads", "verdict"}
	var rows [][]string
	stepped := false
	for _, f := range r.Cutoffs {
		if f.HalfStep == nil {
			rows = append(rows, judgedRow(f.Cutoff.String(), f, f.Reading))
			continue
		}
		stepped = true
		without, with := judgedRow, otherRow
		if q.HalfStep {
			without, with = otherRow, judgedRow
		}
		rows = append(rows, without(f.Cutoff.String(), f, f.WithoutHalfStep), with(" half-step", f, *f.HalfStep))
	}
	legend := "Gap: curve minus count in points; + is too high. Ratio: curve over count."
	if stepped {
		legend += " In brackets: the reading that is not judged."
	}
	return table(heading, rows) + wrapped("", "", legend)
}

func judgedRow(label string, f ask.Finding, r ask.Reading) []string {
	ratio, verdict := "none", ""
	if f.Ratio != nil {
		ratio = words.Brief(words.RatioNumber(*f.Ratio))
	}
	if f.Verdict != nil {
		verdict = words.Line(*f.Verdict)
	}
	return []string{label, words.Brief(words.Share(r.CurveShare)), words.Brief(words.Share(f.CountedShare)), words.SignedGapOf(r),
		words.SignedLimits(r), ratio, words.SignedHeads(f), verdict}
}

func otherRow(label string, f ask.Finding, r ask.Reading) []string {
	verdict := ""
	if r.Verdict != nil {
		verdict = "(" + words.Line(*r.Verdict) + ")"
	}
	return []string{label, words.Brief(words.Share(r.CurveShare)), words.Brief(words.Share(f.CountedShare)), words.SignedGapOf(r),
		words.SignedLimits(r), "", "", verdict}
}

// stretches says where the curve can be trusted and where it is furthest off.
func (t *text) stretches(q ask.Question, r ask.Result) {
	var sentences []string
	for _, s := range r.Sweeps {
		sentences = append(sentences, words.Trusted(q, r, s)...)
	}
	if worst := words.Worst(r); worst != "" {
		sentences = append(sentences, worst)
	}
	if len(sentences) > 0 {
		t.gap()
	}
	for _, sentence := range sentences {
		t.line(sentence)
	}
}

// shape says what the shape of the scores does to the gaps, and what tests of
// normality have to say.
func (t *text) shape(q ask.Question, r ask.Result) {
	sentences := words.Shape(q, r)
	if tests := words.Normality(r); tests != "" {
		if words.Tested(r) && !t.tested {
			tests += " " + words.NoAnswer()
			t.tested = true
		}
		sentences = append(sentences, tests)
	}
	if len(sentences) == 0 {
		return
	}
	t.gap()
	t.line("Shape: what makes the gaps.")
	for _, sentence := range sentences {
		t.WriteString(wrapped("- ", "  ", sentence))
	}
}
