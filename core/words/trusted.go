package words

import (
	"cmp"
	"math"
	"slices"
	"strings"

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

// Trusted says where the curve can be trusted on one sweep: a sentence for
// where it can, or that it can't, and one for each reason why people are too
// few to tell; empty without a tolerance.
func Trusted(q ask.Question, r ask.Result, s ask.Sweep) []string {
	if q.TooHigh == nil && q.TooLow == nil {
		return nil
	}
	var plain []ask.Stretch
	var others []tooFew
	for _, stretch := range s.Trusted {
		if stretch.Trivial {
			others = joined(others, fewPeople(s, stretch), stretch)
		} else {
			plain = append(plain, stretch)
		}
	}
	judged := judgedBy(q, r, s)
	sentences := []string{nowhere(s, len(others) > 0) + judged}
	if len(plain) > 0 {
		sentences[0] = Capital(places(plain, s.Side)) + " the curve is within the tolerance" + whatever(plain, s) + judged
	}
	for _, other := range others {
		sentences = append(sentences, other.sentence(q, s.Side))
	}
	return sentences
}

func nowhere(s ask.Sweep, few bool) string {
	text := "Nowhere on this scale (" + SideName(s.Side) + ")"
	if few {
		text += " where there are people enough to matter"
	}
	return text + " can the curve be trusted at this tolerance"
}

// judgedBy closes the first sentence by saying why a cutoff's verdict can hold
// where the curve isn't trusted: the band is wider than the interval of one
// cutoff. The sweeps after a result's first one say it more shortly.
func judgedBy(q ask.Question, r ask.Result, s ask.Sweep) string {
	switch band := Level(q.Level) + " band"; {
	case q.Everyone:
		return "."
	case len(r.Sweeps) > 0 && r.Sweeps[0].Side != s.Side:
		return " (judged by the " + band + ")."
	default:
		return " (judged by the " + band + ", which holds for all thresholds at once)."
	}
}

// whatever says of how many thresholds the stretches are made.
func whatever(stretches []ask.Stretch, s ask.Sweep) string {
	switch {
	case !slices.ContainsFunc(stretches, func(t ask.Stretch) bool { return t.From != t.To }):
		return ""
	case s.Thinned:
		return " at every threshold looked at"
	}
	return ", whatever threshold is taken"
}

// How many stretches a sentence names: all of up to mostPlaces, else the
// widest ones.
const (
	mostPlaces   = 8
	widestPlaces = 6
)

// places names stretches: "from 5 to 9, from 11 to 15 and at 20 (at or above)".
func places(stretches []ask.Stretch, side cutoff.Side) string {
	named := stretches
	if len(stretches) > mostPlaces {
		named = widest(stretches, widestPlaces)
	}
	var texts []string
	for _, stretch := range named {
		if stretch.From == stretch.To {
			texts = append(texts, "at "+Number(stretch.From))
		} else {
			texts = append(texts, "from "+Number(stretch.From)+" to "+Number(stretch.To))
		}
	}
	if left := len(stretches) - len(named); left > 0 {
		texts = append(texts, "in "+Count(left)+" stretches no longer than these")
	}
	last := len(texts) - 1
	if last > 0 {
		texts = []string{strings.Join(texts[:last], ", ") + " and " + texts[last]}
	}
	return texts[0] + " (" + SideName(side) + ")"
}

// widest are the n stretches that span most, in their order on the scale.
func widest(stretches []ask.Stretch, n int) []ask.Stretch {
	kept := slices.Clone(stretches)
	slices.SortStableFunc(kept, func(a, b ask.Stretch) int { return cmp.Compare(b.To-b.From, a.To-a.From) })
	kept = kept[:n]
	slices.SortStableFunc(kept, func(a, b ask.Stretch) int { return cmp.Compare(a.From, b.From) })
	return kept
}

// tooFew are the stretches that are inside the tolerance only because there
// are too few people beyond them, or short of them, for a miss to show in
// points, and for the same reason.
type tooFew struct {
	few
	stretches []ask.Stretch
}

// joined adds a stretch to those with the same reason.
func joined(all []tooFew, f few, stretch ask.Stretch) []tooFew {
	for i := range all {
		if other := &all[i]; other.here == f.here && other.opposite == f.opposite && other.counted == f.counted {
			other.stretches = append(other.stretches, stretch)
			if far(f.ratio) > far(other.ratio) {
				other.ratio = f.ratio
			}
			return all
		}
	}
	return append(all, tooFew{f, []ask.Stretch{stretch}})
}

func (t tooFew) sentence(q ask.Question, side cutoff.Side) string {
	text := Capital(places(t.stretches, side)) + ": "
	if q.TooHigh != nil && q.TooLow != nil {
		text += "too few people " + t.where() + " to matter at "
	} else { // one of the two shares may be large
		text += "too small a share " + t.where() + " to miss by more than "
	}
	text += within(q.TooHigh, q.TooLow)
	switch {
	case !t.counted:
		return text + "; none were counted."
	case t.ratio >= 5 || t.ratio <= 0.2:
		text += "; the curve is " + ratio(t.ratio)
	default:
		text += "; " + ratio(t.ratio)
	}
	if len(t.stretches) > 1 || t.stretches[0].From != t.stretches[0].To {
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
		if to := far(curve / count); to > furthest {
			f.counted, f.ratio, furthest = true, curve/count, to
		}
	}
	return f
}

// far is how far a ratio is from 1, either way.
func far(ratio float64) float64 { return math.Abs(math.Log(ratio)) }

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
