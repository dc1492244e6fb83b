package resample

import (
	"math"

	"gonum.org/v1/gonum/stat/distuv"

	"tailgap/core/gap"
)

// ApartOf is the interval of a given curve's Gap(weight), and its band where a
// is for BandMiss.
func ApartOf(a gap.Apart, weight float64) Interval {
	low, high := a.Limits(weight)
	return Interval{Low: low, High: high}
}

// Miss is the probability with which an interval at the level may miss on each
// side.
func Miss(level float64) float64 { return (1 - level) / 2 }

// BandMiss is the same for one threshold of a given curve's band: that of a
// normal quantity beyond the quantile of the largest studentised gap of the
// sweep. It is never larger than an interval's, which so lies in the band.
func BandMiss(quantile, level float64) float64 {
	return math.Min(distuv.UnitNormal.CDF(-quantile), Miss(level))
}
