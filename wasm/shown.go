package main

import (
	"strconv"

	"github.com/maxence-charriere/go-app/v9/pkg/app"
)

// shown is a printed number that carries its exact value under the name that
// the JSON answer has for it.
func shown(field string, value float64, text string) app.HTMLSpan {
	return app.Span().DataSet("field", field).DataSet("value", exact(value)).Text(text)
}

// shownText is likewise for a value that is no number.
func shownText(field, value, text string) app.HTMLSpan {
	return app.Span().DataSet("field", field).DataSet("value", value).Text(text)
}

// optional is a printed number that may not be there: JSON's null.
func optional(field string, value *float64, text string) app.UI {
	if value == nil {
		return app.Span().DataSet("field", field).DataSet("value", "null").Text(text)
	}
	return shown(field, *value, text)
}

func itoa(i int) string { return strconv.Itoa(i) }
