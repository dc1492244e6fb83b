package ask

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"math"
	"strings"

	"tailgap/core/cutoff"
	"tailgap/core/sample"
	"tailgap/core/verdict"
)

// Limits of what can be asked; beyond them an answer would be noise, or
// would never come.
const (
	minReplicates = 200
	maxReplicates = 1_000_000
	maxCutoffs    = 1000
	maxWorkers    = 1024
	maxHeads      = 1e12
	minLevel      = 0.5
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

// Check returns an error, a sentence for the person who asks, when the
// question can't be answered whatever the data.
func (q Question) Check() error {
	if q.Format != QuestionFormat {
		return fmt.Errorf("the question has the format %.60q; this program reads %q", q.Format, QuestionFormat)
	}
	if !(q.Level > 0 && q.Level < 1) {
		return fmt.Errorf("the level %v is not between 0 and 1; write 0.95 for 95%% intervals", q.Level)
	}
	if q.Level < minLevel {
		return fmt.Errorf("an interval at the level %v misses more often than it hits and settles nothing; ask for %v or more, such as 0.95", q.Level, minLevel)
	}
	if q.Replicates < minReplicates || q.Replicates > maxReplicates {
		return fmt.Errorf("%d replicates can't be used; ask for between %d and %d", q.Replicates, minReplicates, maxReplicates)
	}
	if float64(q.Replicates+1)*(1-q.Level) < 1 {
		return fmt.Errorf("a level of %v needs more than %d replicates: ask for %.0f or more", q.Level, q.Replicates, math.Ceil(1/(1-q.Level)))
	}
	if q.Workers < 0 || q.Workers > maxWorkers {
		return fmt.Errorf("%d workers can't share the work; ask for 1 to %d, or 0 for one for each core", q.Workers, maxWorkers)
	}
	if q.Curve != nil && (!(q.Curve.SD > 0) || !finite(q.Curve.SD) || !finite(q.Curve.Mean)) {
		return fmt.Errorf("a curve with mean %v and SD %v can't be drawn; the SD must be above zero and both must be finite", q.Curve.Mean, q.Curve.SD)
	}
	return errors.Join(q.checkCutoffs(), q.checkStakes())
}

func (q Question) checkCutoffs() error {
	if len(q.Cutoffs) > maxCutoffs {
		return fmt.Errorf("%d cutoffs are more than one answer takes; ask for at most %d", len(q.Cutoffs), maxCutoffs)
	}
	seen := map[cutoff.Cutoff]bool{}
	for _, c := range q.Cutoffs {
		if seen[c] {
			return fmt.Errorf("the cutoff %s is there twice; leave one out", c)
		}
		seen[c] = true
	}
	return nil
}

func (q Question) checkStakes() error {
	if q.Heads != nil && !(*q.Heads > 0 && *q.Heads <= maxHeads) {
		return fmt.Errorf("%v heads can't be counted; say how many people the share will be applied to, a number above zero and up to a million million", *q.Heads)
	}
	for _, limit := range []*verdict.Limit{q.TooHigh, q.TooLow} {
		switch {
		case limit == nil:
		case !(limit.Size >= 0) || !finite(limit.Size):
			return fmt.Errorf("the tolerance %s can't be used; it must be zero or more", limit)
		case limit.Unit == verdict.Heads && q.Heads == nil:
			return fmt.Errorf("the tolerance %s needs to know of how many people; say it with heads, such as 4000", limit)
		}
	}
	if l := q.TooLow; l != nil && l.Unit == verdict.OfCount && l.Size >= 100 {
		return fmt.Errorf("no curve is too low by more than all of the count, so %s says nothing; leave out the limit on too low, or make it smaller", l)
	}
	return nil
}

func finite(x float64) bool { return !math.IsNaN(x) && !math.IsInf(x, 0) }
