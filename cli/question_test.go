package main

import (
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/sample"
	"tailgap/core/verdict"
)

// everyFlag is a command line with every flag that changes the question, none
// at its default, and everyFlagAsks is what it asks.
var everyFlag = []string{
	"--score", "score", "--missing", "-9,99", "--missing", " n/a ", "--header", "yes",
	"--cutoff", "<= 45", "--cutoff", "48..52", "--step", "1", "--range", "-10:110",
	"--mean", "49.5", "--sd", "10.5", "--norm-n", "870", "--half-step", "--too-high", "1pt", "--too-low", "40heads",
	"--heads", "4000", "--level", "0.9", "--replicates", "700", "--seed", "18446744073709551615", "--everyone",
}

func everyFlagAsks() ask.Question {
	heads, people := 4000.0, 870
	return ask.Question{
		Format: ask.QuestionFormat, Scores: []string{"score"}, Missing: []string{"-9", "99", "n/a"}, Header: sample.HeaderYes,
		Cutoffs: []cutoff.Cutoff{{Side: cutoff.AtMost, At: 45}, {Side: cutoff.Stretch, At: 48, To: 52}},
		Step:    sample.StepChoice{Size: 1}, Range: &sample.Range{Low: -10, High: 110},
		Curve: &curve.Given{Mean: 49.5, SD: 10.5, NormN: &people}, HalfStep: true,
		TooHigh: &verdict.Limit{Size: 1}, TooLow: &verdict.Limit{Size: 40, Unit: verdict.Heads},
		Heads: &heads, Everyone: true, Level: 0.9, Replicates: 700, Seed: 1<<64 - 1,
	}
}

func TestFlagsMakeTheQuestion(t *testing.T) {
	scores := bell(t, 200)
	assert.Equal(t, everyFlagAsks(), answered(t, append([]string{scores}, everyFlag...)...).Question)
}

func TestSavedQuestionAsksTheSame(t *testing.T) {
	scores := bell(t, 200)
	for name, flags := range map[string][]string{
		"defaults":   {"--score", "score"},
		"every flag": everyFlag,
		"percent":    {"--score", "score", "--tolerance", "20%count", "--cutoff", ">= -1.5"},
	} {
		t.Run(name, func(t *testing.T) {
			path := filepath.Join(t.TempDir(), "question.json")
			said := answered(t, append([]string{scores, "--save-question", path}, flags...)...)
			again := answered(t, scores, "--question", path)
			if name == "every flag" { // it says how many replicates, and answered does too
				assert.Equal(t, said.Question.Seed, again.Question.Seed)
			}
			again.Question.Replicates = said.Question.Replicates
			assert.Equal(t, said.Question, again.Question)

			text, err := os.ReadFile(path)
			require.NoError(t, err)
			question, err := ask.ReadQuestion(text)
			require.NoError(t, err)
			assert.Equal(t, said.Question, question)
		})
	}
}

func TestSavedQuestionGivesTheSameBytes(t *testing.T) {
	scores := bell(t, 200)
	path := filepath.Join(t.TempDir(), "question.json")
	said, _, status := tailgap("", append([]string{"judge", scores, "--save-question", path}, everyFlag...)...)
	again, _, statusAgain := tailgap("", "judge", scores, "--question", path)
	assert.Equal(t, said, again)
	assert.Equal(t, status, statusAgain)
	assert.NotEmpty(t, said)
}

// Each flag replaces its part of a question file and leaves the others.
func TestFlagsOverrideTheFile(t *testing.T) {
	scores := bell(t, 200)
	path := filepath.Join(t.TempDir(), "question.json")
	answered(t, append([]string{scores, "--save-question", path}, everyFlag...)...)
	five, fifty, six := 5.0, 50, verdict.Limit{Size: 6, Unit: verdict.OfCount}
	for _, c := range []struct {
		flags  []string
		change func(*ask.Question)
	}{
		{[]string{"--score", "2"}, func(q *ask.Question) { q.Scores = []string{"2"} }},
		{[]string{"--missing", ""}, func(q *ask.Question) { q.Missing = []string{} }},
		{[]string{"--missing", "7"}, func(q *ask.Question) { q.Missing = []string{"7"} }},
		{[]string{"--header", "auto"}, func(q *ask.Question) { q.Header = sample.HeaderAuto }},
		{[]string{"--cutoff", ">50", "--cutoff", ">60"}, func(q *ask.Question) {
			q.Cutoffs = []cutoff.Cutoff{{Side: cutoff.Above, At: 50}, {Side: cutoff.Above, At: 60}}
		}},
		{[]string{"--step", "none"}, func(q *ask.Question) { q.Step = sample.StepChoice{None: true} }},
		{[]string{"--range", "0:100"}, func(q *ask.Question) { q.Range = &sample.Range{Low: 0, High: 100} }},
		{[]string{"--mean", "-3"}, func(q *ask.Question) { q.Curve.Mean = -3 }},
		{[]string{"--sd", "5"}, func(q *ask.Question) { q.Curve.SD = 5 }},
		{[]string{"--norm-n", "50"}, func(q *ask.Question) { q.Curve.NormN = &fifty }},
		{[]string{"--norm-n", "none"}, func(q *ask.Question) { q.Curve.NormN = nil }},
		{[]string{"--half-step=false"}, func(q *ask.Question) { q.HalfStep = false }},
		{[]string{"--everyone=false"}, func(q *ask.Question) { q.Everyone = false }},
		{[]string{"--too-high", "6%count"}, func(q *ask.Question) { q.TooHigh = &six }},
		{[]string{"--too-low", "6%count"}, func(q *ask.Question) { q.TooLow = &six }},
		{[]string{"--tolerance", "6%count"}, func(q *ask.Question) { q.TooHigh, q.TooLow = &six, &six }},
		{[]string{"--heads", "5"}, func(q *ask.Question) { q.Heads = &five }},
		{[]string{"--level", "0.8"}, func(q *ask.Question) { q.Level = 0.8 }},
		{[]string{"--seed", "0"}, func(q *ask.Question) { q.Seed = 0 }},
		{[]string{"--replicates", "900"}, func(q *ask.Question) { q.Replicates = 900 }},
	} {
		t.Run(c.flags[0], func(t *testing.T) {
			want := everyFlagAsks()
			want.Replicates = 500 // as answered asks
			c.change(&want)
			got := answered(t, append([]string{scores, "--question", path}, c.flags...)...).Question
			assert.Equal(t, want, got)
		})
	}
}
