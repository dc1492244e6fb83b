package figure

import (
	"math"
	"sort"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
)

// counting is how the counted people lie on the scale, taken back from a
// sweep's counted shares: below[i] of them lie below split[i]. Between two
// splits, where a long sweep was thinned, they are taken as evenly spread.
type counting struct {
	split, below []float64
}

// newCounting reads a sweep. On a scale with a step the people are split half
// a step before each threshold or after it; without one each threshold
// stands twice, and they are split just before it and just after it.
func newCounting(r ask.Result, s ask.Sweep) counting {
	shift := 0.0
	if r.Sample.Step != nil {
		shift = -*r.Sample.Step / 2
		if s.Side.Strict() {
			shift = -shift
		}
	}
	var c counting
	for i, t := range s.Threshold {
		below := s.CountedShare[i]
		if !s.Side.Lower() {
			below = 1 - below
		}
		if i == 0 && below > 0 {
			c.split, c.below = append(c.split, t-math.Abs(shift)), append(c.below, 0)
		}
		c.split, c.below = append(c.split, t+shift), append(c.below, below)
		if i == len(s.Threshold)-1 && below < 1 {
			c.split, c.below = append(c.split, t+math.Abs(shift)), append(c.below, 1)
		}
	}
	return c
}

// share is the share of people below a score; after says whether those just
// at it are taken in.
func (c counting) share(score float64, after bool) float64 {
	n := len(c.split)
	i := sort.Search(n, func(i int) bool { return c.split[i] > score || !after && c.split[i] == score })
	switch {
	case i > 0 && c.split[i-1] == score: // after a jump
		return c.below[i-1]
	case i == n:
		return 1
	case c.split[i] == score: // before a jump
		return c.below[i]
	case i == 0:
		return 0
	}
	part := (score - c.split[i-1]) / (c.split[i] - c.split[i-1])
	return c.below[i-1] + part*(c.below[i]-c.below[i-1])
}

// bin is a bar of counted scores: the share of people between two scores.
type bin struct{ from, to, share float64 }

// edge is a score at which one bar ends and the next begins; after: the
// people just at it stand in the bar that ends there.
type edge struct {
	at    float64
	after bool
}

// mostBars is how many scores are drawn one by one; more are binned.
const mostBars = 120

// bins parts the counted people into bars: one for each score of a scale with
// a step, wider ones where there would be too many, and a histogram on a
// scale without a step. Edges stand at round distances from the cutoff, so
// that no bar is partly beyond it. All bars are width wide but the last one
// within a stretch. Empty bars are left out.
func bins(r ask.Result, c counting, at cutoff.Cutoff, f Frame) (all []bin, width float64) {
	if len(c.split) < 2 {
		return nil, 1
	}
	first, last := c.split[0], c.split[len(c.split)-1]
	width = barWidth(r, last-first, f)
	if !(width > 0) || math.IsInf(width, 0) {
		return nil, 1
	}
	edges := edgesAbout(r, at, first, last, width)
	for i := 1; i < len(edges); i++ {
		from, to := edges[i-1], edges[i]
		if share := c.share(to.at, to.after) - c.share(from.at, from.after); share > 0 {
			all = append(all, bin{from.at, to.at, share})
		}
	}
	return all, width
}

// barWidth is how wide the bars over a range of scores are: round, with no
// more bars than can be told apart.
func barWidth(r ask.Result, span float64, f Frame) float64 {
	px := f.Right - f.Left
	if step := r.Sample.Step; step != nil {
		return roundUp(max(1, span/min(mostBars, px/3) / *step)) * *step
	}
	// Rice's rule, twice the cube root of n, says how many bars; the nearest
	// round width may give up to 1.4 times as many.
	return roundUp(span / min(2.8*math.Cbrt(float64(r.Sample.Used)), px/8))
}

// edgesAbout lists edges from below the first score to above the last: at
// whole widths from where the cutoff splits the people.
func edgesAbout(r ask.Result, c cutoff.Cutoff, first, last, width float64) []edge {
	at := splits(r, c)
	low, high := edge{at[0], c.Side.Strict()}, edge{at[0], c.Side.Strict()}
	if len(at) == 2 {
		high = edge{at[1], true} // both ends of a stretch are in it
	}
	if low.at < first || high.at > last { // not among the scores: no bar is near it
		low = edge{first, false}
		if r.Sample.Step == nil {
			low.at = math.Floor(first/width) * width
		}
		high = low
	}
	// One bar more on both sides: rounding, or people on the very edge, may
	// have put somebody there.
	var edges []edge
	for i := int((low.at-first)/width) + 2; i > 0; i-- {
		edges = append(edges, edge{low.at - float64(i)*width, low.after})
	}
	edges = append(edges, low)
	// Within a stretch what is left over joins the last bar if it is less
	// than half a bar.
	for i := 1; float64(i) < (high.at-low.at)/width-0.499; i++ {
		edges = append(edges, edge{low.at + float64(i)*width, low.after})
	}
	if high != low {
		edges = append(edges, high)
	}
	for i := range int((last-high.at)/width) + 2 {
		edges = append(edges, edge{high.at + float64(i+1)*width, high.after})
	}
	return edges
}

// roundUp is the least of 1, 2, 5, 10, ... (and of 0.5, 0.2, ...) that is not
// below x, up to rounding errors.
func roundUp(x float64) float64 {
	if !(x > 0) || math.IsInf(x, 0) {
		return 1
	}
	for exponent := int(math.Floor(math.Log10(x))) - 1; ; exponent++ {
		for _, lead := range [...]float64{1, 2, 5} {
			if round := scaled(lead, exponent); round >= x*(1-1e-9) {
				return round
			}
		}
	}
}

// splits are the scores at which a cutoff splits the people: on a scale with
// a step half-way between two attainable scores.
func splits(r ask.Result, c cutoff.Cutoff) []float64 {
	at := ends(c)
	if r.Sample.Step == nil {
		return at
	}
	step, low := *r.Sample.Step, r.Sample.Min // steps are counted from the lowest score seen
	for i := range at {
		steps := (at[i] - low) / step
		if c.Side.Strict() || i == 1 {
			at[i] = low + (math.Floor(steps+1e-9)+0.5)*step
		} else {
			at[i] = low + (math.Ceil(steps-1e-9)-0.5)*step
		}
	}
	return at
}

// beyond is the part of the frame that a cutoff asks about, given where it
// splits it.
func beyond(c cutoff.Cutoff, splits []float64, f Frame) (from, to float64) {
	switch {
	case c.Side == cutoff.Stretch:
		return max(splits[0], f.Low), min(splits[1], f.High)
	case c.Side.Lower():
		return f.Low, min(splits[0], f.High)
	}
	return max(splits[0], f.Low), f.High
}
