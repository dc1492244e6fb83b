package words

import (
	"cmp"
	"math"
	"slices"
	"strings"

	"tailgap/core/ask"
)

const (
	// mostSentences is how many sentences the shape of a score gets: those
	// with a figure, and of the others those about the largest effects.
	mostSentences = 6
	// mostNamed is how many cutoffs a sentence names.
	mostNamed = 3
	// leastPart is the part of a gap, or of 1 point where the gap is smaller,
	// below which an effect of no part of its own (a pile's, a heap's) goes
	// unsaid.
	leastPart = 0.1
	// leastShape is the skewness from which on a tail is called long where
	// everyone was counted (common practice).
	leastShape = 0.5
)

// Shape says what the shape of the scores does to the gaps at the cutoffs, in
// six sentences at most: "Skewness 0.92 (95% interval 0.61 or higher): the long
// upper tail accounts for 2.1 of the 4.4 points too low at 45 or above (1.2 to
// 3.0)." Only what is there gets a sentence.
func Shape(q ask.Question, r ask.Result) []string {
	s := r.Shape
	if s == nil || len(s.Cutoffs) != len(r.Cutoffs) {
		return nil
	}
	var all []said
	for _, one := range []said{
		parts(q, r, givenMean(r), func(c ask.ShapeAt) *ask.Effect { return c.MeanAndSD }),
		parts(q, r, asymmetry(q, s.Skewness), func(c ask.ShapeAt) *ask.Effect { return c.Asymmetry }),
		parts(q, r, tails(q, s), func(c ask.ShapeAt) *ask.Effect { return c.Rest }),
		parts(q, r, lead{"", "reading the curve without the half-step accounts for"}, func(c ask.ShapeAt) *ask.Effect { return c.HalfStep }),
		without(q, r, piled(s.Floor, "lowest"), func(c ask.ShapeAt) *ask.Effect { return c.Floor }),
		without(q, r, piled(s.Ceiling, "highest"), func(c ask.ShapeAt) *ask.Effect { return c.Ceiling }),
		without(q, r, heaped(s.Heaps), func(c ask.ShapeAt) *ask.Effect { return c.Heaps }),
		without(q, r, extremes(s.Extremes), func(c ask.ShapeAt) *ask.Effect { return c.Extremes }),
		without(q, r, farthest(s.Farthest), func(c ask.ShapeAt) *ask.Effect { return c.Farthest }),
	} {
		if one.text != "" {
			all = append(all, one)
		}
	}
	for len(all) > mostSentences {
		least := 0
		for i := range all {
			if all[i].size < all[least].size {
				least = i
			}
		}
		all = slices.Delete(all, least, least+1)
	}
	var sentences []string
	for _, one := range all {
		sentences = append(sentences, one.text)
	}
	return sentences
}

// said is a sentence with the size of the largest effect in it; infinite where
// it is said whatever the effect.
type said struct {
	text string
	size float64
}

// lead opens a sentence: a figure with its interval, which is said whatever
// it does to the gaps, and what accounts for a part of them.
type lead struct{ figure, cause string }

func givenMean(r ask.Result) lead {
	return lead{"", "the given curve's having another mean and SD than these people (" + MeanSD(r.Sample.Mean, r.Sample.SD) + ") accounts for"}
}

func asymmetry(q ask.Question, skewness ask.Measured) lead {
	cause := "asymmetry accounts for"
	sure := sign(skewness)
	if q.Everyone && math.Abs(skewness.Value) >= leastShape {
		sure = skewness.Value
	}
	switch {
	case sure > 0:
		cause = "the long upper tail accounts for"
	case sure < 0:
		cause = "the long lower tail accounts for"
	}
	return lead{"skewness " + figure(q, skewness, sure), cause}
}

// tails calls them neither heavy nor light: a floor or two groups make a
// kurtosis too.
func tails(q ask.Question, s *ask.Shape) lead {
	open := math.Max(math.Abs(sign(s.Skewness)), sign(s.ExcessKurtosis))
	return lead{"excess kurtosis " + figure(q, s.ExcessKurtosis, open), "tails and peak together account for"}
}

// sign is the side of 0 on which a skewness or kurtosis surely lies, 1 or -1;
// 0 where neither is sure.
func sign(m ask.Measured) float64 {
	switch {
	case m.Low != nil && *m.Low > 0:
		return 1
	case m.High != nil && *m.High < 0:
		return -1
	}
	return 0
}

// figure prints a skewness or a kurtosis with its interval, which is open
// upwards or, below 0, downwards: of skewed scores, and of heavy tails, a
// sample shows too little, and the far limit does not keep its promise.
func figure(q ask.Question, m ask.Measured, open float64) string {
	if m.Low == nil || m.High == nil {
		return shape(m.Value)
	}
	interval := shape(*m.Low) + " to " + shape(*m.High)
	switch {
	case open > 0:
		interval = shape(*m.Low) + " or higher"
	case open < 0:
		interval = shape(*m.High) + " or lower"
	}
	return shape(m.Value) + " (" + Level(q.Level) + " interval " + interval + ")"
}

// named is an effect at one cutoff, to be said.
type named struct {
	finding ask.Finding
	effect  ask.Effect
}

// certain is true for an effect whose interval leaves 0 out.
func certain(e ask.Effect) bool { return e.Low != nil && e.High != nil && (*e.Low > 0 || *e.High < 0) }

// sorted are the effects that apply: the sure ones, largest first, and the
// others in the order of the cutoffs. What needs no interval, as exact says or
// because everyone was counted, is sure where it is worth a sentence.
func sorted(q ask.Question, r ask.Result, of func(ask.ShapeAt) *ask.Effect, exact bool) (sure, unsure []named) {
	for i, c := range r.Shape.Cutoffs {
		e := of(c)
		if e == nil {
			continue
		}
		one := named{r.Cutoffs[i], *e}
		if certain(*e) || (exact || q.Everyone) && e.Low == nil && !one.slight() {
			sure = append(sure, one)
		} else {
			unsure = append(unsure, one)
		}
	}
	slices.SortStableFunc(sure, func(a, b named) int { return cmp.Compare(math.Abs(b.effect.Points), math.Abs(a.effect.Points)) })
	return sure, unsure
}

// parts says what a part of the gaps comes to: "2.1 of the 4.4 points too low
// at 45 or above (1.2 to 3.0)".
func parts(q ask.Question, r ask.Result, l lead, of func(ask.ShapeAt) *ask.Effect) said {
	sure, unsure := sorted(q, r, of, l.figure == "")
	if l.figure == "" { // a part without a figure of its own is said where it matters
		sure, unsure = slices.DeleteFunc(sure, named.slight), nil
		if len(sure) == 0 {
			return said{}
		}
	}
	var clauses []string
	size := 0.0
	if len(sure) > 0 {
		size = math.Abs(sure[0].effect.Points)
		clauses = append(clauses, l.cause+" "+partsAt(sure))
	}
	if len(unsure) > 0 {
		no := "no sure part "
		if q.Everyone {
			no = "no part to speak of "
		}
		clauses = append(clauses, no+cutoffsOf(unsure, len(sure) == 0))
	}
	switch text := strings.Join(clauses, "; "); {
	case l.figure == "":
		return said{Capital(text) + ".", size}
	case text == "":
		return said{Capital(l.figure) + ".", math.Inf(1)}
	default:
		return said{Capital(l.figure) + ": " + text + ".", math.Inf(1)}
	}
}

// partsAt names the largest effects, parts of their gaps first.
func partsAt(sure []named) string {
	all := slices.Clone(sure[:min(len(sure), mostNamed)])
	slices.SortStableFunc(all, func(a, b named) int { return cmp.Compare(a.order(), b.order()) })
	var within, texts []string
	for _, n := range all {
		if n.within() {
			within = append(within, n.part())
		} else {
			texts = append(texts, n.part())
		}
	}
	if within != nil {
		texts = slices.Insert(texts, 0, enumerated(within))
	}
	return strings.Join(texts, "; ") + fewer(len(sure)-len(all))
}

func (n named) order() int {
	if n.within() {
		return 0
	}
	return 1
}

// slight is true where the effect is not worth a sentence beside its gap.
func (n named) slight() bool {
	return math.Abs(n.effect.Points) < leastPart*math.Max(1, math.Abs(n.finding.GapPoints))
}

// decimals are those that the effect, its interval and the gap are printed
// with: the gap as everywhere, the effect no finer.
func (n named) decimals() (effect, gap int) {
	gap = readingDecimals(n.finding.Reading)
	return min(gap, readingDecimals(n.reading())), gap
}

// reading is the effect as if it were a gap.
func (n named) reading() ask.Reading {
	return ask.Reading{GapPoints: n.effect.Points, GapLow: n.effect.Low, GapHigh: n.effect.High}
}

// within is true where the effect is a part of the gap, not more than all of
// it and not against it.
func (n named) within() bool {
	gap, effect := n.finding.GapPoints, n.effect.Points
	return gap*effect > 0 && math.Abs(effect) <= math.Abs(gap)*(1+1e-9)
}

func (n named) part() string {
	decimals, gap := n.decimals()
	if n.within() {
		return unsigned(n.effect.Points, decimals) + " of the " + pointsTo(n.finding.GapPoints, gap) + side(n.finding.GapPoints) + " " +
			n.finding.Cutoff.Words() + n.interval(decimals)
	}
	whole := "there is no gap"
	if n.finding.GapPoints != 0 {
		whole = "the whole gap is " + pointsTo(n.finding.GapPoints, gap) + side(n.finding.GapPoints)
	}
	return pointsTo(n.effect.Points, decimals) + side(n.effect.Points) + " " + n.finding.Cutoff.Words() + n.interval(decimals) + ", where " + whole
}

// interval is the effect's own in brackets, in the effect's direction.
func (n named) interval(decimals int) string {
	if n.effect.Low == nil || n.effect.High == nil {
		return ""
	}
	size := func(x float64) string { return unsigned(x, decimals) }
	return " (" + limits(n.effect.Points, *n.effect.Low, *n.effect.High, size, "too low", "too high") + ")"
}

func side(points float64) string {
	if points < 0 {
		return " too low"
	}
	return " too high"
}

// fewer says that so many cutoffs are left out, at which there is less.
func fewer(left int) string {
	switch {
	case left <= 0:
		return ""
	case left == 1:
		return ", and less at 1 other cutoff"
	}
	return ", and less at " + Count(left) + " other cutoffs"
}

// cutoffsOf names some cutoffs, or says how many they are.
func cutoffsOf(all []named, every bool) string {
	switch many := len(all) > mostNamed; {
	case many && every:
		return "at any cutoff"
	case many:
		return "at " + Count(len(all)) + " others"
	}
	var texts []string
	for _, n := range all {
		texts = append(texts, n.finding.Cutoff.Words())
	}
	return enumerated(texts)
}

// enumerated joins texts: "a, b and c".
func enumerated(texts []string) string {
	last := len(texts) - 1
	if last < 1 {
		return strings.Join(texts, "")
	}
	return strings.Join(texts[:last], ", ") + " and " + texts[last]
}
