package sample

import "math"

const (
	// maxDecimals is how many decimals a recorded score is taken to have.
	maxDecimals = 6
	// smallestStep is the step in SDs below which there is no step worth
	// the name: half of it moves no share by 0.1 points or more
	// (half a step moves a share by up to 19.9·step/SD points).
	smallestStep = 0.005
	// fewDistinct is the number of distinct scores up to which a common
	// divisor above the recorded unit may well be chance.
	fewDistinct = 10
)

// Scale is where scores can be: the step between attainable scores and the
// two ends.
type Scale struct {
	Step        float64 // 0: none
	StepSource  string  // "stated" or "detected"
	Low, High   float64
	RangeSource string // "stated" or "observed"
	origin      float64
	offLattice  int
}

// NewScale settles the scale of a count table: step and range as stated, or
// detected. The step is detected from the decimals of the distinct scores
// and their common divisor; none is found when it would be below 0.005 SD.
func NewScale(counts Counts, sd float64, step StepChoice, ends *Range) Scale {
	s := Scale{StepSource: "stated", Low: counts.Min(), High: counts.Max(), RangeSource: "observed", origin: counts.Min()}
	if ends != nil {
		s.Low, s.High, s.RangeSource = ends.Low, ends.High, "stated"
	}
	switch {
	case step.None:
	case step.Size > 0:
		s.Step = step.Size
	default:
		s.StepSource, s.Step = "detected", detectStep(counts, sd)
	}
	if s.Step > 0 {
		for i, score := range counts.Score {
			if !s.Attainable(score) {
				s.offLattice += counts.Count[i]
			}
		}
	}
	return s
}

// OffStep counts the people whose score is not a whole number of steps from
// the lowest score.
func (s Scale) OffStep() int { return s.offLattice }

// Attainable is true for a score on the scale's steps, and for every score
// on a scale without a step. The ends of the scale are not looked at.
func (s Scale) Attainable(score float64) bool {
	if s.Step == 0 {
		return true
	}
	steps := (score - s.origin) / s.Step
	return math.Abs(steps-math.Round(steps)) < noiseOf(math.Max(math.Abs(score), math.Abs(s.origin))/s.Step, 1e-6)
}

// AtOrAbove is the lowest attainable score at or above x, and AtOrBelow the
// highest at or below it; x itself on a scale without a step.
func (s Scale) AtOrAbove(x float64) float64 {
	if s.Attainable(x) {
		return x
	}
	return s.Score(math.Ceil((x - s.origin) / s.Step))
}

// AtOrBelow is the highest attainable score at or below x.
func (s Scale) AtOrBelow(x float64) float64 {
	if s.Attainable(x) {
		return x
	}
	return s.Score(math.Floor((x - s.origin) / s.Step))
}

// Index is the number of steps from the lowest observed score to x, rounded.
func (s Scale) Index(x float64) float64 { return math.Round((x - s.origin) / s.Step) }

// Score is the score that many steps from the lowest observed one, with the
// noise of binary fractions rounded away (9.8, not 9.799999999999999).
func (s Scale) Score(steps float64) float64 {
	const tenDecimals = 1e10
	score := s.origin + steps*s.Step
	if rounded := math.Round(score*tenDecimals) / tenDecimals; math.Abs(rounded-score) <= 1e-9*s.Step {
		return rounded
	}
	return score
}

func detectStep(counts Counts, sd float64) float64 {
	unit := 1.0 // how many recording units go into 1
	for decimals := 0; ; decimals++ {
		if decimals > maxDecimals {
			return 0
		}
		if wholeIn(counts.Score, unit) {
			break
		}
		unit *= 10
	}
	divisor := 1.0
	if len(counts.Score) >= fewDistinct {
		divisor = 0
		for _, score := range counts.Score[1:] {
			divisor = commonDivisor(divisor, math.Round(score*unit)-math.Round(counts.Score[0]*unit))
		}
	}
	step := divisor / unit
	if !(step >= smallestStep*sd) {
		return 0
	}
	return step
}

// wholeIn is true when every score is a whole number of 1/unit. Scores that
// differ by more than noise but are near the same whole number are none.
func wholeIn(scores []float64, unit float64) bool {
	before := math.NaN()
	for _, score := range scores {
		scaled := score * unit
		noise := noiseOf(scaled, 1e-9)
		if math.Abs(scaled) > 1<<52 || math.Abs(scaled-math.Round(scaled)) > noise {
			return false
		}
		if math.Round(scaled) == math.Round(before) && scaled-before > 4*epsilon*math.Abs(scaled) {
			return false
		}
		before = scaled
	}
	return math.Round(before) != math.Round(scores[0]*unit)
}

// epsilon is the distance from 1 to the next number.
const epsilon = 0x1p-52

// noiseOf is how far a whole number computed from numbers up to the given
// size may be off: the least that is asked, or some roundings of that size,
// and never enough to take what isn't whole for it.
func noiseOf(size, least float64) float64 {
	return math.Min(math.Max(least, 4*epsilon*math.Abs(size)), 1e-3)
}

func commonDivisor(a, b float64) float64 {
	for b != 0 {
		a, b = b, math.Mod(a, b)
	}
	return a
}
