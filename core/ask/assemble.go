package ask

import (
	"math"

	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/resample"
	"tailgap/core/verdict"
)

// shown is one region as an answer shows it: upper tail or stretch, or the
// complement of an upper tail where the side is lower.
type shown struct {
	*work
	region int
	tail   bool
	lower  bool
}

func (w *work) shownAt(c cutoff.Cutoff, halfStep bool) shown {
	return shown{w, w.region(c, halfStep), c.Side != cutoff.Stretch, c.Side.Lower()}
}

func (s shown) estimate() *gap.Estimate { return s.plan.Estimates[s.region] }

func (s shown) curveShare() float64 {
	if s.lower {
		return s.estimate().CurveShort()
	}
	return s.estimate().Curve
}

func (s shown) counted() int {
	e := s.estimate()
	if s.lower {
		return int(math.Round(e.N - e.Inside))
	}
	return int(math.Round(e.Inside))
}

func (s shown) countedShare() float64 { return float64(s.counted()) / s.estimate().N }

func (s shown) gap(weight float64) float64 {
	return s.curveShare() - weight*s.countedShare()
}

// interval is the interval of curve share - weight·counted share; with a
// fitted curve by the quantile of the studentised replicates at the weight of.
func (s shown) interval(weight, of float64) resample.Interval {
	if !s.table.Curve.Fitted {
		return resample.ApartOf(s.apart(resample.Miss(s.question.Level)), weight)
	}
	quantile := s.quantiles.Region[s.region][s.weightIndex(of)]
	i := resample.IntervalOf(s.estimate(), weight, quantile, s.t, s.tail)
	if s.lower {
		return i.Mirror(1 - weight)
	}
	return i
}

// limits are those that a verdict is judged by; all at the gap itself when
// everyone was counted.
func (s shown) limits(weight float64) verdict.Limits {
	l := verdict.Limits{Gap: s.gap(weight)}
	l.Low, l.High = l.Gap, l.Gap
	if s.question.Everyone {
		return l
	}
	i := s.interval(weight, weight)
	l.Low, l.High = i.Low, i.High
	if !s.table.Curve.Fitted {
		l.FixedLow, l.FixedHigh = s.apart(resample.Miss(s.question.Level)).CurveParts(weight)
	}
	return l
}

// bandLimits are the simultaneous limits for a whole sweep. They hold the
// interval for the one threshold, which can be wider where few people are
// beyond it.
func (s shown) bandLimits(group int, weight float64) verdict.Limits {
	l := s.limits(weight)
	if s.question.Everyone {
		return l
	}
	quantile := s.quantiles.Group[group][s.weightIndex(weight)]
	if !s.table.Curve.Fitted {
		i := resample.ApartOf(s.apart(resample.BandMiss(quantile, s.question.Level)), weight)
		l.Low, l.High = i.Low, i.High
		return l
	}
	band := resample.BandOf(s.estimate(), weight, quantile, s.sparse)
	if s.lower {
		band = band.Mirror(1 - weight)
	}
	l.Low, l.High = math.Min(l.Low, band.Low), math.Max(l.High, band.High)
	return l
}

func (w *work) weightIndex(weight float64) int {
	if w.table.Curve.Known() {
		return 0
	}
	for i, known := range w.plan.Weights {
		if known == weight {
			return i
		}
	}
	panic("ask: a weight that was not planned")
}

// decide gives the verdict by some limits. A limit in percent of the count
// can't be judged where nobody was counted; a limit in points can still fail.
func (s shown) decide(limits func(weight float64) verdict.Limits) verdict.Verdict {
	if s.tolerance.OfCount() && s.counted() == 0 && !s.question.Everyone {
		if verdict.Of(s.tolerance.InPoints(), limits) == verdict.Fails {
			return verdict.Fails
		}
		return verdict.Unsettled
	}
	return verdict.Of(s.tolerance, limits)
}

// reading is the cutoff read in one way, with its verdict.
func (s shown) reading(c cutoff.Cutoff, halfStep bool) Reading {
	ends := gap.Ends(s.scale, c, halfStep)
	r := Reading{
		Z:          s.table.Curve.Z(ends[0].Point),
		CurveShare: s.curveShare(),
		GapPoints:  toPoints(s.gap(1)),
	}
	if len(ends) == 2 {
		z := s.table.Curve.Z(ends[1].Point)
		r.ZTo = &z
	}
	if !s.question.Everyone {
		l := s.limits(1)
		low, high := toPoints(l.Low), toPoints(l.High)
		r.GapLow, r.GapHigh = &low, &high
	}
	if !s.tolerance.None() {
		v := string(s.decide(s.limits))
		r.Verdict = &v
	}
	return r
}
