package words

import (
	"math"
	"slices"
	"strings"

	"tailgap/core/ask"
)

// without says what goes away of the gaps without a feature: "Without the 147
// people (35.9%) at 0, the lowest score, 3.1 of the 18.1 points too low at 5 or
// below go away (0.3 to 5.5)". Where it makes no difference to speak of at any
// cutoff nothing is said.
func without(q ask.Question, r ask.Result, feature string, of func(ask.ShapeAt) *ask.Effect) said {
	if feature == "" {
		return said{}
	}
	sure, _ := sorted(q, r, of, true)
	sure = slices.DeleteFunc(sure, named.slight)
	if len(sure) == 0 {
		return said{}
	}
	var texts []string
	for _, n := range sure[:min(len(sure), mostNamed)] {
		texts = append(texts, n.change())
	}
	return said{Capital(feature) + " " + strings.Join(texts, "; ") + fewer(len(sure)-len(texts)) + ".", math.Abs(sure[0].effect.Points)}
}

// change says how one gap changes.
func (n named) change() string {
	decimals, gap := n.decimals()
	now, left := n.finding.GapPoints, n.finding.GapPoints-n.effect.Points
	at := " " + n.finding.Cutoff.Words()
	switch {
	case n.within():
		return unsigned(n.effect.Points, decimals) + " of the " + pointsTo(now, gap) + side(now) + at + " go away" + n.interval(decimals)
	case now*n.effect.Points <= 0: // the gap grows
		return "the gap" + at + " grows from " + unsigned(now, gap) + " to " + pointsTo(left, decimals) + side(left) + n.by(decimals)
	}
	return "the gap" + at + " turns from " + pointsTo(now, gap) + side(now) + " to " + pointsTo(left, decimals) + side(left) + n.by(decimals)
}

// by is the interval of the size of a change.
func (n named) by(decimals int) string {
	if n.effect.Low == nil || n.effect.High == nil {
		return ""
	}
	low, high := math.Abs(*n.effect.Low), math.Abs(*n.effect.High)
	return " (by " + unsigned(math.Min(low, high), decimals) + " to " + unsigned(math.Max(low, high), decimals) + ")"
}

func piled(p *ask.Pile, end string) string {
	if p == nil {
		return ""
	}
	return "without the " + Count(p.People) + " people (" + Share(p.Share) + ") at " + Number(p.Score) + ", the " + end + " score,"
}

func heaped(h *ask.Heaps) string {
	if h == nil {
		return ""
	}
	return "were the people heaped on multiples of " + Number(h.Spacing) + " (" + Share(h.Share) + " are there) spread over the scores around,"
}

func extremes(e *ask.Extremes) string {
	if e == nil {
		return ""
	}
	return "without the " + Count(e.People) + " most extreme scores, which make " + Share(e.ShareOfSquares) + " of the sum of squares,"
}

func farthest(f *ask.Farthest) string {
	if f == nil {
		return ""
	}
	return "without the single most extreme score, " + Number(f.Score) + " (" + unsigned(f.Z, 1) + " SDs from the mean),"
}
