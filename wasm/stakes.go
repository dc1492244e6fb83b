package main

import (
	"fmt"

	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/ask"
	"tailgap/core/verdict"
	"tailgap/core/words"
)

// units in the order in which they are offered, as they end a limit's text.
var units = []struct{ ending, text string }{
	{"pt", "points"}, {"%count", "% of the count"}, {"heads", "people"},
}

func limitWords(limit *verdict.Limit) string {
	if limit == nil {
		return "any amount"
	}
	return "at most " + words.Limit(*limit)
}

// limitOf is the question's limit at a place.
func limitOf(q *ask.Question, at place) **verdict.Limit {
	if at == atHigh {
		return &q.TooHigh
	}
	return &q.TooLow
}

// limitEditor sets, changes or lifts one side of the tolerance.
func (s *sheet) limitEditor(at place) func() app.UI {
	return func() app.UI {
		q := s.desk.question
		limit := *limitOf(&q, at)
		size, unit := "", s.draft.unit
		if limit != nil {
			size = plain(limit.Size)
			if unit == "" {
				unit = units[limit.Unit].ending
			}
		}
		id := string(at)
		typed := func(name string) (app.EventHandler, any) {
			return s.act(name+id, func(app.Context, app.Event) { s.limitTyped(at) })
		}
		return app.Span().Class("fields").Body(
			app.Label().For("size-"+id).Text("At most"),
			app.Input().ID("size-"+id).Class("figure").AutoComplete(false).Value(size).OnChange(typed("size-")),
			app.Select().ID("unit-"+id).Aria("label", "Unit").OnChange(typed("unit-")).Body(
				app.Range(units).Slice(func(i int) app.UI {
					return app.Option().Value(units[i].ending).Text(units[i].text).Selected(units[i].ending == unit)
				}),
			),
			app.Button().Type("button").ID("none-"+id).Text("No limit").
				OnClick(s.act("none-"+id, func(app.Context, app.Event) { s.liftLimit(at) })),
		)
	}
}

// limitTyped takes in what now stands in the fields of a limit.
func (s *sheet) limitTyped(at place) {
	size, unit := valueOf("size-"+string(at)), valueOf("unit-"+string(at))
	s.draft.unit = unit
	if size == "" {
		return // not finished
	}
	q := s.desk.question
	limit, err := limitIn(size, unit)
	*limitOf(&q, at) = &limit
	s.change(at, q, err)
}

// limitIn reads the size of a limit and the ending of its unit.
func limitIn(size, unit string) (verdict.Limit, error) {
	x, err := number(size)
	switch {
	case err != nil:
		return verdict.Limit{}, err
	case x < 0:
		return verdict.Limit{}, fmt.Errorf("a tolerance of %s can't be used; it must be zero or more", plain(x))
	}
	return verdict.ParseLimit(plain(x) + unit)
}

func (s *sheet) liftLimit(at place) {
	q := s.desk.question
	*limitOf(&q, at) = nil
	if s.change(at, q, nil) {
		s.close()
	}
}

// headsEditor says how many people the share is going to be applied to.
func (s *sheet) headsEditor() app.UI {
	heads := ""
	if h := s.desk.question.Heads; h != nil {
		heads = plain(*h)
	}
	return app.Span().Class("fields").Body(
		app.Label().For("heads").Text("How many people the share will be applied to"),
		app.Input().ID("heads").Class("figure").AutoComplete(false).Value(heads).
			OnChange(s.act("heads", func(ctx app.Context, _ app.Event) { s.headsTyped(typed(ctx)) })),
		app.Button().Type("button").ID("no-heads").Text("Shares only").
			OnClick(s.act("no-heads", func(app.Context, app.Event) {
				if s.headsTyped("") {
					s.close()
				}
			})),
	)
}

func (s *sheet) headsTyped(text string) bool {
	q := s.desk.question
	q.Heads = nil
	if text == "" {
		return s.change(atHeads, q, nil)
	}
	heads, err := number(text)
	q.Heads = &heads
	return s.change(atHeads, q, err)
}
