package words

import (
	"math"
	"strconv"

	"tailgap/core/ask"
	"tailgap/core/numeral"
)

// Ratio says the ratio of the curve's share to the counted one: "17 by the
// curve for every 10 counted", from 5 times on either way "8 times too low";
// empty when there is none, because nobody was counted.
func Ratio(f ask.Finding) string {
	if f.Ratio == nil {
		return ""
	}
	return ratio(*f.Ratio)
}

func ratio(r float64) string {
	switch {
	case !(r >= 0):
		return "ratio " + unknown
	case r == 1:
		return "as many by the curve as counted"
	case r >= 5:
		return times(r) + " too high"
	case r <= 0.2:
		return times(1/r) + " too low"
	}
	per := 100.0
	if r >= 1.5 {
		per = 10
	}
	curve := math.Round(r * per)
	if curve == per {
		return "about as many by the curve as counted"
	}
	return Number(curve) + " by the curve for every " + Number(per) + " counted"
}

// times prints how many times as large, from 5 on.
func times(r float64) string {
	if r > 1000 {
		return "more than 1,000 times"
	}
	return Count(int(math.Round(r))) + " times"
}

// RatioNumber prints a ratio for a table: "1.68", "0.58", "12.3", "0.021".
func RatioNumber(r float64) string {
	switch {
	case !(r >= 0):
		return unknown
	case r == 0:
		return "0"
	case r > 1000:
		return "over 1,000"
	case r < 0.001:
		return "under 0.001"
	case r >= 99.95:
		return numeral.Thousands(strconv.FormatFloat(r, 'f', 0, 64))
	case r >= 9.995:
		return strconv.FormatFloat(r, 'f', 1, 64)
	case r >= 0.1:
		return strconv.FormatFloat(r, 'f', 2, 64)
	}
	return strconv.FormatFloat(r, 'f', significantDecimals(r, 2), 64)
}

// RatioLimits prints the ratio's interval for a table: "1.45 to 2.02", "1.45
// or more" where it has no upper limit; empty when there is none.
func RatioLimits(f ask.Finding) string {
	switch {
	case f.RatioLow == nil:
		return ""
	case f.RatioHigh == nil:
		return RatioNumber(*f.RatioLow) + " or more"
	}
	return RatioNumber(*f.RatioLow) + " to " + RatioNumber(*f.RatioHigh)
}
