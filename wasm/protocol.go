package main

import (
	"encoding/json"
	"errors"
	"fmt"

	"tailgap/core/ask"
	"tailgap/core/intake"
	"tailgap/core/sample"
)

// What the desk asks of the worker that leads. Data of more than a few bytes
// travel beside the message, as parcels.
const (
	askColumns = "columns" // which columns has the file? (beside it: the file, unless the worker has it)
	askAnswer  = "answer"  // what is the answer to this question? (likewise)
)

// What the crew asks of its workers while they share the replicates.
const (
	askMaker  = "maker"  // get ready to make them (beside it: the order)
	askBlocks = "blocks" // make these blocks
	askPart   = "part"   // hand over what was made
	askMerge  = "merge"  // of the lead: put this together and go on (beside it: the parts)
)

// What a worker says of its own accord; to a request it says the request's kind.
const (
	sayProgress = "progress"
	sayShare    = "share"  // the lead: there is enough to do for others (beside it: the order)
	sayBroken   = "broken" // the worker itself can't go on
)

// request is one message to a worker.
type request struct {
	ID       int           `json:"id"`
	Kind     string        `json:"kind"`
	Name     string        `json:"name,omitempty"` // the file, as the user knows it
	Demo     bool          `json:"demo,omitempty"` // the demo instead of a file
	Header   sample.Header `json:"header,omitempty"`
	Question *ask.Question `json:"question,omitempty"`
	Helpers  int           `json:"helpers,omitempty"` // workers that could help with it

	From int `json:"from,omitempty"` // blocks, from (in) to (out)
	To   int `json:"to,omitempty"`
	Made int `json:"made,omitempty"` // blocks that all workers have made so far
}

// parcel is bytes in the browser's hands: a file, or what one worker has for
// another. The page passes it on and never looks inside.
type parcel any

// share is the data of sayShare: the blocks that are still to be made, how many
// of them make a good portion, and how many workers there is memory for.
type share struct {
	From    int `json:"from"`
	Blocks  int `json:"blocks"` // in all
	Portion int `json:"portion"`
	Workers int `json:"workers"`
}

// portion is the data of a reply to askBlocks: how many blocks were made, and
// how many the worker would make in a good portion's time.
type portion struct {
	Made int `json:"made"`
	Next int `json:"next"`
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
