package main

import (
	"context"
	"encoding/json"
	"io"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/demo"
	"tailgap/core/intake"
)

// heard keeps what a bench says on the way; nobody answers.
type heard []reply

func (h *heard) say(r reply, _ ...[]byte) { *h = append(*h, r) }
func (h *heard) hear() message            { panic("nobody is there") }

// served is what a bench answers to a request.
func served(b *bench, r request) reply {
	answer, _ := b.serve(message{request: r}, &heard{})
	return answer
}

func TestBenchAnswersAsTheCoreDoes(t *testing.T) {
	question := demo.Question()
	question.Replicates = 500
	b := newBench()
	r := served(b, request{ID: 7, Kind: askAnswer, Demo: true, Question: &question})
	assert.Equal(t, 7, r.ID)
	got, err := r.answer()
	require.NoError(t, err)

	scores, err := intake.Read(context.Background(), []intake.Source{b.source(nil)}, intake.Options{Scores: question.Scores, Missing: question.Missing})
	require.NoError(t, err)
	scores.Demo = true
	want, err := ask.Judge(context.Background(), question, scores, nil)
	require.NoError(t, err)
	wantText, err := json.Marshal(want)
	require.NoError(t, err)
	gotText, err := json.Marshal(got)
	require.NoError(t, err)
	assert.JSONEq(t, string(wantText), string(gotText))
}

func TestProgressIsToldNowAndThen(t *testing.T) {
	clock := time.Unix(0, 0)
	b := &bench{now: func() time.Time { return clock }}
	var said heard
	tell := b.tellProgress(7, stageJudging, &said)
	for done := range 1000 { // a second of work
		clock = clock.Add(time.Millisecond)
		tell(done, 1000)
	}
	require.Len(t, said, 20)
	for i, r := range said {
		assert.Equal(t, 7, r.ID)
		assert.Equal(t, sayProgress, r.Kind)
		p, err := decoded[progress](r)
		require.NoError(t, err)
		assert.Equal(t, progress{stageJudging, 50*i + 49, 1000}, p)
	}
}

func TestReadingTellsHowFarItIs(t *testing.T) {
	b := newBench()
	b.hold("a.csv", []byte(strings.Repeat("7\n", 1_000_000)))
	var done []int
	text, err := io.ReadAll(b.source(func(bytes, total int) {
		assert.Equal(t, 2_000_000, total)
		done = append(done, bytes)
	}).Reader)
	require.NoError(t, err)
	assert.Len(t, text, 2_000_000)
	assert.Greater(t, len(done), 10)
	assert.IsIncreasing(t, done[:len(done)-1])
	assert.Equal(t, 2_000_000, done[len(done)-1])
}

func TestBenchReadsAnewOnlyWhatIsReadDifferently(t *testing.T) {
	b := newBench()
	b.hold("a.csv", []byte("a,b\n1,5\n2,6\n4,7\n99,9\n"))
	used := func(question ask.Question) int {
		t.Helper()
		question.Replicates = 200
		r := served(b, request{Kind: askAnswer, Question: &question})
		a, err := r.answer()
		require.NoError(t, err)
		return a.Results[0].Sample.Used
	}
	q := ask.NewQuestion()
	q.Scores = []string{"a"}
	assert.Equal(t, 4, used(q))
	b.data = nil // nobody should look at it again
	assert.Equal(t, 4, used(q))
	b.data = []byte("a,b\n1,5\n2,6\n4,7\n99,9\n")
	q.Missing = []string{"99"}
	assert.Equal(t, 3, used(q))
	q.Scores = []string{"b"}
	assert.Equal(t, 4, used(q))
}

func TestBenchFailsInSentences(t *testing.T) {
	question := ask.NewQuestion()
	question.Scores = []string{"c"}
	tests := []struct {
		name string
		data string
		r    request
		want string
	}{
		{"no such column", "a,b\n1,2\n", request{Kind: askAnswer, Question: &question}, `there is no column "c"`},
		{"an empty file", "", request{Kind: askColumns}, "empty"},
		{"no question", "a\n1\n", request{Kind: askAnswer}, "without a question"},
		{"no order", "a\n1\n", request{Kind: askMaker}, "without an order"},
		{"blocks of nothing", "a\n1\n", request{Kind: askBlocks, To: 1}, "without an order"},
		{"a part of nothing", "a\n1\n", request{Kind: askPart}, "part of nothing"},
		{"an unknown wish", "a\n1\n", request{Kind: "dance"}, "doesn't know"},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			b := newBench()
			b.hold("x.csv", []byte(test.data))
			r := served(b, test.r)
			assert.Contains(t, r.Error, test.want)
			assert.Nil(t, r.Data)
			assert.Equal(t, test.name == "no such column", r.Unread, "the question can't be asked of the data")
		})
	}
}

func TestGuardedTurnsAPanicIntoAnError(t *testing.T) {
	r := guarded(3, askAnswer, func() (any, error) { panic("a hole in the floor") })
	assert.Equal(t, 3, r.ID)
	assert.Equal(t, askAnswer, r.Kind)
	assert.Contains(t, r.Error, "a hole in the floor")
	assert.Nil(t, r.Data)
	_, err := r.answer()
	assert.ErrorContains(t, err, "a hole in the floor")
}
