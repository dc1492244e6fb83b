package figure

import (
	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/words"
)

// Sweep draws the gap at every threshold of one side: the gap with its band,
// the tolerance as a corridor about zero, the trusted stretches on the zero
// line and the cutoffs as full-height grips. Cutoffs of other sides stand
// dashed, without a gap, since they have a sweep of their own. Its scale is
// SweepFrame's.
func Sweep(q ask.Question, r ask.Result, s ask.Sweep, o Options) string {
	return drawSweep(q, r, s, o).document(o)
}

func drawSweep(q ask.Question, r ask.Result, s ask.Sweep, o Options) drawing {
	s = whole(s)
	p := newPlot(r, o)
	laid, rows := flags(r, s.Side, p.frame, p.size)
	underFlags := 4 + p.size + 6 + float64(rows)*flagRow // the axis' title stands over the flags, where no pole is
	p.layOut(underFlags+10, 300, 220, 140)
	limits := newCorridor(q, s)
	p.low, p.high = heights(r, s, limits)

	d := &sweepDrawing{plot: p, q: q, r: r, s: s, flags: laid}
	d.gap = p.along(r, s.Threshold, s.GapPoints)
	d.bandHigh = p.along(r, s.Threshold, s.BandHigh)
	d.bandLow = p.along(r, s.Threshold, s.BandLow)
	d.limitHigh = p.along(r, s.Threshold, limits.high)
	d.limitLow = p.along(r, s.Threshold, limits.low)
	d.field()
	for _, l := range laid {
		p.grip(l, underFlags)
	}
	d.line()
	for _, l := range laid {
		p.flag(l, underFlags)
	}
	p.scoreAxis(r.Sample.Step, axisTitle(r, s.Side), d.poles())
	d.labels()
	return drawing{width: o.width(), height: p.height, body: p.String(),
		title: "How far the curve is from the count: " + axisTitle(r, s.Side), description: d.description()}
}

// sweepDrawing is a sweep's plot with the lines it draws.
type sweepDrawing struct {
	*plot
	q     ask.Question
	r     ask.Result
	s     ask.Sweep
	flags []flag

	gap, bandHigh, bandLow, limitHigh, limitLow []point
	grid                                        []float64
	bandSky, limitSky                           [2]skyline // lower and upper
}

// axisTitle says what a threshold means on a sweep.
func axisTitle(r ask.Result, side cutoff.Side) string {
	return words.Name(r.Score) + map[cutoff.Side]string{
		cutoff.AtLeast: ", at this score or above",
		cutoff.Above:   ", above this score",
		cutoff.AtMost:  ", at this score or below",
		cutoff.Below:   ", below this score",
	}[side]
}

// field draws what lies behind the grips: corridor, grid, stretches, band, zero.
func (d *sweepDrawing) field() {
	d.clipped(d.corridor)
	d.grid = d.valueAxis(signed)
	d.clipped(func() {
		for _, f := range d.r.Cutoffs {
			if f.Cutoff.Side == cutoff.Stretch {
				from, to := d.spanOf(f.Cutoff)
				d.rect("span", from, d.top, to-from, d.bottom-d.top)
			}
		}
		d.area("band", d.bandHigh, d.bandLow)
	})
	d.canvas.line("zero", d.frame.Left, d.y(0), d.frame.Right, d.y(0))
}

// corridor shades the tolerance; a side without a limit stays open.
func (d *sweepDrawing) corridor() {
	if len(d.limitHigh) == 0 && len(d.limitLow) == 0 {
		return
	}
	level := func(along []point, y float64) []point {
		return []point{{along[0].x, y}, {along[len(along)-1].x, y}}
	}
	upper, lower := d.limitHigh, d.limitLow
	if upper == nil {
		upper = level(lower, d.top)
	}
	if lower == nil {
		lower = level(upper, d.bottom)
	}
	d.area("corridor", upper, lower)
	d.path("edge", d.limitHigh)
	d.path("edge", d.limitLow)
}

// spanOf is the stretch of the frame that a stretch of scores takes.
func (d *sweepDrawing) spanOf(c cutoff.Cutoff) (from, to float64) {
	from, _ = d.frame.pin(c.At)
	to, _ = d.frame.pin(c.To)
	return from, to
}

// line draws the trusted stretches, the gap and the cutoffs' own gaps.
func (d *sweepDrawing) line() {
	for _, t := range d.s.Trusted {
		b := d.trustedBox(t)
		class := "trusted"
		if t.Trivial {
			class = "trivial"
		}
		d.rect(class, b.left, b.top, b.right-b.left, b.bottom-b.top)
	}
	class := "gap"
	if len(d.s.Threshold) > 300 {
		class += " thin"
	}
	d.path(class, d.gap)
	for _, f := range d.r.Cutoffs {
		d.cutoffGap(f)
	}
}

// trustedBox is the bar of a trusted stretch, half a step beyond its ends on
// a scale with a step.
func (d *sweepDrawing) trustedBox(t ask.Stretch) box {
	half := 0.0
	if d.r.Sample.Step != nil {
		half = *d.r.Sample.Step / 2
	}
	from, _ := d.frame.pin(t.From - half)
	to, _ := d.frame.pin(t.To + half)
	if to-from < 2 {
		from, to = from-1, to+1
	}
	zero := d.y(0)
	if t.Trivial {
		return box{from + 0.7, zero - 2.5, to - 0.7, zero + 2.5}
	}
	return box{from, zero - 3, to, zero + 3}
}

// cutoffGap draws a cutoff's own gap with its interval: on the pole, or over
// the whole of a stretch.
func (d *sweepDrawing) cutoffGap(f ask.Finding) {
	x, out := d.frame.pin(f.Cutoff.At)
	if !onSweep(f, d.s) || out != 0 && f.Cutoff.Side != cutoff.Stretch {
		return
	}
	y := d.y(f.GapPoints)
	if f.Cutoff.Side == cutoff.Stretch {
		from, to := d.spanOf(f.Cutoff)
		d.canvas.line("over", from, y, to, y)
		x = (from + to) / 2
	}
	if f.GapLow != nil && f.GapHigh != nil {
		top := max(d.y(*f.GapHigh), d.top)
		bottom := min(d.y(*f.GapLow), d.bottom)
		d.canvas.line("whisker", x, top, x, bottom)
		reach := 6.0
		if d.options.small() {
			reach = 4
		}
		if *f.GapHigh <= d.high {
			d.canvas.line("whisker", x-reach, top, x+reach, top)
		}
		if *f.GapLow >= d.low {
			d.canvas.line("whisker", x-reach, bottom, x+reach, bottom)
		}
	}
	d.circle("dot", x, y, 4.5)
}

// description says in sentences what the figure shows.
func (d *sweepDrawing) description() string {
	var parts []string
	for _, f := range d.r.Cutoffs {
		if onSweep(f, d.s) {
			parts = append(parts, words.Sentence(d.q, f))
		}
	}
	parts = append(parts, words.Trusted(d.q, d.r, d.s)...)
	if d.r.Worst.Side == d.s.Side {
		parts = append(parts, words.Worst(d.r))
	}
	return sentences(parts...)
}
