// Package numeral prints plain numbers for people to read: scores and counts.
// What a number says of an Answer is worded in package words.
package numeral

import (
	"math"
	"strconv"
	"strings"
)

// Unknown stands where a number should be and none is.
const Unknown = "not known"

// Plain prints a score or another plain number in its shortest form: "70",
// "25.5". Digits past the twelfth are left out: they come from adding up
// steps, not from anybody's score. What is no number is "not known".
func Plain(x float64) string {
	if math.IsNaN(x) || math.IsInf(x, 0) {
		return Unknown
	}
	rounded, _ := strconv.ParseFloat(strconv.FormatFloat(x, 'e', 11, 64), 64)
	size := math.Abs(rounded)
	if size != 0 && (size >= 1e15 || size < 1e-6) {
		return strconv.FormatFloat(rounded, 'g', -1, 64)
	}
	return strconv.FormatFloat(rounded+0, 'f', -1, 64)
}

// Count prints a whole number with its thousands marked: "4,000".
func Count(n int) string { return Thousands(strconv.Itoa(n)) }

// Thousands marks the thousands of a number in digits, which may have a sign
// and decimals.
func Thousands(digits string) string {
	sign, whole, decimals := "", digits, ""
	if strings.HasPrefix(whole, "-") {
		sign, whole = "-", whole[1:]
	}
	if point := strings.IndexByte(whole, '.'); point >= 0 {
		whole, decimals = whole[:point], whole[point:]
	}
	for i := len(whole) - 3; i > 0; i -= 3 {
		whole = whole[:i] + "," + whole[i:]
	}
	return sign + whole + decimals
}
