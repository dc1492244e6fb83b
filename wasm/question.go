package main

import (
	"strconv"

	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/ask"
	"tailgap/core/words"
)

// sentence is the question. Its parts are buttons; each opens an editor where
// it stands, and the sentence goes on below it.
func (s *sheet) sentence() app.UI {
	q := s.desk.question
	parts := []app.UI{
		app.Text("Of "), s.slot(atData, s.dataWords(), ",", s.dataEditor),
		app.Text(" how far is "), s.slot(atCurve, curveWords(q), "", s.curveEditor),
		app.Text(" from the count "),
	}
	parts = append(parts, s.cutoffSlots()...)
	parts = append(parts,
		app.Text(" if it may be too high by "), s.slot(atHigh, limitWords(q.TooHigh), "", s.limitEditor(atHigh)),
		app.Text(" and too low by "), s.slot(atLow, limitWords(q.TooLow), ",", s.limitEditor(atLow)),
		app.Text(" for "), s.slot(atHeads, headsWords(q), "?", s.headsEditor),
	)
	return app.Section().Class("asking").Aria("label", "The question").Body(
		app.Div().Class("question").Body(parts...),
		app.Div().Class("small-print").Body(
			s.slot(atMore, moreWords(q), "", s.moreEditor),
			when(s.desk.data.demo, func() app.UI {
				return app.P().Text("These scores are made up. For your own, drop a file anywhere on this page, paste them, or choose a file where the question names its scores.")
			}),
		),
	)
}

func curveWords(q ask.Question) string {
	if q.Curve == nil {
		return "the normal curve fitted to them"
	}
	return "the normal curve " + words.GivenCurve(*q.Curve)
}

func headsWords(q ask.Question) string {
	if q.Heads == nil {
		return "any number of people"
	}
	return words.People(*q.Heads)
}

// dataWords names the scores: "405 vocabulary scores in demo.csv".
func (s *sheet) dataWords() string {
	name := words.Name(s.desk.data.name)
	switch scores := s.desk.question.Scores; len(scores) {
	case 0:
		return name + " (choose a column)"
	case 1:
		text := words.Name(s.columnName(scores[0])) + " scores in " + name
		if r := s.shown(); r != nil && !s.desk.old() && len(s.desk.answer.Results) == 1 {
			text = words.Count(r.Sample.Used) + " " + text
		}
		return text
	default:
		return strconv.Itoa(len(scores)) + " columns of scores in " + name
	}
}
