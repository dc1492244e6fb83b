package figure

import (
	"math"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/words"
)

// Worm draws a result's worm plot: a mark for each score at the place where
// the curve expects it, in SDs from the mean, as high over the zero line as
// the score is above that. Between the two limits lie the marks of scores of
// the curve's own. The cutoffs' poles show which part of the worm they are at.
// It is empty where the answer has no worm.
func Worm(q ask.Question, r ask.Result, o Options) string {
	d, ok := drawWorm(q, r, o)
	if !ok {
		return ""
	}
	return d.document(o)
}

// wormDrawing is a worm's plot with the marks and lines it draws.
type wormDrawing struct {
	*plot
	q         ask.Question
	r         ask.Result
	w         ask.Worm
	flags     []flag
	marks     []point
	low, high []point // the limits
}

func drawWorm(q ask.Question, r ask.Result, o Options) (drawing, bool) {
	if r.Shape == nil || !complete(r.Shape.Worm) {
		return drawing{}, false
	}
	p := &plot{canvas: canvas{prefix: o.prefix()}, options: o, size: o.textSize()}
	d := &wormDrawing{plot: p, q: q, r: r, w: r.Shape.Worm}
	p.frame = d.across()
	laid, rows := lay(len(r.Cutoffs), d.flag)
	d.flags = laid
	underFlags := 4 + p.size + 6 + float64(rows)*flagRow
	p.layOut(underFlags+10, 260, 200, 140)
	p.low, p.high = d.heights()
	for i, quantile := range d.w.Quantile {
		x := p.frame.X(quantile)
		d.marks = append(d.marks, point{x, p.y(d.w.Deviation[i])})
		if d.w.Limit != nil {
			d.low, d.high = append(d.low, point{x, p.y(-d.w.Limit[i])}), append(d.high, point{x, p.y(d.w.Limit[i])})
		}
	}
	d.draw(underFlags)
	return drawing{width: o.width(), height: p.height, body: p.String(),
		title: "Worm plot: " + words.Name(r.Score), description: d.description()}, true
}

// complete is true for a worm that has marks, all of them in numbers.
func complete(w ask.Worm) bool {
	n := len(w.Score)
	if n == 0 || len(w.Quantile) != n || len(w.Deviation) != n || len(w.Limit) != n && w.Limit != nil {
		return false
	}
	for _, values := range [...][]float64{w.Quantile, w.Deviation, w.Limit} {
		for _, x := range values {
			if !(math.Abs(x) < 1e300) {
				return false
			}
		}
	}
	return true
}

// across is the frame: standard scores, with all marks and poles in it.
func (d *wormDrawing) across() Frame {
	f := Frame{Left: leftWide, Right: d.options.width() - rightWide}
	if d.options.small() {
		f.Left, f.Right = leftSmall, d.options.width()-rightSmall
	}
	f.Low, f.High = d.w.Quantile[0], d.w.Quantile[len(d.w.Quantile)-1]
	for _, c := range d.r.Shape.Cutoffs {
		for _, quantile := range [...]*float64{c.Quantile, c.QuantileTo} {
			if quantile != nil {
				f.Low, f.High = min(f.Low, *quantile), max(f.High, *quantile)
			}
		}
	}
	room := max(0.1, 0.04*(f.High-f.Low))
	f.Low, f.High = f.Low-room, f.High+room
	return f
}

// poles are the px at which the i-th cutoff's ends part the worm, and for the
// first of them on which side of the frame it lies outside.
func (d *wormDrawing) poles(i int) (at []float64, out int) {
	if i >= len(d.r.Shape.Cutoffs) {
		return []float64{d.frame.Right}, 1
	}
	c, f := d.r.Shape.Cutoffs[i], d.r.Cutoffs[i]
	if c.Quantile != nil {
		at = append(at, d.frame.X(*c.Quantile))
	}
	if c.QuantileTo != nil {
		at = append(at, d.frame.X(*c.QuantileTo))
	}
	// Nobody beyond an upper cutoff, or short of a lower one, is all the
	// people below it.
	switch allBelow := (f.Counted == 0) != f.Cutoff.Side.Lower(); {
	case at != nil:
		return at, 0
	case f.Cutoff.Side == cutoff.Stretch && f.Cutoff.To < d.r.Sample.Min, f.Cutoff.Side != cutoff.Stretch && !allBelow:
		return []float64{d.frame.Left}, -1
	case f.Cutoff.Side == cutoff.Stretch && f.Counted > 0:
		return []float64{d.frame.Left}, 0
	}
	return []float64{d.frame.Right}, 1
}

func (d *wormDrawing) flag(i, style int) flag {
	at, out := d.poles(i)
	return flagAt(i, d.r.Cutoffs[i], false, at[0], out, d.frame, d.size, style)
}

// heights is the extent of the figure: all marks, and the limits where they
// are no farther off than the marks by much.
func (d *wormDrawing) heights() (low, high float64) {
	low, high = extent(d.w.Deviation)
	base := max(0.05, -low, high)
	for _, limit := range d.w.Limit {
		reach := min(limit, 1.5*base)
		low, high = min(low, -reach), max(high, reach)
	}
	low, high = min(low, -base/4), max(high, base/4)
	room := 0.1 * (high - low)
	return low - room, high + room
}

func (d *wormDrawing) draw(underFlags float64) {
	grid := d.valueAxis(signed)
	d.clipped(func() {
		d.area("limits", d.high, d.low)
		d.path("limit", d.high)
		d.path("limit", d.low)
	})
	d.line("zero", d.frame.Left, d.y(0), d.frame.Right, d.y(0))
	for _, l := range d.flags {
		d.pole(l, underFlags)
	}
	d.path("link", d.marks)
	radius := 3.0
	if len(d.marks) > 100 || d.options.small() {
		radius = 2
	}
	for _, mark := range d.marks {
		d.circle("beyond", mark.x, mark.y, radius)
	}
	for _, l := range d.flags {
		d.plot.flag(l, underFlags)
	}
	d.quantileAxis()
	d.labels(grid)
}

// pole draws a cutoff's poles down to the axis; dashed at the edge, where all
// people are on one side.
func (d *wormDrawing) pole(l flag, underFlags float64) {
	at, out := d.poles(l.index)
	class := "pole"
	if l.index == d.options.Selected {
		class += " selected"
	}
	if out != 0 {
		class += " aside"
	}
	d.line(class, l.pole, d.flagTop(l, underFlags)+flagHeight, l.pole, d.bottom)
	for _, x := range at[1:] {
		d.line(class, x, d.top, x, d.bottom)
	}
}

// quantileAxis draws the standard scores along the bottom.
func (d *wormDrawing) quantileAxis() {
	values, labels := scoreTicks(d.frame, nil, d.size, d.options.width())
	for i, value := range values {
		x := d.frame.X(value)
		d.line("zero", x, d.bottom, x, d.bottom+4)
		if labels[i] != "" {
			d.text("halo", "middle", x, d.bottom+8+d.size, labels[i])
		}
	}
	d.line("zero", d.frame.Left, d.bottom, d.frame.Right, d.bottom)
	title := words.Name(d.r.Score) + ": where the curve expects each score, in SDs from the mean"
	if d.options.small() {
		title = "where the curve expects a score, in SDs"
	}
	title = shorten(title, d.size, d.frame.Right-d.frame.Left)
	d.text("halo soft", "end", d.frame.Right, d.bottom+axisRow+d.size, title)
}

// labels names the directions and the limits where they touch nothing.
func (d *wormDrawing) labels(grid []float64) {
	p := &placer{size: d.size, field: box{d.frame.Left + 2, d.top - 2, d.frame.Right + rightSmall, d.bottom + 1}, lines: grid,
		avoid: []skyline{newSkyline(d.frame, d.marks)}, rather: []skyline{newSkyline(d.frame, d.low), newSkyline(d.frame, d.high)}}
	p.taken = append(p.taken, box{d.frame.Left, d.y(0) - 1, d.frame.Right, d.y(0) + 1})
	for _, mark := range d.marks {
		p.taken = append(p.taken, box{mark.x - 4, mark.y - 4, mark.x + 4, mark.y + 4})
	}
	for i := range d.r.Cutoffs {
		at, _ := d.poles(i)
		for _, x := range at {
			p.taken = append(p.taken, box{x - 4, d.top, x + 4, d.bottom})
		}
	}
	higher, lower := "scores higher than the curve has them ↑", "scores lower than the curve has them ↓"
	if d.options.small() {
		higher, lower = "scores too high ↑", "scores too low ↓"
	}
	up, upFits := p.place(textWidth(higher, d.size), d.spots(higher, d.top+d.size+2, d.top+d.size+12, d.top+d.size+22, d.top+d.size+32, d.y(0)-8))
	down, downFits := p.place(textWidth(lower, d.size), d.spots(lower, d.bottom-6, d.bottom-16, d.bottom-26, d.bottom-36, d.y(0)+d.size+5))
	title := "SDs off the curve"
	if upFits && downFits {
		d.text("", "start", up.x, up.y, higher)
		d.text("", "start", down.x, down.y, lower)
	} else {
		title += ": ↑ higher, ↓ lower"
	}
	d.text("soft", "start", 4, d.size+2, title)
	if d.high == nil {
		return
	}
	limit, sky := words.Level(d.q.Level)+" limits", newSkyline(d.frame, d.high)
	width := textWidth(limit, d.size)
	var spots []point
	for _, spot := range d.spots(limit, 0) {
		if start, _ := sky.at(spot.x, spot.x); math.IsInf(start, 0) { // before the first mark
			continue
		}
		top, bottom := sky.at(spot.x, spot.x+width)
		spots = append(spots, point{spot.x, max(bottom, d.top) + d.size + 2}, point{spot.x, top - 5})
	}
	if spot, found := p.place(width, spots); found {
		d.text("plum", "start", spot.x, spot.y, limit)
	}
}

// spots lists places for a label from the left to the right of the frame, at
// each of the heights.
func (d *wormDrawing) spots(label string, heights ...float64) []point {
	const columns = 14
	first, last := d.frame.Left+6, d.frame.Right-textWidth(label, d.size)-2
	var all []point
	for _, y := range heights {
		for i := range columns {
			all = append(all, point{first + (last-first)*float64(i)/(columns-1), y})
		}
	}
	return all
}

// description says in sentences what the figure shows.
func (d *wormDrawing) description() string {
	return sentences(append([]string{words.ReadWorm()}, words.Worm(d.q, d.r)...)...)
}
