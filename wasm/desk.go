package main

import (
	"reflect"
	"time"

	"tailgap/core/ask"
	"tailgap/core/demo"
	"tailgap/core/intake"
)

// place is a part of the page where something can be wrong.
type place string

// The places; each cutoff has its own, made by atCutoff.
const (
	atData  place = "data"
	atCurve place = "curve"
	atMore  place = "more"
	atHigh  place = "too-high"
	atLow   place = "too-low"
	atHeads place = "heads"
	atAdd   place = "add"
	atRead  place = "reading" // of the data, as the question wants them read
	atWork  place = "work"
	atAway  place = "take-away"
)

// patience is how long a question that was overtaken may still run before
// its worker is stopped: most answers are there sooner than a new worker.
const patience = 250 * time.Millisecond

// data is what the question is asked of.
type data struct {
	name    string
	demo    bool
	file    *file           // nil for the demo
	columns []intake.Column // nil until the worker has said
}

// is true for the same data: two files of one name are not.
func (a data) is(b data) bool { return a.demo == b.demo && a.file == b.file }

// fetchFile is what the page does itself: it takes a file into memory.
const fetchFile = "fetch"

// job is what is being done, by the worker unless it is fetchFile.
type job struct {
	id       int
	kind     string
	version  int   // of the question it answers
	opens    *data // the data it looks at, for fetchFile and askColumns
	progress progress
}

// desk is the page's state and its conversation with the worker, without any
// element of the page. Its methods are called on the page's one thread.
type desk struct {
	start func(receive func(reply)) thread    // starts a worker
	soon  func(do func())                     // does something on the page's thread, and shows it
	aside func(do func())                     // likewise, but what it changes shows itself
	after func(wait time.Duration, do func()) // likewise, later

	question ask.Question
	opened   bool // the question came from a file of its own
	data     data
	version  int // counts the changes of question and data

	answer     *ask.Answer
	answeredAs int  // the version that the answer answers
	answerData data // what it is about

	trouble map[place]string
	running *job
	waiting bool // the question has changed since the worker began
	stopped bool // the person has stopped the work

	worker thread
	holds  *file // the file the worker has
	lastID int
}

// newDesk has the demo on it, asked its own question.
func newDesk() *desk {
	return &desk{
		question: demo.Question(), data: data{name: demo.Name, demo: true},
		trouble: map[place]string{},
	}
}

// old is true when what is shown answers an earlier question, or other data.
func (d *desk) old() bool { return d.answer != nil && d.answeredAs != d.version }

// ready is true when there is something to ask.
func (d *desk) ready() bool { return len(d.question.Scores) > 0 }

// untouched is true while the demo's question, which nobody asked, is asked.
func (d *desk) untouched() bool {
	return d.data.demo && !d.opened && reflect.DeepEqual(d.question, demo.Question())
}

// change puts another question on the desk and asks it.
func (d *desk) change(question ask.Question) {
	again := question.Header != d.question.Header // then the columns have other names
	d.question = question
	d.version++
	if again {
		d.reread()
		return
	}
	d.ask()
}

// openQuestion puts a question from a file on the desk. What was wrong with
// the one before, or with a file that didn't come to be used, is over.
func (d *desk) openQuestion(question ask.Question) {
	clear(d.trouble)
	d.opened = true
	if question.Header == d.question.Header {
		question = asked(question, d.data.columns)
	}
	d.change(question)
}

// ask asks the question as it stands, once the worker is free. A question
// that can't be answered, whatever the data, is not sent.
func (d *desk) ask() {
	d.stopped = false
	delete(d.trouble, atWork)
	delete(d.trouble, atRead)
	if d.running != nil && d.running.opens != nil {
		d.waiting = true // what it opens would be lost
		return
	}
	if !d.ready() {
		d.drop()
		if d.data.columns == nil {
			d.reread() // to have columns to choose from
		}
		return
	}
	if err := d.question.Check(); err != nil {
		d.trouble[atWork] = sentence(err)
		d.drop()
		return
	}
	if d.running == nil {
		d.send(job{kind: askAnswer, version: d.version})
		return
	}
	if d.waiting {
		return
	}
	d.waiting = true
	overtaken := d.running
	d.after(patience, func() {
		if d.running == overtaken && d.waiting {
			d.drop()
			d.ask()
		}
	})
}

// cancel stops the work; what was answered last stays.
func (d *desk) cancel() {
	if d.running == nil {
		return
	}
	d.stopped = d.waiting || d.running.kind == askAnswer
	d.drop()
}

// drop ends what is running, and its worker with it.
func (d *desk) drop() {
	d.waiting = false
	dropped := d.running
	d.running = nil
	if dropped == nil || dropped.kind == fetchFile {
		return
	}
	d.worker.stop()
	d.worker, d.holds = nil, nil
}

// send gives the worker a job, starting one first if there is none.
func (d *desk) send(j job) {
	of := d.data
	if j.opens != nil {
		of = *j.opens
	}
	if d.worker == nil {
		d.worker = d.start(func(r reply) {
			if r.Kind == sayProgress {
				d.aside(func() { d.heard(r) })
			} else {
				d.soon(func() { d.heard(r) })
			}
		})
	}
	d.lastID++
	j.id = d.lastID
	r := request{ID: j.id, Kind: j.kind, Name: of.name, Demo: of.demo, Header: d.question.Header}
	if j.kind == askAnswer {
		question := d.question
		r.Question = &question
	}
	with := of.file
	if with == d.holds {
		with = nil
	}
	d.holds = of.file
	d.running = &j
	d.worker.post(r, with)
}

// heard takes in what the worker says. A worker that was stopped may have
// said something just before; its job is not the running one any more.
func (d *desk) heard(r reply) {
	if d.running == nil || (r.ID != d.running.id && r.Kind != sayBroken) {
		return
	}
	switch r.Kind {
	case sayProgress:
		if p, err := decoded[progress](r); err == nil {
			d.running.progress = p
		}
		return
	case sayBroken:
		d.drop()
		d.trouble[atWork] = "The page's worker has stopped: " + r.Error + ". Change or ask the question again to start another."
		return
	}
	done := *d.running
	d.running = nil
	if done.kind == askColumns {
		d.looked(done, r)
	} else {
		d.answered(done, r)
	}
	d.goOn()
}

// goOn asks the question that waits, if nothing is running any more.
func (d *desk) goOn() {
	if d.waiting && d.running == nil {
		d.waiting = false
		d.ask()
	}
}

func (d *desk) answered(done job, r reply) {
	answer, err := r.answer()
	switch {
	case err == nil:
		d.answer, d.answeredAs, d.answerData = answer, done.version, d.data
	case done.version != d.version:
	case r.Unread:
		d.trouble[atRead] = sentence(err)
	default:
		d.trouble[atWork] = sentence(err)
	}
	if d.data.columns == nil {
		d.send(job{kind: askColumns, opens: &data{name: d.data.name, demo: d.data.demo, file: d.data.file}})
	}
}
