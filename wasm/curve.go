package main

import (
	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/curve"
)

// curveEditor chooses between the curve fitted to the scores and one that is
// given by its mean and SD.
func (s *sheet) curveEditor() app.UI {
	given := s.draft.given || s.desk.question.Curve != nil
	mean, sd := s.draft.mean, s.draft.sd
	if c := s.desk.question.Curve; c != nil {
		mean, sd = plain(c.Mean), plain(c.SD)
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
			)
		}),
	)
}

func (s *sheet) curveField(id, value string) app.UI {
	return app.Input().ID(id).Class("figure").AutoComplete(false).Value(value).
		OnChange(s.act(id, func(app.Context, app.Event) { s.curveTyped() }))
}

func (s *sheet) fitCurve() {
	s.draft = draft{}
	q := s.desk.question
	q.Curve = nil
	s.change(atCurve, q, nil)
}

// curveTyped takes in the mean and the SD once both are there.
func (s *sheet) curveTyped() {
	s.draft.given, s.draft.mean, s.draft.sd = true, valueOf("mean"), valueOf("sd")
	if s.draft.mean == "" || s.draft.sd == "" {
		return // not finished
	}
	mean, err := number(s.draft.mean)
	sd, errSD := number(s.draft.sd)
	if err == nil {
		err = errSD
	}
	q := s.desk.question
	q.Curve = &curve.Given{Mean: mean, SD: sd}
	s.change(atCurve, q, err)
}
