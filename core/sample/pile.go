package sample

import "math"

// Pile is people at one end of the scale, more of them than a tail would
// leave there.
type Pile struct {
	Score  float64
	People int // 0: no pile
}

const (
	fewestPiled = 10   // people that make a pile
	usualPile   = 0.15 // of the people, at one end
	manyTimes   = 1.5  // as many as at any other score, or as even spreading would put there
)

// Piles are the people at the lowest and at the highest score of the scale,
// each where they make a pile: 15% of the people or more (common practice for
// a floor or ceiling effect: McHorney & Tarlov 1995), or more than one and a
// half times as many as at any other score within an SD of the end, by more
// than three standard errors of that difference (a rule of our own: a tail
// falls off towards its end). Fewer than ten people are none.
func Piles(c Counts, m Moments, s Scale) (floor, ceiling Pile) {
	low, high := c.Min(), c.Max()
	if s.RangeSource == "stated" {
		low, high = s.AtOrAbove(s.Low), s.AtOrBelow(s.High)
	}
	return pileAt(c, m, low), pileAt(c, m, high)
}

func pileAt(c Counts, m Moments, end float64) Pile {
	at := c.IndexAtLeast(end)
	if at == len(c.Score) || c.Score[at] != end || c.Count[at] < fewestPiled {
		return Pile{}
	}
	busiest := 0
	for i := c.IndexAtLeast(end - m.SD); i < len(c.Score) && c.Score[i] <= end+m.SD; i++ {
		if i != at {
			busiest = max(busiest, c.Count[i])
		}
	}
	people, others := float64(c.Count[at]), float64(busiest)
	excess := people - manyTimes*others
	if people < usualPile*float64(c.N) && !(excess > 3*math.Sqrt(people+manyTimes*manyTimes*others)) {
		return Pile{}
	}
	return Pile{Score: c.Score[at], People: c.Count[at]}
}

// Heaping is people heaped on round scores.
type Heaping struct {
	Spacing float64 // the round scores are its multiples; 0: no heaps
	Share   float64 // of the people there, those piled up at an end left out
	At      []int   // the round scores, by their index among the distinct ones
}

// Heaps finds people heaped on round scores, the multiples of 10 or of 5
// steps: where their share is above one and a half times what even spreading
// would put there, by more than four standard errors, on a scale with an SD of
// at least one spacing. Heaps on tens are heaps on fives where the fives
// between them are heaps as well. People piled up at an end of the scale are
// left out of all this: an end is no round score.
func Heaps(c Counts, m Moments, s Scale) Heaping {
	if s.Step == 0 {
		return Heaping{}
	}
	floor, ceiling := Piles(c, m, s)
	rest := c.N - floor.People - ceiling.People
	piled := func(score float64) bool {
		return floor.People > 0 && score == floor.Score || ceiling.People > 0 && score == ceiling.Score
	}
	multiples := func(spacing float64) (at []int, people int) {
		for i, score := range c.Score {
			if multiple := score / spacing; math.Abs(multiple-math.Round(multiple)) < 1e-6 && !piled(score) {
				at, people = append(at, i), people+c.Count[i]
			}
		}
		return at, people
	}
	fives, onFives := multiples(5 * s.Step)
	tens, onTens := multiples(10 * s.Step)
	switch {
	case m.SD >= 10*s.Step && heaped(onTens, rest, 1.0/10) && !heaped(onFives-onTens, rest-onTens, 1.0/9):
		return Heaping{10 * s.Step, float64(onTens) / float64(rest), tens}
	case m.SD >= 5*s.Step && heaped(onFives, rest, 1.0/5):
		return Heaping{5 * s.Step, float64(onFives) / float64(rest), fives}
	}
	return Heaping{}
}

func heaped(people, of int, even float64) bool {
	if of <= 0 {
		return false
	}
	n := float64(of)
	share := float64(people) / n
	return share > manyTimes*even && share-even > 4*math.Sqrt(even*(1-even)/n)
}
