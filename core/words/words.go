// Package words says an Answer in sentences and printed figures: every
// number that a person reads, on the page, in the report, in a figure or in
// the terminal, is worded here and nowhere else. Only warnings and notes, which
// are sentences in the Answer itself, are worded where they arise (core/ask),
// and cutoffs print themselves as they are written.
//
// The parts of a sentence are functions of their own (GapOf, Limits, Ratio,
// Heads, Verdict), and the sentences are built from those very parts, so that
// a card, a table and a sentence can't print the same thing in two ways.
package words

import (
	"unicode"
	"unicode/utf8"
)

// Capital is the text with its first letter in upper case, to open a sentence.
func Capital(text string) string {
	first, size := utf8.DecodeRuneInString(text)
	if size == 0 {
		return text
	}
	return string(unicode.ToUpper(first)) + text[size:]
}
