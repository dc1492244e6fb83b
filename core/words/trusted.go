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
		sentences = append(sentences, place(stretch, s.Side)+" the curve is within the tolerance, whatever threshold is taken.")
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

func place(stretch ask.Stretch, side cutoff.Side) string {
	if stretch.From == stretch.To {
		return "At " + Number(stretch.From) + " (" + SideName(side) + ")"
	}
	return "From " + Number(stretch.From) + " to " + Number(stretch.To) + " (" + SideName(side) + ")"
}

// trivial words a stretch that is inside the tolerance only because there are
// too few people beyond it, or short of it, for a miss to show in points.
func trivial(q ask.Question, s ask.Sweep, stretch ask.Stretch) string {
	worst, known, beyond := worstRatio(s, stretch)
	text := place(stretch, s.Side) + ": too few people "
	if beyond {
		text += "here"
	} else {
		text += "on the other side"
	}
	text += " to matter at " + within(q.TooHigh, q.TooLow)
	if !known {
		return text + "; none were counted."
	}
	if worst >= 5 || worst <= 0.2 {
		text += "; the curve is " + ratio(worst)
	} else {
		text += "; " + ratio(worst)
	}
	if stretch.From != stretch.To {
		text += " at worst"
	}
	return text + "."
}

// worstRatio is the ratio of the curve's share to the counted one, furthest
// from 1 over the stretch. Where most people are beyond the threshold
// (beyond is false), it is the ratio of the shares on the other side. known is
// false where nobody was counted.
func worstRatio(s ask.Sweep, stretch ask.Stretch) (worst float64, known, beyond bool) {
	beyond = true
	furthest := -1.0
	for i, threshold := range s.Threshold {
		if threshold < stretch.From || threshold > stretch.To || i >= len(s.CurveShare) || i >= len(s.CountedShare) {
			continue
		}
		curve, count := s.CurveShare[i], s.CountedShare[i]
		beyond = count <= 0.5
		if !beyond {
			curve, count = 1-curve, 1-count
		}
		if count <= 0 {
			continue
		}
		if far := math.Abs(math.Log(curve / count)); far > furthest {
			worst, known, furthest = curve/count, true, far
		}
	}
	return worst, known, beyond
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
