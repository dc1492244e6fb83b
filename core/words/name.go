package words

import (
	"strings"
	"unicode"
)

// longestName is how many characters of a name are shown.
const longestName = 40

// Name is a column's name made fit to be shown: one line, no control or
// invisible characters, 40 characters at most.
func Name(name string) string {
	clean := Line(name)
	if clean == "" {
		return "(no name)"
	}
	if runes := []rune(clean); len(runes) > longestName {
		return string(runes[:longestName-1]) + "…"
	}
	return clean
}

// Line is a text from outside made harmless in a terminal: line breaks and
// other white space become one space, and control, invisible and
// direction-changing characters a replacement mark.
func Line(text string) string {
	visible := strings.Map(func(r rune) rune {
		switch {
		case unicode.IsSpace(r):
			return ' '
		case unicode.IsPrint(r):
			return r
		}
		return unicode.ReplacementChar
	}, text)
	return strings.Join(strings.Fields(visible), " ")
}
