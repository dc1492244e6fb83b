package figure_test

import (
	"math"
	"slices"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/verdict"
)

// The answers here are made by hand: shares and gaps are what the scores
// give, limits are a plain multiple of a binomial standard error, good enough
// to draw and independent of the statistics.

// recipe says what answer to make.
type recipe struct {
	name     string
	scores   []float64
	step     float64 // 0: none
	low      float64 // ends of the scale; equal: the scores' own
	high     float64
	cutoffs  []string
	tooHigh  string
	tooLow   string
	heads    float64
	everyone bool
	halfStep bool
	demo     bool
}

func (m recipe) answer() ask.Answer {
	q := ask.Question{Scores: []string{m.name}, HalfStep: m.halfStep, Everyone: m.everyone, Level: 0.95, Replicates: 10000, Seed: 1}
	if m.heads > 0 {
		q.Heads = &m.heads
	}
	q.TooHigh, q.TooLow = limitOf(m.tooHigh), limitOf(m.tooLow)
	for _, text := range m.cutoffs {
		c, err := cutoff.Parse(text)
		if err != nil {
			panic(err)
		}
		q.Cutoffs = append(q.Cutoffs, c)
	}
	r := m.result(q)
	return ask.Answer{Format: ask.AnswerFormat, Program: "tailgap test", Demo: m.demo, Question: q, Results: []ask.Result{r}}
}

func limitOf(text string) *verdict.Limit {
	if text == "" {
		return nil
	}
	l, err := verdict.ParseLimit(text)
	if err != nil {
		panic(err)
	}
	return &l
}

func (m recipe) result(q ask.Question) ask.Result {
	scores := slices.Sorted(slices.Values(m.scores))
	n := float64(len(scores))
	mean, squares := 0.0, 0.0
	for _, x := range scores {
		mean += x / n
	}
	for _, x := range scores {
		squares += (x - mean) * (x - mean)
	}
	sd := math.Sqrt(squares / (n - 1))
	low, high := scores[0], scores[len(scores)-1]
	if m.low < m.high {
		low, high = m.low, m.high
	}
	r := ask.Result{Score: m.name,
		Sample: ask.Described{N: len(scores) + 3, Used: len(scores), Mean: mean, SD: sd, Min: scores[0], Max: scores[len(scores)-1],
			Distinct: len(slices.Compact(slices.Clone(scores))), Low: low, High: high, StepSource: "detected", RangeSource: "stated"},
		Curve: ask.Curve{Kind: "normal", Mean: mean, SD: sd, Source: "fitted"}}
	if m.step > 0 {
		r.Sample.Step = &m.step
	}
	c := counter{recipe: m, q: q, scores: scores, mean: mean, sd: sd}
	for _, at := range q.Cutoffs {
		r.Cutoffs = append(r.Cutoffs, c.finding(at))
	}
	for _, side := range sides(q.Cutoffs) {
		r.Sweeps = append(r.Sweeps, c.sweep(side, low, high))
	}
	for _, s := range r.Sweeps {
		for i, gap := range s.GapPoints {
			if math.Abs(gap) > math.Abs(r.Worst.GapPoints) {
				r.Worst = ask.Worst{Side: s.Side, Threshold: s.Threshold[i], GapPoints: gap}
			}
		}
	}
	return r
}

func sides(cutoffs []cutoff.Cutoff) []cutoff.Side {
	var used []cutoff.Side
	for _, c := range cutoffs {
		if c.Side != cutoff.Stretch && !slices.Contains(used, c.Side) {
			used = append(used, c.Side)
		}
	}
	if used == nil {
		used = []cutoff.Side{cutoff.AtLeast}
	}
	return used
}

// counter counts and judges.
type counter struct {
	recipe
	q        ask.Question
	scores   []float64
	mean, sd float64
}

// below is how many scores lie below x; after takes in those at x.
func (c counter) below(x float64, after bool) float64 {
	count := 0
	for _, score := range c.scores {
		if score < x || after && score == x {
			count++
		}
	}
	return float64(count)
}

func (c counter) curveBelow(x float64) float64 {
	return math.Erfc(-(x-c.mean)/c.sd/math.Sqrt2) / 2
}

func (c counter) shift(strict bool) float64 {
	switch {
	case !c.halfStep:
		return 0
	case strict:
		return c.step / 2
	}
	return -c.step / 2
}

// shares are the curve's and the counted share at one end.
func (c counter) shares(side cutoff.Side, x float64, after bool) (curve, counted float64) {
	curve = c.curveBelow(x + c.shift(side.Strict()))
	counted = c.below(x, after) / float64(len(c.scores))
	if side.Lower() {
		return curve, counted
	}
	return 1 - curve, 1 - counted
}

func (c counter) finding(at cutoff.Cutoff) ask.Finding {
	f := ask.Finding{Cutoff: at, Method: "made by hand"}
	if at.Side == cutoff.Stretch {
		from, counted := c.shares(cutoff.AtLeast, at.At, false)
		to, countedTo := c.shares(cutoff.Above, at.To, true)
		f.CurveShare, f.CountedShare = from-to, counted-countedTo
	} else {
		f.CurveShare, f.CountedShare = c.shares(at.Side, at.At, at.Side.Strict())
	}
	n := float64(len(c.scores))
	f.Counted = int(math.Round(f.CountedShare * n))
	f.GapPoints = 100 * (f.CurveShare - f.CountedShare)
	if f.CountedShare > 0 {
		ratio := f.CurveShare / f.CountedShare
		f.Ratio = &ratio
	}
	low, high := c.limits(f.GapPoints, f.CountedShare, 1.96)
	if !c.everyone {
		f.GapLow, f.GapHigh = &low, &high
	}
	if c.heads > 0 {
		f.Heads = &ask.HeadCount{Gap: f.GapPoints * c.heads / 100}
	}
	if c.q.TooHigh != nil || c.q.TooLow != nil {
		from, to := c.tolerated(f.CountedShare)
		v := "unsettled"
		switch {
		case low >= from && high <= to:
			v = "holds"
		case high < from || low > to:
			v = "fails"
		}
		f.Verdict = &v
	}
	f.WithoutHalfStep = f.Reading
	return f
}

func (c counter) limits(gap, share, quantile float64) (low, high float64) {
	if c.everyone {
		return gap, gap
	}
	n := float64(len(c.scores))
	p := (share*n + 2) / (n + 4)
	half := 100 * quantile * math.Sqrt(0.6*p*(1-p)/n)
	return gap - half, gap + half
}

func (c counter) tolerated(share float64) (from, to float64) {
	size := func(l *verdict.Limit) float64 {
		switch {
		case l == nil:
			return math.Inf(1)
		case l.Unit == verdict.OfCount:
			return l.Size * share
		case l.Unit == verdict.Heads:
			return 100 * l.Size / c.heads
		}
		return l.Size
	}
	return -size(c.q.TooLow), size(c.q.TooHigh)
}

func (c counter) sweep(side cutoff.Side, low, high float64) ask.Sweep {
	s := ask.Sweep{Side: side}
	add := func(x float64, after bool) {
		curve, counted := c.shares(side, x, after)
		gap := 100 * (curve - counted)
		s.Threshold = append(s.Threshold, x)
		s.CurveShare, s.CountedShare, s.GapPoints = append(s.CurveShare, curve), append(s.CountedShare, counted), append(s.GapPoints, gap)
		if c.everyone {
			return
		}
		l, h := c.limits(gap, counted, 1.96)
		s.Low, s.High = append(s.Low, l), append(s.High, h)
		l, h = c.limits(gap, counted, 3)
		s.BandLow, s.BandHigh = append(s.BandLow, l), append(s.BandHigh, h)
	}
	if c.step > 0 {
		for k := 0; k <= int(math.Round((high-low)/c.step)); k++ {
			add(low+float64(k)*c.step, side.Strict())
		}
	} else {
		for _, x := range slices.Compact(slices.Clone(c.scores)) {
			add(x, false)
			add(x, true)
		}
	}
	if c.q.TooHigh != nil || c.q.TooLow != nil {
		s.Trusted = c.trusted(s)
	}
	return s
}

// trusted are the runs of thresholds at which the band lies inside the
// tolerance; trivial where both shares lie inside it as well.
func (c counter) trusted(s ask.Sweep) []ask.Stretch {
	runs := []ask.Stretch{}
	open := false
	for i, x := range s.Threshold {
		from, to := c.tolerated(s.CountedShare[i])
		low, high := s.GapPoints[i], s.GapPoints[i]
		if s.BandLow != nil {
			low, high = s.BandLow[i], s.BandHigh[i]
		}
		within := low >= from && high <= to
		rare := math.Max(s.CurveShare[i], s.CountedShare[i])
		common := math.Max(1-s.CurveShare[i], 1-s.CountedShare[i])
		trivial := 100*math.Min(rare, common) <= math.Min(-from, to)
		switch {
		case !within:
			open = false
		case open && runs[len(runs)-1].Trivial == trivial:
			runs[len(runs)-1].To = x
		default:
			runs = append(runs, ask.Stretch{From: x, To: x, Trivial: trivial})
			open = true
		}
	}
	return runs
}
