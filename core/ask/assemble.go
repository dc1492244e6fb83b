package ask

import (
	"math"

	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/verdict"
)

// shown is one region as an answer shows it: upper tail or stretch, or the
// complement of an upper tail where the side is lower.
type shown struct {
	*work
	region int
	lower  bool
}

func (w *work) shownAt(c cutoff.Cutoff, halfStep bool) shown {
	return shown{w, w.region(c, halfStep), c.Side.Lower()}
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

// limits are those that a verdict is judged by; all at the gap itself when
// everyone was counted.
func (s shown) limits(weight float64) verdict.Limits {
	l := verdict.Limits{Gap: s.gap(weight)}
	l.Low, l.High = l.Gap, l.Gap
	if s.question.Everyone {
		return l
	}
	i := s.judged.Interval(s.region, s.lower, weight, weight)
	l.Low, l.High = i.Low, i.High
	l.FixedLow, l.FixedHigh = s.judged.FixedParts(s.region, s.lower, weight)
	return l
}

// bandLimits are the simultaneous limits for a whole sweep.
func (s shown) bandLimits(group int, weight float64) verdict.Limits {
	if s.question.Everyone {
		return s.limits(weight)
	}
	i := s.judged.Band(s.region, group, s.lower, weight)
	return verdict.Limits{Gap: s.gap(weight), Low: i.Low, High: i.High}
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
