package main

import (
	"errors"
	"strings"
	"testing"

	"github.com/maxence-charriere/go-app/v9/pkg/app"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/curve"
	"tailgap/core/demo"
	"tailgap/core/sample"
	"tailgap/core/verdict"
	"tailgap/core/words"
)

// sheetWith is a sheet with an answer on it.
func sheetWith(t *testing.T, text string, change func(q *ask.Question)) *sheet {
	t.Helper()
	q := demo.Question()
	q.Replicates = 200
	change(&q)
	b := &bench{}
	b.hold("made.csv", []byte(text))
	r := b.serve(request{Kind: askAnswer, Demo: text == "", Question: &q}, silent)
	a, err := r.answer()
	require.NoError(t, err)
	s := &sheet{}
	s.OnInit()
	s.desk.question, s.desk.answer, s.desk.answerData = q, a, s.desk.data
	s.arrived()
	return s
}

const twoColumns = "whole,\"<script>part</script>\"\n1,1.5\n2,2.25\n2,3.125\n3,1.75\n4,9.5\n6,2.5\n9,4.5\n"

func limit(t *testing.T, text string) *verdict.Limit {
	t.Helper()
	l, err := verdict.ParseLimit(text)
	require.NoError(t, err)
	return &l
}

// Every way to ask has to come out as a whole page.
func TestSheetShowsEveryKindOfAnswer(t *testing.T) {
	own := func(q *ask.Question) {
		*q = ask.NewQuestion()
		q.Replicates, q.Scores = 200, []string{"whole"}
		q.Cutoffs = asking(">=4", "2..3").Cutoffs
	}
	tests := []struct {
		name   string
		text   string
		change func(q *ask.Question)
	}{
		{"the demo", "", func(*ask.Question) {}},
		{"judged with the half-step", "", func(q *ask.Question) { q.HalfStep = true }},
		{"everyone counted", "", func(q *ask.Question) { q.Everyone = true }},
		{"a given curve, parts of the count", "", func(q *ask.Question) {
			q.Curve, q.TooHigh, q.Heads = &curve.Given{Mean: 20, SD: 5}, limit(t, "20%count"), nil
		}},
		{"no tolerance and no heads", twoColumns, own},
		{"no cutoff", twoColumns, func(q *ask.Question) { own(q); q.Cutoffs = nil }},
		{"no step", twoColumns, func(q *ask.Question) { own(q); q.Step = sample.StepChoice{None: true} }},
		{"nobody beyond", twoColumns, func(q *ask.Question) { own(q); q.Cutoffs = asking(">=90").Cutoffs }},
		{"two scores", twoColumns, func(q *ask.Question) { own(q); q.Scores = []string{"whole", "2"} }},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			s := sheetWith(t, test.text, test.change)
			for i, r := range s.desk.answer.Results {
				s.result = i
				html := app.HTMLString(s.Render())
				assert.NotContains(t, html, "<script")
				for _, f := range r.Cutoffs {
					assert.Contains(t, html, words.Capital(f.Cutoff.Words()))
					assert.Contains(t, html, exact(f.GapPoints))
					assert.Contains(t, html, words.Capital(words.Gap(f.GapPoints)))
				}
				assert.Equal(t, len(r.Cutoffs), strings.Count(html, "<article"))
				for _, caution := range words.Cautions() {
					assert.Contains(t, html, app.HTMLString(app.Text(caution)))
				}
			}
			for _, at := range []place{atData, atCurve, atHigh, atLow, atHeads, atMore, atAdd, atCutoff(0)} {
				s.open = at
				assert.Equal(t, at.cutoff() < len(s.desk.question.Cutoffs), strings.Contains(app.HTMLString(s.Render()), `id="editor-`+string(at)))
			}
		})
	}
}

func TestSheetBeforeTheFirstAnswer(t *testing.T) {
	s := &sheet{}
	s.OnInit()
	html := app.HTMLString(s.Render())
	assert.Contains(t, html, "Of ")
	assert.Contains(t, html, "at 11 or below")
	assert.NotContains(t, html, "<article")
}

func TestSheetSaysThatAnAnswerIsOld(t *testing.T) {
	s := sheetWith(t, "", func(*ask.Question) {})
	assert.NotContains(t, app.HTMLString(s.Render()), "earlier question")
	s.desk.version++
	assert.Contains(t, app.HTMLString(s.Render()), "earlier question")
	s.desk.data = data{name: "other.csv", file: &file{}}
	assert.Contains(t, s.desk.oldness(), "about demo.csv, not about the data above")
	s.desk.answerData = data{name: "other.csv", file: &file{}}
	assert.Contains(t, s.desk.oldness(), "about the data before", "another file of the same name")
	s.desk.answerData = s.desk.data
	assert.Contains(t, s.desk.oldness(), "earlier question")
}

func TestNumber(t *testing.T) {
	for text, want := range map[string]float64{"4": 4, " 4,000 ": 4000, "1,234,567": 1234567, "-2.5": -2.5, "−3": -3, "1e3": 1000} {
		got, err := number(text)
		require.NoError(t, err, text)
		assert.Equal(t, want, got, text)
	}
	for _, text := range []string{"", "4k", "4,5", "1,2345", "four"} {
		_, err := number(text)
		assert.Error(t, err, text)
	}
}

func TestSentence(t *testing.T) {
	assert.Equal(t, "It is so.", sentence(errors.New("it is so")))
	assert.Equal(t, "It is so.", sentence(errors.New("It is so.")))
}
