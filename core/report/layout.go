package report

import (
	"strings"
	"unicode/utf8"

	"tailgap/core/words"
)

// columns is the width of a terminal that the text is laid out for.
const columns = 80

// wrapped is the text broken between words into lines of at most 80 columns,
// the first one opened with first, the others with rest. A word that is longer
// than a line stands on a line of its own, and no character of it moves a
// cursor.
func wrapped(first, rest, text string) string {
	var out strings.Builder
	line, width := first, utf8.RuneCountInString(first)
	fresh := true
	for _, word := range strings.Fields(words.Line(text)) {
		size := utf8.RuneCountInString(word)
		if !fresh && width+1+size > columns {
			out.WriteString(line + "\n")
			line, width, fresh = rest, utf8.RuneCountInString(rest), true
		}
		if !fresh {
			line, width = line+" ", width+1
		}
		line, width, fresh = line+word, width+size, false
	}
	out.WriteString(strings.TrimRight(line, " ") + "\n")
	return out.String()
}

// table lays cells out in columns two spaces apart, the first column to the
// left and the others to the right. A column in which every cell below the
// heading is empty is left out.
func table(heading []string, rows [][]string) string {
	widths := make([]int, len(heading))
	for i := range heading {
		for _, row := range rows {
			widths[i] = max(widths[i], utf8.RuneCountInString(row[i]))
		}
		if widths[i] > 0 {
			widths[i] = max(widths[i], utf8.RuneCountInString(heading[i]))
		}
	}
	var out strings.Builder
	for _, row := range append([][]string{heading}, rows...) {
		var line strings.Builder
		for i, cell := range row {
			if widths[i] == 0 {
				continue
			}
			space := strings.Repeat(" ", max(0, widths[i]-utf8.RuneCountInString(cell)))
			if i == 0 {
				line.WriteString(cell + space)
			} else {
				line.WriteString("  " + space + cell)
			}
		}
		out.WriteString(strings.TrimRight(line.String(), " ") + "\n")
	}
	return out.String()
}
