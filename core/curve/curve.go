// Package curve has the curves a share can be read from.
package curve

import (
	"math"

	"tailgap/core/sample"
)

// Given is a curve with a stated mean and SD, for instance from a manual.
// NormN is how many people the two were estimated from; nil: they are taken
// to be known exactly.
type Given struct {
	Mean  float64 `json:"mean"`
	SD    float64 `json:"sd"`
	NormN *int    `json:"norm_n,omitempty"`
}

// Normal is the normal curve as it was given.
func (g Given) Normal() Normal {
	c := Normal{Mean: g.Mean, SD: g.SD}
	if g.NormN != nil {
		c.NormN = *g.NormN
	}
	return c
}

// Normal is the normal curve. Fitted says that Mean and SD come from the
// very scores it is held against, so that their sampling errors go together.
// NormN says that they come from so many other people; where it is 0 and the
// curve is not fitted, they are known exactly.
type Normal struct {
	Mean, SD float64
	Fitted   bool
	NormN    int
}

// Known is true where nothing about the curve is uncertain.
func (c Normal) Known() bool { return !c.Fitted && c.NormN == 0 }

// FitNormal is the normal curve with the sample's mean and SD (divisor n-1).
func FitNormal(m sample.Moments) Normal { return Normal{Mean: m.Mean, SD: m.SD, Fitted: true} }

// Z is the point in SDs from the mean.
func (c Normal) Z(point float64) float64 { return (point - c.Mean) / c.SD }

// UpperTail is the share of a standard normal curve at or beyond z, through
// erfc: accurate far into the tail, where 1-Φ(z) has no digits left.
func UpperTail(z float64) float64 { return 0.5 * math.Erfc(z/math.Sqrt2) }

// Density is the standard normal density at z.
func Density(z float64) float64 { return math.Exp(-0.5*z*z) / math.Sqrt(2*math.Pi) }
