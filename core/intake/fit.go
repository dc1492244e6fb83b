package intake

import "fmt"

// fit counts how the rows fit under the header. Some programs write row names
// and no name above them: each name is then one column off, and reading by
// name would give wrong numbers.
type fit struct {
	width  int // cells in the header
	rows   int
	longer int // rows with one cell more, and something in it
	other  int // rows with any other number of cells
}

func (f *fit) add(data *row) {
	f.rows++
	switch {
	case data.misquoted:
	case len(data.cells) != f.width+1:
		f.other++
	case !isBlank(trim(data.cells[f.width])):
		f.longer++
	}
}

// check is an error where most rows are longer by one cell and none speaks
// against a missing name. A delimiter at the end of every row is no sign.
func (f *fit) check() error {
	if f.other > 0 || 2*f.longer <= f.rows {
		return nil
	}
	return fmt.Errorf("the rows have %d cells but the header names %d, so it can't be told which name is over which column; add the name that is missing, or give the column's number", f.width+1, f.width)
}
