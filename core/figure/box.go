package figure

import "math"

// box is a rectangle that something takes up.
type box struct{ left, top, right, bottom float64 }

func (b box) overlaps(other box) bool {
	return b.left < other.right && other.left < b.right && b.top < other.bottom && other.top < b.bottom
}

// columnWidth is how many px of a skyline are looked at together.
const columnWidth = 4

// skyline is what a drawn line takes up in each column of pixels.
type skyline struct {
	first       int // the column of top[0]
	top, bottom []float64
}

// newSkyline runs over a line whose points go from left to right.
func newSkyline(f Frame, line []point) skyline {
	s := skyline{first: column(f.Left)}
	n := max(0, column(f.Right)-s.first+1)
	s.top, s.bottom = make([]float64, n), make([]float64, n)
	for i := range n {
		s.top[i], s.bottom[i] = math.Inf(1), math.Inf(-1)
	}
	for i := 1; i < len(line); i++ {
		s.add(line[i-1], line[i])
	}
	return s
}

func column(x float64) int { return int(x / columnWidth) }

// add takes in the line from a to b.
func (s skyline) add(a, b point) {
	slope := 0.0
	if b.x-a.x > 1e-6 {
		slope = (b.y - a.y) / (b.x - a.x)
	}
	last := min(column(b.x)-s.first, len(s.top)-1)
	for i := max(column(a.x)-s.first, 0); i <= last; i++ {
		from, to := a.y, b.y
		if left := float64((s.first + i) * columnWidth); slope != 0 {
			from = a.y + slope*(max(left, a.x)-a.x)
			to = a.y + slope*(min(left+columnWidth, b.x)-a.x)
		}
		s.top[i] = min(s.top[i], from, to)
		s.bottom[i] = max(s.bottom[i], from, to)
	}
}

// at is the line's extent over the columns left..right; top > bottom where
// there is no line.
func (s skyline) at(left, right float64) (top, bottom float64) {
	top, bottom = math.Inf(1), math.Inf(-1)
	last := min(column(right)-s.first, len(s.top)-1)
	for i := max(column(left)-s.first, 0); i <= last; i++ {
		top, bottom = min(top, s.top[i]), max(bottom, s.bottom[i])
	}
	return top, bottom
}

func (s skyline) crosses(b box) bool {
	top, bottom := s.at(b.left, b.right)
	return top < b.bottom && bottom > b.top
}

// placer finds room for labels among what is drawn.
type placer struct {
	field  box       // where labels may stand
	taken  []box     // by marks and labels
	avoid  []skyline // lines that no label is written over
	rather []skyline // lines that a label keeps off if it can
	lines  []float64 // level lines, likewise
	size   float64   // of the text
}

// ascent and descent of text as parts of its size.
const ascent, descent = 0.78, 0.24

// place takes the first spot (left end of the baseline) where a label touches
// nothing, else the first where it touches only lines it would rather avoid.
func (p *placer) place(width float64, spots []point) (point, bool) {
	for _, strict := range [...]bool{true, false} {
		for _, spot := range spots {
			b := box{spot.x - 3, spot.y - ascent*p.size - 2, spot.x + width + 3, spot.y + descent*p.size + 2}
			if p.free(b, strict) {
				p.taken = append(p.taken, b)
				return spot, true
			}
		}
	}
	return point{}, false
}

func (p *placer) free(b box, strict bool) bool {
	inside := b.left >= p.field.left && b.right <= p.field.right && b.top >= p.field.top && b.bottom <= p.field.bottom
	if !inside { // a spot that isn't a number is inside nothing
		return false
	}
	for _, other := range p.taken {
		if b.overlaps(other) {
			return false
		}
	}
	for _, line := range p.avoid {
		if line.crosses(b) {
			return false
		}
	}
	if strict {
		for _, y := range p.lines {
			if b.top+2 < y && y < b.bottom-2 {
				return false
			}
		}
		for _, line := range p.rather {
			if line.crosses(b) {
				return false
			}
		}
	}
	return true
}
