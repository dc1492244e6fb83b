package main

import (
	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/ask"
	"tailgap/core/words"
)

// headings of the table, with the names that a narrow page puts before each
// figure instead.
var headings = []string{
	"Cutoff", "z", "Curve", "Counted", "People", "Gap, points", "Interval", "Ratio", "Interval of the ratio",
	"Heads", "Interval of the heads", "Verdict", "To settle it",
}

// table has every figure of every cutoff, with and without the half-step; the
// reading that is not judged stands in a row of its own.
func table(q ask.Question, r *ask.Result) app.UI {
	if len(r.Cutoffs) == 0 {
		return app.Section().ID("table")
	}
	used := usedColumns(r)
	var rows []app.UI
	for _, f := range r.Cutoffs {
		rows = append(rows, judgedRow(f, used))
		if f.HalfStep == nil {
			continue
		}
		name, field, other := "with the half-step", "half_step", *f.HalfStep
		if q.HalfStep {
			name, field, other = "without the half-step", "without_half_step", f.WithoutHalfStep
		}
		rows = append(rows, otherRow(f, name, field, other, used))
	}
	return app.Section().ID("table").Body(
		app.H2().Text("The cutoffs in figures"),
		app.Table().Body(
			app.Caption().Text("Gap: curve share minus counted share, + is too high. Intervals at "+words.Level(q.Level)+"."),
			app.THead().Body(app.Tr().Body(
				app.Range(headings).Slice(func(i int) app.UI {
					return when(used[i], func() app.UI { return app.Th().Scope("col").Text(headings[i]) })
				}),
			)),
			app.TBody().Body(rows...),
		),
	)
}

// usedColumns leaves out the columns that no cutoff has anything for.
func usedColumns(r *ask.Result) []bool {
	used := make([]bool, len(headings))
	for i := range used {
		used[i] = true
	}
	interval, ratio, heads, judged, unsettled := false, false, false, false, false
	for _, f := range r.Cutoffs {
		interval = interval || f.GapLow != nil
		ratio = ratio || f.RatioLow != nil
		heads = heads || f.Heads != nil
		judged = judged || f.Verdict != nil
		unsettled = unsettled || (f.Verdict != nil && *f.Verdict == "unsettled")
	}
	used[6], used[8], used[9], used[10], used[11], used[12] = interval, ratio, heads, heads && interval, judged, unsettled
	return used
}

func judgedRow(f ask.Finding, used []bool) app.UI {
	cells := append(readingCells("", f, f.Reading),
		optional("ratio", f.Ratio, ratioText(f)),
		both("ratio", f.RatioLow, f.RatioHigh, words.RatioLimits(f)),
		headsCell(f),
		headLimitsCell(f),
		verdictCell("verdict", f.Verdict),
		settleCell(f),
	)
	return row(f, "", words.Capital(f.Cutoff.Words()), cells, used)
}

// otherRow is the curve read in the way that is not judged.
func otherRow(f ask.Finding, name, field string, r ask.Reading, used []bool) app.UI {
	cells := append(readingCells(field+".", f, r), nil, nil, nil, nil, verdictCell(field+".verdict", r.Verdict), nil)
	return row(f, field, name, cells, used)
}

// readingCells are the figures that both ways of reading the curve have.
func readingCells(prefix string, f ask.Finding, r ask.Reading) []app.UI {
	z := []app.UI{shown(prefix+"z", r.Z, words.Z(r.Z))}
	if r.ZTo != nil {
		z = append(z, app.Text(" to "), shown(prefix+"z_to", *r.ZTo, words.Z(*r.ZTo)))
	}
	counted, people := app.UI(nil), app.UI(nil)
	if prefix == "" {
		counted = shown("counted_share", f.CountedShare, words.Share(f.CountedShare))
		people = shown("counted", float64(f.Counted), words.Count(f.Counted))
	}
	return []app.UI{
		app.Span().Body(z...),
		shown(prefix+"curve_share", r.CurveShare, words.Share(r.CurveShare)),
		counted,
		people,
		shown(prefix+"gap_points", r.GapPoints, words.SignedGapOf(r)),
		both(prefix+"gap", r.GapLow, r.GapHigh, words.SignedLimits(r)),
	}
}

// both is an interval's text with both of its ends.
func both(field string, low, high *float64, text string) app.UI {
	return when(text != "", func() app.UI {
		return app.Span().Body(optional(field+"_low", low, ""), optional(field+"_high", high, ""), app.Text(text))
	})
}

func ratioText(f ask.Finding) string {
	if f.Ratio == nil {
		return "none counted"
	}
	return words.RatioNumber(*f.Ratio)
}

func headsCell(f ask.Finding) app.UI {
	return when(f.Heads != nil, func() app.UI { return shown("heads.gap", f.Heads.Gap, words.SignedHeads(f)) })
}

func headLimitsCell(f ask.Finding) app.UI {
	return when(f.Heads != nil, func() app.UI {
		text := words.SignedHeadLimits(f)
		return when(text != "", func() app.UI {
			return app.Span().Body(optional("heads.low", f.Heads.Low, ""), optional("heads.high", f.Heads.High, ""), app.Text(text))
		})
	})
}

func verdictCell(field string, verdict *string) app.UI {
	return when(verdict != nil, func() app.UI { return shownText(field, *verdict, *verdict) })
}

func settleCell(f ask.Finding) app.UI {
	return when(f.PeopleToSettle != nil, func() app.UI {
		return shown("people_to_settle", float64(*f.PeopleToSettle), words.SettleNumber(*f.PeopleToSettle))
	})
}

// row is one line of the table; cells leaves out the first column's name.
func row(f ask.Finding, reading, name string, cells []app.UI, used []bool) app.UI {
	class := "judged"
	if reading != "" {
		class = "other"
	}
	line := []app.UI{app.Th().Scope("row").Text(name)}
	for i, cell := range cells {
		if !used[i+1] {
			continue
		}
		if cell == nil {
			line = append(line, app.Td().Class("empty"))
			continue
		}
		line = append(line, app.Td().DataSet("label", headings[i+1]).Body(cell))
	}
	return app.Tr().Class(class).DataSet("cutoff", f.Cutoff.String()).DataSet("reading", reading).Body(line...)
}
