package words

import (
	"cmp"
	"math"
	"slices"

	"tailgap/core/ask"
)

// Worm says what a worm plot shows: "Higher than the curve has them, by more
// than the 95% limits: the scores from 19 to 33. Lower: those from 0 to 13 and
// from 34 to 37. The curve is most clearly off at 37, a score
// 0.71 SDs lower than the curve has it." Empty where there is no worm.
func Worm(q ask.Question, r ask.Result) []string {
	if r.Shape == nil {
		return nil
	}
	w := r.Shape.Worm
	n := len(w.Score)
	if n == 0 || len(w.Deviation) != n || len(w.Limit) != n && w.Limit != nil {
		return nil
	}
	var all []string
	if w.Limit != nil {
		beyond := "beyond the " + Level(q.Level) + " limits of a score by itself"
		higher, lower := outside(w, +1), outside(w, -1)
		switch {
		case higher == nil && lower == nil:
			all = append(all, "No score lies "+beyond+".")
		case lower == nil:
			all = append(all, "Higher than the curve has them, "+beyond+": the scores "+runsOf(higher)+".")
		case higher == nil:
			all = append(all, "Lower than the curve has them, "+beyond+": the scores "+runsOf(lower)+".")
		default:
			all = append(all, "Higher than the curve has them, "+beyond+": the scores "+runsOf(higher)+"; lower: those "+runsOf(lower)+".")
		}
	}
	if at, ok := clearest(w); ok {
		direction := "higher"
		if w.Deviation[at] < 0 {
			direction = "lower"
		}
		all = append(all, "The curve is most clearly off at "+Number(w.Score[at])+", a score "+unsigned(w.Deviation[at], 2)+" SDs "+direction+" than the curve has it.")
	}
	return all
}

// clearest is the mark that is the most times as far off as its limit, if it is
// beyond it: at the ends, where the limits are widest, marks are far off by
// chance. Without limits it is the one that is furthest off.
func clearest(w ask.Worm) (at int, ok bool) {
	most := 0.0
	for i, deviation := range w.Deviation {
		off := math.Abs(deviation)
		if w.Limit != nil {
			off /= w.Limit[i]
		}
		if off > most {
			at, most = i, off
		}
	}
	return at, most > 1 || w.Limit == nil && most > 0
}

// ReadWorm says how to read a worm plot. A mark stands for half of the people
// with its score, so each half of the sentence is certain of that side only on
// which all of them are counted; the curve is read without the half-step.
func ReadWorm() string {
	return "Where the worm is above the line, the curve puts too few people at or above the score there; where it is below, too few at or below it."
}

// run is a run of marks beyond a limit.
type run struct{ from, to float64 }

// outside are the runs of marks above the limits, or below with the sign -1.
func outside(w ask.Worm, sign float64) []run {
	var runs []run
	goesOn := false
	for i, score := range w.Score {
		if sign*w.Deviation[i] <= w.Limit[i] {
			goesOn = false
			continue
		}
		if goesOn {
			runs[len(runs)-1].to = score
		} else {
			runs = append(runs, run{score, score})
		}
		goesOn = true
	}
	return runs
}

// runsOf names the longest runs.
func runsOf(runs []run) string {
	named := slices.Clone(runs)
	slices.SortStableFunc(named, func(a, b run) int { return cmp.Compare(b.to-b.from, a.to-a.from) })
	named = named[:min(len(named), mostNamed)]
	slices.SortStableFunc(named, func(a, b run) int { return cmp.Compare(a.from, b.from) })
	var texts []string
	for _, one := range named {
		if one.from == one.to {
			texts = append(texts, "at "+Number(one.from))
		} else {
			texts = append(texts, "from "+Number(one.from)+" to "+Number(one.to))
		}
	}
	if left := len(runs) - len(named); left > 0 {
		texts = append(texts, "in "+Count(left)+" shorter runs")
	}
	return enumerated(texts)
}
