package figure_test

import (
	"math"
	"math/rand/v2"
)

// draw makes n scores from a seeded source.
func draw(n int, seed uint64, score func(*rand.Rand) float64) []float64 {
	source := rand.New(rand.NewPCG(seed, 7))
	scores := make([]float64, n)
	for i := range scores {
		scores[i] = score(source)
	}
	return scores
}

// whole draws whole numbers within a scale.
func whole(n int, seed uint64, mean, sd, low, high float64) []float64 {
	return draw(n, seed, func(r *rand.Rand) float64 {
		return math.Min(high, math.Max(low, math.Round(mean+sd*r.NormFloat64())))
	})
}

// skewed draws scores with a long right tail and two decimals.
func skewed(n int, seed uint64) []float64 {
	return draw(n, seed, func(r *rand.Rand) float64 {
		return math.Round(100*(12+6*(r.ExpFloat64()+r.ExpFloat64()))) / 100
	})
}

// ceiling draws whole numbers 0..37 piled up at the top.
func ceiling(n int, seed uint64) []float64 {
	return draw(n, seed, func(r *rand.Rand) float64 {
		return math.Max(0, math.Round(37-4.5*(r.ExpFloat64()+r.ExpFloat64())-0.5*math.Abs(r.NormFloat64())))
	})
}

// recipes are the answers that the golden figures are drawn from.
var recipes = map[string]recipe{
	"vocabulary": {name: "vocabulary", scores: ceiling(412, 3), step: 1, low: 0, high: 37,
		cutoffs: []string{"<=11", ">=30", ">=35"}, tooHigh: "1pt", tooLow: "2pt", heads: 4000, demo: true},
	"minutes": {name: "form minutes", scores: skewed(390, 5),
		cutoffs: []string{">=45", ">=47.5", ">=60"}, tooHigh: "20%count"},
	"twenty": {name: "reading", scores: whole(20, 11, 50, 10, 0, 100), step: 1, low: 0, high: 100,
		cutoffs: []string{">=60", "40..59"}, tooHigh: "5pt", tooLow: "5pt"},
	"crowd": {name: "a", scores: whole(900, 13, 50, 10, 0, 83), step: 1, low: 0, high: 83,
		cutoffs: []string{"<=41", "<42", "<=43", ">=44", ">45", "46..50", ">=200", ">=82"}, tooHigh: "30heads", tooLow: "60heads", heads: 1000, halfStep: true},
	"outside": {name: "reading", scores: whole(200, 23, 50, 5, 0, 100), step: 1,
		cutoffs: []string{"<=33", "<38", ">=66"}, tooHigh: "1pt"}, // left and right of the scores, in the frame
	"everyone": {name: "everyone's score", scores: whole(300, 17, 20, 4, 0, 40), step: 1, low: 0, high: 40,
		cutoffs: []string{"20..30"}, everyone: true},
	"fine": {name: "fine steps", scores: draw(3000, 19, func(r *rand.Rand) float64 { return math.Round(500 + 100*r.NormFloat64()) }),
		step: 1, low: 0, high: 1099, cutoffs: []string{">=600"}, tooHigh: "0.5pt", tooLow: "0.5pt"},
}
