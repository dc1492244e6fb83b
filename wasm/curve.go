package main

import (
	"fmt"
	"strconv"

	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/curve"
)

// curveEditor chooses between the curve fitted to the scores and one that is
// given by its mean and SD.
func (s *sheet) curveEditor() app.UI {
	given := s.draft.given || s.desk.question.Curve != nil
	mean, sd, people := s.draft.mean, s.draft.sd, s.draft.people
	if c := s.desk.question.Curve; c != nil {
		mean, sd, people = plain(c.Mean), plain(c.SD), ""
		if c.NormN != nil {
			people = strconv.Itoa(*c.NormN)
		}
	}
	return app.Span().Class("fields").Body(
		app.Label().Body(
			app.Input().ID("curve-fitted").Type("radio").Name("curve").Checked(!given).
				OnChange(s.act("curve-fitted", func(app.Context, app.Event) { s.fitCurve() })),
			app.Text(" fitted to the scores"),
		),
		app.Label().Body(
			app.Input().ID("curve-given").Type("radio").Name("curve").Checked(given).
				OnChange(s.act("curve-given", func(app.Context, app.Event) {
					s.draft.given = true
					s.focusOn("mean")
				})),
			app.Text(" given, as in printed norms"),
		),
		when(given, func() app.UI {
			return app.Span().Class("pair").Body(
				app.Label().For("mean").Text("mean"),
				s.curveField("mean", mean),
				app.Label().For("sd").Text("SD"),
				s.curveField("sd", sd),
				app.Label().For("norm-n").Text("norm people"),
				s.curveField("norm-n", people).Aria("describedby", "hint-norm-n"),
			)
		}),
		when(given, func() app.UI {
			return app.Small().ID("hint-norm-n").Text("how many people mean and SD come from; empty if they are to count as exact")
		}),
	)
}

func (s *sheet) curveField(id, value string) app.HTMLInput {
	return app.Input().ID(id).Class("figure").AutoComplete(false).Value(value).
		OnChange(s.act(id, func(app.Context, app.Event) { s.curveTyped() }))
}

func (s *sheet) fitCurve() {
	s.draft = draft{}
	q := s.desk.question
	q.Curve = nil
	s.change(atCurve, q, nil)
}

// curveTyped takes in the mean and the SD once both are there, and how many
// people they come from.
func (s *sheet) curveTyped() {
	s.draft.given, s.draft.mean, s.draft.sd, s.draft.people = true, valueOf("mean"), valueOf("sd"), valueOf("norm-n")
	if s.draft.mean == "" || s.draft.sd == "" {
		return // not finished
	}
	mean, err := number(s.draft.mean)
	sd, errSD := number(s.draft.sd)
	if err == nil {
		err = errSD
	}
	people, errPeople := normPeople(s.draft.people)
	if err == nil {
		err = errPeople
	}
	q := s.desk.question
	q.Curve = &curve.Given{Mean: mean, SD: sd, NormN: people}
	s.change(atCurve, q, err)
}

// normPeople reads how many people norms come from; nil where nothing is said.
func normPeople(text string) (*int, error) {
	if text == "" {
		return nil, nil
	}
	people, err := whole(text)
	if err != nil {
		return nil, fmt.Errorf("%.40q is no number of norm people; write a whole number, or nothing if mean and SD are to count as exact", text)
	}
	return &people, nil
}
