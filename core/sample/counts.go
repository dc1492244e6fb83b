package sample

import (
	"context"
	"slices"
)

// Counts is the count table: the distinct scores, ascending, with how many
// people have each. It is all that an unweighted analysis needs.
type Counts struct {
	Score []float64
	Count []int
	N     int // people in all
}

// Count tallies the scores, which must be finite, and leaves them as they are.
func Count(scores []float64) Counts {
	counts, _ := CountContext(context.Background(), scores, nil)
	return counts
}

// Min is the lowest score seen; the table must not be empty.
func (c Counts) Min() float64 { return c.Score[0] }

// Max is the highest score seen; the table must not be empty.
func (c Counts) Max() float64 { return c.Score[len(c.Score)-1] }

// IndexAtLeast is the index of the first distinct score >= threshold;
// len(c.Score) when there is none.
func (c Counts) IndexAtLeast(threshold float64) int {
	i, _ := slices.BinarySearch(c.Score, threshold)
	return i
}

// IndexAbove is the index of the first distinct score > threshold.
func (c Counts) IndexAbove(threshold float64) int {
	i, found := slices.BinarySearch(c.Score, threshold)
	if found {
		i++
	}
	return i
}

// People counts the people with the distinct scores from:to (to is out).
func (c Counts) People(from, to int) int {
	people := 0
	for _, count := range c.Count[from:to] {
		people += count
	}
	return people
}
