package main

import (
	"encoding/json"
	"errors"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/demo"
	"tailgap/core/intake"
	"tailgap/core/sample"
)

// posted is one message to a worker.
type posted struct {
	request
	with *file
}

// fakeThread keeps what it is told, and says what the test wants it to.
type fakeThread struct {
	posted  []posted
	stopped bool
	receive func(reply)
}

func (t *fakeThread) post(r request, with *file) { t.posted = append(t.posted, posted{r, with}) }
func (t *fakeThread) stop()                      { t.stopped = true }
func (t *fakeThread) last() posted               { return t.posted[len(t.posted)-1] }

// says answers the last message.
func (t *fakeThread) says(data any, failure string) {
	text, err := json.Marshal(data)
	if err != nil {
		panic(err)
	}
	t.receive(reply{ID: t.last().ID, Kind: t.last().Kind, Data: text, Error: failure})
}

// tried is a desk in the hands of a test.
type tried struct {
	*desk
	threads []*fakeThread
	later   []func() // what is put off until patience is over
}

func newTried() *tried {
	d := &tried{desk: newDesk()}
	d.start = func(receive func(reply)) thread {
		t := &fakeThread{receive: receive}
		d.threads = append(d.threads, t)
		return t
	}
	d.soon = func(do func()) { do() }
	d.aside = d.soon
	d.after = func(_ time.Duration, do func()) { d.later = append(d.later, do) }
	return d
}

// open opens a file that is fetched at once.
func (d *tried) open(f *file) {
	d.desk.open(f.name, func(fetched func(*file, error)) { fetched(f, nil) })
}

func (d *tried) thread() *fakeThread { return d.threads[len(d.threads)-1] }

// wait lets the patience with what is running come to its end.
func (d *tried) wait() {
	for _, do := range d.later {
		do()
	}
	d.later = nil
}

// answered brings the desk to where the demo is answered and looked into.
func (d *tried) answered() {
	d.ask()
	d.thread().says(ask.Answer{Question: d.question}, "")
	d.thread().says([]intake.Column{{Name: "vocabulary", Number: 1, Numeric: true, Ask: "vocabulary"}}, "")
}

func asking(cutoffs ...string) ask.Question {
	q := demo.Question()
	q.Cutoffs = nil
	for _, text := range cutoffs {
		c, err := cutoff.Parse(text)
		if err != nil {
			panic(err)
		}
		q.Cutoffs = append(q.Cutoffs, c)
	}
	return q
}

func TestDeskOpensWithTheDemoAsked(t *testing.T) {
	d := newTried()
	d.ask()
	require.Len(t, d.threads, 1)
	sent := d.thread().last()
	assert.Equal(t, askAnswer, sent.Kind)
	assert.True(t, sent.Demo)
	assert.Nil(t, sent.with)
	assert.Equal(t, demo.Question(), *sent.Question)

	d.thread().says(answerOf("x"), "")
	require.NotNil(t, d.answer)
	assert.Equal(t, "x", d.answer.Program)
	assert.False(t, d.old())
	assert.Equal(t, askColumns, d.thread().last().Kind, "then it wants to know which other columns there are")
	d.thread().says([]intake.Column{{Name: "a", Ask: "a"}, {Name: "b", Ask: "b"}}, "")
	assert.Len(t, d.data.columns, 2)
	assert.Nil(t, d.running)
	assert.False(t, d.old())
}

func TestDeskLetsShortWorkFinish(t *testing.T) {
	d := newTried()
	d.answered()
	d.change(asking("<=10"))
	d.change(asking("<=9"))
	d.change(asking("<=8"))
	assert.True(t, d.old())
	d.thread().says(answerOf("of <=10"), "")
	assert.Equal(t, "of <=10", d.answer.Program, "it is shown, ")
	assert.True(t, d.old(), "but as old")
	assert.Equal(t, asking("<=8"), *d.thread().last().Question, "only the newest question is asked next")
	d.thread().says(answerOf("of <=8"), "")
	assert.False(t, d.old())
	d.wait()
	assert.Len(t, d.threads, 1)
	assert.False(t, d.thread().stopped)
	assert.Nil(t, d.running)
}

func TestDeskStopsLongWorkThatWasOvertaken(t *testing.T) {
	d := newTried()
	d.answered()
	d.change(asking("<=10"))
	d.change(asking("<=9"))
	first := d.thread()
	d.wait()
	assert.True(t, first.stopped)
	require.Len(t, d.threads, 2)
	assert.Equal(t, asking("<=9"), *d.thread().last().Question)

	first.says(answerOf("too late"), "")
	assert.Empty(t, d.answer.Program, "what a stopped worker had said just before is not heard")
	d.thread().says(answerOf("in time"), "")
	assert.Equal(t, "in time", d.answer.Program)
	assert.False(t, d.old())
}

func TestDeskCancelKeepsTheLastAnswerAsOld(t *testing.T) {
	d := newTried()
	d.answered()
	d.change(asking("<=10"))
	d.thread().receive(reply{ID: d.running.id, Kind: sayProgress, Data: json.RawMessage(`{"stage":"judging","done":3,"total":10}`)})
	assert.Equal(t, progress{stageJudging, 3, 10}, d.running.progress)
	working := d.thread()
	d.cancel()
	assert.True(t, working.stopped)
	assert.True(t, d.stopped)
	assert.Nil(t, d.running)
	assert.NotNil(t, d.answer)
	assert.True(t, d.old())

	d.ask()
	assert.False(t, d.stopped)
	require.Len(t, d.threads, 2)
	assert.Equal(t, asking("<=10"), *d.thread().last().Question)
}

func TestDeskKeepsWhatItHasWhenAFileIsBad(t *testing.T) {
	d := newTried()
	d.answered()
	before := d.answer
	bad := &file{name: "notes.pdf"}
	d.open(bad)
	assert.Equal(t, askColumns, d.thread().last().Kind)
	assert.Same(t, bad, d.thread().last().with)
	d.thread().says(nil, "this isn't text")
	assert.Equal(t, "This isn't text.", d.trouble[atData])
	assert.True(t, d.data.demo)
	assert.Same(t, before, d.answer)
	assert.False(t, d.old(), "what is shown still answers what is asked")

	d.change(asking("<=10"))
	assert.True(t, d.thread().last().Demo, "the worker has to be told to take the demo again")
}

func TestDeskAsksAnInterruptedQuestionAfterABadFile(t *testing.T) {
	d := newTried()
	d.answered()
	d.change(asking("<=10"))
	d.open(&file{name: "notes.pdf"})
	require.Len(t, d.threads, 2, "a file is not kept waiting")
	d.thread().says(nil, "this isn't text")
	assert.Equal(t, askAnswer, d.thread().last().Kind)
	assert.Equal(t, asking("<=10"), *d.thread().last().Question)
}

func TestDeskOpensAFile(t *testing.T) {
	two := []intake.Column{{Name: "id", Number: 1, Numeric: true, Ask: "id"}, {Name: "score", Number: 2, Numeric: true, Ask: "score"}}
	tests := []struct {
		name    string
		columns []intake.Column
		scores  []string
	}{
		{"one column goes without saying", two[:1], []string{"id"}},
		{"so does the only one with numbers", []intake.Column{{Name: "site", Number: 1, Ask: "site"}, two[1]}, []string{"score"}},
		{"of two, one has to be chosen", two, []string{}},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			d := newTried()
			d.answered()
			f := &file{name: "scores.csv"}
			d.open(f)
			d.thread().says(test.columns, "")
			assert.False(t, d.data.demo)
			assert.Equal(t, "scores.csv", d.data.name)
			want := ask.NewQuestion()
			want.Scores = test.scores
			assert.Equal(t, want, d.question, "nothing of the demo's question is left")
			assert.True(t, d.old())
			if len(test.scores) == 0 {
				assert.Nil(t, d.running)
				return
			}
			sent := d.thread().last()
			assert.Equal(t, askAnswer, sent.Kind)
			assert.Nil(t, sent.with, "the worker has the file already")
			d.cancel()
			d.ask()
			assert.Same(t, f, d.thread().last().with, "a new worker hasn't")
		})
	}
}

// planned is a question that was settled before the data were there.
func planned(scores ...string) ask.Question {
	q := asking("<=10", ">=50")
	q.Scores, q.Missing, q.Seed = scores, []string{"-9"}, 77
	return q
}

var twoScores = []intake.Column{{Name: "id", Number: 1, Numeric: true, Ask: "id"}, {Name: "Errors", Number: 2, Numeric: true, Ask: "Errors"}}

// A preregistered question is asked of the file as it stands, whichever of
// the two is opened first, and however quickly.
func TestDeskKeepsTheQuestionWhicheverComesFirst(t *testing.T) {
	numbered := planned("errors")
	numbered.Header = sample.HeaderYes
	tests := []struct {
		name     string
		question ask.Question
		columns  []intake.Column
		want     []string
	}{
		{"a column by its name", planned("errors"), twoScores, []string{"errors"}},
		{"a column by its number", planned("2"), twoScores, []string{"2"}},
		{"a column that isn't there", planned("minutes"), twoScores, []string{"minutes"}},
		{"none named, one there", planned(), twoScores[1:], []string{"Errors"}},
		{"none named, two there", planned(), twoScores, nil},
		{"the demo's own question from a file", demo.Question(), twoScores, []string{"vocabulary"}},
		{"the header read in another way", numbered, twoScores, []string{"errors"}},
	}
	f := &file{name: "scores.csv"}
	// columns answers whatever still wants to know them: of the demo, those
	// of the demo.
	columns := func(d *tried, list []intake.Column) {
		for d.running != nil && d.running.kind == askColumns {
			if d.running.opens.demo {
				d.thread().says([]intake.Column{{Name: "vocabulary", Number: 1, Numeric: true, Ask: "vocabulary"}, {Name: "weight", Number: 2, Numeric: true, Ask: "weight"}}, "")
			} else {
				d.thread().says(list, "")
			}
		}
	}
	orders := map[string]func(d *tried, q ask.Question, list []intake.Column){
		"question, file": func(d *tried, q ask.Question, list []intake.Column) {
			d.openQuestion(q)
			columns(d, list)
			d.open(f)
			columns(d, list)
		},
		"file, question": func(d *tried, q ask.Question, list []intake.Column) {
			d.open(f)
			columns(d, list)
			d.openQuestion(q)
			columns(d, list)
		},
		"a question while the file is looked into": func(d *tried, q ask.Question, list []intake.Column) {
			d.open(f)
			d.openQuestion(q)
			d.wait()
			columns(d, list)
		},
	}
	for _, test := range tests {
		for order, open := range orders {
			for _, answered := range []bool{true, false} {
				t.Run(test.name+": "+order, func(t *testing.T) {
					d := newTried()
					if d.ask(); answered {
						d.thread().says(ask.Answer{Question: d.question}, "")
						columns(d, nil)
					}
					open(d, test.question, test.columns)
					want := test.question
					want.Scores = test.want
					if test.want == nil {
						assert.Empty(t, d.question.Scores)
						assert.Nil(t, d.running, "a column has to be chosen first")
						want.Scores = d.question.Scores
					}
					assert.Equal(t, want, d.question)
					assert.Same(t, f, d.data.file)
					assert.Equal(t, test.columns, d.data.columns)
					if test.want != nil {
						require.NotNil(t, d.running)
						for d.running.version != d.version { // the answer to the question before may still come
							d.thread().says(ask.Answer{}, "")
						}
						sent := d.thread().last()
						assert.Equal(t, askAnswer, sent.Kind)
						assert.Equal(t, want, *sent.Question)
						assert.False(t, sent.Demo)
					}
				})
			}
		}
	}
}

func TestDeskKeepsATouchedQuestionForAFile(t *testing.T) {
	d := newTried()
	d.answered()
	q := d.question
	q.Seed = 5
	d.change(q)
	d.thread().says(ask.Answer{Question: q}, "")
	d.open(&file{name: "scores.csv"})
	d.thread().says(twoScores, "")
	assert.Equal(t, q, d.question)
	d.thread().receive(reply{ID: d.running.id, Kind: askAnswer, Error: `there is no column "vocabulary"; the columns are: id, Errors`, Unread: true})
	s := &sheet{desk: d.desk}
	assert.Equal(t, `There is no column "vocabulary"; the columns are: id, Errors.`, s.wrong(atData), "it is said where the column can be chosen")
	assert.Equal(t, "failed", s.state())
	q.Scores = []string{"Errors"}
	d.change(q)
	assert.Empty(t, s.wrong(atData))

	d.openDemo()
	d.open(&file{name: "scores.csv"})
	d.thread().says(twoScores, "")
	assert.Equal(t, ask.NewQuestion().Cutoffs, d.question.Cutoffs, "the demo's own question goes with the demo")
}

// fetching is a desk that waits for a file, and how it comes.
func fetching(d *tried) (fetched func(*file, error)) {
	d.desk.open("scores.csv", func(f func(*file, error)) { fetched = f })
	return fetched
}

func TestDeskFetchesAFile(t *testing.T) {
	f := &file{name: "scores.csv"}
	d := newTried()
	d.answered()
	worker := d.thread()
	fetched := fetching(d)
	assert.Equal(t, fetchFile, d.running.kind)
	assert.Equal(t, "scores.csv", d.running.opens.name)
	fetched(f, nil)
	assert.Equal(t, askColumns, worker.last().Kind)
	assert.Same(t, f, worker.last().with)
	assert.False(t, worker.stopped, "it had nothing to do meanwhile")

	t.Run("cancelled", func(t *testing.T) {
		d := newTried()
		d.answered()
		fetched := fetching(d)
		d.cancel()
		assert.Nil(t, d.running)
		assert.False(t, d.stopped, "nothing was being asked")
		fetched(f, nil)
		assert.Nil(t, d.running)
		assert.True(t, d.data.demo)
		assert.False(t, d.thread().stopped)
		assert.False(t, d.old())
	})
	t.Run("cancelled, with a question that waits", func(t *testing.T) {
		d := newTried()
		d.answered()
		d.change(asking("<=10"))
		fetching(d)
		d.cancel()
		assert.True(t, d.stopped)
		assert.True(t, d.old())
	})
	t.Run("another file meanwhile", func(t *testing.T) {
		d := newTried()
		d.answered()
		late := fetching(d)
		other := &file{name: "others.csv"}
		d.open(other)
		late(f, nil)
		assert.Same(t, other, d.thread().last().with)
		d.thread().says(twoScores, "")
		assert.Same(t, other, d.data.file)
	})
	t.Run("it can't be read", func(t *testing.T) {
		d := newTried()
		d.answered()
		d.change(asking("<=10"))
		fetching(d)(nil, errors.New("the file scores.csv can't be read: it is gone"))
		assert.Equal(t, "The file scores.csv can't be read: it is gone.", d.trouble[atData])
		assert.Equal(t, asking("<=10"), *d.thread().last().Question, "what was interrupted is asked again")
	})
	t.Run("a question meanwhile", func(t *testing.T) {
		d := newTried()
		d.answered()
		fetched := fetching(d)
		q := planned("Errors")
		q.Header = sample.HeaderYes
		d.openQuestion(q)
		assert.Equal(t, fetchFile, d.running.kind)
		fetched(f, nil)
		assert.Equal(t, sample.HeaderYes, d.thread().last().Header)
		d.thread().says(twoScores, "")
		assert.Equal(t, q, *d.thread().last().Question)
	})
}

func TestDeskForgetsABadFileWhenSomethingElseIsOpened(t *testing.T) {
	other := map[string]func(d *tried){
		"a question": func(d *tried) { d.openQuestion(planned("vocabulary")) },
		"a file":     func(d *tried) { d.open(&file{name: "scores.csv"}) },
		"the demo":   func(d *tried) { d.openDemo() },
	}
	for name, open := range other {
		d := newTried()
		d.answered()
		d.open(&file{name: "notes.pdf"})
		d.thread().says(nil, "this isn't text")
		require.NotEmpty(t, d.trouble[atData])
		open(d)
		assert.Empty(t, d.trouble[atData], name)
	}
}

func TestDeskSurvivesItsWorker(t *testing.T) {
	d := newTried()
	d.answered()
	d.change(asking("<=10"))
	d.thread().receive(reply{Kind: sayBroken, Error: "out of memory"})
	assert.Contains(t, d.trouble[atWork], "out of memory")
	assert.True(t, d.old())
	d.change(asking("<=9"))
	require.Len(t, d.threads, 2)
	assert.Empty(t, d.trouble[atWork])
	d.thread().says(nil, "nobody is left")
	assert.Equal(t, "Nobody is left.", d.trouble[atWork])
}

func TestDeskRefusesAQuestionThatCannotBeAnswered(t *testing.T) {
	d := newTried()
	d.answered()
	sent := len(d.thread().posted)
	q := asking("<=10")
	q.Level = 2
	d.change(q)
	assert.Contains(t, d.trouble[atWork], "level")
	assert.Len(t, d.thread().posted, sent)
}

// answerOf is an answer that a test knows again by its program.
func answerOf(program string) ask.Answer {
	return ask.Answer{Question: demo.Question(), Program: program}
}
