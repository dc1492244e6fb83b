package main

import (
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"io"
	"slices"
	"time"

	"tailgap/core/ask"
	"tailgap/core/demo"
	"tailgap/core/intake"
	"tailgap/core/sample"
)

// bench is the worker's side of the work, without the browser: it holds one
// file, reads it as a question wants it, and answers.
type bench struct {
	name string
	data []byte
	demo bool

	read   intake.Options // how the sample was read; its scores are nil when nothing was
	sample sample.Sample
}

// hold puts a file on the bench in place of the one before.
func (b *bench) hold(name string, data []byte) { *b = bench{name: name, data: data} }

// serve does what a request asks and says how it went; long work says its
// progress through post on the way.
func (b *bench) serve(r request, post func(reply)) reply {
	return guarded(r.ID, r.Kind, func() (any, error) {
		if r.Demo && !b.demo {
			b.hold(demo.Name, demo.CSV())
			b.demo = true
		}
		switch r.Kind {
		case askColumns:
			return intake.Columns(b.source(nil), r.Header)
		case askAnswer:
			return b.answer(r, post)
		}
		return nil, errors.New("the page asked for something that its worker doesn't know")
	})
}

// source is the file to be read; tell, which may be nil, hears how many of its
// bytes have been.
func (b *bench) source(tell ask.Progress) intake.Source {
	var reader io.Reader = bytes.NewReader(b.data)
	if tell != nil {
		reader = &told{Reader: reader, total: len(b.data), tell: tell}
	}
	return intake.Source{Name: b.name, Reader: reader}
}

// told is a reader that says how far it is.
type told struct {
	io.Reader
	done, total int
	tell        ask.Progress
}

func (t *told) Read(p []byte) (int, error) {
	n, err := t.Reader.Read(p)
	t.done += n
	t.tell(t.done, t.total)
	return n, err
}

func (b *bench) answer(r request, post func(reply)) (ask.Answer, error) {
	if r.Question == nil {
		return ask.Answer{}, errors.New("the page asked without a question")
	}
	question := *r.Question
	question.Workers = 1 // a browser gives a worker one thread
	options := intake.Options{Scores: question.Scores, Missing: question.Missing, Header: question.Header}
	if err := b.readAs(options, tellProgress(r.ID, stageReading, post, time.Now)); err != nil {
		return ask.Answer{}, unread{err}
	}
	return ask.Judge(context.Background(), question, b.sample, tellProgress(r.ID, stageJudging, post, time.Now))
}

// readAs reads the file, unless it was read in the same way before.
func (b *bench) readAs(options intake.Options, tell ask.Progress) error {
	if b.read.Scores != nil && slices.Equal(b.read.Scores, options.Scores) &&
		slices.Equal(b.read.Missing, options.Missing) && b.read.Header == options.Header {
		return nil
	}
	read, err := intake.Read([]intake.Source{b.source(tell)}, options)
	if err != nil {
		return err
	}
	read.Demo = b.demo
	b.sample, b.read = read, options
	return nil
}

// tellEvery is how often progress is told and shown.
const tellEvery = 50 * time.Millisecond

// tellProgress says how far a stage of a request is, now and then.
func tellProgress(id int, stage string, post func(reply), now func() time.Time) ask.Progress {
	told := now()
	return func(done, total int) {
		if now().Sub(told) < tellEvery {
			return
		}
		told = now()
		data, err := json.Marshal(progress{stage, done, total})
		if err == nil {
			post(reply{ID: id, Kind: sayProgress, Data: data})
		}
	}
}
