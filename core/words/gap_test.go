package words

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"tailgap/core/ask"
)

func some[T any](x T) *T { return &x }

func reading(gap, low, high float64) ask.Reading {
	return ask.Reading{GapPoints: gap, GapLow: &low, GapHigh: &high}
}

// Each threshold of the rule with its neighbours on both sides.
func TestGapAtTheEdges(t *testing.T) {
	for _, c := range []struct {
		points       float64
		words, table string
	}{
		{0, "no gap", "0.00"}, {math.Copysign(0, -1), "no gap", "0.00"},
		{math.SmallestNonzeroFloat64, "too high by under 0.01 points", "+<0.01"},
		{-0.0049, "too low by under 0.01 points", "-<0.01"}, {0.00501, "too high by 0.01 points", "+0.01"},
		{0.125001, "too high by 0.13 points", "+0.13"}, {-0.13, "too low by 0.13 points", "-0.13"}, {0.4, "too high by 0.40 points", "+0.40"},
		{below(0.995), "too high by 0.99 points", "+0.99"}, {0.995, "too high by 1 point", "+1.0"}, {above(0.995), "too high by 1 point", "+1.0"},
		{below(1), "too high by 1 point", "+1.0"}, {1, "too high by 1 point", "+1.0"}, {-1.04, "too low by 1 point", "-1.0"},
		{1.051, "too high by 1.1 points", "+1.1"}, {1.4, "too high by 1.4 points", "+1.4"}, {2, "too high by 2.0 points", "+2.0"},
		{-99.99, "too low by 100.0 points", "-100.0"}, {-100, "too low by 100.0 points", "-100.0"},
		{math.NaN(), "gap not known", unknown}, {math.Inf(1), "gap not known", unknown},
	} {
		assert.Equal(t, c.words, Gap(c.points), "%v", c.points)
		assert.Equal(t, c.table, signedPoints(c.points, gapDecimals(c.points)), "%v", c.points)
	}
}

func TestLimits(t *testing.T) {
	for _, c := range []struct {
		gap, low, high float64
		words, table   string
	}{
		{1.4, 1.1, 1.8, "1.1 to 1.8", "+1.1 to +1.8"},
		{-3.9, -6.1, -1.8, "1.8 to 6.1", "-6.1 to -1.8"},
		{0.7, -0.3, 1.8, "0.3 too low to 1.8 too high", "-0.3 to +1.8"},
		{0.7, -0.3, below(0.995), "0.30 too low to 0.99 too high", "-0.30 to +0.99"},
		{0.7, -0.3, 0.995, "0.3 too low to 1.0 too high", "-0.3 to +1.0"},
		{0.7, -0.995, 0.8, "1.0 too low to 0.8 too high", "-1.0 to +0.8"},
		{-1.2, -2.7, 0.3, "2.7 too low to 0.3 too high", "-2.7 to +0.3"},
		{1.2, 0.03, 2.4, "under 0.1 to 2.4", "+<0.1 to +2.4"},
		{1.2, -0.03, 2.4, "under 0.1 too low to 2.4 too high", "-<0.1 to +2.4"},
		{1.2, 0, 2.4, "0 to 2.4", "0.0 to +2.4"},
		{-1.2, -2.4, 0, "0 to 2.4", "-2.4 to 0.0"},
		{0, -0.5, 0.5, "0.50 too low to 0.50 too high", "-0.50 to +0.50"},
		{0, 0.1, 0.5, "0.10 too high to 0.50 too high", "+0.10 to +0.50"},
		{0, 0, 0, "0 to 0", "0.00 to 0.00"},
	} {
		assert.Equal(t, c.words, Limits(reading(c.gap, c.low, c.high)))
		assert.Equal(t, c.table, SignedLimits(reading(c.gap, c.low, c.high)))
	}
	assert.Empty(t, Limits(ask.Reading{GapPoints: 3}), "an exact gap has no interval")
	assert.Empty(t, SignedLimits(ask.Reading{GapPoints: 3}))
}

// A gap is printed no finer than its interval lets it be known.
func TestGapAsFineAsItsInterval(t *testing.T) {
	for _, c := range []struct {
		r            ask.Reading
		words, table string
	}{
		{reading(-0.98, -17.39, 15.45), "too low by 1 point", "-1.0"},
		{reading(0.38, -0.2, 1.1), "too high by 0.4 points", "+0.4"},
		{reading(0.38, -0.2, 0.9), "too high by 0.38 points", "+0.38"},
		{reading(0.03, -46.65, 46.65), "too high by under 0.1 points", "+<0.1"},
		{reading(-0.03, -46.65, 46.65), "too low by under 0.1 points", "-<0.1"},
		{reading(0, -46.65, 46.65), "no gap", "0.0"},
		{reading(1.4, 1.1, 1.8), "too high by 1.4 points", "+1.4"},
		{ask.Reading{GapPoints: 0.38}, "too high by 0.38 points", "+0.38"},
		{ask.Reading{GapPoints: 3.81}, "too high by 3.8 points", "+3.8"},
		{reading(math.NaN(), -1, 1), "gap not known", unknown},
	} {
		assert.Equal(t, c.words, GapOf(c.r))
		assert.Equal(t, c.table, SignedGapOf(c.r))
	}
}

// sized reads a worded number and its side back: side is 1 for too high, -1
// for too low and 0 where the words say none.
func sized(t *rapid.T, worded string) (size float64, side int) {
	worded, low := strings.CutSuffix(worded, " too low")
	worded, high := strings.CutSuffix(worded, " too high")
	worded, under := strings.CutPrefix(worded, "under ")
	size, err := strconv.ParseFloat(worded, 64)
	require.NoError(t, err)
	if under {
		size /= 2
	}
	switch {
	case low:
		return size, -1
	case high:
		return size, 1
	}
	return size, 0
}

// A gap and its limits are printed with the same decimals, on the side they
// are on, and in their order.
func TestGapAndLimitsAgree(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		scale := math.Pow10(rapid.IntRange(-4, 1).Draw(t, "scale"))
		gap := scale * rapid.Float64Range(-9, 9).Draw(t, "gap")
		low := gap - scale*rapid.Float64Range(0, 9).Draw(t, "below")
		high := gap + scale*rapid.Float64Range(0, 9).Draw(t, "above")
		r := reading(gap, low, high)

		first, last, found := strings.Cut(Limits(r), " to ")
		require.True(t, found)
		printedLow, lowSide := sized(t, first)
		printedHigh, highSide := sized(t, last)
		direction := map[bool]int{true: 1, false: -1}[gap > 0]
		if lowSide == 0 && highSide == 0 && gap != 0 { // both in the gap's direction
			assert.GreaterOrEqual(t, float64(direction)*low, 0.0)
			assert.GreaterOrEqual(t, float64(direction)*high, 0.0)
			if direction < 0 {
				printedLow, printedHigh = printedHigh, printedLow
			}
			lowSide, highSide = direction, direction
		}
		printedLow, printedHigh = float64(lowSide)*printedLow, float64(highSide)*printedHigh
		assert.LessOrEqual(t, printedLow, printedHigh)

		half := 0.5 * math.Pow10(-readingDecimals(r))
		if max(math.Abs(gap), math.Abs(low), math.Abs(high)) >= 0.995 {
			assert.InDelta(t, 0.05, half, 1e-12, "one decimal")
		}
		assert.InDelta(t, low, printedLow, half+1e-12)
		assert.InDelta(t, high, printedHigh, half+1e-12)
		assert.True(t, low*printedLow >= 0 && high*printedHigh >= 0, "a limit changed sides")

		direct := GapOf(r)
		assert.Equal(t, gap > 0, strings.HasPrefix(direct, "too high by "))
		assert.Equal(t, gap < 0, strings.HasPrefix(direct, "too low by "))
		if gap == 0 {
			assert.Equal(t, "no gap", direct)
		} else if digits := strings.Fields(direct)[3]; digits != "under" {
			printed, err := strconv.ParseFloat(digits, 64)
			require.NoError(t, err)
			printed *= float64(direction)
			assert.InDelta(t, gap, printed, half+1e-12)
			if lowSide != 0 && highSide != 0 {
				assert.LessOrEqual(t, printedLow, printed)
				assert.LessOrEqual(t, printed, printedHigh)
			}
		}
		table := SignedGapOf(r)
		assert.Equal(t, gap > 0, table[0] == '+', table)
		assert.Equal(t, gap < 0, table[0] == '-', table)
		lowest, highest, _ := strings.Cut(SignedLimits(r), " to ")
		assert.Equal(t, low < 0, lowest[0] == '-', lowest)
		assert.Equal(t, high > 0, highest[0] == '+', highest)
	})
}

func TestHeads(t *testing.T) {
	of := ask.Question{Heads: some(4000.0)}
	for _, c := range []struct {
		gap, low, high                    float64
		words, limits, table, tableLimits string
	}{
		{56.4, 44, 72, "56 too many of 4,000", "44 to 72", "+56", "+44 to +72"},
		{-157, -252, -68, "157 too few of 4,000", "68 to 252", "-157", "-252 to -68"},
		{-1500, -3000, 20, "1,500 too few of 4,000", "3,000 too few to 20 too many", "-1,500", "-3,000 to +20"},
		{0.3, -9, 9.4, "under 1 too many of 4,000", "9 too few to 9 too many", "0", "-9 to +9"},
		{0, 0, 0, "none too many or too few of 4,000", "0 to 0", "0", "0 to 0"},
	} {
		f := ask.Finding{Heads: &ask.HeadCount{Gap: c.gap, Low: &c.low, High: &c.high}}
		assert.Equal(t, c.words, Heads(of, f))
		assert.Equal(t, c.limits, HeadLimits(f))
		assert.Equal(t, c.table, SignedHeads(f))
		assert.Equal(t, c.tableLimits, SignedHeadLimits(f))
	}
	assert.Empty(t, Heads(ask.Question{}, ask.Finding{}))
	exact := ask.Finding{Heads: &ask.HeadCount{Gap: 3}}
	assert.Empty(t, HeadLimits(exact))
	assert.Empty(t, SignedHeadLimits(exact))
}

func TestRatio(t *testing.T) {
	for _, c := range []struct {
		ratio        float64
		words, table string
	}{
		{0, "more than 1,000 times too low", "0"}, {1e-19, "more than 1,000 times too low", "under 0.001"},
		{below(0.001), "more than 1,000 times too low", "under 0.001"}, {0.001, "1,000 times too low", "0.0010"},
		{0.0021, "476 times too low", "0.0021"}, {0.0996, "10 times too low", "0.10"}, {0.1, "10 times too low", "0.10"},
		{0.13 / 1.03, "8 times too low", "0.13"}, {0.2, "5 times too low", "0.20"},
		{above(0.2), "20 by the curve for every 100 counted", "0.20"}, {0.58, "58 by the curve for every 100 counted", "0.58"},
		{0.994, "99 by the curve for every 100 counted", "0.99"}, {0.996, "about as many by the curve as counted", "1.00"},
		{1, "as many by the curve as counted", "1.00"}, {1.004, "about as many by the curve as counted", "1.00"},
		{1.04, "104 by the curve for every 100 counted", "1.04"}, {below(1.5), "150 by the curve for every 100 counted", "1.50"},
		{1.5, "15 by the curve for every 10 counted", "1.50"}, {1.7, "17 by the curve for every 10 counted", "1.70"},
		{2, "20 by the curve for every 10 counted", "2.00"}, {below(5), "50 by the curve for every 10 counted", "5.00"},
		{5, "5 times too high", "5.00"}, {7.9, "8 times too high", "7.90"}, {9.994, "10 times too high", "9.99"}, {9.996, "10 times too high", "10.0"},
		{99.94, "100 times too high", "99.9"}, {99.96, "100 times too high", "100"}, {1000, "1,000 times too high", "1,000"},
		{above(1000), "more than 1,000 times too high", "over 1,000"}, {math.Inf(1), "more than 1,000 times too high", "over 1,000"},
		{math.NaN(), "ratio not known", unknown}, {-1, "ratio not known", unknown},
	} {
		assert.Equal(t, c.words, Ratio(ask.Finding{Ratio: &c.ratio}), "%v", c.ratio)
		assert.Equal(t, c.table, RatioNumber(c.ratio), "%v", c.ratio)
	}
	assert.Empty(t, Ratio(ask.Finding{}), "nobody was counted")
}

func TestRatioLimits(t *testing.T) {
	assert.Equal(t, "1.45 to 2.02", RatioLimits(ask.Finding{RatioLow: some(1.45), RatioHigh: some(2.02)}))
	assert.Equal(t, "1.45 or more", RatioLimits(ask.Finding{RatioLow: some(1.45)}))
	assert.Empty(t, RatioLimits(ask.Finding{}))
}

// What a ratio says never contradicts the side of 1 that it is on.
func TestRatioAgreesWithItsSide(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		r := math.Exp(rapid.Float64Range(-9, 9).Draw(t, "log"))
		said := ratio(r)
		var curve, per float64
		switch digits := strings.Fields(said); {
		case strings.HasSuffix(said, "too high"):
			assert.Greater(t, r, 1.0)
		case strings.HasSuffix(said, "too low"):
			assert.Less(t, r, 1.0)
		case strings.HasPrefix(said, "as many"):
			assert.Equal(t, 1.0, r)
		case strings.HasPrefix(said, "about"):
			assert.InDelta(t, 1, r, 0.005)
		default:
			curve, _ = strconv.ParseFloat(digits[0], 64)
			per, _ = strconv.ParseFloat(digits[6], 64)
			assert.Equal(t, r > 1, curve > per, said)
			assert.InDelta(t, r, curve/per, 0.5/per+1e-12, said)
		}
	})
}
