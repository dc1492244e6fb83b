package calibration

import (
	"math"

	"tailgap/core/gap"
	"tailgap/core/verdict"

	"gonum.org/v1/gonum/stat/distuv"
)

// Tally is what was counted over the samples of one case.
type Tally struct {
	Population string
	N          int
	Samples    int // with at least two different scores
	Cells      []Cell
	Band       int // samples whose band holds the whole truth
	FalseTrust int // samples with a threshold trusted wrongly
}

// Cell is what was counted for one cutoff, or one stretch.
type Cell struct {
	Distance   float64 // of the cutoff, in SDs from the population's mean
	From, To   float64 // the score of the cutoff, or the stretch's two
	Gap        float64 // the true one, in points
	Weight     float64 // what the counted share is multiplied by, in percent of the count; else 0
	TooHigh    int     // samples whose whole interval is above the true gap
	TooLow     int     // samples whose whole interval is below it
	Width      float64 // the intervals' mean, in points
	Oracle     float64 // the width of an interval of one who knows the sampling SD
	FalseHolds int     // samples with "holds" where the tolerance is the true gap
	FalseFails int
}

// Coverage is the part of the samples whose interval holds the true gap.
func (t Tally) Coverage(c Cell) float64 {
	return 1 - float64(c.TooHigh+c.TooLow)/float64(t.Samples)
}

// BandCoverage is the part of the samples whose band holds the whole truth.
func (t Tally) BandCoverage() float64 { return float64(t.Band) / float64(t.Samples) }

func (s Study) tally(c Case, trials []trial) Tally {
	out := Tally{Population: c.Population.Name, N: c.N}
	split := func(at float64, strict bool) gap.Threshold { return s.attainable(c.Population, at, strict) }
	regions := s.regions(c.Population, split)
	sums := make([]moments, len(regions))
	tolerances := make([]verdict.Tolerance, len(regions))
	for i, ends := range regions {
		weight := 1.0
		cell := Cell{Distance: s.distance(c.Population, ends[0].At), From: ends[0].At, To: ends[len(ends)-1].At, Gap: 100 * s.truth(c.Population, ends)}
		if s.OfCount {
			weight = s.weight(c.Population, ends)
			cell.Gap, cell.Weight = 0, weight
		}
		tolerances[i] = edges(cell.Gap/100, weight)
		out.Cells = append(out.Cells, cell)
	}
	for _, trial := range trials {
		if trial.none {
			continue
		}
		out.Samples++
		if trial.bandHolds {
			out.Band++
		}
		if trial.falseTrust {
			out.FalseTrust++
		}
		for i, o := range trial.outcomes {
			sums[i].add(out.Cells[i].count(o, tolerances[i]), o.gap)
		}
	}
	z := distuv.UnitNormal.Quantile((1 + s.Level) / 2)
	for i := range out.Cells {
		out.Cells[i].Width = sums[i].width / float64(out.Samples)
		out.Cells[i].Oracle = 200 * z * sums[i].sd(out.Samples)
	}
	return out
}

// distance is that of the listed distances whose cutoff this is.
func (s Study) distance(p Population, at float64) float64 {
	for _, z := range s.Distances {
		if p.Cutoff(z) == at {
			return z
		}
	}
	return (at - p.Mean) / p.SD
}

// count counts one sample and returns the width of its interval, in points.
func (c *Cell) count(o outcome, edge verdict.Tolerance) float64 {
	truth := c.Gap / 100
	low, high := math.Max(-1, o.limits.Low), math.Min(1, o.limits.High)
	switch {
	case low > truth+rounding:
		c.TooHigh++
	case high < truth-rounding:
		c.TooLow++
	}
	switch o.verdict(edge) {
	case verdict.Holds:
		c.FalseHolds++
	case verdict.Fails:
		c.FalseFails++
	}
	return 100 * (high - low)
}

// moments gather widths, in points, and gaps, as proportions.
type moments struct{ width, gaps, squares float64 }

func (m *moments) add(width, gap float64) {
	m.width += width
	m.gaps += gap
	m.squares += gap * gap
}

func (m moments) sd(n int) float64 {
	mean := m.gaps / float64(n)
	return math.Sqrt(math.Max(0, m.squares/float64(n)-mean*mean))
}

// attainable is the threshold on the population's own scale, where every
// cutoff of the study is attainable.
func (s Study) attainable(p Population, at float64, strict bool) gap.Threshold {
	t := gap.Threshold{At: at, Strict: strict, Point: at}
	switch {
	case !s.HalfStep:
	case strict:
		t.Point += p.Step / 2
	default:
		t.Point -= p.Step / 2
	}
	return t
}
