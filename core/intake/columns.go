package intake

import (
	"fmt"
	"slices"
	"strconv"
	"strings"
	"unicode"
	"unicode/utf8"

	"tailgap/core/sample"
)

// columns are what a source has to choose from.
type columns struct {
	names  []string // of the header; nil without one
	width  int      // cells in the first row
	guided bool     // the first row was looked at, not stated, to be no header
	commas bool     // commas delimit them
}

// found is a column that was asked for.
type found struct {
	index  int
	byName bool
}

// newColumns decides whether the first row is a header. In doubt it is one
// when none of its cells is a number and some cell could be a name, or when
// it holds a name that was asked for. Names that are numbers don't decide:
// "2" in the first row is more often a score.
func newColumns(first []string, header sample.Header, asked []string, cells *cellReader) columns {
	named := columns{names: make([]string, len(first)), width: len(first)}
	unnamed := columns{width: len(first), guided: header != sample.HeaderNo}
	numbers, words := false, false
	for i, cell := range first {
		_, k, _ := cells.read(cell)
		numbers = numbers || k == usable || k == ambiguous || k == infinite
		words = words || k == unreadable
		if !utf8.ValidString(cell) {
			cell = fromLatin1(cell)
		}
		named.names[i] = cell
	}
	switch {
	case header == sample.HeaderYes:
		return named
	case header == sample.HeaderNo:
		return unnamed
	case words && !numbers, named.holdsOneOf(asked, cells):
		return named
	}
	return unnamed
}

func (c columns) holdsOneOf(asked []string, cells *cellReader) bool {
	return slices.ContainsFunc(asked, func(name string) bool {
		_, k, _ := cells.read(name)
		return k == unreadable && len(c.named(name)) > 0
	})
}

// named lists the columns that have this name exactly, or else but for case
// and spaces.
func (c columns) named(name string) []int {
	var exactly, nearly []int
	for i, n := range c.names {
		if n == name {
			exactly = append(exactly, i)
		}
		if folded(n) == folded(name) {
			nearly = append(nearly, i)
		}
	}
	if folded(name) == "" {
		return nil
	}
	if len(exactly) > 0 {
		return exactly
	}
	return nearly
}

func folded(name string) string {
	return strings.ToLower(strings.Join(strings.FieldsFunc(name, isSpace), " "))
}

// find finds a column by name, or else by number from 1, as in "3" or
// "column 3".
func (c columns) find(asked string) (found, error) {
	named := c.named(asked)
	if len(named) == 1 {
		return found{index: named[0], byName: true}, nil
	}
	if len(named) > 1 {
		numbers := make([]string, len(named))
		for i, index := range named {
			numbers[i] = strconv.Itoa(index + 1)
		}
		last := len(numbers) - 1
		return found{}, fmt.Errorf("the name %s stands over columns %s and %s; give the number of the one you mean", quoted(asked), strings.Join(numbers[:last], ", "), numbers[last])
	}
	number, err := strconv.ParseUint(strings.TrimPrefix(folded(asked), "column "), 10, 31)
	if err == nil && number >= 1 && int(number) <= c.width {
		return found{index: int(number) - 1}, nil
	}
	hint := ""
	if c.guided && err != nil {
		hint = "; if the first row names the columns, set header to yes"
	}
	return found{}, fmt.Errorf("there is no column %s; %s%s", quoted(asked), c, hint)
}

// findAll finds what was asked for, or the only column there is when nothing
// was.
func (c columns) findAll(asked []string) ([]found, error) {
	if len(asked) == 0 && c.width == 1 {
		return []found{{}}, nil
	}
	if len(asked) == 0 {
		hint := ""
		if c.commas && c.width == 2 && c.names == nil {
			hint = "; if the comma is the decimal mark of one column, put a name above it"
		}
		return nil, fmt.Errorf("say which column is the score; %s%s", c, hint)
	}
	all := make([]found, len(asked))
	for i, name := range asked {
		var err error
		if all[i], err = c.find(name); err != nil {
			return nil, err
		}
		for j := range i {
			if all[j].index == all[i].index {
				return nil, fmt.Errorf("%s and %s are the same column; ask for it once", quoted(asked[j]), quoted(name))
			}
		}
	}
	return all, nil
}

// label is a column's name as it can be shown, or "column 3".
func (c columns) label(index int) string {
	if c.names != nil {
		if name := printable(c.names[index], 80); name != "" {
			return name
		}
	}
	return "column " + strconv.Itoa(index+1)
}

const listed = 20 // columns that a message lists

// String says which columns there are; without a header only how many, so
// that no row of data is repeated.
func (c columns) String() string {
	switch {
	case c.names == nil && c.width == 1:
		return "there is one column, no header row"
	case c.names == nil:
		return fmt.Sprintf("there are columns 1 to %d, no header row", c.width)
	case c.width == 1:
		return "the only column is " + printable(c.label(0), 40)
	}
	var list []string
	for i := range min(c.width, listed) {
		list = append(list, printable(c.label(i), 40))
	}
	more := ""
	if c.width > listed {
		more = fmt.Sprintf(" and %d more", c.width-listed)
	}
	return "the columns are: " + strings.Join(list, ", ") + more
}

// quoted is a name in a message.
func quoted(name string) string { return `"` + printable(name, 40) + `"` }

// printable is a name on one line, without characters that can't be seen, and
// shortened.
func printable(name string, longest int) string {
	name = strings.Join(strings.FieldsFunc(strings.ToValidUTF8(name, "�"), isSpace), " ")
	name = strings.Map(func(r rune) rune {
		if !unicode.IsPrint(r) {
			return -1
		}
		return r
	}, name)
	if runes := []rune(name); len(runes) > longest {
		return string(runes[:longest]) + "…"
	}
	return name
}
