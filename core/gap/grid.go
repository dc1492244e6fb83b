package gap

import (
	"math"
	"slices"

	"tailgap/core/sample"
)

const (
	// mostThresholds is how many thresholds a sweep has before it is thinned.
	mostThresholds = 1000
	// spacedThresholds are left by thinning, spaced evenly over the people,
	// beside outermostThresholds at each end, where a count changes fastest
	// relative to itself.
	spacedThresholds    = 512
	outermostThresholds = 50
)

// Grid is the scores at which a sweep is taken, ascending: on a scale with a
// step every attainable score from its lower to its upper end, or further if
// scores were seen there, and without a step every distinct score. Above
// 1,000 thresholds (a score without a step makes two, at it and just past
// it) 512 spaced evenly over the people, the 50 outermost on each side, and
// the cutoffs are left, and thinned says so.
func Grid(counts sample.Counts, scale sample.Scale, cutoffs []float64) (grid []float64, thinned bool) {
	thresholdsEach := 2
	grid = slices.Clone(counts.Score)
	if scale.Step > 0 {
		thresholdsEach = 1
		grid, thinned = attainable(counts, scale)
	}
	if len(grid)*thresholdsEach <= mostThresholds {
		return grid, thinned
	}
	grid = slices.Concat(thin(grid, counts, thresholdsEach), cutoffs)
	slices.Sort(grid)
	return slices.Compact(grid), true
}

// attainable lists the attainable scores together with the scores seen; when
// the scale has too many, those seen and the next attainable one after each,
// and thinned says so.
func attainable(counts sample.Counts, scale sample.Scale) (scores []float64, thinned bool) {
	low := scale.Index(scale.AtOrAbove(math.Min(scale.Low, counts.Min())))
	high := scale.Index(scale.AtOrBelow(math.Max(scale.High, counts.Max())))
	seen := make(map[float64]bool, len(counts.Score))
	for _, score := range counts.Score {
		if scale.Attainable(score) {
			seen[scale.Index(score)] = true
		}
	}
	scores = slices.Clone(counts.Score)
	add := func(steps float64) {
		if !seen[steps] {
			seen[steps] = true
			scores = append(scores, scale.Score(steps))
		}
	}
	if high-low < mostThresholds {
		for steps := low; steps <= high; steps++ {
			add(steps)
		}
	} else {
		thinned = true
		for _, score := range counts.Score {
			add(min(high, scale.Index(score)+1))
		}
		add(low)
		add(high)
	}
	slices.Sort(scores)
	return slices.Compact(scores), thinned
}

// thin keeps scores spaced evenly over the people, and the outermost ones.
func thin(scores []float64, counts sample.Counts, thresholdsEach int) []float64 {
	outer := min(len(scores), outermostThresholds/thresholdsEach)
	kept := slices.Concat(scores[:outer], scores[len(scores)-outer:])
	wanted := spacedThresholds / thresholdsEach
	people, next := 0, 0
	for i, score := range counts.Score {
		people += counts.Count[i]
		for next < wanted && people*wanted > next*counts.N {
			kept = append(kept, score)
			next = people*wanted/counts.N + 1
		}
	}
	return kept
}

// Beyond is where a band is also held to its promise although no one was
// seen there: one step past each end of the grid. It keeps the band honest in
// the empty tails; further steps change nothing. Without a step the grid's
// own "just past the highest score" does the same.
func Beyond(grid []float64, step float64) []float64 {
	if step == 0 {
		return nil
	}
	return []float64{grid[0] - step, grid[len(grid)-1] + step}
}
