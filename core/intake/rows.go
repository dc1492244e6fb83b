package intake

import (
	"bufio"
	"context"
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"strings"
)

// row is one row of data. Lines count from 1.
type row struct {
	cells     []string // valid until the next row
	line      int      // where it starts
	end       int      // where it ends
	misquoted bool     // a quote stands where none may; the cells are unknown
}

// rows reads a source row by row.
type rows struct {
	columns
	cells cellReader
	score int // the first score column, -1 while it isn't known

	text      *plainText
	csv       *csv.Reader
	delimiter rune
	read      int  // last line that was read
	given     int  // last line that was given out
	held      row  // the last row that was read
	holding   bool // and not given out
	blankLine row
}

// open finds out how a source is written and which columns it has. Errors are
// sentences for the user, naming no source.
func open(ctx context.Context, source io.Reader, options Options) (*rows, error) {
	text, err := newPlainText(ctx, source)
	if err != nil {
		return nil, err
	}
	buffer := bufio.NewReaderSize(text, headSize)
	head, err := buffer.Peek(headSize)
	if err != nil && err != io.EOF {
		return nil, err
	}
	delimiter, titled := detectDelimiter(head, err == io.EOF)
	if titled != nil {
		return nil, titled
	}
	r := &rows{text: text, csv: csv.NewReader(buffer), delimiter: delimiter, score: -1}
	r.csv.Comma = delimiter
	r.csv.FieldsPerRecord = -1
	r.csv.ReuseRecord = true
	r.csv.TrimLeadingSpace = delimiter != '\t' // a tab would count as space
	r.cells = newCellReader(delimiter, options.Missing)
	return r, r.start(options)
}

// start reads the first row, as a header or to be given out as data.
func (r *rows) start(options Options) error {
	first, err := r.readRow()
	if err == io.EOF {
		return errors.New("no usable score: the input is empty")
	}
	if err != nil {
		return err
	}
	if first.misquoted {
		return fmt.Errorf("line %d, the first row, has a misplaced quote, so its columns can't be told; correct it", first.line)
	}
	r.columns = newColumns(first.cells, options.Header, options.Scores, &r.cells)
	r.commas = r.delimiter == ','
	if r.names == nil {
		r.held, r.holding = first, true
	} else {
		r.given = first.end
	}
	return nil
}

var blankCells = []string{""}

// next gives out the next row; at the end its error is io.EOF. A blank line
// is a blank cell where there is one column, and no row where there are
// several; at the end it is nothing.
func (r *rows) next() (*row, error) {
	if !r.holding {
		var err error
		if r.held, err = r.readRow(); err != nil {
			return nil, err
		}
		r.holding = true
	}
	if r.delimiter == noDelimiter && r.given+1 < r.held.line {
		r.given++
		r.blankLine = row{cells: blankCells, line: r.given, end: r.given}
		return &r.blankLine, nil
	}
	r.holding, r.given = false, r.held.end
	return &r.held, nil
}

func (r *rows) readRow() (row, error) {
	for {
		r.text.rowStart, r.text.rowAfter = r.csv.InputOffset(), r.read
		cells, err := r.csv.Read() // passes over blank lines
		if err != nil {
			return r.misquoted(err)
		}
		last := len(cells) - 1
		line, _ := r.csv.FieldPos(0)
		end, _ := r.csv.FieldPos(last)
		if strings.IndexByte(cells[last], '\n') >= 0 {
			end += strings.Count(cells[last], "\n")
		}
		r.read = end
		if end > line && r.swallowsRows(cells) {
			return row{}, fmt.Errorf("a quote that opens in the row on line %d closes only on line %d, and its lines look like rows of their own; close it where it belongs or take it out", line, end)
		}
		if last > 0 || r.delimiter == noDelimiter || trim(cells[0]) != "" {
			return row{cells: cells, line: line, end: end}, nil
		}
	}
}

// misquoted makes a row of a quote that stands where none may. If it reached
// beyond its line nobody can tell the rows apart any more, which is an error,
// as is everything else.
func (r *rows) misquoted(err error) (row, error) {
	var quote *csv.ParseError
	if !errors.As(err, &quote) {
		return row{}, err
	}
	if quote.Line != quote.StartLine {
		return row{}, fmt.Errorf("a quote that opens in the row on line %d isn't closed properly, so that it runs together with the rows down to line %d; close it where it belongs or take it out", quote.StartLine, quote.Line)
	}
	r.read = quote.Line
	return row{line: quote.StartLine, end: quote.Line, misquoted: true}, nil
}

// swallowsRows is true where a row over several lines is more likely several
// rows, run together by a quote: at least two of its lines have all the cells
// and a score.
func (r *rows) swallowsRows(cells []string) bool {
	if r.score < 0 {
		return false
	}
	delimiter := string(r.delimiter)
	found := 0
	for line := range strings.SplitSeq(strings.Join(cells, delimiter), "\n") {
		if parts := strings.Split(line, delimiter); len(parts) == r.width {
			if _, k, _ := r.cells.read(parts[r.score]); k == usable || k >= coded {
				found++
			}
		}
	}
	return found >= 2
}
