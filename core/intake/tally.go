package intake

import (
	"fmt"
	"strings"

	"tailgap/core/sample"
)

// tally gathers one score over all sources.
type tally struct {
	column sample.Column
	named  bool // the name is from a header

	// Of the present source: the first line with each decimal mark, 0 for none.
	comma, point int

	// Where semicolons part the cells: the place of the first number with a
	// mark, and whether every one so far has a group of three digits after it.
	marked string
	groups bool
}

// join starts a further source. A column asked for by its number must have the
// same name in all sources that have names.
func (t *tally) join(r *rows, index int) error {
	t.comma, t.point = 0, 0
	name := r.label(index)
	switch {
	case r.names == nil:
	case !t.named:
		t.column.Name, t.named = name, true
	case folded(name) != folded(t.column.Name):
		return fmt.Errorf("column %d is %s here but %s in the sources before; ask for it by its name", index+1, quoted(name), quoted(t.column.Name))
	}
	return nil
}

// add counts one row. The error is a sentence for the user.
func (t *tally) add(r *rows, data *row, index int, place func(line int) string) error {
	t.column.Rows++
	k, x, mark := tooShort, 0.0, byte(0)
	switch {
	case data.misquoted:
		k = misplacedQuote
	case index < len(data.cells):
		x, k, mark = r.cells.read(data.cells[index])
	}
	if k == usable {
		t.column.Scores = append(t.column.Scores, x)
		if mark != 0 && r.cells.comma == commaDecimal {
			t.seeMark(data.cells[index], mark, place(data.line))
		}
		return t.oneMark(mark, data.line)
	}
	if k == infinite {
		return fmt.Errorf("column %s has a value on line %d that is infinite or too large to compute with; correct it, or list it as a missing code", quoted(t.column.Name), data.line)
	}
	t.drop(r.cells.reason(k), data.line, place)
	return nil
}

// seeMark watches for marks that may part thousands: 1.234 for 1234.
func (t *tally) seeMark(cell string, mark byte, place string) {
	before, after, _ := strings.Cut(trim(cell), string(mark))
	if t.marked == "" {
		t.marked, t.groups = place, true
	}
	t.groups = t.groups && isThousands(before, after)
}

// doubts are what may be otherwise than it was read.
func (t *tally) doubts() []string {
	if !t.groups {
		return nil
	}
	return []string{fmt.Sprintf("every number with a decimal mark has three digits after it (first on %s): if the marks part thousands, those scores are 1,000 times too small", t.marked)}
}

// oneMark refuses a column in which both 3,5 and 3.5 stand: one of them is
// not what it seems.
func (t *tally) oneMark(mark byte, line int) error {
	switch {
	case mark == ',' && t.comma == 0:
		t.comma = line
	case mark == '.' && t.point == 0:
		t.point = line
	default:
		return nil
	}
	if t.comma > 0 && t.point > 0 {
		return fmt.Errorf("column %s has a decimal comma on line %d and a decimal point on line %d; write all its numbers the same way", quoted(t.column.Name), t.comma, t.point)
	}
	return nil
}

func (t *tally) drop(reason string, line int, place func(line int) string) {
	for i := range t.column.Dropped {
		if t.column.Dropped[i].Reason == reason {
			t.column.Dropped[i].Count++
			return
		}
	}
	t.column.Dropped = append(t.column.Dropped, sample.Dropped{Reason: reason, Count: 1, First: place(line)})
}

// check refuses a column without a usable score, with what became of its rows.
func (t *tally) check() error {
	switch {
	case len(t.column.Scores) > 0:
		return nil
	case t.column.Rows == 0:
		return fmt.Errorf("no usable score in column %s: there is no row below the header", quoted(t.column.Name))
	}
	var counts []string
	advice := "check the column and the missing codes"
	for _, d := range t.column.Dropped {
		counts = append(counts, fmt.Sprintf("%s: %d", d.Reason, d.Count))
		if d.Reason == reasons[ambiguous] {
			advice = "write decimals with a point"
		}
	}
	rows := fmt.Sprintf("all %d rows were", t.column.Rows)
	if t.column.Rows == 1 {
		rows = "the only row was"
	}
	return fmt.Errorf("no usable score in column %s: %s left out (%s); %s", quoted(t.column.Name), rows, strings.Join(counts, ", "), advice)
}
