package main

import (
	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/ask"
	"tailgap/core/figure"
	"tailgap/core/report"
)

// takings are what can be taken away from an answer.
var takings = []struct {
	id, label, name, kind string
	make                  func(a ask.Answer) ([]byte, error)
}{
	{"save-text", "Text", "tailgap.txt", "text/plain", func(a ask.Answer) ([]byte, error) { return []byte(report.Text(a)), nil }},
	{"save-csv", "Table (CSV)", "tailgap.csv", "text/csv", report.CSV},
	{"save-figure", "Figures (SVG)", "tailgap.svg", "image/svg+xml", func(a ask.Answer) ([]byte, error) { return []byte(figure.Sheet(a)), nil }},
	{"save-worm", "Worm plots (SVG)", "tailgap-worm.svg", "image/svg+xml", func(a ask.Answer) ([]byte, error) { return []byte(figure.WormSheet(a)), nil }},
	{"save-json", "Answer (JSON)", "tailgap-answer.json", "application/json", report.JSON},
}

// takeAway saves what was asked and what was found, and opens a question.
func (s *sheet) takeAway() app.UI {
	return app.Details().ID("take-away").Body(
		app.Summary().Text("Take away"),
		app.P().Body(
			app.Text("The question, without any data: "),
			app.Button().Type("button").ID("save-question").Text("Save the question").
				OnClick(s.act("save-question", func(app.Context, app.Event) {
					text, err := ask.WriteQuestion(s.desk.question)
					s.hand("tailgap-question.json", "application/json", text, err)
				})),
			app.Text(" "),
			app.Label().Class("chooser").Body(
				app.Text("Open a question"),
				app.Input().ID("open-question").Type("file").Accept(".json,application/json").
					OnChange(s.act("open-question", func(ctx app.Context, _ app.Event) {
						if chosen := ctx.JSSrc().Get("files"); chosen.Get("length").Int() > 0 {
							s.takeQuestion(chosen.Index(0))
						}
						ctx.JSSrc().Set("value", "")
					})),
			),
		),
		s.takings(),
		trouble(s.desk.trouble[atAway]),
	)
}

// takings are the answer's files, as long as it is the answer to what is asked.
func (s *sheet) takings() app.UI {
	why := s.desk.untakable()
	return app.P().Body(
		app.Text("The answer, for use inside: "),
		app.Range(takings).Slice(func(i int) app.UI {
			t := takings[i]
			return app.Button().Type("button").ID(t.id).Text(t.label).Disabled(why != "").
				OnClick(s.act(t.id, func(app.Context, app.Event) {
					if s.desk.untakable() != "" {
						return // it was pressed before the page showed so
					}
					text, err := t.make(*s.desk.answer)
					s.hand(t.name, t.kind, text, err)
				}))
		}),
		when(why != "", func() app.UI { return app.Span().ID("untakable").Class("old-mark").Text(why) }),
		app.Span().Class("line soft").Text("Its exact shares allow counts of single people to be worked out, so keep these files where the scores may be kept."),
	)
}

// untakable says why there is no answer to take away; "" when there is one.
func (d *desk) untakable() string {
	switch {
	case d.answer == nil:
		return "There is none yet: wait for it."
	case d.old():
		return "The answer shown is old: wait for the new one."
	}
	return ""
}

// hand gives a file to the person, or says why there is none.
func (s *sheet) hand(name, kind string, text []byte, err error) {
	delete(s.desk.trouble, atAway)
	if err != nil {
		s.desk.trouble[atAway] = sentence(err)
		return
	}
	save(name, kind, text)
}
