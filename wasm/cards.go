package main

import (
	"cmp"
	"math"
	"slices"

	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/figure"
	"tailgap/core/words"
)

// cards are the findings, each hanging under its cutoff's grip. Where they
// don't fit into one row they stand in a grid, in the order of the cutoffs.
func (s *sheet) cards(q ask.Question, r *ask.Result) app.UI {
	if len(r.Cutoffs) == 0 {
		return app.Div().ID("cards").Class("cards").Body(
			app.P().Class("none").Text("Name a cutoff in the question to see what the curve makes of it."),
		)
	}
	column := float64(s.width)
	poles := make([][]float64, len(r.Cutoffs))
	middles := make([]float64, len(r.Cutoffs))
	for i, f := range r.Cutoffs {
		poles[i] = polesOf(f.Cutoff, figure.SweepFrame(*r, s.options("sweep")))
		middles[i] = (poles[i][0] + poles[i][len(poles[i])-1]) / 2
	}
	var left []float64
	width, row := cardWide, "row wide"
	if s.width >= stacked {
		if left = hang(middles, column, width); left == nil {
			width, row = cardWidth, "row"
			left = hang(middles, column, width)
		}
	}
	if left == nil {
		return app.Div().ID("cards").Class("cards", "grid").Body(
			app.Range(r.Cutoffs).Slice(func(i int) app.UI { return s.card(q, r.Cutoffs[i], i) }),
		)
	}
	return app.Div().ID("cards").Class("cards").Body(
		app.Raw(ties(poles, left, column, width, s.selected)),
		app.Div().Class(row).Body(s.row(q, r, left, width)...),
	)
}

// row hangs the cards from left to right, each with its distance to the one
// before. The policy lets no style attribute in: the loader sets data-at.
func (s *sheet) row(q ask.Question, r *ask.Result, left []float64, width float64) []app.UI {
	order := make([]int, len(left))
	for i := range order {
		order[i] = i
	}
	slices.SortFunc(order, func(a, b int) int { return cmp.Compare(left[a], left[b]) })
	row := make([]app.UI, len(left))
	end := 0.0
	for rank, i := range order {
		row[rank] = s.card(q, r.Cutoffs[i], i).DataSet("at", exact(left[i]-end)+"px")
		end = left[i] + width
	}
	return row
}

// polesOf is where a cutoff's grip stands, in px: two places for a stretch.
func polesOf(c cutoff.Cutoff, frame figure.Frame) []float64 {
	at := func(score float64) float64 { return math.Min(math.Max(frame.X(score), frame.Left), frame.Right) }
	if c.Side == cutoff.Stretch {
		return []float64{at(c.At), at(c.To)}
	}
	return []float64{at(c.At)}
}

// card is what was found at one cutoff.
func (s *sheet) card(q ask.Question, f ask.Finding, i int) app.HTMLArticle {
	class := "card"
	if i == s.selected {
		class += " selected"
	}
	if f.Verdict != nil {
		class += " " + *f.Verdict
	}
	return app.Article().Class(class).DataSet("cutoff", f.Cutoff.String()).Body(
		app.H3().Body(
			app.Button().Type("button").Class("pick").Text(words.Capital(f.Cutoff.Words())).
				Aria("pressed", i == s.selected).
				OnClick(s.act("card-"+itoa(i), func(app.Context, app.Event) { s.pick(i) })),
		),
		shares(f),
		gapLines(q, f),
		verdictLines(q, f),
		when(f.HalfStep != nil, func() app.UI { return app.P().Class("soft").Text(words.OtherReading(q, f)) }),
		app.Range(f.Notes).Slice(func(i int) app.UI { return app.P().Class("note").Text(words.Line(words.Capital(f.Notes[i]))) }),
	)
}

func shares(f ask.Finding) app.UI {
	return app.P().Class("shares").Body(
		shown("curve_share", f.CurveShare, words.Share(f.CurveShare)).Class("curve"),
		app.Span().Text("by the curve"),
		shown("counted_share", f.CountedShare, words.Share(f.CountedShare)).Class("count"),
		app.Span().Body(
			app.Text("counted: "),
			shown("counted", float64(f.Counted), words.Count(f.Counted)),
		),
	)
}

// gapLines are the gap with its interval, in points, as a ratio and in people.
func gapLines(q ask.Question, f ask.Finding) app.UI {
	return app.P().Class("gap").Body(
		app.Strong().Body(shown("gap_points", f.GapPoints, words.Capital(words.GapOf(f.Reading)))),
		interval(words.Limits(f.Reading)),
		when(f.Ratio != nil, func() app.UI {
			return app.Span().Class("line").Body(shown("ratio", *f.Ratio, words.Capital(words.Ratio(f))))
		}),
		when(f.Heads != nil, func() app.UI {
			return app.Span().Class("line").Body(
				shown("heads.gap", f.Heads.Gap, words.Capital(words.Heads(q, f))),
				interval(words.HeadLimits(f)),
			)
		}),
	)
}

func interval(limits string) app.UI {
	return when(limits != "", func() app.UI {
		return app.Span().Body(app.Text(" "), app.Span().Class("soft interval").Text("("+limits+")"))
	})
}

func verdictLines(q ask.Question, f ask.Finding) app.UI {
	return when(f.Verdict != nil, func() app.UI {
		return app.P().Class("said").Body(
			shownText("verdict", *f.Verdict, *f.Verdict).Class("verdict"),
			app.Text(" "+words.Capital(words.Reason(q, f))+"."),
			when(words.Settle(q, f) != "", func() app.UI {
				return app.Span().Class("line soft").Text(words.Capital(words.Settle(q, f)) + ".")
			}),
		)
	})
}
