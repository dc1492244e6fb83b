package main

import (
	"tailgap/core/ask"
	"tailgap/core/demo"
	"tailgap/core/intake"
)

// How data come to the desk, and how the question stays the same when they do.

// open fetches a file, looks into it and, if it has columns, puts it on the
// desk in place of what was there. fetch does the first in its own time and
// says what came of it.
func (d *desk) open(name string, fetch func(fetched func(*file, error))) {
	d.begin(&job{kind: fetchFile, opens: &data{name: name}})
	fetching := d.running
	fetch(func(f *file, err error) {
		if d.running != fetching {
			return
		}
		if err != nil {
			d.running = nil
			d.unopened(err)
			d.goOn()
			return
		}
		d.look(&data{name: name, file: f})
	})
}

// openDemo puts the demo back on the desk with its own question.
func (d *desk) openDemo() {
	d.drop()
	d.data = data{name: demo.Name, demo: true}
	d.opened = false
	delete(d.trouble, atData)
	d.change(demo.Question())
}

// reread looks at the data again, or at those that are about to be opened,
// and then asks: their header is now read in another way.
func (d *desk) reread() {
	again := d.data
	if d.running != nil && d.running.opens != nil {
		again = *d.running.opens
	}
	if d.running == nil || d.running.kind != fetchFile {
		d.look(&again)
	}
	d.waiting = true
}

func (d *desk) look(at *data) {
	d.begin(nil)
	d.send(job{kind: askColumns, opens: at})
}

// begin makes way for a job that opens data: what it interrupts waits.
func (d *desk) begin(j *job) {
	unanswered := d.waiting || (d.running != nil && d.running.kind == askAnswer)
	d.drop()
	delete(d.trouble, atData)
	d.waiting, d.running = unanswered, j
}

// looked puts on the desk what was looked into. The question stays, whichever
// of the two came first; only the demo's own goes with the demo.
func (d *desk) looked(done job, r reply) {
	columns, err := r.columns()
	if err != nil {
		d.unopened(err)
		return
	}
	question, same := d.question, done.opens.is(d.data)
	if !same && d.untouched() {
		question = ask.NewQuestion()
	}
	d.data = *done.opens
	d.data.columns = columns
	if question = asked(question, columns); same && len(question.Scores) == len(d.question.Scores) {
		return
	}
	d.waiting = false
	d.change(question)
}

// unopened says why data can't be opened; those on the desk stay.
func (d *desk) unopened(err error) {
	d.trouble[atData] = sentence(err)
	d.waiting = d.waiting && d.ready()
}

// asked is the question with the score columns that go without saying, if it
// names none: the only column, or the only one with numbers in it.
func asked(q ask.Question, columns []intake.Column) ask.Question {
	if len(q.Scores) > 0 {
		return q
	}
	var numeric []intake.Column
	for _, c := range columns {
		if c.Numeric {
			numeric = append(numeric, c)
		}
	}
	switch {
	case len(columns) == 1:
		q.Scores = []string{columns[0].Ask}
	case len(numeric) == 1:
		q.Scores = []string{numeric[0].Ask}
	}
	return q
}
