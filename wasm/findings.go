package main

import (
	"strings"

	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/ask"
	"tailgap/core/words"
)

// findings is the last answer, from the sweep down to what was read. It is
// marked as old when it doesn't answer the question above it.
func (s *sheet) findings() app.UI {
	r := s.shown()
	if r == nil {
		return app.Section().Class("findings")
	}
	q := s.desk.answer.Question
	class := "findings"
	if s.desk.old() {
		class += " old"
	}
	return app.Section().ID("findings").Class(class).Aria("label", "The answer").Body(
		s.scoreTabs(),
		warnings(r),
		s.sweep(q, r),
		s.cards(q, r),
		s.counted(q, r),
		table(q, r),
		stretches(q, r),
		reading(s.desk.answer, r),
		s.shape(q, r),
	)
}

// scoreTabs chooses between the results of several score columns.
func (s *sheet) scoreTabs() app.UI {
	results := s.desk.answer.Results
	return when(len(results) > 1, func() app.UI {
		return app.Div().Class("choice").Role("group").Aria("label", "Which score").Body(
			app.Range(results).Slice(func(i int) app.UI {
				return app.Button().Type("button").Class("option").Text(words.Name(results[i].Score)).
					DataSet("result", i).Aria("pressed", i == s.result).
					OnClick(s.act("result-"+itoa(i), func(app.Context, app.Event) {
						s.result = i
						s.pick(0)
					}))
			}),
		)
	})
}

// stretches says where the curve can be trusted, and where it is worst.
func stretches(q ask.Question, r *ask.Result) app.UI {
	var said []string
	for _, sweep := range r.Sweeps {
		said = append(said, words.Trusted(q, *r, sweep)...)
	}
	heading, worst := "Where the curve can be trusted", words.Worst(*r)
	if len(said) == 0 {
		heading = "Where the gap is largest"
	}
	return when(len(said) > 0 || worst != "", func() app.UI {
		return app.Section().ID("stretches").Body(
			app.H2().Text(heading),
			paragraphs(said),
			when(worst != "", func() app.UI {
				return app.P().Body(shown("worst", r.Worst.GapPoints, worst))
			}),
		)
	})
}

// warnings are what to know of the data before anything found in them.
func warnings(r *ask.Result) app.UI {
	return when(len(r.Warnings) > 0, func() app.UI {
		return app.Ul().ID("warnings").Class("warnings").Aria("label", "Warnings").Body(
			app.Range(r.Warnings).Slice(func(i int) app.UI {
				return app.Li().Text(words.Line(words.Capital(r.Warnings[i])) + ".")
			}),
		)
	})
}

// reading is what was read and with what it was compared.
func reading(a *ask.Answer, r *ask.Result) app.UI {
	said := []struct{ term, text string }{
		{"Scores", words.Sample(*r)}, {"Shape", words.Moments(*r)}, {"Scale", words.Scale(*r)},
		{"Curve", words.Curve(*r)}, {"Method", words.Method(*a)},
	}
	return app.Section().ID("reading").Body(
		app.H2().Text("What was read"),
		app.Dl().Body(
			app.Range(said).Slice(func(i int) app.UI {
				return app.Div().Body(
					app.Dt().Text(said[i].term),
					app.Dd().Text(words.Capital(strings.TrimSuffix(said[i].text, "."))+"."),
				)
			}),
		),
	)
}

func paragraphs(texts []string) app.UI {
	return app.Range(texts).Slice(func(i int) app.UI { return app.P().Text(texts[i]) })
}

// announcement is the newest answer for someone who hears it.
func announcement(a *ask.Answer) string {
	var said []string
	for _, r := range a.Results {
		for _, f := range r.Cutoffs {
			text := words.Capital(f.Cutoff.Words()) + ": "
			if verdict := words.Verdict(a.Question, f); verdict != "" {
				text += verdict + "."
			} else {
				text += words.GapOf(f.Reading) + "."
			}
			if len(a.Results) > 1 {
				text = words.Name(r.Score) + ". " + text
			}
			said = append(said, text)
		}
	}
	if len(said) == 0 {
		return "The sweep is ready; no cutoff is named yet."
	}
	return strings.Join(said, " ")
}
