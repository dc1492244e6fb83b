package intake

import (
	"errors"
	"math"
	"strconv"
	"strings"
	"unicode"
	"unicode/utf8"
)

// kind is what a cell turned out to be. From coded on it is one of the
// missing codes: coded+i is the i-th.
type kind int

const (
	usable kind = iota
	infinite
	blank
	unreadable
	ambiguous
	tooShort
	misplacedQuote
	coded
)

var reasons = [...]string{
	blank:          "blank",
	unreadable:     "unreadable",
	ambiguous:      "comma that could be decimal or thousands",
	tooShort:       "past the end of their row",
	misplacedQuote: "misplaced quote",
}

// commaRule says what a single comma in a number means.
type commaRule int

const (
	commaAmbiguous       commaRule = iota // the file is delimited by commas, so its decimals should have points
	commaDecimal                          // the file is delimited by semicolons because its decimals have commas
	commaUnlessThousands                  // tabs or one column: 3,5 is a decimal, 1,234 could be either
)

func commaRuleFor(delimiter rune) commaRule {
	switch delimiter {
	case ',':
		return commaAmbiguous
	case ';':
		return commaDecimal
	}
	return commaUnlessThousands
}

// cellReader reads the cells of one source.
type cellReader struct {
	comma commaRule
	codes []code
}

// code is a cell that stands for "no score". It also fits numbers of the same
// value.
type code struct {
	text   string
	value  float64
	number bool
	reason string
}

func newCellReader(delimiter rune, missing []string) cellReader {
	c := cellReader{comma: commaRuleFor(delimiter)}
	var codes []code
	for _, text := range missing {
		text = trim(text)
		if text == "" {
			continue // a blank cell has its own reason
		}
		value, k, _ := c.read(text)
		codes = append(codes, code{text: text, value: value, number: k == usable, reason: "coded " + printable(text, 40)})
	}
	c.codes = codes
	return c
}

// reason words the kinds that are left out.
func (c *cellReader) reason(k kind) string {
	if k >= coded {
		return c.codes[k-coded].reason
	}
	return reasons[k]
}

// read reads a cell: the number in it when it is usable, and its decimal mark
// ('.', ',' or 0).
func (c *cellReader) read(cell string) (x float64, k kind, mark byte) {
	if x, mark, ok := c.parsePlain(cell); ok {
		return x, c.unlessCoded(x), mark
	}
	if !utf8.ValidString(cell) {
		cell = fromLatin1(cell)
	}
	cell = trim(cell)
	for i := range c.codes {
		if c.codes[i].text == cell {
			return 0, coded + kind(i), 0
		}
	}
	if isBlank(cell) {
		return 0, blank, 0
	}
	cell = strings.Replace(cell, "−", "-", 1)
	if x, mark, ok := c.parsePlain(cell); ok {
		return x, c.unlessCoded(x), mark
	}
	if x, k, mark = c.parse(cell); k == usable {
		k = c.unlessCoded(x)
	}
	return x, k, mark
}

func (c *cellReader) unlessCoded(x float64) kind {
	for i := range c.codes {
		if c.codes[i].number && c.codes[i].value == x {
			return coded + kind(i)
		}
	}
	return usable
}

var powersOfTen = [...]float64{1, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15}

// parsePlain reads nearly every number there is: up to 15 digits with a sign
// and a decimal mark. Digits and power of ten are then exact in a float64, so
// one division rounds correctly (Clinger 1990).
func (c *cellReader) parsePlain(s string) (x float64, mark byte, ok bool) {
	negative := len(s) > 0 && s[0] == '-'
	if negative {
		s = s[1:]
	}
	if len(s) == 0 || len(s) > 15 {
		return 0, 0, false
	}
	digits, decimals := int64(0), 0
	for i := 0; i < len(s); i++ {
		switch d := s[i]; {
		case d-'0' <= 9:
			digits = 10*digits + int64(d-'0')
		case mark == 0 && len(s) > 1 && (d == '.' || d == ',' && c.comma == commaDecimal):
			mark, decimals = d, len(s)-1-i
		default:
			return 0, 0, false
		}
	}
	x = float64(digits) / powersOfTen[decimals]
	if negative {
		x = 0 - x // and not -0
	}
	return x, mark, true
}

// parse reads a trimmed cell that isn't blank.
func (c *cellReader) parse(cell string) (x float64, k kind, mark byte) {
	before, after, comma := strings.Cut(cell, ",")
	if !comma {
		if strings.Contains(cell, ".") {
			mark = '.'
		}
		x, k = parseFloat(cell)
		return x, k, mark
	}
	x, k = parseFloat(before + "." + after) // a second mark makes it unreadable
	if k == usable && (c.comma == commaAmbiguous || c.comma == commaUnlessThousands && isThousands(before, after)) {
		k = ambiguous
	}
	return x, k, ','
}

// isThousands is true for 1,234: one to three digits, then three.
func isThousands(before, after string) bool {
	before = strings.TrimLeft(before, "+-")
	return len(before) >= 1 && len(before) <= 3 && len(after) == 3 && strings.Trim(after, "0123456789") == ""
}

// parseFloat reads sign, digits, point and exponent, and none of the other
// things that strconv takes for a number.
func parseFloat(s string) (float64, kind) {
	if strings.Trim(s, "0123456789+-.eE") != "" {
		switch strings.ToLower(strings.TrimLeft(s, "+-")) {
		case "inf", "infinity", "∞":
			return 0, infinite
		}
		return 0, unreadable
	}
	x, err := strconv.ParseFloat(s, 64)
	switch {
	case errors.Is(err, strconv.ErrRange) && math.IsInf(x, 0):
		return 0, infinite
	case err != nil:
		return 0, unreadable
	}
	return x + 0, usable
}

func isBlank(cell string) bool {
	if len(cell) > len("null") {
		return false
	}
	switch strings.ToLower(cell) {
	case "", ".", "na", "n/a", "nan", "null":
		return true
	}
	return false
}

func trim(s string) string { return strings.TrimFunc(s, isSpace) }

// isSpace also knows the marks without width that copying leaves behind.
func isSpace(r rune) bool { return unicode.IsSpace(r) || r == '\ufeff' || r == '\u200b' }

// fromLatin1 makes text of what older programs write: one byte, one character.
func fromLatin1(s string) string {
	runes := make([]rune, len(s))
	for i := range len(s) {
		runes[i] = rune(s[i])
	}
	return string(runes)
}
