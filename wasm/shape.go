package main

import (
	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/ask"
	"tailgap/core/figure"
	"tailgap/core/words"
)

// effect is a column of a table: what one thing does to the gaps.
type effect struct {
	heading, field string // field is its name in the JSON answer
	at             func(e ask.Effects) *ask.Effect
}

// parts add up to a gap.
var parts = []effect{
	{"Another mean and SD", "mean_and_sd", func(e ask.Effects) *ask.Effect { return e.MeanAndSD }},
	{"No half-step", "half_step", func(e ask.Effects) *ask.Effect { return e.HalfStep }},
	{"Asymmetry", "asymmetry", func(e ask.Effects) *ask.Effect { return e.Asymmetry }},
	{"Tails and peak", "rest", func(e ask.Effects) *ask.Effect { return e.Rest }},
}

// features each make the difference between the gap and the gap without them.
var features = []effect{
	{"The people at the lowest score", "floor", func(e ask.Effects) *ask.Effect { return e.Floor }},
	{"The people at the highest score", "ceiling", func(e ask.Effects) *ask.Effect { return e.Ceiling }},
	{"Heaps on round scores", "heaps", func(e ask.Effects) *ask.Effect { return e.Heaps }},
	{"The most extreme hundredth", "extremes", func(e ask.Effects) *ask.Effect { return e.Extremes }},
	{"The single most extreme score", "farthest", func(e ask.Effects) *ask.Effect { return e.Farthest }},
}

// shape is what the shape of the scores does to the gaps, opened as wanted.
func (s *sheet) shape(q ask.Question, r *ask.Result) app.UI {
	if r.Shape == nil {
		return nil
	}
	level := ""
	if !q.Everyone {
		level = " Intervals at " + words.Level(q.Level) + "."
	}
	return app.Details().ID("shape").Body(
		app.Summary().Text("What makes the gaps: the shape of the scores"),
		paragraphs(words.Shape(q, *r)),
		effectTable(r, parts, "What each gap is made of, in points, + is too high. The parts add up to the gap."+level),
		effectTable(r, features, "What single things in the scores do to each gap: the gap less the gap without them, in points, + is too high."+level),
		s.worm(q, r),
		when(words.Normality(*r) != "", func() app.UI {
			return app.Section().ID("normality").Body(
				app.H3().Text("Tests of normality"),
				app.P().Text(words.Normality(*r)),
				when(words.Tested(*r), func() app.UI { return app.P().Text(words.NoAnswer()) }),
			)
		}),
	)
}

// effectTable has a row for each cutoff and a column for each effect that there
// is at any of them.
func effectTable(r *ask.Result, effects []effect, caption string) app.UI {
	var used []effect
	for _, e := range effects {
		for _, at := range r.Shape.Cutoffs {
			if e.at(at.Effects) != nil {
				used = append(used, e)
				break
			}
		}
	}
	return when(len(used) > 0, func() app.UI {
		return app.Table().Body(
			app.Caption().Text(caption),
			app.THead().Body(app.Tr().Body(
				app.Th().Scope("col").Text("Cutoff"),
				app.Th().Scope("col").Text("Gap"),
				app.Range(used).Slice(func(i int) app.UI { return app.Th().Scope("col").Text(used[i].heading) }),
			)),
			app.TBody().Body(
				app.Range(r.Cutoffs).Slice(func(i int) app.UI { return effectRow(r.Cutoffs[i], r.Shape.Cutoffs[i].Effects, used) }),
			),
		)
	})
}

func effectRow(f ask.Finding, effects ask.Effects, used []effect) app.UI {
	return app.Tr().Class("judged").DataSet("cutoff", f.Cutoff.String()).Body(
		app.Th().Scope("row").Text(words.Capital(f.Cutoff.Words())),
		app.Td().DataSet("label", "Gap").Body(shown("gap_points", f.GapPoints, words.SignedGapOf(f.Reading))),
		app.Range(used).Slice(func(i int) app.UI {
			e := used[i].at(effects)
			if e == nil {
				return app.Td().Class("empty")
			}
			return app.Td().DataSet("label", used[i].heading).Body(
				shown(used[i].field+".points", e.Points, words.SignedEffect(f, *e)),
				when(e.Low != nil && e.High != nil, func() app.UI {
					return app.Span().Class("interval soft").Body(
						shown(used[i].field+".low", *e.Low, ""), shown(used[i].field+".high", *e.High, ""),
						app.Text("("+words.SignedEffectLimits(f, *e)+")"),
					)
				}),
			)
		}),
	)
}

// worm is the worm plot with what it shows.
func (s *sheet) worm(q ask.Question, r *ask.Result) app.UI {
	o := s.options("worm")
	return when(len(r.Shape.Worm.Score) > 0, func() app.UI {
		return app.Section().ID("worm").Body(
			app.H3().Text("Worm plot"),
			app.P().Text(words.ReadWorm()),
			s.drawn.worm.of(r, 0, o, func() string { return figure.Worm(q, *r, o) }),
			paragraphs(words.Worm(q, *r)),
		)
	})
}
