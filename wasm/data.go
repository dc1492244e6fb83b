package main

import (
	"slices"
	"strconv"

	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/intake"
	"tailgap/core/words"
)

// dataEditor chooses the file and the columns with the scores.
func (s *sheet) dataEditor() app.UI {
	d := s.desk
	return app.Span().Class("fields stacked").Body(
		app.Span().Class("fields").Body(
			app.Label().Class("chooser").Body(
				app.Text("Choose a file"),
				app.Input().ID("file").Type("file").Accept(".csv,.tsv,.txt,text/*").
					OnChange(s.act("file", func(ctx app.Context, _ app.Event) {
						if chosen := ctx.JSSrc().Get("files"); chosen.Get("length").Int() > 0 {
							s.take(chosen.Index(0))
						}
						ctx.JSSrc().Set("value", "") // so that the same file can be chosen again
					})),
			),
			app.Span().Class("aside").Text("or drop one anywhere on this page,"),
			app.Label().For("paste").Class("aside").Text("or paste scores here:"),
			app.Textarea().ID("paste").Rows(1).Spellcheck(false).
				OnPaste(s.act("paste", func(_ app.Context, e app.Event) {
					e.PreventDefault()
					s.takePaste(e)
				})).
				OnChange(s.act("paste-typed", func(ctx app.Context, _ app.Event) { s.takeText(typed(ctx)) })),
			when(!d.data.demo, func() app.UI {
				return app.Button().Type("button").ID("use-demo").Text("Back to the demo").
					OnClick(s.act("use-demo", func(app.Context, app.Event) { d.openDemo() }))
			}),
		),
		when(len(d.data.columns) > 1 || d.trouble[atRead] != "", s.columnChoice),
		when(d.data.demo, func() app.UI {
			return app.Span().Class("aside").Text("These scores are made up: a reading programme that takes in learners at three sites.")
		}),
	)
}

// columnChoice lists the file's columns, those with numbers before the others.
func (s *sheet) columnChoice() app.UI {
	columns := slices.Clone(s.desk.data.columns)
	slices.SortStableFunc(columns, func(a, b intake.Column) int {
		switch {
		case a.Numeric == b.Numeric:
			return 0
		case a.Numeric:
			return -1
		}
		return 1
	})
	return app.FieldSet().ID("columns").Class("columns").Body(
		app.Legend().Text("The scores are in"),
		app.Range(columns).Slice(func(i int) app.UI { return s.columnBox(columns[i]) }),
	)
}

func (s *sheet) columnBox(c intake.Column) app.UI {
	key, id := c.Ask, "column-"+strconv.Itoa(c.Number)
	kind := "numbers"
	if !c.Numeric {
		kind = "words"
	}
	return app.Label().Class("column", kind).Title(kind).Body(
		app.Input().Type("checkbox").ID(id).Checked(s.scoreIn(c) != "").
			OnChange(s.act(id+" "+key, func(ctx app.Context, _ app.Event) { s.columnTicked(key, ctx.JSSrc().Get("checked").Bool()) })),
		app.Span().Text(words.Name(c.Name)),
	)
}

// columnTicked takes a column into the question or out of it, in the order of
// the file.
func (s *sheet) columnTicked(key string, in bool) {
	q := s.desk.question
	var scores []string
	for _, c := range s.desk.data.columns {
		switch score := s.scoreIn(c); {
		case c.Ask == key && in:
			scores = append(scores, key)
		case c.Ask != key && score != "":
			scores = append(scores, score)
		}
	}
	q.Scores = scores
	s.result = 0
	s.change(atData, q, nil)
}

// scoreIn is how the question asks for a column; "" where it doesn't.
func (s *sheet) scoreIn(c intake.Column) string {
	for _, score := range s.desk.question.Scores {
		if found, ok := intake.Find(s.desk.data.columns, score); ok && found.Number == c.Number {
			return score
		}
	}
	return ""
}

// columnName is the name that the file has for a column of the question.
func (s *sheet) columnName(score string) string {
	if c, ok := intake.Find(s.desk.data.columns, score); ok && c.Name != "" {
		return c.Name
	}
	return score
}
