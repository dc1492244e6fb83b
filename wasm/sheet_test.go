package main

import (
	"errors"
	"math"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"github.com/maxence-charriere/go-app/v9/pkg/app"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/curve"
	"tailgap/core/cutoff"
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
	b := newBench()
	b.hold("made.csv", []byte(text))
	r := served(b, request{Kind: askAnswer, Demo: text == "", Question: &q})
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
		{"norms from people", "", func(q *ask.Question) {
			people := 870
			q.Curve = &curve.Given{Mean: 20, SD: 5, NormN: &people}
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
					assert.Contains(t, html, words.Capital(words.GapOf(f.Reading)))
				}
				assert.Equal(t, len(r.Cutoffs), strings.Count(html, "<article"))
				for _, said := range append(words.Shape(s.desk.answer.Question, r), words.Normality(r)) {
					assert.Contains(t, html, app.HTMLString(app.Text(said)))
				}
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
	for text, want := range map[string]float64{"4": 4, " 4000 ": 4000, "-2.5": -2.5, "−3": -3, "1e3": 1000, "4,5": 4.5, "-0,25": -0.25,
		"1,2345": 1.2345, ",5": 0.5, "1,5e2": 150, "7,": 7} {
		got, err := number(text)
		require.NoError(t, err, text)
		assert.Equal(t, want, got, text)
	}
	zero, err := number("-0")
	require.NoError(t, err)
	assert.False(t, math.Signbit(zero))
	for _, text := range []string{"", "4k", "four", "1,234,567", "1.234,5", "1,234.5", "1 000", "NaN", "inf", "0x10", "1_000", "1e999"} {
		_, err := number(text)
		assert.ErrorContains(t, err, strconv.Quote(text)+" can't be read as a number")
	}
	for _, text := range []string{"1,234", "-1,234", "0,500", "1,234e2"} { // one thing or the other
		_, err := number(text)
		assert.EqualError(t, err, strconv.Quote(text)+" could mean thousands or decimals; write thousands without a mark, and decimals with a point")
	}
}

func TestCutoffIn(t *testing.T) {
	for _, test := range []struct {
		side           cutoff.Side
		from, to, want string
	}{
		{cutoff.AtLeast, "50", "", ">=50"}, {cutoff.Below, "12,5", "", "<12.5"}, {cutoff.Above, "−3", "", ">-3"},
		{cutoff.AtLeast, "<=12,5", "", "<=12.5"}, {cutoff.AtMost, "20..30", "", "20..30"},
		{cutoff.Stretch, "10,5", "20.5", "10.5..20.5"}, {cutoff.Stretch, "-3", "-3", "-3..-3"}, {cutoff.Stretch, ">=7", "20", ">=7"},
	} {
		c, err := cutoffIn(test.side, test.from, test.to)
		require.NoError(t, err, test.from)
		assert.Equal(t, test.want, c.String())
	}
	for _, test := range []struct {
		side           cutoff.Side
		from, to, want string
	}{
		{cutoff.AtLeast, "abc", "", `"abc" can't be read as a number; write digits, and decimals with a point`},
		{cutoff.Stretch, "11", "abc", `"abc" can't be read as a number; write digits, and decimals with a point`},
		{cutoff.AtLeast, ">=1,234", "", `">=1,234" could mean thousands or decimals; write thousands without a mark, and decimals with a point`},
		{cutoff.Stretch, "20", "11,5", `the lower end, 20, is above the upper end, 11.5; write the lower end first`},
	} {
		_, err := cutoffIn(test.side, test.from, test.to)
		assert.EqualError(t, err, test.want)
	}
}

func TestLimitIn(t *testing.T) {
	for _, test := range []struct{ size, unit, want string }{{"1,5", "pt", "1.5pt"}, {"20", "%count", "20%count"}, {"1e2", "heads", "100heads"}, {"-0", "pt", "0pt"}} {
		l, err := limitIn(test.size, test.unit)
		require.NoError(t, err)
		assert.Equal(t, test.want, l.String())
	}
	for size, want := range map[string]string{
		"abc": `"abc" can't be read as a number; write digits, and decimals with a point`,
		"-2":  "a tolerance of -2 can't be used; it must be zero or more", "5%": `"5%" can't be read as a number`,
	} {
		_, err := limitIn(size, "pt")
		assert.ErrorContains(t, err, want)
	}
}

var disabled = regexp.MustCompile(` disabled[ >]`)

func TestSheetOffersOnlyTheAnswerToWhatIsAsked(t *testing.T) {
	s := sheetWith(t, "", func(*ask.Question) {})
	assert.NotRegexp(t, disabled, app.HTMLString(s.takings()))
	s.desk.version++
	html := app.HTMLString(s.takeAway())
	assert.Equal(t, len(takings), len(disabled.FindAllString(html, -1)), "the question can still be saved")
	assert.Contains(t, html, "The answer shown is old")
	s.desk.answer = nil
	html = app.HTMLString(s.takings())
	assert.Equal(t, len(takings), len(disabled.FindAllString(html, -1)))
	assert.Contains(t, html, "none yet")
}

func TestSheetSaysThatACutoffIsForEveryScore(t *testing.T) {
	s := sheetWith(t, twoColumns, func(q *ask.Question) {
		*q = ask.NewQuestion()
		q.Replicates, q.Scores, q.Cutoffs = 200, []string{"whole", "2"}, asking(">=4", "2..3").Cutoffs
	})
	for _, at := range []place{atCutoff(0), atCutoff(1), atAdd} {
		s.open = at
		assert.Contains(t, app.HTMLString(s.Render()), "Every cutoff is used for each of the 2 scores.")
		s.desk.question.Scores = []string{"whole"}
		assert.NotContains(t, app.HTMLString(s.Render()), "Every cutoff")
		s.desk.question.Scores = []string{"whole", "2"}
	}
}

func TestSentence(t *testing.T) {
	assert.Equal(t, "It is so.", sentence(errors.New("it is so")))
	assert.Equal(t, "It is so.", sentence(errors.New("It is so.")))
}
