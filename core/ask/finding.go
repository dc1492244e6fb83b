package ask

import (
	"math"

	"tailgap/core/cutoff"
	"tailgap/core/resample"
	"tailgap/core/sample"
	"tailgap/core/verdict"
)

// result puts together what one column's answer shows.
func (w *work) result(steps *steps) (Result, error) {
	steps.of = len(w.question.Cutoffs) + len(w.sweeps) + 1
	m := w.table.Moments
	r := Result{
		Score: w.column.Name,
		Sample: Described{
			N: w.column.Rows, Used: m.N, Dropped: w.column.Dropped,
			Mean: m.Mean, SD: m.SD, Skewness: m.Skewness(), ExcessKurtosis: m.ExcessKurtosis(),
			Min: w.table.Counts.Min(), Max: w.table.Counts.Max(), Distinct: len(w.table.U),
			StepSource: w.scale.StepSource, Low: w.scale.Low, High: w.scale.High, RangeSource: w.scale.RangeSource,
		},
		Curve:   Curve{Kind: "normal", Mean: w.table.Curve.Mean, SD: w.table.Curve.SD, Source: "given"},
		Cutoffs: []Finding{}, Sweeps: []Sweep{},
	}
	if r.Sample.Dropped == nil {
		r.Sample.Dropped = []sample.Dropped{}
	}
	if w.scale.Step > 0 {
		step := w.scale.Step
		r.Sample.Step = &step
	}
	switch {
	case w.table.Curve.Fitted:
		r.Curve.Source = "fitted"
	case w.table.Curve.NormN > 0:
		r.Curve.NormN = &w.table.Curve.NormN
	}
	for _, c := range w.question.Cutoffs {
		r.Cutoffs = append(r.Cutoffs, w.finding(c))
		if err := steps.next(); err != nil {
			return Result{}, err
		}
	}
	for _, sweep := range w.sweeps {
		r.Sweeps = append(r.Sweeps, w.sweep(sweep))
		if err := steps.next(); err != nil {
			return Result{}, err
		}
	}
	r.Worst = worst(r.Sweeps, w.scale.Step > 0)
	r.Shape = w.shape(r.Cutoffs)
	r.Warnings = w.warnings()
	return r, steps.next()
}

// finding is the answer at one cutoff.
func (w *work) finding(c cutoff.Cutoff) Finding {
	judged := w.shownAt(c, w.halfStep)
	f := Finding{
		Cutoff:          c,
		Reading:         judged.reading(c, w.halfStep),
		Counted:         judged.counted(),
		CountedShare:    judged.countedShare(),
		WithoutHalfStep: w.shownAt(c, false).reading(c, false),
		Method:          judged.method(),
	}
	if w.scale.Step > 0 {
		half := w.shownAt(c, true).reading(c, true)
		f.HalfStep = &half
	}
	if f.Counted > 0 {
		ratio := f.CurveShare / f.CountedShare
		f.Ratio = &ratio
		if !w.question.Everyone {
			f.RatioLow, f.RatioHigh = judged.ratioLimits(ratio)
		}
	}
	f.Heads = w.heads(f.Reading)
	if f.Verdict != nil && *f.Verdict == string(verdict.Unsettled) && !(w.tolerance.OfCount() && f.Counted == 0) {
		if more, ok := verdict.PeopleToSettle(w.tolerance, w.table.Counts.N, w.question.Level, judged.limits); ok {
			f.PeopleToSettle = &more
		}
	}
	f.Notes = w.notes(c, f)
	return f
}

// method names how the interval was made.
func (s shown) method() string {
	if s.question.Everyone {
		return "exact"
	}
	return s.judged.Method(s.region)
}

func (s shown) ratioLimits(ratio float64) (low, high *float64) {
	return resample.RatioLimits(ratio, func(weight float64) resample.Interval { return s.judged.Interval(s.region, s.lower, weight, 1) })
}

func (w *work) heads(r Reading) *HeadCount {
	if w.question.Heads == nil {
		return nil
	}
	people := func(points float64) float64 { return points / 100 * *w.question.Heads }
	h := &HeadCount{Gap: people(r.GapPoints)}
	if r.GapLow != nil {
		low, high := people(*r.GapLow), people(*r.GapHigh)
		h.Low, h.High = &low, &high
	}
	return h
}

// sweep is one side's sweep with its band and trusted range.
func (w *work) sweep(plan sweepPlan) Sweep {
	out := Sweep{Side: plan.side, Thinned: plan.thinned, Threshold: plan.thresholds}
	if !w.tolerance.None() {
		out.Trusted = []Stretch{}
	}
	unbroken := false // every threshold since the last of the side's own was trusted
	for i, at := range plan.thresholds {
		s := shown{w, plan.regions[i], plan.side.Lower()}
		out.CurveShare = append(out.CurveShare, s.curveShare())
		out.CountedShare = append(out.CountedShare, s.countedShare())
		out.GapPoints = append(out.GapPoints, toPoints(s.gap(1)))
		band := func(weight float64) verdict.Limits { return s.bandLimits(plan.group, weight) }
		if !w.question.Everyone {
			interval, simultaneous := s.limits(1), band(1)
			out.Low = append(out.Low, toPoints(interval.Low))
			out.High = append(out.High, toPoints(interval.High))
			out.BandLow = append(out.BandLow, toPoints(simultaneous.Low))
			out.BandHigh = append(out.BandHigh, toPoints(simultaneous.High))
		}
		switch {
		case w.tolerance.None() || s.decide(band) != verdict.Holds:
			unbroken = false
		case w.own(plan.side, i):
			trivial := w.tolerance.Trivial(s.curveShare(), s.countedShare())
			out.Trusted = extend(out.Trusted, at, trivial, unbroken)
			unbroken = true
		}
	}
	return out
}

// own is true where the i-th threshold of a sweep parts the people as the side
// does. On a scale without a step every second one parts them on the other
// side of the score, and a stretch must not begin or end there: what holds
// above 29 need not hold at 29 or above.
func (w *work) own(side cutoff.Side, i int) bool {
	return w.scale.Step > 0 || side.Strict() == (i%2 == 1)
}

// extend adds a trusted threshold to the last stretch when it goes on, or
// starts a new one.
func extend(stretches []Stretch, at float64, trivial, goesOn bool) []Stretch {
	if last := len(stretches) - 1; goesOn && stretches[last].Trivial == trivial {
		stretches[last].To = at
		return stretches
	}
	return append(stretches, Stretch{From: at, To: at, Trivial: trivial})
}

// worst is the first of the largest gaps: sweeps of two sides can mirror each
// other up to rounding.
func worst(sweeps []Sweep, step bool) Worst {
	const rounding = 1e-9
	var w Worst
	largest := -1.0
	for _, s := range sweeps {
		for i, points := range s.GapPoints {
			if size := math.Abs(points); size > largest+rounding {
				largest = size
				w = Worst{Side: s.Side, Threshold: s.Threshold[i], GapPoints: points}
				if !step {
					w.Side = besides(s.Side, i%2 == 1)
				}
			}
		}
	}
	return w
}

// besides is the side that parts the people at the score itself, or just past
// it, on a scale without a step, where a sweep shows both.
func besides(side cutoff.Side, past bool) cutoff.Side {
	switch {
	case side.Lower() && past:
		return cutoff.AtMost
	case side.Lower():
		return cutoff.Below
	case past:
		return cutoff.Above
	}
	return cutoff.AtLeast
}
