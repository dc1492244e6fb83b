package words

import (
	"testing"

	"github.com/stretchr/testify/assert"

	"tailgap/core/ask"
	"tailgap/core/curve"
)

func TestMethod(t *testing.T) {
	a := ask.Answer{Question: ask.NewQuestion(), Program: "tailgap 1.2.3"}
	assert.Equal(t, "95% intervals and bands from 10,000 replicates, seed 1. Made by tailgap 1.2.3.", Method(a))
	a.Results = []ask.Result{
		{Cutoffs: []ask.Finding{{Method: "ghost-studentised"}, {Method: "score"}}},
		{Cutoffs: []ask.Finding{{Method: "ghost-studentised"}}},
	}
	a.Question.Seed = 1<<64 - 1
	assert.Equal(t, "95% intervals (ghost-studentised; score) and bands from 10,000 replicates, seed 18446744073709551615. Made by tailgap 1.2.3.", Method(a))
	a.Question.Everyone = true
	assert.Equal(t, "These are all the people: the gaps are exact and have no interval. Made by tailgap 1.2.3.", Method(a))
	people := 870
	a.Question.Curve = &curve.Given{Mean: 54.6, SD: 13.1, NormN: &people}
	assert.Equal(t, "These are all the people, and the curve is judged as its norms are printed: the gaps are exact and have no interval. Made by tailgap 1.2.3.", Method(a))
}

func TestCautionsSayWhatTheFiguresCannot(t *testing.T) {
	said := Cautions()
	assert.Len(t, said, 3)
	assert.Contains(t, said[0], "nothing certain about one person")
	assert.Contains(t, said[1], "instrument's manual")
	assert.Contains(t, said[2], "not diagnosis")
}

func TestCapital(t *testing.T) {
	assert.Equal(t, "At 70", Capital("at 70"))
	assert.Equal(t, "Élan", Capital("élan"))
	assert.Empty(t, Capital(""))
}
