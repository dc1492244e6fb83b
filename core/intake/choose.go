package intake

import (
	"context"
	"io"
	"strconv"

	"tailgap/core/sample"
)

// Column is a column of a file as a person chooses it.
type Column struct {
	Name    string // from the header, or "column 3"
	Number  int    // from 1
	Numeric bool   // most of its first cells are numbers
	Ask     string // what to put into Options.Scores for it: the name, or the number where the name is missing or isn't the only one
}

const looked = 200 // rows that Columns looks at

// Columns reads the head of a source and says what columns it has. It refuses
// what Read refuses, as far as it reads.
func Columns(ctx context.Context, source Source, header sample.Header) ([]Column, error) {
	if err := checkHeader(header); err != nil {
		return nil, err
	}
	r, err := open(ctx, source.Reader, Options{Header: header})
	if err != nil {
		return nil, err
	}
	filled, numbers := make([]int, r.width), make([]int, r.width)
	for range looked {
		data, err := r.next()
		if err == io.EOF {
			break
		}
		if err != nil {
			return nil, err
		}
		for i, cell := range data.cells[:min(len(data.cells), r.width)] {
			switch _, k, _ := r.cells.read(cell); k {
			case usable, ambiguous, infinite:
				numbers[i]++
				filled[i]++
			case unreadable:
				filled[i]++
			}
		}
	}
	list := make([]Column, r.width)
	for i := range list {
		list[i] = Column{Name: r.label(i), Number: i + 1, Numeric: 2*numbers[i] > filled[i], Ask: r.ask(i)}
	}
	return list, nil
}

// Find is the column of the list that a question means by a name or a number,
// as Read finds it; false where there is none, or more than one.
func Find(list []Column, asked string) (Column, bool) {
	all := columns{names: make([]string, len(list)), width: len(list)}
	for i, c := range list {
		all.names[i] = c.Name
	}
	f, err := all.find(asked)
	if err != nil {
		return Column{}, false
	}
	return list[f.index], true
}

// ask is how find finds this column.
func (c columns) ask(index int) string {
	number := strconv.Itoa(index + 1)
	for _, way := range []string{c.label(index), number} {
		if f, err := c.find(way); err == nil && f.index == index {
			return way
		}
	}
	return "column " + number
}
