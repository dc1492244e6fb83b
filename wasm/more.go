package main

import (
	"fmt"
	"strconv"
	"strings"

	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/ask"
	"tailgap/core/sample"
	"tailgap/core/words"
)

// moreWords says in small print how the question is asked apart from its
// sentence.
func moreWords(q ask.Question) string {
	var parts []string
	if len(q.Missing) > 0 {
		codes := make([]string, len(q.Missing))
		for i, code := range q.Missing {
			codes[i] = words.Name(code)
		}
		parts = append(parts, "missing codes "+strings.Join(codes, ", "))
	} else {
		parts = append(parts, "no missing codes")
	}
	switch q.Header {
	case sample.HeaderYes:
		parts = append(parts, "first row names the columns")
	case sample.HeaderNo:
		parts = append(parts, "no row of names")
	}
	switch {
	case q.Step.None:
		parts = append(parts, "a scale without a step")
	case q.Step.Size > 0:
		parts = append(parts, "a step of "+words.Number(q.Step.Size))
	}
	if q.Range != nil {
		parts = append(parts, "a scale from "+words.Number(q.Range.Low)+" to "+words.Number(q.Range.High))
	}
	judged := "judged without the half-step"
	if q.HalfStep {
		judged = "judged with the half-step"
	}
	parts = append(parts, judged)
	return words.Capital(strings.Join(parts, "; ")) + ". " + words.Method(ask.Answer{Question: q})
}

// setting is one field of the small print: how the question shows it, and how
// what is typed gets into the question.
type setting struct {
	id, label, hint string
	show            func(q ask.Question) string
	read            func(q *ask.Question, text string) error
}

// settings are the fields with something to type.
var settings = []setting{
	{
		"missing", "Missing codes", "such as -9, 99; none when empty",
		func(q ask.Question) string { return strings.Join(q.Missing, ", ") },
		func(q *ask.Question, text string) error {
			q.Missing = []string{}
			for code := range strings.SplitSeq(text, ",") {
				if code = strings.TrimSpace(code); code != "" {
					q.Missing = append(q.Missing, code)
				}
			}
			return nil
		},
	},
	{
		"step", "Step of the scale", "auto, none or a number",
		func(q ask.Question) string { return q.Step.String() },
		func(q *ask.Question, text string) (err error) {
			q.Step, err = sample.ParseStep(text)
			return err
		},
	},
	{
		"range", "Ends of the scale", "such as 0:83; as observed when empty",
		func(q ask.Question) string {
			if q.Range == nil {
				return ""
			}
			return q.Range.String()
		},
		func(q *ask.Question, text string) error {
			q.Range = nil
			if text == "" {
				return nil
			}
			ends, err := sample.ParseRange(text)
			q.Range = &ends
			return err
		},
	},
	{
		"level", "Level of intervals", "such as 0.95",
		func(q ask.Question) string { return plain(q.Level) },
		func(q *ask.Question, text string) (err error) {
			q.Level, err = number(text)
			return err
		},
	},
	{
		"replicates", "Replicates", "more are slower and steadier",
		func(q ask.Question) string { return strconv.Itoa(q.Replicates) },
		func(q *ask.Question, text string) (err error) {
			q.Replicates, err = whole(text)
			return err
		},
	},
	{
		"seed", "Seed", "a whole number",
		func(q ask.Question) string { return strconv.FormatUint(q.Seed, 10) },
		func(q *ask.Question, text string) (err error) {
			if q.Seed, err = strconv.ParseUint(text, 10, 64); err != nil {
				return fmt.Errorf("the seed %.20q can't be read; write a whole number of zero or more", text)
			}
			return nil
		},
	},
}

// moreEditor has everything that the sentence has no slot for.
func (s *sheet) moreEditor() app.UI {
	q := s.desk.question
	return app.Span().Class("settings").Body(
		s.settingField(settings[0]), s.headerField(q), s.settingField(settings[1]),
		s.settingField(settings[2]), s.settingField(settings[3]), s.settingField(settings[4]), s.settingField(settings[5]),
		s.tick("half-step", "Judge with the half-step", q.HalfStep, func(q *ask.Question, on bool) { q.HalfStep = on }),
		s.tick("everyone", "These are all the people: the gap is exact", q.Everyone, func(q *ask.Question, on bool) { q.Everyone = on }),
	)
}

func (s *sheet) settingField(f setting) app.UI {
	return app.Label().Class("setting").Body(
		app.Span().Text(f.label),
		app.Input().ID(f.id).AutoComplete(false).Value(f.show(s.desk.question)).
			Aria("describedby", "hint-"+f.id).
			OnChange(s.act(f.id, func(ctx app.Context, _ app.Event) {
				q := s.desk.question
				err := f.read(&q, typed(ctx))
				s.change(atMore, q, err)
			})),
		app.Small().ID("hint-"+f.id).Text(f.hint),
	)
}

// headers in the order in which they are offered.
var headers = []struct {
	header sample.Header
	text   string
}{
	{sample.HeaderAuto, "found out from the file"},
	{sample.HeaderYes, "names the columns"},
	{sample.HeaderNo, "is data already"},
}

func (s *sheet) headerField(q ask.Question) app.UI {
	return app.Label().Class("setting").Body(
		app.Span().Text("The first row"),
		app.Select().ID("header").OnChange(s.act("header", func(ctx app.Context, _ app.Event) { s.headerChosen(typed(ctx)) })).Body(
			app.Range(headers).Slice(func(i int) app.UI {
				return app.Option().Value(string(headers[i].header)).Text(headers[i].text).Selected(headers[i].header == q.Header)
			}),
		),
	)
}

func (s *sheet) headerChosen(text string) {
	q := s.desk.question
	err := q.Header.UnmarshalText([]byte(text))
	s.change(atMore, q, err)
}

func (s *sheet) tick(id, label string, on bool, set func(q *ask.Question, on bool)) app.UI {
	return app.Label().Class("ticked").Body(
		app.Input().Type("checkbox").ID(id).Checked(on).
			OnChange(s.act(id, func(ctx app.Context, _ app.Event) {
				q := s.desk.question
				set(&q, ctx.JSSrc().Get("checked").Bool())
				s.change(atMore, q, nil)
			})),
		app.Span().Text(label),
	)
}
