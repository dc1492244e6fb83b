// Package report writes an Answer out: as JSON and CSV for programs, as text
// for people.
package report

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
)

// JSON writes the answer as indented JSON, the same bytes for the same
// answer. It is an error if the answer holds a number that is none (NaN or
// infinite): nothing is written then.
func JSON(a ask.Answer) ([]byte, error) {
	var out bytes.Buffer
	encoder := json.NewEncoder(&out)
	encoder.SetEscapeHTML(false) // a cutoff is to read ">=70"
	encoder.SetIndent("", "  ")
	if err := encoder.Encode(a); err != nil {
		var none *json.UnsupportedValueError
		if errors.As(err, &none) {
			return nil, fmt.Errorf("the answer can't be written: one of its numbers came out as %s", none.Str)
		}
		return nil, fmt.Errorf("the answer can't be written: %w", err)
	}
	return out.Bytes(), nil
}

// ReadJSON reads an answer that JSON wrote. An answer of another
// version is refused, and one whose question can't be asked; fields it
// doesn't know are ignored. It is an error if the text is no JSON, goes on
// after the answer, or has a sweep or a worm whose columns differ in
// length.
func ReadJSON(text []byte) (ask.Answer, error) {
	var version struct {
		Format string `json:"format"`
	}
	if err := json.Unmarshal(text, &version); err != nil {
		return ask.Answer{}, unreadable(text, err)
	}
	if version.Format != ask.AnswerFormat {
		return ask.Answer{}, fmt.Errorf("this is no answer this program can read: its format is %.40q, not %q", version.Format, ask.AnswerFormat)
	}
	a := ask.Answer{Question: ask.NewQuestion()} // what a question leaves out keeps its default
	if err := json.Unmarshal(text, &a); err != nil {
		return ask.Answer{}, unreadable(text, err)
	}
	if err := a.Question.Check(); err != nil {
		return ask.Answer{}, fmt.Errorf("the answer can't be read: %w", err)
	}
	for _, r := range a.Results {
		for _, s := range r.Sweeps {
			if err := checkSweep(s); err != nil {
				return ask.Answer{}, err
			}
		}
		if err := checkWorm(r); err != nil {
			return ask.Answer{}, err
		}
	}
	return a, nil
}

// unreadable says where in the text JSON went wrong, as far as it is known.
func unreadable(text []byte, err error) error {
	var syntax *json.SyntaxError
	var kind *json.UnmarshalTypeError
	switch {
	case errors.As(err, &syntax):
		line, column := position(text, syntax.Offset)
		return fmt.Errorf("the answer can't be read: line %d, column %d is not JSON", line, column)
	case errors.As(err, &kind):
		line, column := position(text, kind.Offset)
		return fmt.Errorf("the answer can't be read: line %d, column %d has a value of the wrong kind for %.60q", line, column, kind.Field)
	}
	return fmt.Errorf("the answer can't be read: %w", err)
}

// position is the line and column, both from 1, of the last of so many bytes.
func position(text []byte, offset int64) (line, column int) {
	before := text[:min(max(offset-1, 0), int64(len(text)))]
	return 1 + bytes.Count(before, []byte("\n")), len(before) - bytes.LastIndexByte(before, '\n')
}

func checkWorm(r ask.Result) error {
	if r.Shape == nil {
		return nil
	}
	w := r.Shape.Worm
	for _, column := range []struct {
		name     string
		values   []float64
		optional bool
	}{{"quantile", w.Quantile, false}, {"deviation", w.Deviation, false}, {"limit", w.Limit, true}} {
		if len(column.values) != len(w.Score) && !(column.optional && column.values == nil) {
			return fmt.Errorf("the answer can't be read: the worm of %.40q has %d scores but %d of %s", r.Score, len(w.Score), len(column.values), column.name)
		}
	}
	return nil
}

func checkSweep(s ask.Sweep) error {
	if s.Side == cutoff.Stretch {
		return errors.New("the answer can't be read: a sweep has the side .., which no sweep has")
	}
	for _, column := range []struct {
		name     string
		values   []float64
		optional bool
	}{
		{"curve_share", s.CurveShare, false}, {"counted_share", s.CountedShare, false}, {"gap_points", s.GapPoints, false},
		{"low", s.Low, true}, {"high", s.High, true}, {"band_low", s.BandLow, true}, {"band_high", s.BandHigh, true},
	} {
		if len(column.values) != len(s.Threshold) && !(column.optional && column.values == nil) {
			return fmt.Errorf("the answer can't be read: the sweep %s has %d thresholds but %d of %s", s.Side, len(s.Threshold), len(column.values), column.name)
		}
	}
	return nil
}
