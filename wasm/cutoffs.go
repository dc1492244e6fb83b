package main

import (
	"fmt"
	"slices"
	"strconv"
	"strings"

	"github.com/maxence-charriere/go-app/v9/pkg/app"

	"tailgap/core/cutoff"
	"tailgap/core/words"
)

// sides in the order in which they are offered.
var sides = []cutoff.Side{cutoff.AtMost, cutoff.Below, cutoff.AtLeast, cutoff.Above, cutoff.Stretch}

// atCutoff is the place of a cutoff in the sentence.
func atCutoff(i int) place { return place("cutoff-" + strconv.Itoa(i)) }

// cutoff is which cutoff the place is of; -1 for another place.
func (at place) cutoff() int {
	if text, ok := strings.CutPrefix(string(at), "cutoff-"); ok {
		if i, err := strconv.Atoi(text); err == nil {
			return i
		}
	}
	return -1
}

// cutoffSlots are the cutoffs in the sentence, and the slot that adds one.
func (s *sheet) cutoffSlots() []app.UI {
	cutoffs := s.desk.question.Cutoffs
	var parts []app.UI
	for i, c := range cutoffs {
		mark, next := "", " "
		switch {
		case i < len(cutoffs)-2:
			mark = ","
		case i == len(cutoffs)-2:
			next = " and "
		}
		parts = append(parts, s.slot(atCutoff(i), c.Words(), mark, s.cutoffEditor(i)), app.Text(next))
	}
	add := "at a cutoff (name one)"
	if len(cutoffs) > 0 {
		add = "add a cutoff"
	}
	return append(parts, s.slot(atAdd, add, ",", s.addEditor))
}

// cutoffEditor changes or removes the i-th cutoff.
func (s *sheet) cutoffEditor(i int) func() app.UI {
	return func() app.UI {
		c, at := s.desk.question.Cutoffs[i], atCutoff(i)
		remove := app.Button().Type("button").ID("remove-" + string(at)).Text("Remove").
			OnClick(s.act("remove-"+string(at), func(app.Context, app.Event) { s.removeCutoff(i) }))
		return app.Span().Class("fields").Body(append(s.cutoffFields(at, &c), remove)...)
	}
}

func (s *sheet) addEditor() app.UI {
	return app.Span().Class("fields").Body(s.cutoffFields(atAdd, nil)...)
}

// cutoffFields are the side and the number or numbers of a cutoff, nil for a
// new one.
func (s *sheet) cutoffFields(at place, c *cutoff.Cutoff) []app.UI {
	side := cutoff.AtLeast
	from, to := "", ""
	if c != nil {
		side, from = c.Side, plain(c.At)
		if c.Side == cutoff.Stretch {
			to = plain(c.To)
		}
	}
	if s.draft.side != nil {
		side = *s.draft.side
	}
	id := string(at)
	changed := func(name string) (app.EventHandler, any) {
		return s.act(name+id, func(app.Context, app.Event) { s.cutoffTyped(at) })
	}
	choose := app.Select().ID("side-"+id).Aria("label", "Which people").OnChange(changed("side-")).Body(
		app.Range(sides).Slice(func(i int) app.UI {
			return app.Option().Value(sides[i].String()).Text(sideText(sides[i])).Selected(sides[i] == side)
		}),
	)
	first := app.Input().ID("from-"+id).Class("figure").Aria("label", "Cutoff").Attr("inputmode", "text").
		AutoComplete(false).Value(from).OnChange(changed("from-"))
	if side != cutoff.Stretch {
		return []app.UI{choose, first, s.forEachScore()}
	}
	second := app.Input().ID("to-"+id).Class("figure").Aria("label", "Upper end").
		AutoComplete(false).Value(to).OnChange(changed("to-"))
	return []app.UI{choose, first, app.Text("to"), second, app.Span().Class("aside").Text("both ends in"), s.forEachScore()}
}

// sideText is how a side is offered.
func sideText(side cutoff.Side) string {
	if side == cutoff.Stretch {
		return "from … to"
	}
	return words.SideName(side)
}

// forEachScore says what several scores mean for a cutoff.
func (s *sheet) forEachScore() app.UI {
	scores := len(s.desk.question.Scores)
	return when(scores > 1, func() app.UI {
		return app.Small().Class("every-score").Text("Every cutoff is used for each of the " + strconv.Itoa(scores) + " scores.")
	})
}

// cutoffTyped takes in what now stands in the fields of a cutoff. Someone may
// also write a whole cutoff, such as >=50, into the number's field.
func (s *sheet) cutoffTyped(at place) {
	var side cutoff.Side
	if err := side.UnmarshalText([]byte(valueOf("side-" + string(at)))); err != nil {
		return
	}
	s.draft.side = &side
	from, to := valueOf("from-"+string(at)), valueOf("to-"+string(at))
	if from == "" || (side == cutoff.Stretch && to == "") {
		return // not finished
	}
	c, err := cutoffIn(side, from, to)
	if err == nil {
		s.draft.side = &c.Side
	}
	s.putCutoff(at, c, err)
}

// cutoffIn reads a side and what was typed beside it: a number, two for a
// stretch, or a whole cutoff.
func cutoffIn(side cutoff.Side, from, to string) (cutoff.Cutoff, error) {
	if text, err := pointed(from); err == nil {
		if c, err := cutoff.Parse(text); err == nil {
			return c, nil
		}
	}
	c := cutoff.Cutoff{Side: side}
	var err error
	if c.At, err = number(from); err != nil || side != cutoff.Stretch {
		return c, err
	}
	if c.To, err = number(to); err == nil && c.To < c.At {
		err = fmt.Errorf("the lower end, %s, is above the upper end, %s; write the lower end first", plain(c.At), plain(c.To))
	}
	return c, err
}

// putCutoff puts a cutoff in its place in the question, or at its end.
func (s *sheet) putCutoff(at place, c cutoff.Cutoff, err error) {
	q := s.desk.question
	q.Cutoffs = slices.Clone(q.Cutoffs)
	i := at.cutoff()
	if i < 0 || i >= len(q.Cutoffs) {
		i = len(q.Cutoffs)
		q.Cutoffs = append(q.Cutoffs, c)
	}
	q.Cutoffs[i] = c
	if !s.change(at, q, err) {
		return
	}
	s.pick(i)
	if at == atAdd {
		s.close()
		return
	}
	byID("from-"+string(at)).Set("value", plain(c.At)) // it may have held a whole cutoff
}

func (s *sheet) removeCutoff(i int) {
	q := s.desk.question
	q.Cutoffs = slices.Delete(slices.Clone(q.Cutoffs), i, i+1)
	s.close()
	s.change(atAdd, q, nil)
	s.pick(max(0, i-1))
}

// pick takes a cutoff in hand and shows the sweep that it lies on.
func (s *sheet) pick(i int) { s.selected, s.side = i, nil }
