package figure

import (
	"math"
	"slices"

	"tailgap/core/ask"
	"tailgap/core/words"
)

// labels names what is drawn where it is drawn. Each label looks for a place
// where it touches nothing and is left out where there is none; only the two
// directions are always told, over the axis if need be.
func (d *sweepDrawing) labels() {
	p := d.room()
	title, tooHigh, tooLow := "gap in points", "curve too high ↑", "curve too low ↓"
	if d.options.small() {
		tooHigh, tooLow = "too high ↑", "too low ↓"
	}
	high, highFits := p.place(textWidth(tooHigh, d.size), d.spots(tooHigh, func(left, right float64) []float64 {
		return []float64{d.top + d.size + 2, d.top + d.size + 12, d.top + d.size + 22, d.y(0) - 8}
	}))
	low, lowFits := p.place(textWidth(tooLow, d.size), d.spots(tooLow, func(left, right float64) []float64 {
		return []float64{d.bottom - 6, d.bottom - 16, d.bottom - 26, d.y(0) + d.size + 5}
	}))
	if highFits && lowFits {
		d.text("", "start", high.x, high.y, tooHigh)
		d.text("", "start", low.x, low.y, tooLow)
	} else {
		title = "gap in points: ↑ too high, ↓ too low"
	}
	d.text("soft", "start", 4, d.size+2, title)
	d.bandLabel(p)
	d.toleranceLabel(p)
	d.trustedLabel(p, false, "trusted")
	d.trustedLabel(p, true, "too few to matter")
}

// room is a placer that knows everything drawn so far.
func (d *sweepDrawing) room() *placer {
	f := d.frame
	d.bandSky = [2]skyline{newSkyline(f, d.bandLow), newSkyline(f, d.bandHigh)}
	d.limitSky = [2]skyline{newSkyline(f, d.limitLow), newSkyline(f, d.limitHigh)}
	p := &placer{size: d.size, field: box{f.Left + 2, d.top - 2, f.Right + rightSmall, d.bottom + 1},
		lines: d.grid, avoid: []skyline{newSkyline(f, d.gap)},
		rather: []skyline{d.bandSky[0], d.bandSky[1], d.limitSky[0], d.limitSky[1]}}
	zero := d.y(0)
	p.taken = append(p.taken, box{f.Left, zero - 1, f.Right, zero + 1})
	for _, x := range d.poles() {
		p.taken = append(p.taken, box{x - 7, d.top, x + 7, d.bottom})
	}
	for _, t := range d.s.Trusted {
		p.taken = append(p.taken, d.trustedBox(t))
	}
	for _, finding := range d.r.Cutoffs {
		if len(ends(finding.Cutoff)) == 2 {
			from, to := d.spanOf(finding.Cutoff)
			y := d.y(finding.GapPoints)
			p.taken = append(p.taken, box{from, y - 2, to, y + 2}, box{(from+to)/2 - 7, d.top, (from+to)/2 + 7, d.bottom})
		}
	}
	return p
}

// spots lists places for a label: from the left to the right of the frame at
// the first of the heights that at gives, then at the second, and so on.
func (d *sweepDrawing) spots(label string, at func(left, right float64) []float64) []point {
	const columns = 14
	width := textWidth(label, d.size)
	first, last := d.frame.Left+6, d.frame.Right-width-2
	var ranks [4][]point
	for i := range columns {
		x := first + (last-first)*float64(i)/(columns-1)
		for rank, y := range at(x-5, x+width+5) {
			ranks[rank] = append(ranks[rank], point{x, y})
		}
	}
	return slices.Concat(ranks[:]...)
}

// bandLabel stands inside the band where it is thick, else along its edges.
func (d *sweepDrawing) bandLabel(p *placer) {
	if d.bandHigh == nil || d.bandLow == nil {
		return
	}
	label := words.Level(d.q.Level) + " band"
	lowest, _ := extent(d.s.BandLow)
	if _, highest := extent(d.s.BandHigh); highest > d.high || lowest < d.low { // it leaves the picture
		label += ", " + signed(math.Round(lowest)) + " to " + signed(math.Round(highest))
	}
	lower, upper := d.bandSky[0], d.bandSky[1]
	spot, found := p.place(textWidth(label, d.size), d.spots(label, func(left, right float64) []float64 {
		above, under := upper.at(left, right)
		_, below := lower.at(left, right)
		return []float64{max(under, d.top) + d.size + 1, above - 6, below + d.size + 3}
	}))
	if found {
		d.text("plum", "start", spot.x, spot.y, label)
	}
}

// toleranceLabel stands inside the corridor where it is high enough, else
// along its edges.
func (d *sweepDrawing) toleranceLabel(p *placer) {
	if d.limitHigh == nil && d.limitLow == nil {
		return
	}
	const label = "tolerance"
	lower, upper := d.limitSky[0], d.limitSky[1]
	spot, found := p.place(textWidth(label, d.size), d.spots(label, func(left, right float64) []float64 {
		var at []float64
		if d.limitHigh != nil {
			top, bottom := upper.at(left, right)
			at = append(at, max(bottom, d.top)+d.size+1, top-5)
		}
		if d.limitLow != nil {
			top, bottom := lower.at(left, right)
			at = append(at, min(top, d.bottom)-5, bottom+d.size+3)
		}
		return at
	}))
	if found {
		d.text("", "start", spot.x, spot.y, label)
	}
}

// trustedLabel names the longest trusted stretch of its kind.
func (d *sweepDrawing) trustedLabel(p *placer, trivial bool, label string) {
	var longest *ask.Stretch
	for i, t := range d.s.Trusted {
		if t.Trivial == trivial && (longest == nil || t.To-t.From > longest.To-longest.From) {
			longest = &d.s.Trusted[i]
		}
	}
	if longest == nil {
		return
	}
	b := d.trustedBox(*longest)
	width := textWidth(label, d.size)
	var spots []point
	for _, x := range [...]float64{(b.left + b.right - width) / 2, b.left, b.right - width, b.left - width/2, b.right - width/2} {
		spots = append(spots, point{x, b.top - 6}, point{x, b.bottom + d.size + 4})
	}
	if spot, found := p.place(width, spots); found {
		d.text("", "start", spot.x, spot.y, label)
	}
}
