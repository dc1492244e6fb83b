package main

import (
	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
)

// draft is what an open editor knows that the question can't hold yet.
type draft struct {
	side   *cutoff.Side // of the cutoff being edited
	given  bool         // a given curve, before its mean and SD are both there
	mean   string
	sd     string
	people string // norm people
	unit   string // of the limit being edited, before its size is there
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
			OnClick(s.act("slot-"+id, func(app.Context, app.Event) { s.toggle(at) })), // web/loader.js makes Enter and the space bar click
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
					trouble(s.wrong(at)),
					app.Button().Type("button").Class("done").Text("Done").
						OnClick(s.act("done-"+id, func(app.Context, app.Event) { s.close() })),
				)
		}),
		// What is wrong with a part is said beside it, also when it is closed.
		when(!open, func() app.UI { return trouble(s.wrong(at)) }),
	)
}

// wrong says what is wrong with a part of the question. With the data it may
// be they themselves, or that the question can't be asked of them.
func (s *sheet) wrong(at place) string {
	text := s.desk.trouble[at]
	if at == atData && text == "" {
		text = s.desk.trouble[atRead]
	}
	return text
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
