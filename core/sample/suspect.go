package sample

import "math"

// The thresholds in this file are rules of thumb, common practice rather
// than published constants: they decide what is worth a warning, never a
// figure.

// usualCodes are numbers that often stand for "no score".
var usualCodes = map[float64]bool{
	-1: true, -7: true, -8: true, -9: true, -77: true, -88: true, -99: true, -999: true, -9999: true,
	77: true, 88: true, 99: true, 777: true, 888: true, 999: true, 7777: true, 8888: true, 9999: true,
}

// SuspectedCodes are the lowest or highest scores that look like missing
// codes: a usual code more than 4 SD from the mean of the other scores and
// more than 2 SD from the nearest of them (their SD); or a usual code below
// zero where all scores that are none are zero or more.
func SuspectedCodes(c Counts) []float64 {
	var suspects []float64
	for len(c.Score) > 3 {
		last := len(c.Score) - 1
		switch {
		case usualCodes[c.Score[last]] && apart(c, last, last-1):
			suspects = append(suspects, c.Score[last])
			c = without(c, last)
		case usualCodes[c.Score[0]] && (apart(c, 0, 1) || onlyBelowZero(c)):
			suspects = append(suspects, c.Score[0])
			c = without(c, 0)
		default:
			return suspects
		}
	}
	return suspects
}

func apart(c Counts, suspect, neighbour int) bool {
	m := without(c, suspect).Moments()
	return math.Abs(c.Score[suspect]-m.Mean) > 4*m.SD && math.Abs(c.Score[suspect]-c.Score[neighbour]) > 2*m.SD
}

// onlyBelowZero is true where every score below zero is a usual code.
func onlyBelowZero(c Counts) bool {
	for _, score := range c.Score {
		if score >= 0 {
			return c.Score[0] < 0
		}
		if !usualCodes[score] {
			return false
		}
	}
	return false
}

// without is the table without its first or its last score.
func without(c Counts, index int) Counts {
	n := c.N - c.Count[index]
	if index == 0 {
		return Counts{Score: c.Score[1:], Count: c.Count[1:], N: n}
	}
	return Counts{Score: c.Score[:index], Count: c.Count[:index], N: n}
}

// ExtremeShare is the part of the sum of squares about the mean that comes
// from the most extreme hundredth of the people (at least one), and how many
// they are.
func ExtremeShare(c Counts, m Moments) (share float64, people int) {
	people = (c.N + 99) / 100
	low, high := 0, len(c.Score)-1
	usedLow, usedHigh := 0, 0
	total := 0.0
	for range people {
		below, above := m.Mean-c.Score[low], c.Score[high]-m.Mean
		if below > above {
			total += below * below
			if usedLow++; usedLow == c.Count[low] {
				low, usedLow = low+1, 0
			}
		} else {
			total += above * above
			if usedHigh++; usedHigh == c.Count[high] {
				high, usedHigh = high-1, 0
			}
		}
	}
	return total / (float64(c.N) * m.M2), people
}

const (
	mostlyTheirs      = 0.5 // of the sum of squares: more of it, and the SD is that of a few
	fewestForExtremes = 20  // people of whom this is said
)

// Extremes is ExtremeShare where the SD is mostly the most extreme people's,
// among twenty people or more; elsewhere they are 0.
func Extremes(c Counts, m Moments) (share float64, people int) {
	if share, people = ExtremeShare(c, m); c.N < fewestForExtremes || !(share > mostlyTheirs) {
		return 0, 0
	}
	return share, people
}
