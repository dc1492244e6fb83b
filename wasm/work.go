package main

import (
	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/words"
)

// work says how the computing stands: going on, stopped, or gone wrong. What
// is shown below it may answer an earlier question, and then it says so.
func (s *sheet) work() app.UI {
	d := s.desk
	return app.Div().ID("work").Class("work").DataSet("state", s.state()).Body(
		when(s.slow && d.running != nil, s.bar),
		when(d.stopped, s.again),
		trouble(d.trouble[atWork]),
		when(d.old(), func() app.UI { return app.P().ID("old").Class("old-mark").Text(d.oldness()) }),
	)
}

func (s *sheet) state() string {
	switch {
	case s.desk.running != nil:
		return "working"
	case s.desk.stopped:
		return "stopped"
	case s.desk.trouble[atWork] != "" || s.desk.trouble[atRead] != "":
		return "failed"
	}
	return "done"
}

func (s *sheet) bar() app.UI {
	return app.P().Class("bar").Body(
		&gauge{Of: s.desk.running, Name: s.desk.data.name},
		app.Button().ID("cancel").Text("Cancel").OnClick(s.act("cancel", func(app.Context, app.Event) { s.desk.cancel() })),
	)
}

func (s *sheet) again() app.UI {
	return app.P().Body(
		app.Text("Stopped. "),
		app.Button().ID("ask-again").Text("Ask again").OnClick(s.act("ask-again", func(app.Context, app.Event) { s.desk.ask() })),
	)
}

// oldness says what it is that is shown in place of an answer.
func (d *desk) oldness() string {
	switch {
	case d.answerData.is(d.data):
	case d.answerData.name == d.data.name:
		return "What stands below is about the data before, not about the data above."
	default:
		return "What stands below is about " + d.answerData.name + ", not about the data above."
	}
	return "What stands below answers an earlier question, not the one above."
}

// trouble is a sentence about something that is wrong, where it is wrong.
func trouble(text string) app.UI {
	return when(text != "", func() app.UI { return app.P().Class("trouble").Role("alert").Text(text) })
}

// gauge shows how far a job is. It looks for itself, so that the rest of the
// page need not be drawn anew for it.
type gauge struct {
	app.Compo
	Of   *job
	Name string // of the data on the desk
}

// OnMount begins to look.
func (g *gauge) OnMount(ctx app.Context) {
	ctx.After(tellEvery, func(ctx app.Context) {
		if g.Mounted() {
			g.OnMount(ctx)
		}
	})
}

// Render is the bar, and what it is about.
func (g *gauge) Render() app.UI {
	const full = 1000
	p := g.Of.progress
	bar := app.Progress().ID("progress").Max(full)
	if p.Total > 0 {
		bar = bar.Value(itoa(int(full * float64(p.Done) / float64(p.Total))))
	}
	return app.Span().Class("gauge").Body(app.Label().For("progress").Text(g.doing()), bar)
}

// doing says what is being done.
func (g *gauge) doing() string {
	switch {
	case g.Of.opens != nil:
		return "Opening " + words.Name(g.Of.opens.name)
	case g.Of.progress.Stage == stageReading:
		return "Reading " + words.Name(g.Name)
	}
	return "Working it out"
}
