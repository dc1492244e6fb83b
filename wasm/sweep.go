package main

import (
	"slices"
	"strconv"

	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/figure"
	"tailgap/core/words"
)

// drawn keeps the figures that were drawn last, so that a change elsewhere on
// the page doesn't draw them again.
type drawn struct {
	sweep, counted, worm picture
}

// picture is a figure with what it was drawn from.
type picture struct {
	result  *ask.Result
	index   int // of the sweep or cutoff
	options figure.Options
	svg     string
}

func (p *picture) of(r *ask.Result, index int, o figure.Options, draw func() string) app.UI {
	if p.result != r || p.index != index || p.options != o {
		*p = picture{r, index, o, draw()}
	}
	return app.Raw(p.svg)
}

// sweep is the widest thing on the page: the gap over the whole score range,
// for one side at a time.
func (s *sheet) sweep(q ask.Question, r *ask.Result) app.UI {
	i := s.sweepShown(r)
	if i < 0 {
		return app.Section().ID("sweep")
	}
	o := s.options("sweep")
	return app.Section().ID("sweep").DataSet("side", r.Sweeps[i].Side.String()).
		OnClick(s.act("grip", func(_ app.Context, e app.Event) { s.gripClicked(e) })).
		Body(
			s.sideChoice(r, i),
			s.drawn.sweep.of(r, i, o, func() string { return figure.Sweep(q, *r, r.Sweeps[i], o) }),
		)
}

// counted is the counted scores against the curve for the cutoff in hand.
func (s *sheet) counted(q ask.Question, r *ask.Result) app.UI {
	if s.selected >= len(r.Cutoffs) {
		return app.Section().ID("counted")
	}
	f, o := r.Cutoffs[s.selected], s.options("counted")
	return app.Section().ID("counted").Body(
		app.H2().Text("Counted against curve, "+f.Cutoff.Words()),
		s.drawn.counted.of(r, s.selected, o, func() string { return figure.Counted(q, *r, f, o) }),
	)
}

func (s *sheet) options(prefix string) figure.Options {
	return figure.Options{Width: s.width, Selected: s.selected, Prefix: prefix}
}

// sweepShown is which sweep is shown: the chosen side's, else that of the
// cutoff in hand, else the first; -1 when there is none.
func (s *sheet) sweepShown(r *ask.Result) int {
	of := func(side cutoff.Side) int {
		return slices.IndexFunc(r.Sweeps, func(sweep ask.Sweep) bool { return sweep.Side == side })
	}
	if s.side != nil {
		if i := of(*s.side); i >= 0 {
			return i
		}
	}
	if s.selected < len(r.Cutoffs) {
		if i := of(r.Cutoffs[s.selected].Cutoff.Side); i >= 0 {
			return i
		}
	}
	return min(0, len(r.Sweeps)-1)
}

// sideChoice chooses between the sweeps of several sides.
func (s *sheet) sideChoice(r *ask.Result, chosen int) app.UI {
	return when(len(r.Sweeps) > 1, func() app.UI {
		return app.Div().Class("choice").Role("group").Aria("label", "Which people the sweep counts").Body(
			app.Range(r.Sweeps).Slice(func(i int) app.UI {
				side := r.Sweeps[i].Side
				return app.Button().Type("button").Class("option").Text(words.SideName(side)).
					DataSet("side", side.String()).Aria("pressed", i == chosen).
					OnClick(s.act("side-"+side.String(), func(app.Context, app.Event) { s.side = &side }))
			}),
		)
	})
}

// gripClicked takes the cutoff in hand whose grip was clicked.
func (s *sheet) gripClicked(e app.Event) {
	grip := e.Get("target").Call("closest", "[data-cutoff]")
	if !grip.Truthy() {
		return
	}
	if i, err := strconv.Atoi(grip.Call("getAttribute", "data-cutoff").String()); err == nil {
		s.pick(i)
	}
}
