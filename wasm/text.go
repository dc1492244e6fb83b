package main

import (
	"errors"
	"fmt"
	"regexp"
	"strconv"
	"strings"

	"tailgap/core/words"
)

// sentence is an error as a sentence of its own.
func sentence(err error) string {
	text := words.Capital(strings.TrimSpace(err.Error()))
	if !strings.HasSuffix(text, ".") {
		text += "."
	}
	return text
}

// exact writes a number with every digit the machine has.
func exact(x float64) string { return strconv.FormatFloat(x, 'g', -1, 64) }

// plain writes a number as a person would type it, with every digit.
func plain(x float64) string { return strconv.FormatFloat(x, 'f', -1, 64) }

// grouped is a whole number with its thousands marked, as the page prints it.
var grouped = regexp.MustCompile(`^[-+]?\d{1,3}(,\d{3})+$`)

var (
	digits = regexp.MustCompile(`^[-+]?(\d+\.?\d*|\.\d+)([eE][-+]?\d+)?$`)
	// thousand is a comma that may as well mark thousands.
	thousand = regexp.MustCompile(`,\d{3}(\D|$)`)
)

// pointed turns a decimal comma into a point: the only comma of a text
// without a point. A comma before just three digits is refused.
func pointed(text string) (string, error) {
	if strings.Count(text, ",") != 1 || strings.Contains(text, ".") {
		return text, nil
	}
	if thousand.MatchString(text) {
		return "", fmt.Errorf("%.40q could mean thousands or decimals; write thousands without a mark, and decimals with a point", text)
	}
	return strings.Replace(text, ",", ".", 1), nil
}

// number reads what a person typed.
func number(text string) (float64, error) {
	clean, err := pointed(strings.TrimSpace(strings.ReplaceAll(text, "−", "-")))
	if err != nil {
		return 0, err
	}
	x, err := strconv.ParseFloat(clean, 64)
	if err != nil || !digits.MatchString(clean) {
		return 0, fmt.Errorf("%.40q can't be read as a number; write digits, and decimals with a point", text)
	}
	return x + 0, nil // no negative zero
}

// whole reads a whole number that a person typed.
func whole(text string) (int, error) {
	text = strings.TrimSpace(text)
	if grouped.MatchString(text) {
		text = strings.ReplaceAll(text, ",", "")
	}
	n, err := strconv.Atoi(text)
	if err != nil {
		return 0, errors.New("this can't be read as a whole number")
	}
	return n, nil
}
