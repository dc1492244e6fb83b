package shape

import (
	"math"
	"slices"

	"tailgap/core/gap"
)

// spans is a count table with the stretch over which each entry's people are
// spread when a share is read anywhere: the step about a score, the score
// alone on a scale without a step, or a bin.
type spans struct {
	table     gap.Table // the entries; the curve is fitted
	low, high []float64 // in standard units, both ascending
	bins      bool
}

// newSpans are the spans of a table's scores.
func newSpans(table gap.Table, step float64) spans {
	s := spans{table: table, low: slices.Clone(table.U), high: slices.Clone(table.U)}
	half := step / 2 / table.Moments.SD
	for i := range table.U {
		s.low[i] -= half
		s.high[i] += half
	}
	return s
}

// rounding is what a computed reading point may be off, in SDs.
const rounding = 1e-9

// below is how many people are below a point in standard units, those at the
// point itself included or not; before has the people before each entry.
func (s *spans) below(point float64, included bool, count []int32, before []float64) float64 {
	border := point - rounding
	if included {
		border = point + rounding
	}
	i, _ := slices.BinarySearch(s.high, border)
	people := before[i]
	for ; i < len(count) && s.low[i] < border; i++ {
		part := (point - s.low[i]) / (s.high[i] - s.low[i])
		people += float64(count[i]) * math.Max(0, math.Min(1, part))
	}
	return people
}

const (
	// mostEntries is how many distinct scores are resampled one by one.
	mostEntries = 4096
	// binWidth is that of a bin within one SD of the mean, in SDs, and as a
	// part of the distance from the mean beyond.
	binWidth = 1.0 / 256
	// outermost scores at either end are kept out of bins.
	outermost = 50
)

// binned puts the people of many distinct scores into bins, so that a resample
// takes no longer for a million scores than for some thousands. A bin counts
// as its people's mean score; it is no wider than 1/256 of an SD, or of its
// distance from the mean, which moves sums of powers up to the eighth by some
// parts in 100,000: 4 where its people are spread evenly over it. The entries at which edges names a first one open a
// bin, so that every share that is counted is counted exactly.
func (s *spans) binned(edges []int) spans {
	table := s.table
	counts := table.Counts
	opens := make([]bool, len(table.U)+1)
	for _, i := range edges {
		opens[i] = true
	}
	table.Counts.Score, table.Counts.Count = nil, nil
	out := spans{bins: true}
	for from := 0; from < len(table.U); {
		to := from + 1
		if from >= outermost {
			widest := binWidth * math.Max(1, math.Min(math.Abs(s.table.U[from]), math.Abs(s.table.U[min(to, len(table.U)-1)])))
			for to < len(table.U)-outermost && !opens[to] && s.table.U[to]-s.table.U[from] <= widest {
				to++
			}
		}
		people, sum := 0, 0.0
		for i := from; i < to; i++ {
			people += counts.Count[i]
			sum += float64(counts.Count[i]) * (counts.Score[i] - counts.Score[from])
		}
		table.Counts.Score = append(table.Counts.Score, counts.Score[from]+sum/float64(people))
		table.Counts.Count = append(table.Counts.Count, people)
		out.low, out.high = append(out.low, s.low[from]), append(out.high, s.high[to-1])
		from = to
	}
	out.table = gap.NewTable(table.Counts, table.Moments, table.Curve)
	return out
}
