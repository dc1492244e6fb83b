// Package curve has the curves a share can be read from.
package curve

import (
	"math"

	"tailgap/core/sample"
)

// Given is a curve with a stated mean and SD, for instance from a manual.
type Given struct {
	Mean float64 `json:"mean"`
	SD   float64 `json:"sd"`
}

// Normal is the normal curve. Fitted says that Mean and SD come from the
// very scores it is held against, so that their sampling errors go together.
type Normal struct {
	Mean, SD float64
	Fitted   bool
}

// FitNormal is the normal curve with the sample's mean and SD (divisor n-1).
func FitNormal(m sample.Moments) Normal { return Normal{Mean: m.Mean, SD: m.SD, Fitted: true} }

// Z is the point in SDs from the mean.
func (c Normal) Z(point float64) float64 { return (point - c.Mean) / c.SD }

// UpperTail is the share of a standard normal curve at or beyond z, through
// erfc: accurate far into the tail, where 1-Φ(z) has no digits left.
func UpperTail(z float64) float64 { return 0.5 * math.Erfc(z/math.Sqrt2) }

// Density is the standard normal density at z.
func Density(z float64) float64 { return math.Exp(-0.5*z*z) / math.Sqrt(2*math.Pi) }
