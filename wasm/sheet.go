package main

import (
	"time"

	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/words"
)

// sheet is the whole page, read from top to bottom like a finding: the
// question, the sweep, a card for each cutoff, and what lies behind them.
type sheet struct {
	app.Compo
	desk *desk
	page app.Context // the sheet's own, to show what comes from elsewhere

	open     place        // the slot whose editor is open; "" when none is
	draft    draft        // what the open editor knows that the question doesn't
	result   int          // which score's result is shown
	side     *cutoff.Side // which sweep is shown; nil: that of the selected cutoff
	selected int          // which cutoff is in hand
	width    int          // of the column, px
	slow     bool         // the work has taken long enough to say so
	live     string       // what a screen reader is told about the newest answer
	drawn    drawn        // figures that were drawn already
}

// OnInit lays the demo out. The framework makes the sheet itself, empty.
func (s *sheet) OnInit() { s.desk, s.width = newDesk(), 1120 }

// slowAfter is how long work may take before its progress is shown. It fades
// in (web/style.css), so that work that is over soon does not flash.
const slowAfter = 50 * time.Millisecond

// OnMount gives the desk its way into the page and asks the demo's question.
func (s *sheet) OnMount(ctx app.Context) {
	s.page = ctx
	s.desk.start = startCrew
	s.desk.soon = func(do func()) { ctx.Dispatch(func(app.Context) { s.settle(do) }) }
	s.desk.aside = func(do func()) {
		ctx.Dispatcher().Dispatch(app.Dispatch{Mode: app.Next, Source: s, Function: func(app.Context) { do() }})
	}
	s.desk.after = func(wait time.Duration, do func()) {
		ctx.After(wait, func(app.Context) { s.settle(do) })
	}
	s.listenForFiles()
	s.settle(s.desk.ask)
	s.measure(ctx)
}

// OnResize draws the figures anew for the new width.
func (s *sheet) OnResize(ctx app.Context) { s.measure(ctx) }

func (s *sheet) measure(ctx app.Context) {
	ctx.Defer(func(ctx app.Context) {
		if width := widthOf("column"); width > 0 && width != s.width {
			s.width = width
			ctx.Dispatch(func(app.Context) {})
		}
	})
}

// settle does something to the desk and brings the rest of the sheet in line.
func (s *sheet) settle(do func()) {
	before, working, from := s.desk.answer, s.desk.running, s.desk.data.file
	do()
	if s.desk.data.file != from && !s.desk.ready() {
		s.focusInside("columns") // what is missing now
	}
	if s.desk.answer != before {
		s.arrived()
	}
	if s.desk.running != working {
		s.watch()
	}
}

// arrived takes in a new answer.
func (s *sheet) arrived() {
	a := s.desk.answer
	s.result = min(s.result, max(0, len(a.Results)-1))
	if r := s.shown(); r != nil {
		s.selected = min(s.selected, max(0, len(r.Cutoffs)-1))
	}
	s.live = announcement(a)
}

// watch shows the progress of what has just begun, if it takes its time.
func (s *sheet) watch() {
	begun := s.desk.running
	if begun == nil {
		s.slow = false
		return
	}
	s.page.After(slowAfter, func(app.Context) { s.slow = s.slow || s.desk.running == begun })
}

// shown is the result on the page; nil before the first answer.
func (s *sheet) shown() *ask.Result {
	if s.desk.answer == nil || s.result >= len(s.desk.answer.Results) {
		return nil
	}
	return &s.desk.answer.Results[s.result]
}

// act is what happens when a person does something at the page. The framework
// tells handlers apart by their name only, so one name must mean one thing.
func (s *sheet) act(name string, do func(ctx app.Context, e app.Event)) (app.EventHandler, any) {
	return func(ctx app.Context, e app.Event) { s.settle(func() { do(ctx, e) }) }, name
}

// when shows something only where it applies.
func when(applies bool, show func() app.UI) app.UI {
	if !applies {
		return nil
	}
	return show()
}

// Render is the page from top to bottom.
func (s *sheet) Render() app.UI {
	return app.Main().ID("column").Body(
		s.header(),
		s.sentence(),
		s.work(),
		s.findings(),
		s.takeAway(),
		foot(),
		app.Div().Class("unseen").Role("status").Aria("live", "polite").Text(s.live),
	)
}

func (s *sheet) header() app.UI {
	return app.Header().Body(
		app.H1().Text("tailgap"),
		when(s.desk.data.demo, func() app.UI {
			return app.Strong().Class("demo").Title(words.Demo()).Text("DEMO")
		}),
		app.P().Text("Nothing can leave this page: its own policy blocks every connection, and it stores nothing."),
	)
}

func foot() app.UI {
	cautions := words.Cautions()
	return app.Footer().Body(
		app.Range(cautions).Slice(func(i int) app.UI { return app.P().Text(cautions[i]) }),
		app.P().Text(ask.Program),
	)
}
