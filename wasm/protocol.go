package main

import (
	"encoding/json"
	"errors"
	"fmt"

	"tailgap/core/ask"
	"tailgap/core/intake"
	"tailgap/core/sample"
)

// What the page asks of the worker. Data of more than a few bytes travels
// beside the message, as the browser's own file.
const (
	askColumns = "columns" // which columns has the file?
	askAnswer  = "answer"  // what is the answer to this question?
)

// What the worker says; to a request it also says askColumns or askAnswer.
const (
	sayProgress = "progress"
	sayBroken   = "broken" // the worker itself can't go on
)

// request is one message to the worker.
type request struct {
	ID       int           `json:"id"`
	Kind     string        `json:"kind"`
	Name     string        `json:"name"` // the file, as the user knows it
	Demo     bool          `json:"demo"` // the demo instead of a file
	Header   sample.Header `json:"header"`
	Question *ask.Question `json:"question,omitempty"`
}

// reply is one message from the worker: data, or an error that is a sentence
// for the person at the page.
type reply struct {
	ID    int             `json:"id"`
	Kind  string          `json:"kind"`
	Data  json.RawMessage `json:"data,omitempty"`
	Error string          `json:"error,omitempty"`
	// Unread is true when the error is about the data or the columns asked for.
	Unread bool `json:"unread,omitempty"`
}

// progress is the data of sayProgress: how far a stage of the work is.
type progress struct {
	Stage string `json:"stage"`
	Done  int    `json:"done"`
	Total int    `json:"total"`
}

// The stages of an answer.
const (
	stageReading = "reading" // the file; counted in bytes
	stageJudging = "judging" // counted in replicates
)

// unread is what keeps data from being read as a question wants them.
type unread struct{ error }

// guarded runs work and encodes what comes of it. A panic becomes an error
// like any other, so that the page always hears something.
func guarded(id int, kind string, work func() (any, error)) (r reply) {
	r = reply{ID: id, Kind: kind}
	defer func() {
		if cause := recover(); cause != nil {
			r.Data, r.Error = nil, fmt.Sprintf("the program failed at this, and it is not the data's fault: %v", cause)
		}
	}()
	result, err := work()
	if err == nil {
		r.Data, err = json.Marshal(result)
	}
	if err != nil {
		r.Data, r.Error = nil, err.Error()
		_, r.Unread = err.(unread)
	}
	return r
}

// columns reads the data of a reply to askColumns.
func (r reply) columns() ([]intake.Column, error) { return decoded[[]intake.Column](r) }

// answer reads the data of a reply to askAnswer.
func (r reply) answer() (*ask.Answer, error) { return decoded[*ask.Answer](r) }

func decoded[T any](r reply) (result T, err error) {
	if r.Error != "" {
		return result, errors.New(r.Error)
	}
	err = json.Unmarshal(r.Data, &result)
	return result, err
}
