package words

import (
	"math"
	"strconv"
	"strings"

	"tailgap/core/ask"
	"tailgap/core/verdict"
)

// Tolerance says the question's tolerance: "at most 1 point too high or 2
// points too low"; empty without one.
func Tolerance(q ask.Question) string {
	switch {
	case q.TooHigh == nil && q.TooLow == nil:
		return ""
	case q.TooLow == nil:
		return "at most " + Limit(*q.TooHigh) + " too high; no limit on too low"
	case q.TooHigh == nil:
		return "at most " + Limit(*q.TooLow) + " too low; no limit on too high"
	case *q.TooHigh == *q.TooLow:
		return "at most " + Limit(*q.TooHigh) + " too high or too low"
	}
	return "at most " + Limit(*q.TooHigh) + " too high or " + Limit(*q.TooLow) + " too low"
}

// Limit says one side of a tolerance: "1 point", "20% of the count", "40
// people".
func Limit(l verdict.Limit) string {
	switch {
	case l.Unit == verdict.OfCount:
		return Number(l.Size) + "% of the count"
	case l.Unit == verdict.Heads:
		return People(l.Size)
	case l.Size == 1:
		return "1 point"
	}
	return Number(l.Size) + " points"
}

// Verdict says the verdict and its reason: "fails: too high by more than 1
// point"; empty without a tolerance.
func Verdict(q ask.Question, f ask.Finding) string {
	if f.Verdict == nil {
		return ""
	}
	if reason := Reason(q, f); reason != "" {
		return *f.Verdict + ": " + reason
	}
	return *f.Verdict
}

// Reason is why the verdict is what it is: "too high by more than 1 point",
// "within 1 point too high and 2 points too low"; empty without a tolerance.
func Reason(q ask.Question, f ask.Finding) string {
	if f.Verdict == nil {
		return ""
	}
	switch *f.Verdict {
	case "holds":
		return heldWithin(q)
	case "fails":
		return failedBy(q, f)
	}
	if f.Counted == 0 && (ofCount(q.TooHigh) || ofCount(q.TooLow)) {
		return "none were counted, so there is no count to take a part of"
	}
	if reached := within(reachedLimits(q, f)); reached != "" {
		return "could be inside or outside " + reached
	}
	return ""
}

func heldWithin(q ask.Question) string {
	switch {
	case q.TooHigh == nil && q.TooLow == nil:
		return ""
	case q.TooLow == nil:
		return "not too high by more than " + Limit(*q.TooHigh)
	case q.TooHigh == nil:
		return "not too low by more than " + Limit(*q.TooLow)
	}
	return "within " + within(q.TooHigh, q.TooLow)
}

// within names the limits that there are: "1 point too high and 2 points too low".
func within(high, low *verdict.Limit) string {
	if high != nil && low != nil && *high == *low {
		return Limit(*high) + " too high or too low"
	}
	var named []string
	if high != nil {
		named = append(named, Limit(*high)+" too high")
	}
	if low != nil {
		named = append(named, Limit(*low)+" too low")
	}
	return strings.Join(named, " and ")
}

func failedBy(q ask.Question, f ask.Finding) string {
	direction, passed, nearest := "too high", q.TooHigh, f.GapLow
	if f.GapPoints < 0 {
		direction, passed, nearest = "too low", q.TooLow, f.GapHigh
	}
	if passed == nil {
		return ""
	}
	if nearest == nil {
		nearest = &f.GapPoints
	}
	by := "more than "
	if at, known := passed.Points(q.Heads); known && printAlike(*nearest, at, readingDecimals(f.Reading)) {
		by = "just over " // else "too high by 1 point: too high by more than 1 point"
	}
	return direction + " by " + by + Limit(*passed)
}

// printAlike is true where a gap is printed with the digits of a limit.
func printAlike(gap, at float64, decimals int) bool {
	printed := func(x float64) string { return strconv.FormatFloat(math.Abs(x), 'f', decimals, 64) }
	return printed(gap) == printed(at)
}

// reachedLimits are the limits of the tolerance that the interval straddles:
// the reason why it is unsettled. A part of the count is judged by an interval
// of its own, so it can't be left out.
func reachedLimits(q ask.Question, f ask.Finding) (high, low *verdict.Limit) {
	straddles := func(l *verdict.Limit, sign float64) bool {
		if l == nil {
			return false
		}
		at, known := l.Points(q.Heads)
		if !known || f.GapLow == nil || f.GapHigh == nil {
			return true
		}
		return *f.GapLow <= sign*at && sign*at <= *f.GapHigh
	}
	if straddles(q.TooHigh, 1) {
		high = q.TooHigh
	}
	if straddles(q.TooLow, -1) {
		low = q.TooLow
	}
	return high, low
}

func ofCount(l *verdict.Limit) bool { return l != nil && l.Unit == verdict.OfCount }

// Settle says how many more people would settle an unsettled verdict, that no
// realistic number would, or that it can't be said; empty otherwise.
func Settle(q ask.Question, f ask.Finding) string {
	if f.Verdict == nil || *f.Verdict != "unsettled" {
		return ""
	}
	if f.PeopleToSettle == nil && f.Counted == 0 && (ofCount(q.TooHigh) || ofCount(q.TooLow)) {
		return "how many more people would settle it can't be said"
	}
	if f.PeopleToSettle == nil {
		return "no realistic number of people would settle it"
	}
	noun := "people"
	if *f.PeopleToSettle == 1 {
		noun = "person"
	}
	return "about " + SettleNumber(*f.PeopleToSettle) + " more " + noun + " would settle it if the gap is as estimated (an 80% chance)"
}

// SettleNumber prints how many more people would settle a verdict, rounded up
// to three significant digits: "1,250".
func SettleNumber(more int) string {
	unit := 1
	for more/unit >= 1000 {
		unit *= 10
	}
	return Count((more + unit - 1) / unit * unit)
}
