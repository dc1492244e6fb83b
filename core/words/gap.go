package words

import (
	"math"
	"strconv"
	"strings"

	"tailgap/core/ask"
)

// gapDecimals is how many decimals a gap is printed with: one from 1 point on,
// two below.
func gapDecimals(gap float64) int {
	if math.Abs(gap) >= 0.995 { // would print as 1.00
		return 1
	}
	return 2
}

// readingDecimals is how many decimals a gap and its limits are printed with:
// what the coarsest of the three has, so that they are printed alike and the
// gap no finer than it is known.
func readingDecimals(r ask.Reading) int {
	decimals := gapDecimals(r.GapPoints)
	for _, limit := range []*float64{r.GapLow, r.GapHigh} {
		if limit != nil {
			decimals = min(decimals, gapDecimals(*limit))
		}
	}
	return decimals
}

func pointsTo(gap float64, decimals int) string {
	digits := unsigned(gap, decimals)
	if digits == "1.0" {
		return "1 point"
	}
	return digits + " points"
}

// Gap prints the direction and size of a gap that stands without its
// interval: "too high by 1.4 points", "too low by 0.13 points", "no gap".
func Gap(points float64) string { return gapTo(points, gapDecimals(points)) }

// GapOf prints a reading's gap, with no more decimals than its interval
// allows: 0.98 known to within 17 points is "too high by 1 point".
func GapOf(r ask.Reading) string { return gapTo(r.GapPoints, readingDecimals(r)) }

func gapTo(size float64, decimals int) string {
	switch {
	case math.IsNaN(size) || math.IsInf(size, 0):
		return "gap " + unknown
	case size > 0:
		return "too high by " + pointsTo(size, decimals)
	case size < 0:
		return "too low by " + pointsTo(size, decimals)
	}
	return "no gap"
}

// SignedGapOf prints a reading's gap for a table, with no more decimals than
// its interval allows.
func SignedGapOf(r ask.Reading) string { return signedPoints(r.GapPoints, readingDecimals(r)) }

// signedPoints is signed, but says the side of what rounds to zero too.
func signedPoints(x float64, decimals int) string {
	least := "<" + strconv.FormatFloat(math.Pow10(-decimals), 'f', decimals, 64)
	switch text := signed(x, decimals); {
	case strings.ContainsAny(text, "123456789") || text == unknown || x == 0:
		return text
	case x < 0:
		return "-" + least
	}
	return "+" + least
}

// Limits prints the interval around a gap in the direction GapOf gives it:
// "1.1 to 1.8". Where the interval reaches to the other side each limit says
// its own: "0.3 too low to 1.8 too high". Empty when the gap is exact.
func Limits(r ask.Reading) string {
	if r.GapLow == nil || r.GapHigh == nil {
		return ""
	}
	decimals := readingDecimals(r)
	size := func(x float64) string { return unsigned(x, decimals) }
	return limits(r.GapPoints, *r.GapLow, *r.GapHigh, size, "too low", "too high")
}

// SignedLimits prints the interval around a gap for a table: "+1.1 to +1.8";
// empty when the gap is exact.
func SignedLimits(r ask.Reading) string {
	if r.GapLow == nil || r.GapHigh == nil {
		return ""
	}
	decimals := readingDecimals(r)
	return signedPoints(*r.GapLow, decimals) + " to " + signedPoints(*r.GapHigh, decimals)
}

// limits words the two ends of an interval, low <= high, around a middle that
// has already said its direction; size prints a number without its sign, under
// and over name the directions.
func limits(middle, low, high float64, size func(float64) string, under, over string) string {
	switch {
	case middle > 0 && low >= 0:
		return size(low) + " to " + size(high)
	case middle < 0 && high <= 0:
		return size(high) + " to " + size(low)
	}
	side := func(x float64) string {
		switch {
		case x > 0:
			return size(x) + " " + over
		case x < 0:
			return size(x) + " " + under
		}
		return size(x)
	}
	return side(low) + " to " + side(high)
}

// Heads says the gap in people: "56 too many of 4,000"; empty when no heads
// were asked for.
func Heads(q ask.Question, f ask.Finding) string {
	if q.Heads == nil || f.Heads == nil {
		return ""
	}
	of := " of " + people(*q.Heads)
	switch gap := f.Heads.Gap; {
	case gap > 0:
		return unsigned(gap, 0) + " too many" + of
	case gap < 0:
		return unsigned(gap, 0) + " too few" + of
	}
	return "none too many or too few" + of
}

// SignedHeads prints the gap in people for a table: "+56"; empty when no
// heads were asked for.
func SignedHeads(f ask.Finding) string {
	if f.Heads == nil {
		return ""
	}
	return signed(f.Heads.Gap, 0)
}

// HeadLimits prints the interval around the gap in people: "44 to 72", "12
// too few to 72 too many"; empty when there is none.
func HeadLimits(f ask.Finding) string {
	if f.Heads == nil || f.Heads.Low == nil || f.Heads.High == nil {
		return ""
	}
	size := func(x float64) string { return unsigned(x, 0) }
	return limits(f.Heads.Gap, *f.Heads.Low, *f.Heads.High, size, "too few", "too many")
}

// SignedHeadLimits prints the interval around the gap in people for a table:
// "+44 to +72"; empty when there is none.
func SignedHeadLimits(f ask.Finding) string {
	if f.Heads == nil || f.Heads.Low == nil || f.Heads.High == nil {
		return ""
	}
	return signed(*f.Heads.Low, 0) + " to " + signed(*f.Heads.High, 0)
}
