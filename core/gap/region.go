package gap

import (
	"math"

	"tailgap/core/curve"
	"tailgap/core/sample"
)

// Threshold is one end of a region: where people are split and where the
// curve is read for it.
type Threshold struct {
	At     float64 // the score that splits
	Strict bool    // a score equal to At is short of the threshold (X > At), not beyond it (X >= At)
	Point  float64 // the score at which the curve is read: At, or half a step beside it
}

// Table is a count table in standard units, ready for shares and gaps to be
// read from it, again and again, under any counts.
type Table struct {
	Counts  sample.Counts
	Moments sample.Moments
	Curve   curve.Normal
	U       []float64 // the distinct scores, in SDs from the mean

	unseenAt [2]float64 // where the people unseen stand, in SDs from the mean
}

// NewTable standardises the count table by its mean and SD, which must be
// above zero.
func NewTable(counts sample.Counts, moments sample.Moments, c curve.Normal) Table {
	t := Table{Counts: counts, Moments: moments, Curve: c, U: make([]float64, len(counts.Score))}
	for i, score := range counts.Score {
		t.U[i] = t.standard(score)
	}
	t.unseenAt = t.unseenPlaces()
	return t
}

// farthest is the standard score that stands for all beyond it: the curve's
// share there is none or all, in every resample, and squares stay finite.
const farthest = 1e30

func (t Table) standard(score float64) float64 {
	return math.Max(-farthest, math.Min(farthest, (score-t.Moments.Mean)/t.Moments.SD))
}

// Region is the set of scores whose share is asked for: an upper tail, or a
// stretch between two thresholds.
type Region struct {
	From, To     int // the distinct scores inside: From <= i < To
	Lower, Upper Point
	Stretch      bool
	lowerGhost   float64 // where a ghost observation stands at each end, in standard units
	upperGhost   float64
}

// Point is where the curve is read for one end of a region. Points are equal
// where their readings are.
type Point struct {
	u       float64 // in standard units of the sample
	z, tail float64 // by a given curve, with the share beyond it: they don't move with the sample
}

func (t Table) point(at Threshold) Point {
	z := t.Curve.Z(at.Point)
	return Point{u: t.standard(at.Point), z: z, tail: curve.UpperTail(z)}
}

func (t Table) index(at Threshold) int {
	if at.Strict {
		return t.Counts.IndexAbove(at.At)
	}
	return t.Counts.IndexAtLeast(at.At)
}

// Tail is the region at and beyond a threshold.
func (t Table) Tail(at Threshold) Region {
	return Region{From: t.index(at), To: len(t.U), Lower: t.point(at), lowerGhost: t.standard(at.At)}
}

// Between is the region beyond the threshold from and short of the threshold to.
func (t Table) Between(from, to Threshold) Region {
	r := t.Tail(from)
	r.To = max(r.From, t.index(to))
	r.Upper, r.upperGhost, r.Stretch = t.point(to), t.standard(to.At), true
	return r
}

// Sums describe a sample, or a resample of it, in the standard units of the
// sample; from them every share, gap and standard error follows.
type Sums struct {
	N, Mean, M2, M3 float64 // central moments with divisor n
	perSD           float64 // 1/SD, divisor n-1
	perN            float64 // 1/n
	bessel          float64 // n/(n-1)
	fourth          float64 // M4 - M2²: n times the variance of M2
	Norms           Norms   // what a curve from norms goes by
}

// NewSums turns the sums of 1, u, u², u³ and u⁴ into moments.
func NewSums(s0, s1, s2, s3, s4 float64) Sums {
	perN := 1 / s0
	mean := s1 * perN
	r2, r3, r4 := s2*perN, s3*perN, s4*perN
	square := mean * mean
	m2 := r2 - square
	if m2 < 1e-14*square { // rounding only: one score, drawn again and again
		m2 = 0
	}
	return newSums(s0, mean, m2, r3-3*mean*r2+2*mean*square, r4-4*mean*r3+6*square*r2-3*square*square)
}

func newSums(n, mean, m2, m3, m4 float64) Sums {
	return Sums{N: n, Mean: mean, M2: m2, M3: m3, perSD: math.Sqrt((n - 1) / (n * m2)), perN: 1 / n, bessel: n / (n - 1), fourth: m4 - m2*m2}
}

// Inside are the sums of 1, u and u² over the people inside a region.
type Inside struct{ K, S1, S2 float64 }
