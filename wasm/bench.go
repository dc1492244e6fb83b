package main

import (
	"bytes"
	"context"
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
	now func() time.Time

	name string
	data []byte
	demo bool

	read   intake.Options // how the sample was read; its scores are nil when nothing was
	sample sample.Sample

	maker *ask.Maker // of the replicates that are being made; nil when none are
}

func newBench() *bench { return &bench{now: time.Now} }

// line is a worker's connection with the page.
type line interface {
	say(r reply, parcels ...[]byte)
	hear() message // waits for the next
}

// message is a request with what came beside it; err is what was wrong with
// that.
type message struct {
	request
	parcels [][]byte
	err     error
}

// hold puts a file on the bench in place of the one before.
func (b *bench) hold(name string, data []byte) { *b = bench{now: b.now, name: name, data: data} }

// serve does what a message asks and says how it went. Long work says its
// progress on the way, and may have others help with it.
func (b *bench) serve(m message, line line) (r reply, parcels [][]byte) {
	r = guarded(m.ID, m.Kind, func() (any, error) {
		if m.err != nil {
			return nil, m.err
		}
		switch m.Kind {
		case askColumns, askAnswer:
			b.take(m)
			if m.Kind == askAnswer {
				return b.answer(m.request, line)
			}
			return intake.Columns(context.Background(), b.source(nil), m.Header)
		case askMaker:
			if len(m.parcels) != 1 {
				return nil, errors.New("the page asked for replicates without an order")
			}
			maker, err := ask.NewMaker(context.Background(), m.parcels[0])
			b.maker = maker
			return nil, err
		case askBlocks:
			return b.make(m.request, nil)
		case askPart:
			part, err := b.part()
			parcels = [][]byte{part}
			return nil, err
		}
		return nil, errors.New("the page asked for something that its worker doesn't know")
	})
	return r, parcels
}

// take puts on the bench what a message is about, unless it is there already.
func (b *bench) take(m message) {
	if len(m.parcels) > 0 {
		b.hold(m.Name, m.parcels[0])
	}
	if m.Demo && !b.demo {
		b.hold(demo.Name, demo.CSV())
		b.demo = true
	}
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

func (b *bench) answer(r request, line line) (ask.Answer, error) {
	if r.Question == nil {
		return ask.Answer{}, errors.New("the page asked without a question")
	}
	question := *r.Question
	options := intake.Options{Scores: question.Scores, Missing: question.Missing, Header: question.Header}
	if err := b.readAs(options, b.tellProgress(r.ID, stageReading, line)); err != nil {
		return ask.Answer{}, unread{err}
	}
	return ask.JudgeWith(context.Background(), question, b.sample, b.tellProgress(r.ID, stageJudging, line), b.sharing(r, line))
}

// readAs reads the file, unless it was read in the same way before.
func (b *bench) readAs(options intake.Options, tell ask.Progress) error {
	if b.read.Scores != nil && slices.Equal(b.read.Scores, options.Scores) &&
		slices.Equal(b.read.Missing, options.Missing) && b.read.Header == options.Header {
		return nil
	}
	read, err := intake.Read(context.Background(), []intake.Source{b.source(tell)}, options)
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
func (b *bench) tellProgress(id int, stage string, line line) ask.Progress {
	told := b.now()
	return func(done, total int) {
		if b.now().Sub(told) < tellEvery {
			return
		}
		told = b.now()
		line.say(guarded(id, sayProgress, func() (any, error) { return progress{stage, done, total}, nil }))
	}
}
