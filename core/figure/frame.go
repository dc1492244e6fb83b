package figure

import (
	"tailgap/core/ask"
)

// Frame is the scale along the bottom of a figure: scores Low..High stand at
// Left..Right px.
type Frame struct {
	Left, Right float64
	Low, High   float64
}

// Space at the sides: the gap's figures stand on the left.
const (
	leftWide, rightWide   = 58.0, 20.0
	leftSmall, rightSmall = 46.0, 12.0
)

// reach is how far outside the scores a cutoff may lie, as a part of their
// range, and still be drawn where it stands; beyond, it is pinned to the edge.
const reach = 0.25

// SweepFrame is the frame of a result's figures, the same for all of them at
// one width, so that they stand under each other. It holds the scale's ends
// (with half a step of room), the scores and the cutoffs near them.
func SweepFrame(r ask.Result, o Options) Frame {
	low := min(r.Sample.Low, r.Sample.Min)
	high := max(r.Sample.High, r.Sample.Max)
	span := high - low
	near := func(x float64) bool { return x >= low-reach*span && x <= high+reach*span }
	lowest, highest := low, high
	take := func(x float64) {
		if near(x) {
			lowest, highest = min(lowest, x), max(highest, x)
		}
	}
	for _, f := range r.Cutoffs {
		for _, end := range ends(f.Cutoff) {
			take(end)
		}
	}
	for _, s := range r.Sweeps {
		if n := len(s.Threshold); n > 0 {
			take(s.Threshold[0])
			take(s.Threshold[n-1])
		}
	}
	room := 0.01 * span
	if r.Sample.Step != nil {
		room = *r.Sample.Step / 2
	}
	if !(room > 0) {
		room = 0.5
	}
	f := Frame{Left: leftWide, Right: o.width() - rightWide, Low: lowest - room, High: highest + room}
	if o.small() {
		f.Left, f.Right = leftSmall, o.width()-rightSmall
	}
	return f
}

// X is where a threshold stands, in px.
func (f Frame) X(threshold float64) float64 {
	// Halves, because the difference of two huge scores could overflow.
	return f.Left + (threshold/2-f.Low/2)/(f.High/2-f.Low/2)*(f.Right-f.Left)
}

// Score is the threshold that stands at a px.
func (f Frame) Score(px float64) float64 {
	part := (px - f.Left) / (f.Right - f.Left)
	return f.Low*(1-part) + f.High*part
}

// pin is X, kept inside the frame; out says on which side the threshold lies
// outside: -1, 0 or 1.
func (f Frame) pin(threshold float64) (x float64, out int) {
	switch {
	case threshold < f.Low:
		return f.Left, -1
	case threshold > f.High:
		return f.Right, 1
	}
	return f.X(threshold), 0
}
