package words

import (
	"math"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
)

// SideName says a side without its threshold: "at or above", "below".
func SideName(side cutoff.Side) string {
	switch side {
	case cutoff.AtLeast:
		return "at or above"
	case cutoff.Above:
		return "above"
	case cutoff.AtMost:
		return "at or below"
	case cutoff.Below:
		return "below"
	}
	return "between"
}

// Trusted says where the curve can be trusted on one sweep, a sentence for
// each stretch; empty without a tolerance.
func Trusted(q ask.Question, r ask.Result, s ask.Sweep) []string {
	if q.TooHigh == nil && q.TooLow == nil {
		return nil
	}
	var sentences []string
	anywhere := false
	for _, stretch := range s.Trusted {
		if stretch.Trivial {
			sentences = append(sentences, trivial(q, s, stretch))
			continue
		}
		anywhere = true
		sentences = append(sentences, place(stretch, s.Side)+" the curve is within the tolerance"+whatever(stretch, s)+".")
	}
	switch {
	case anywhere:
		return sentences
	case len(sentences) == 0:
		return []string{"Nowhere on this scale (" + SideName(s.Side) + ") can the curve be trusted at this tolerance."}
	}
	nowhere := "Nowhere on this scale (" + SideName(s.Side) + ") where there are people enough to matter can the curve be trusted at this tolerance."
	return append([]string{nowhere}, sentences...)
}

// whatever says of how many thresholds a stretch is made.
func whatever(stretch ask.Stretch, s ask.Sweep) string {
	switch {
	case stretch.From == stretch.To:
		return ""
	case s.Thinned:
		return " at every threshold looked at"
	}
	return ", whatever threshold is taken"
}

func place(stretch ask.Stretch, side cutoff.Side) string {
	if stretch.From == stretch.To {
		return "At " + Number(stretch.From) + " (" + SideName(side) + ")"
	}
	return "From " + Number(stretch.From) + " to " + Number(stretch.To) + " (" + SideName(side) + ")"
}

// trivial words a stretch that is inside the tolerance only because there are
// too few people beyond it, or short of it, for a miss to show in points.
func trivial(q ask.Question, s ask.Sweep, stretch ask.Stretch) string {
	few := fewPeople(s, stretch)
	text := place(stretch, s.Side) + ": "
	if q.TooHigh != nil && q.TooLow != nil {
		text += "too few people " + few.where() + " to matter at "
	} else { // one of the two shares may be large
		text += "too small a share " + few.where() + " to miss by more than "
	}
	text += within(q.TooHigh, q.TooLow)
	switch {
	case !few.counted:
		return text + "; none were counted."
	case few.ratio >= 5 || few.ratio <= 0.2:
		text += "; the curve is " + ratio(few.ratio)
	default:
		text += "; " + ratio(few.ratio)
	}
	if stretch.From != stretch.To {
		text += " at worst"
	}
	return text + "."
}

// few is what is known of the few people beyond the thresholds of a stretch,
// or on the other side of them where most people are beyond.
type few struct {
	here, opposite bool    // where they are; both in a stretch that spans the middle
	counted        bool    // anybody was counted
	ratio          float64 // of the curve's share to the counted one, furthest from 1
}

func fewPeople(s ask.Sweep, stretch ask.Stretch) few {
	var f few
	furthest := -1.0
	for i, threshold := range s.Threshold {
		if threshold < stretch.From || threshold > stretch.To {
			continue
		}
		curve, count := s.CurveShare[i], s.CountedShare[i]
		if count <= 0.5 {
			f.here = true
		} else {
			f.opposite = true
			curve, count = 1-curve, 1-count
		}
		if count <= 0 {
			continue
		}
		if far := math.Abs(math.Log(curve / count)); far > furthest {
			f.counted, f.ratio, furthest = true, curve/count, far
		}
	}
	return f
}

func (f few) where() string {
	switch {
	case f.here && f.opposite:
		return "here or on the other side"
	case f.opposite:
		return "on the other side"
	}
	return "here"
}

// Worst says where the gap is largest: "The gap is largest at 30 or above:
// too low by 8.9 points."; empty when no sweep was made.
func Worst(r ask.Result) string {
	if len(r.Sweeps) == 0 {
		return ""
	}
	at := cutoff.Cutoff{Side: r.Worst.Side, At: r.Worst.Threshold}
	return "The gap is largest " + at.Words() + ": " + Gap(r.Worst.GapPoints) + "."
}
