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

// slot is one part of the sentence, with the mark that follows it, and below
// them its editor when it is open.
func (s *sheet) slot(at place, text, mark string, editor func() app.UI) app.UI {
	id, open, class := string(at), s.open == at, "slot"
	if len(text) <= 24 {
		class += " whole" // too short to be broken over lines
	}
	if at == atAdd && len(s.desk.question.Cutoffs) > 0 {
		class += " adding"
	}
	return app.Span().Class("slotted").Body(
		// Not a button element: that would stand in the sentence as one block
		// and could not run over the end of a line.
		app.Span().Role("button").TabIndex(0).Class(class).ID("slot-"+id).Text(text).
			Aria("expanded", open).Aria("controls", "editor-"+id).
			OnClick(s.act("slot-"+id, func(app.Context, app.Event) { s.toggle(at) })).
			OnKeyDown(s.act("slot-key-"+id, func(_ app.Context, e app.Event) {
				if key := e.Get("key").String(); key == "Enter" || key == " " {
					e.PreventDefault() // or the page would scroll
					s.toggle(at)
				}
			})),
		app.Text(mark),
		when(open, func() app.UI {
			return app.Span().Class("editor").ID("editor-"+id).Role("group").Aria("label", text).
				OnKeyDown(s.act("keys-"+id, func(_ app.Context, e app.Event) {
					if e.Get("key").String() == "Escape" {
						s.close()
					}
				})).
				Body(
					editor(),
					trouble(s.desk.trouble[at]),
					app.Button().Type("button").Class("done").Text("Done").
						OnClick(s.act("done-"+id, func(app.Context, app.Event) { s.close() })),
				)
		}),
		// What is wrong with a part is said beside it, also when it is closed.
		when(!open, func() app.UI { return trouble(s.desk.trouble[at]) }),
	)
}

// toggle opens a slot's editor, or closes it.
func (s *sheet) toggle(at place) {
	if s.open == at {
		s.close()
		return
	}
	s.show(at)
}

// show opens a slot's editor and puts the focus into it.
func (s *sheet) show(at place) {
	if s.open == at {
		return
	}
	s.forget()
	s.open = at
	s.focusInside("editor-" + string(at))
}

// close closes the open editor and goes back to its slot.
func (s *sheet) close() {
	at := s.open
	s.forget()
	s.focusOn("slot-"+string(at), "slot-"+string(atAdd))
}

// forget drops the open editor, with what was typed there and came to nothing.
func (s *sheet) forget() {
	if s.open != atData { // what is wrong with the data stays wrong
		delete(s.desk.trouble, s.open)
	}
	s.open, s.draft = "", draft{}
}

// change asks another question, if it is one that can be answered; else the
// place says why it isn't.
func (s *sheet) change(at place, q ask.Question, err error) bool {
	if err == nil {
		err = q.Check()
	}
	if err != nil {
		s.desk.trouble[at] = sentence(err)
		return false
	}
	delete(s.desk.trouble, at)
	s.desk.change(q)
	return true
}

func curveWords(q ask.Question) string {
	if q.Curve == nil {
		return "the normal curve fitted to them"
	}
	return "the normal curve with mean " + words.Number(q.Curve.Mean) + " and SD " + words.Number(q.Curve.SD)
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
