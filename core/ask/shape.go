package ask

import "tailgap/core/cutoff"

// Shape is what the shape of the scores does to the gaps at the cutoffs, with
// two tests of normality and a worm plot. What isn't there is null.
type Shape struct {
	Skewness       Measured  `json:"skewness"`
	ExcessKurtosis Measured  `json:"excess_kurtosis"`
	Floor          *Pile     `json:"floor"`    // people piled up at the lowest score
	Ceiling        *Pile     `json:"ceiling"`  // at the highest
	Heaps          *Heaps    `json:"heaps"`    // on round scores
	Extremes       *Extremes `json:"extremes"` // the most extreme hundredth of the people, where the SD is mostly theirs
	Farthest       *Farthest `json:"farthest"` // the single most extreme score, where it is an outlier
	Cutoffs        []ShapeAt `json:"cutoffs"`  // one for each of the result's cutoffs, in their order
	Tests          Tests     `json:"tests"`
	Worm           Worm      `json:"worm"`
	Replicates     int       `json:"replicates"` // that the intervals are from; 0 when everyone was counted
}

// Measured is a figure with its interval, null when everyone was counted.
type Measured struct {
	Value float64  `json:"value"`
	Low   *float64 `json:"low"`
	High  *float64 `json:"high"`
}

// Pile is people at one end of the scale, too many for a tail.
type Pile struct {
	Score  float64 `json:"score"`
	People int     `json:"people"`
	Share  float64 `json:"share"`
}

// Heaps are round scores, the multiples of the spacing, on which people pile
// up; Share is of the people there.
type Heaps struct {
	Spacing float64 `json:"spacing"`
	Share   float64 `json:"share"`
}

// Extremes are the most extreme scores, those farthest from the mean, and the
// part of the sum of squares about the mean that comes from them.
type Extremes struct {
	People         int     `json:"people"`
	ShareOfSquares float64 `json:"share_of_squares"`
}

// Farthest is the score farthest from the mean, and how many SDs it is.
type Farthest struct {
	Score float64 `json:"score"`
	Z     float64 `json:"z"`
}

// ShapeAt is what makes the gap at one cutoff, that of the reading that is
// judged.
type ShapeAt struct {
	Cutoff    cutoff.Cutoff `json:"cutoff"`
	GapPoints float64       `json:"gap_points"`
	Effects
	Quantile   *float64 `json:"quantile"`    // where the cutoff parts the worm; null where all people are on one side of it
	QuantileTo *float64 `json:"quantile_to"` // likewise the upper end of a stretch
}

// Effects are what makes a gap. MeanAndSD, HalfStep, Asymmetry and Rest are
// its parts: those that are not null add up to it. The others are each the
// whole difference that one feature makes: the gap less the gap without it,
// with the curve fitted anew.
type Effects struct {
	MeanAndSD *Effect `json:"mean_and_sd"` // a given curve's are not these people's; null for a fitted curve
	HalfStep  *Effect `json:"half_step"`   // the curve is read without it; null where it is read with it, or there is no step
	Asymmetry *Effect `json:"asymmetry"`   // would go away if the scores were mirrored about their mean and both put together
	Rest      *Effect `json:"rest"`        // left to the tails and the peak of that symmetric score
	Floor     *Effect `json:"floor"`
	Ceiling   *Effect `json:"ceiling"`
	Heaps     *Effect `json:"heaps"`
	Extremes  *Effect `json:"extremes"`
	Farthest  *Effect `json:"farthest"` // no interval: one score is what it is
}

// Effect is so many points of a gap, above zero where they make the curve too
// high. Low and High are null where there is no interval.
type Effect struct {
	Points float64  `json:"points"`
	Low    *float64 `json:"low"`
	High   *float64 `json:"high"`
}

// Tests are tests of normality with a fitted curve. They don't say whether
// the curve will do at a cutoff.
type Tests struct {
	AndersonDarling *AndersonDarling `json:"anderson_darling"`
	Lilliefors      *Lilliefors      `json:"lilliefors"`
	LeftOut         string           `json:"left_out"` // why one is null; empty otherwise
}

// AndersonDarling is the test's statistic, the same made comparable across
// sample sizes, and its p-value.
type AndersonDarling struct {
	A2     float64 `json:"a2"`
	A2Star float64 `json:"a2_star"`
	P      float64 `json:"p"`
}

// Lilliefors is the test's statistic and its p-value.
type Lilliefors struct {
	D float64 `json:"d"`
	P float64 `json:"p"`
}

// Worm is a worm plot (van Buuren & Fredriks 2001): for each distinct score,
// or 300 of them, how many of the curve's SDs it lies above (below: minus) the
// score that the curve expects at its place among the people, and that one's
// standard score, Quantile. A score of the curve's own lies within Limit,
// pointwise, at the question's level; null when everyone was counted.
type Worm struct {
	Score     []float64 `json:"score"`
	Quantile  []float64 `json:"quantile"`
	Deviation []float64 `json:"deviation"`
	Limit     []float64 `json:"limit"`
}
