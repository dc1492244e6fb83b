package words

import (
	"math"
	"strconv"
	"strings"

	"tailgap/core/numeral"
)

// unknown stands where a number should be and none is.
const unknown = numeral.Unknown

// Ends of what Share prints in digits: one in a million, and all but that.
const leastShare = 1e-6

// Share prints a proportion as a percentage: one decimal from 1% to 99%
// ("3.4%"), two significant digits of what is left to the nearer end outside
// ("0.13%", "99.87%"). "0%" and "100%" are kept for exactly none and all;
// below one in a million it is "under 0.0001%", and likewise at the top.
func Share(p float64) string {
	fromEnd := min(p, 1-p)
	switch {
	case !(fromEnd >= 0):
		return unknown
	case p == 0:
		return "0%"
	case p == 1:
		return "100%"
	case p < leastShare:
		return "under 0.0001%"
	case fromEnd < leastShare:
		return "over 99.9999%"
	}
	decimals := 1
	if fromEnd < 0.01 {
		decimals = significantDecimals(100*fromEnd, 2)
	}
	return strconv.FormatFloat(100*p, 'f', decimals, 64) + "%"
}

// significantDecimals is how many decimals print x, above zero, to the given
// number of significant digits, after the rounding that does.
func significantDecimals(x float64, digits int) int {
	text := strconv.FormatFloat(x, 'e', digits-1, 64)
	exponent, _ := strconv.Atoi(text[strings.IndexByte(text, 'e')+1:])
	return max(0, digits-1-exponent)
}

// brief is shorter where a table has no room.
var brief = strings.NewReplacer("under ", "<", "over ", ">")

// Brief is a printed figure for a narrow table: "<0.0001%" for "under
// 0.0001%".
func Brief(figure string) string { return brief.Replace(figure) }

// Number prints a score or another plain number in its shortest form: "70",
// "25.5".
func Number(x float64) string { return numeral.Plain(x) }

// Count prints a whole number with thousands marked: "4,000".
func Count(n int) string { return numeral.Count(n) }

// people prints a number of people that need not be whole, such as the size
// of the group that a share is applied to.
func people(x float64) string { return numeral.Thousands(Number(x)) }

// People says a number of people: "4,000 people", "1 person".
func People(x float64) string {
	if x == 1 {
		return "1 person"
	}
	return people(x) + " people"
}

// Z prints how many SDs above the mean a cutoff lies, for a table: "+1.83",
// "-1.59".
func Z(z float64) string { return signed(z, 2) }

// percent prints a number of percent as stated: 0.95 is "95%", 0.999 is "99.9%".
func percent(p float64) string { return Number(100*p) + "%" }

// Level prints the level of intervals and bands: "95%".
func Level(level float64) string { return percent(level) }

// unsigned prints the size of x with so many decimals; a size that would
// round to zero without being zero is "under" the last digit, so that it is
// never taken for none.
func unsigned(x float64, decimals int) string {
	size := math.Abs(x)
	switch {
	case math.IsNaN(size) || math.IsInf(size, 0):
		return unknown
	case size == 0:
		return "0"
	}
	text := strconv.FormatFloat(size, 'f', decimals, 64)
	if strings.Trim(text, "0.") == "" {
		return "under " + strconv.FormatFloat(math.Pow10(-decimals), 'f', decimals, 64)
	}
	return numeral.Thousands(text)
}

// signed prints x with its sign for a table: "+1.4", "-0.13", "0.0".
func signed(x float64, decimals int) string {
	if math.IsNaN(x) || math.IsInf(x, 0) {
		return unknown
	}
	text := numeral.Thousands(strconv.FormatFloat(math.Abs(x), 'f', decimals, 64))
	switch {
	case strings.Trim(text, "0.") == "":
		return text
	case x < 0:
		return "-" + text
	}
	return "+" + text
}
