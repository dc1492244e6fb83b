package figure

import (
	"math"
	"slices"

	"tailgap/core/ask"
)

// plot is a figure in the making: a canvas and what its parts share.
type plot struct {
	canvas
	options     Options
	frame       Frame
	size        float64 // of the text
	height      float64 // of the whole figure
	top, bottom float64 // of the plotted field, px
	low, high   float64 // the values that stand at bottom and top
}

func newPlot(r ask.Result, o Options) *plot {
	return &plot{canvas: canvas{prefix: o.prefix()}, options: o, frame: SweepFrame(r, o), size: o.textSize()}
}

// y is where a value stands, in px.
func (p *plot) y(value float64) float64 {
	return p.bottom - (value-p.low)/(p.high-p.low)*(p.bottom-p.top)
}

// layOut gives the plotted field its place: under a head of so many px and
// over the axis, wide or small px high unless the options ask for a height,
// and never less than least.
func (p *plot) layOut(head, wide, small, least float64) {
	under := axisRow + titleRow + 4
	field := wide
	if p.options.small() {
		field = small
	}
	if p.options.Height > 0 {
		field = max(least, float64(p.options.Height)-head-under)
	}
	p.top, p.bottom, p.height = head, head+field, head+field+under
	p.raw(`<clipPath id="`)
	p.escape(p.prefix + "-field")
	p.raw(`"><rect`)
	p.attribute("x", p.frame.Left)
	p.attribute("y", p.top)
	p.attribute("width", p.frame.Right-p.frame.Left)
	p.attribute("height", p.bottom-p.top)
	p.raw(`/></clipPath>`)
}

// clipped draws what is seen only where it lies in the plotted field.
func (p *plot) clipped(draw func()) {
	p.raw(`<g clip-path="url(#`)
	p.escape(p.prefix + "-field")
	p.raw(`)">`)
	draw()
	p.raw("</g>")
}

// along is the line of a value over a sweep's thresholds. On a scale with a
// step each score has a tread of its own, because nothing lies between two
// scores; without one the thresholds are joined, and the jump at each score
// is there because each stands twice.
func (p *plot) along(r ask.Result, thresholds, values []float64) []point {
	if len(values) != len(thresholds) {
		return nil
	}
	if r.Sample.Step == nil {
		line := make([]point, len(values))
		for i, t := range thresholds {
			line[i] = point{p.frame.X(t), p.y(values[i])}
		}
		return line
	}
	line := make([]point, 0, 2*len(values))
	for i := range thresholds {
		left, right := tread(thresholds, i, *r.Sample.Step)
		y := p.y(values[i])
		line = append(line, point{p.frame.X(left), y}, point{p.frame.X(right), y})
	}
	return line
}

// tread is the stretch of a scale that belongs to one of its scores: half a
// step on both sides.
func tread(thresholds []float64, i int, step float64) (left, right float64) {
	left, right = thresholds[i]-step/2, thresholds[i]+step/2
	if i > 0 {
		left = thresholds[i-1]/2 + thresholds[i]/2
	}
	if i < len(thresholds)-1 {
		right = thresholds[i]/2 + thresholds[i+1]/2
	}
	return left, right
}

// scoreAxis draws the scores along the bottom, and under them the axis'
// title, off the poles if it can. Both stand before the poles, on ground of
// their own.
func (p *plot) scoreAxis(step *float64, title string, poles []float64) {
	values, labels := scoreTicks(p.frame, step, p.size, p.options.width())
	for i, value := range values {
		x := p.frame.X(value)
		p.line("zero", x, p.bottom, x, p.bottom+4)
		if labels[i] != "" {
			p.text("halo", "middle", x, p.bottom+8+p.size, labels[i])
		}
	}
	p.line("zero", p.frame.Left, p.bottom, p.frame.Right, p.bottom)
	title = shorten(title, p.size, p.frame.Right-p.frame.Left)
	p.text("halo soft", "start", p.titleAt(textWidth(title, p.size), poles), p.bottom+axisRow+p.size, title)
}

// titleAt is where a title begins: as far right as no pole stands in it.
func (p *plot) titleAt(width float64, poles []float64) float64 {
	const columns = 12
	right := p.frame.Right - width
	for i := range columns {
		x := right - (right-p.frame.Left)*float64(i)/(columns-1)
		if !slices.ContainsFunc(poles, func(pole float64) bool { return pole > x-6 && pole < x+width+6 }) {
			return x
		}
	}
	return right
}

// Heights in px of what stands under the plotted field.
const (
	axisRow  = 26.0 // the scores
	titleRow = 20.0 // the axis' title
)

// valueAxis draws the grid and its figures on the left; it returns where the
// lines are.
func (p *plot) valueAxis(label func(float64) string) (lines []float64) {
	most := int(max(2, math.Round((p.bottom-p.top)/44)))
	for _, value := range ticks(p.low, p.high, most, 0) {
		y := p.y(value)
		if value != 0 {
			p.line("grid", p.frame.Left, y, p.frame.Right, y)
		}
		p.text("", "end", p.frame.Left-8, y+0.35*p.size, label(value))
		lines = append(lines, y)
	}
	return lines
}
