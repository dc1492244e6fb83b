package ask

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"strings"

	"tailgap/core/cutoff"
	"tailgap/core/sample"
)

// NewQuestion returns a question with the defaults: a fitted curve, the step
// detected, 95% intervals from 10,000 replicates with seed 1, no cutoffs and
// no tolerance.
func NewQuestion() Question {
	return Question{
		Format: QuestionFormat, Scores: []string{}, Missing: []string{}, Header: sample.HeaderAuto,
		Cutoffs: []cutoff.Cutoff{}, Level: 0.95, Replicates: 10_000, Seed: 1,
	}
}

// ReadQuestion reads a question file: JSON with the version QuestionFormat.
// What the file leaves out keeps its default. An unknown version, an unknown
// field, a name that is there twice and a question that Check refuses are
// errors.
func ReadQuestion(text []byte) (Question, error) {
	text = bytes.TrimPrefix(text, []byte("\ufeff")) // some editors write one
	var version struct {
		Format *string `json:"format"`
	}
	if err := json.Unmarshal(text, &version); err != nil {
		return Question{}, fmt.Errorf("this is not a question file, which is a JSON object with a format: %w", plainer(err, text))
	}
	if version.Format == nil || *version.Format != QuestionFormat {
		found := "no format"
		if version.Format != nil {
			found = fmt.Sprintf("the format %.60q", *version.Format)
		}
		return Question{}, fmt.Errorf("the question file has %s; this program reads %q", found, QuestionFormat)
	}
	question := NewQuestion()
	decoder := json.NewDecoder(bytes.NewReader(text))
	decoder.DisallowUnknownFields()
	if err := decoder.Decode(&question); err != nil {
		return Question{}, fmt.Errorf("the question file can't be read: %w", plainer(err, text))
	}
	if _, err := decoder.Token(); !errors.Is(err, io.EOF) {
		return Question{}, errors.New("the question file goes on after the question; a file holds one question")
	}
	if err := strictly(text); err != nil {
		return Question{}, fmt.Errorf("the question file can't be read: %w", err)
	}
	return question.filled(), question.Check()
}

// plainer says a JSON error in words for the person whose file it is.
func plainer(err error, text []byte) error {
	var syntax *json.SyntaxError
	var kind *json.UnmarshalTypeError
	switch {
	case errors.As(err, &syntax):
		return fmt.Errorf("line %d is not JSON", 1+bytes.Count(text[:min(int(syntax.Offset), len(text))], []byte("\n")))
	case errors.As(err, &kind) && kind.Field != "":
		return fmt.Errorf("%.60q can't be %s; write %s", kind.Field, jsonWord(kind.Value), wanted(kind.Type))
	case errors.As(err, &kind):
		return fmt.Errorf("it holds %s", jsonWord(kind.Value))
	}
	if field, unknown := strings.CutPrefix(err.Error(), "json: unknown field "); unknown {
		return fmt.Errorf("there is no %s in a question", field)
	}
	return err
}

// WriteQuestion writes the question as ReadQuestion reads it.
func WriteQuestion(question Question) ([]byte, error) {
	var text bytes.Buffer
	encoder := json.NewEncoder(&text)
	encoder.SetEscapeHTML(false) // leave < and > as they are
	encoder.SetIndent("", "  ")
	err := encoder.Encode(question.filled())
	return text.Bytes(), err
}

// filled has empty lists where there are none, so that a question is always
// written in one way.
func (q Question) filled() Question {
	if q.Scores == nil {
		q.Scores = []string{}
	}
	if q.Missing == nil {
		q.Missing = []string{}
	}
	if q.Cutoffs == nil {
		q.Cutoffs = []cutoff.Cutoff{}
	}
	if q.Header == "" {
		q.Header = sample.HeaderAuto
	}
	return q
}
