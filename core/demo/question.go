package demo

import (
	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/verdict"
)

// Question is what the demo is asked until it is asked something else.
func Question() ask.Question {
	q := ask.NewQuestion()
	q.Scores, q.Missing = Scores(), Missing()
	for _, score := range q.Scores {
		for _, text := range Cutoffs(score) {
			q.Cutoffs = append(q.Cutoffs, must(cutoff.Parse(text)))
		}
	}
	high, low, heads := must(verdict.ParseLimit(TooHigh)), must(verdict.ParseLimit(TooLow)), float64(Heads)
	q.TooHigh, q.TooLow, q.Heads = &high, &low, &heads
	return q
}

// must is for what is written down in this package.
func must[T any](value T, err error) T {
	if err != nil {
		panic(err)
	}
	return value
}
