package calibration

import (
	"math"
	"math/rand/v2"
	"sort"
)

// Population is a known distribution of scores, from which samples are drawn
// and of which every share is known.
type Population struct {
	Name string
	Step float64 // between attainable scores; 0: continuous
	Mean float64
	SD   float64

	draw   func(random *rand.Rand) float64
	beyond func(x float64) float64 // the share at or above x
}

// Share is the proportion at or above a score, or above it.
func (p Population) Share(x float64, strict bool) float64 {
	if strict && p.Step > 0 {
		x = (math.Floor(x/p.Step) + 1) * p.Step
	}
	return p.beyond(x)
}

// Draw fills scores with a random sample.
func (p Population) Draw(random *rand.Rand, scores []float64) {
	for i := range scores {
		scores[i] = p.draw(random)
	}
}

// Cutoff is the score z SDs from the mean; on a scale with a step the
// attainable one next to it.
func (p Population) Cutoff(z float64) float64 {
	at := p.Mean + z*p.SD
	if p.Step > 0 {
		at = math.Round(at/p.Step)*p.Step + 0 // no -0
	}
	return at
}

// discrete is the population of the scores 0, step, 2·step … plus low with the
// given weights, which need not add up to 1.
func discrete(name string, low, step float64, weights []float64) Population {
	n, total, mean := len(weights), 0.0, 0.0
	for _, w := range weights {
		total += w
	}
	atLeast := make([]float64, n+1) // summed from the top, so that a small tail keeps its digits
	for i := n - 1; i >= 0; i-- {
		atLeast[i] = atLeast[i+1] + weights[i]/total
		mean += weights[i] / total * (low + float64(i)*step)
	}
	variance := 0.0
	below := make([]float64, n) // the share at or below
	sum := 0.0
	for i, w := range weights {
		d := low + float64(i)*step - mean
		variance += w / total * d * d
		sum += w / total
		below[i] = sum
	}
	return Population{
		Name: name, Step: step, Mean: mean, SD: math.Sqrt(variance),
		draw: func(random *rand.Rand) float64 {
			return low + float64(min(n-1, sort.SearchFloat64s(below, random.Float64())))*step
		},
		beyond: func(x float64) float64 {
			i := int(math.Ceil((x-low)/step - 1e-9))
			return atLeast[max(0, min(n, i))]
		},
	}
}
