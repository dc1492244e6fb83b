package main

import (
	"errors"
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

var errNoNumber = errors.New("this can't be read as a number; write digits, and decimals with a point")

// number reads what a person typed.
func number(text string) (float64, error) {
	text = strings.TrimSpace(strings.ReplaceAll(text, "−", "-"))
	if grouped.MatchString(text) {
		text = strings.ReplaceAll(text, ",", "")
	}
	x, err := strconv.ParseFloat(text, 64)
	if err != nil {
		return 0, errNoNumber
	}
	return x, nil
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
