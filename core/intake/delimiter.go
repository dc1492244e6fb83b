package intake

import (
	"bytes"
	"fmt"
	"slices"
)

const (
	headSize = 64 << 10 // bytes that are looked at before reading starts
	headRows = 50       // rows of them
)

// noDelimiter is the delimiter of a file with one column: a code point that
// no text may hold.
const noDelimiter = '\uFFFF'

// delimiters stand in the order of preference where they fit equally well: a
// comma is common inside cells, a semicolon is rare there, a tab rarer.
var delimiters = [...]rune{'\t', ';', ','}

// shape is a row of the head: how often each delimiter stands outside quotes.
type shape struct {
	text  []byte
	line  int
	count [len(delimiters)]int
}

// detectDelimiter takes the delimiter that stands equally often in the first
// row and in most others. One that isn't in the first row, or in the first
// row alone, is part of a cell. The error is a sentence about lines above the
// header.
func detectDelimiter(head []byte, whole bool) (rune, error) {
	rows := shapes(head, whole)
	if len(rows) == 0 {
		return noDelimiter, nil
	}
	best, most := noDelimiter, 0
	for d, delimiter := range delimiters {
		first := rows[0].count[d]
		elsewhere := slices.ContainsFunc(rows[1:], func(r shape) bool { return r.count[d] > 0 })
		if first == 0 || len(rows) > 1 && !elsewhere {
			continue
		}
		alike := 0
		for _, row := range rows {
			if row.count[d] == first {
				alike++
			}
		}
		if alike > most {
			best, most = delimiter, alike
		}
	}
	if best == noDelimiter {
		return best, refuseTitle(rows)
	}
	return best, nil
}

// refuseTitle is an error where the first row is one cell and most rows below
// are several: a title stands above the table. Decimal commas below a header
// are no cells.
func refuseTitle(rows []shape) error {
	for d, delimiter := range delimiters {
		var several []shape
		for _, row := range rows[1:] {
			if row.count[d] > 0 {
				several = append(several, row)
			}
		}
		if 2*len(several) <= len(rows)-1 || len(several) == 0 {
			continue
		}
		decimals := cellReader{comma: commaDecimal}
		if _, k, _ := decimals.read(string(several[0].text)); delimiter == ',' && k == usable {
			continue
		}
		return fmt.Errorf("line %d has one cell where line %d has %d; take out the lines above the header row", rows[0].line, several[0].line, several[0].count[d]+1)
	}
	return nil
}

// shapes splits the head into rows, blank ones left out. Unless the head is
// the whole source, its last row is cut short and only counts where it is the
// first.
func shapes(head []byte, whole bool) []shape {
	var (
		rows                  []shape
		row                   = shape{line: 1}
		line, start           = 1, 0
		quoted, closed, fresh = false, false, true // inside quotes; just behind one that may have closed them; at the start of a cell
	)
	end := func(i int) {
		row.text = bytes.TrimSpace(head[start:i])
		if len(row.text) > 0 {
			rows = append(rows, row)
		}
		start, row = i+1, shape{line: line}
	}
	for i, c := range head {
		if c == '\n' {
			line++
		}
		opens := c == '"' && (fresh || closed)
		switch {
		case quoted:
			quoted, closed = c != '"', c == '"'
			continue
		case opens:
			quoted = true
		case c == '\n':
			end(i)
		default:
			if d := slices.Index(delimiters[:], rune(c)); d >= 0 {
				row.count[d]++
			}
		}
		closed = false
		fresh = c == '\n' || c == ' ' && fresh || slices.Contains(delimiters[:], rune(c))
		if len(rows) == headRows {
			return rows
		}
	}
	if whole || len(rows) == 0 {
		end(len(head))
	}
	return rows
}
