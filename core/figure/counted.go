package figure

import (
	"cmp"
	"slices"

	"tailgap/core/ask"
	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/words"
)

// Counted draws the counted scores as bars against the curve, scaled to the
// same area, for one cutoff; what is beyond the cutoff is marked in both. Its
// scale is SweepFrame's, so that it can stand under a sweep.
func Counted(q ask.Question, r ask.Result, f ask.Finding, o Options) string {
	return drawCounted(q, r, f, o).document(o)
}

// countedDrawing is the plot of one cutoff's counted scores.
type countedDrawing struct {
	*plot
	r       ask.Result
	f       ask.Finding
	bars    []bin
	width   float64 // of a bar, as a score
	curve   []point
	heading [][]span // what is written over the figure, in lines
	// What is beyond the cutoff, by the count and by the curve.
	countFrom, countTo, curveFrom, curveTo float64
}

func drawCounted(q ask.Question, r ask.Result, f ask.Finding, o Options) drawing {
	p := newPlot(r, o)
	d := &countedDrawing{plot: p, r: r, f: f}
	d.heading = d.shares()
	p.layOut(float64(len(d.heading))*(p.size+5)+p.size+12, 170, 130, 100)
	d.bars, d.width = bins(r, newCounting(r, sweepFor(r, f)), f.Cutoff, p.frame)
	at := splits(r, f.Cutoff)
	d.countFrom, d.countTo = beyond(f.Cutoff, at, p.frame)
	if !q.HalfStep {
		at = ends(f.Cutoff)
	}
	d.curveFrom, d.curveTo = beyond(f.Cutoff, at, p.frame)
	d.scale()
	d.draw()
	name := words.Name(r.Score)
	return drawing{width: o.width(), height: p.height, body: p.String(),
		title:       "Counted against curve: " + name + ", " + f.Cutoff.Words(),
		description: sentences(words.Sentence(q, f))}
}

// sweepFor is the sweep from which the counted scores are taken back: one of
// the cutoff's side, or else any, since all count the same people.
func sweepFor(r ask.Result, f ask.Finding) ask.Sweep {
	for _, s := range r.Sweeps {
		if s.Side == f.Cutoff.Side {
			return whole(s)
		}
	}
	if len(r.Sweeps) > 0 {
		return whole(r.Sweeps[0])
	}
	return ask.Sweep{}
}

// tallest is how many times as high as the highest bar the curve may be
// drawn: a narrow curve that was given would press the bars flat.
const tallest = 3.0

// scale gives the figure its height in shares of people.
func (d *countedDrawing) scale() {
	highest := 0.0
	for _, b := range d.bars {
		highest = max(highest, d.heightOf(b))
	}
	peak := 0.0
	const every = 3.0 // px
	for x := d.frame.Left; x < d.frame.Right+every; x += every {
		peak = max(peak, d.density(d.frame.Score(min(x, d.frame.Right))))
	}
	if highest > 0 {
		peak = min(peak, tallest*highest)
	}
	d.low, d.high = 0, 1.06*max(highest, peak)
	if !(d.high > 0) {
		d.high = 1
	}
	d.curve = d.curveOver(d.frame.Low, d.frame.High, every)
}

// heightOf is a bar's height: its share, or the share it would have if it were
// as wide as the others, so that areas can be compared. A bar of less than a
// tenth (a short stretch, or a single score) counts as a tenth.
func (d *countedDrawing) heightOf(b bin) float64 {
	return b.share * d.width / max(b.to-b.from, d.width/10)
}

// density is the curve's share in a bar's width about a score.
func (d *countedDrawing) density(score float64) float64 {
	z := (score - d.r.Curve.Mean) / d.r.Curve.SD
	if density := d.width / d.r.Curve.SD * curve.Density(z); density >= 0 {
		return density
	}
	return 0 // an SD that is no SD
}

// curveOver is the curve over a part of the frame, a point for so many px.
func (d *countedDrawing) curveOver(from, to, every float64) []point {
	if !(to > from) {
		return nil
	}
	left, right := d.frame.X(from), d.frame.X(to)
	var line []point
	for x := left; x < right; x += every {
		line = append(line, point{x, d.y(d.density(d.frame.Score(x)))})
	}
	return append(line, point{right, d.y(d.density(to))})
}

func (d *countedDrawing) draw() {
	d.valueAxis(func(share float64) string { return words.Number(100*share) + "%" })
	d.clipped(func() {
		for _, b := range d.bars {
			d.bar(b)
		}
		if area := d.curveOver(d.curveFrom, d.curveTo, 3); area != nil {
			d.area("share", area, []point{{area[0].x, d.bottom}, {area[len(area)-1].x, d.bottom}})
		}
		d.path("gap", d.curve)
	})
	d.poles()
	d.scoreAxis(d.r.Sample.Step, words.Name(d.r.Score), nil)
	d.text("halo soft", "start", 4, d.top-8, d.valueTitle())
	d.head()
	d.names()
}

// bar draws one bar, strong where it is beyond the cutoff.
func (d *countedDrawing) bar(b bin) {
	left, right := d.frame.X(b.from), d.frame.X(b.to)
	if d.single() && right-left >= 6 { // bars of a histogram stand side by side
		left, right = left+0.08*(right-left), right-0.08*(right-left)
	}
	if right-left < 1 {
		left, right = left-0.5, right+0.5
	}
	top := d.y(d.heightOf(b))
	class := "bar"
	if middle := b.from/2 + b.to/2; d.countFrom <= middle && middle <= d.countTo {
		class = "beyond"
	}
	d.rect(class, left, top, right-left, d.bottom-top)
	d.path("skyline", []point{{left, d.bottom}, {left, top}, {right, top}, {right, d.bottom}})
}

// poles marks the cutoff where it stands in the sweep.
func (d *countedDrawing) poles() {
	for _, end := range ends(d.f.Cutoff) {
		if x, out := d.frame.pin(end); out == 0 {
			d.line("pole", x, d.top-4, x, d.bottom)
		}
	}
}

// single tells whether each bar is one score of a scale with a step.
func (d *countedDrawing) single() bool {
	step := d.r.Sample.Step
	return step != nil && d.width <= *step*1.001
}

// valueTitle says what the bars' height means.
func (d *countedDrawing) valueTitle() string {
	if d.single() {
		return "share of people at each score"
	}
	return "share of people in each stretch of " + words.Number(d.width)
}

// span is a run of text of one class.
type span struct{ class, text string }

// shares says both shares at the cutoff, on one line if it can.
func (d *countedDrawing) shares() [][]span {
	where := shorten(d.f.Cutoff.Words(), d.size, d.options.width()-8)
	curve := span{"strong plum", "curve " + words.Share(d.f.CurveShare)}
	counted := span{"strong moss", "counted " + words.Share(d.f.CountedShare)}
	together := []span{curve, {"", " · "}, counted}
	if lineWidth(together, d.size) <= d.options.width()-8 {
		return [][]span{{{"", where}}, together}
	}
	return [][]span{{{"", where}}, {curve}, {counted}}
}

func lineWidth(line []span, size float64) float64 {
	sum := 0.0
	for _, s := range line {
		if s.class == "" {
			sum += textWidth(s.text, size)
		} else {
			sum += textWidth(s.text, size*bolder)
		}
	}
	return sum
}

// head writes the shares over the side of the cutoff they belong to.
func (d *countedDrawing) head() {
	width := 0.0
	for _, line := range d.heading {
		width = max(width, lineWidth(line, d.size))
	}
	x, _ := d.frame.pin(d.f.Cutoff.At)
	switch side := d.f.Cutoff.Side; {
	case side == cutoff.Stretch:
		to, _ := d.frame.pin(d.f.Cutoff.To)
		x = (x + to - width) / 2
	case side.Lower():
		x -= width
	}
	x = max(4, min(x, d.options.width()-4-width))
	for i, line := range d.heading {
		d.raw("<text")
		d.attribute("x", x)
		d.attribute("y", float64(i)*(d.size+5)+d.size)
		d.raw(">")
		for _, s := range line {
			if s.class == "" {
				d.escape(s.text)
				continue
			}
			d.raw(`<tspan class="` + s.class + `">`)
			d.escape(s.text)
			d.raw("</tspan>")
		}
		d.raw("</text>")
	}
}

// names writes "curve" at the curve and "counted" at the bars.
func (d *countedDrawing) names() {
	f := d.frame
	var roofs []point
	for _, b := range d.bars {
		y := d.y(d.heightOf(b))
		roofs = append(roofs, point{f.X(b.from), d.bottom}, point{f.X(b.from), y}, point{f.X(b.to), y}, point{f.X(b.to), d.bottom})
	}
	bars, curve := newSkyline(f, roofs), newSkyline(f, d.curve)
	p := &placer{size: d.size, field: box{f.Left + 2, d.top, f.Right + rightSmall, d.bottom}, avoid: []skyline{bars, curve}}
	for _, end := range ends(d.f.Cutoff) {
		if x, out := f.pin(end); out == 0 {
			p.taken = append(p.taken, box{x - 3, d.top, x + 3, d.bottom})
		}
	}
	near := func(line skyline, label, class string) {
		width := textWidth(label, d.size)
		const columns = 24
		var spots []point
		for i := range columns {
			left := f.Left + 6 + (f.Right-f.Left-width-8)*float64(i)/(columns-1)
			top, _ := line.at(left, left+width)
			spots = append(spots, point{left, top - 6})
		}
		// The highest part of the line that leaves room for its name.
		slices.SortStableFunc(spots, func(a, b point) int { return cmp.Compare(a.y, b.y) })
		if spot, found := p.place(width, spots); found {
			d.text(class, "start", spot.x, spot.y, label)
		}
	}
	near(curve, "curve", "halo plum")
	near(bars, "counted", "halo moss")
}
