package ask_test

import (
	"context"
	"errors"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"tailgap/core/ask"
	"tailgap/core/sample"
	"tailgap/testdata"
)

func twoColumns() sample.Sample {
	s := of(testdata.Open("mathexam", "tests"))
	s.Columns = append(s.Columns, of(testdata.Open("mathexam", "nsolved")).Columns[0])
	s.Columns[1].Name = "solved"
	return s
}

// Judge's answer does not depend on where its replicates are made.
func TestAnyRunnerGivesTheAnswer(t *testing.T) {
	q, scores := question(">=24", "<=13"), twoColumns()
	q.Replicates, q.TooHigh = 200, ofCount(10)
	want, err := ask.Judge(context.Background(), q, scores, nil)
	require.NoError(t, err)
	rapid.Check(t, func(t *rapid.T) {
		asked := 0
		progress := watcher{t: t}
		got, err := ask.JudgeWith(context.Background(), q, scores, progress.progress,
			func(ctx context.Context, column, blocks int, progress func(done int)) (parts [][]byte, err error) {
				assert.Equal(t, asked, column)
				asked++
				ends := append(rapid.SliceOfN(rapid.IntRange(0, blocks), 0, 4).Draw(t, "ends"), 0, blocks)
				slices.Sort(ends)
				before := 0
				for i := range len(ends) - 1 {
					made := 0
					part, err := ask.Part(ctx, q, scores, column, ends[i], ends[i+1], func(done int) { made = done; progress(before + done) })
					require.NoError(t, err)
					before += made
					parts = append(parts, part)
				}
				return parts, nil
			})
		require.NoError(t, err)
		assert.Equal(t, want, got)
		assert.Equal(t, 2, asked)
		progress.ended()
	})
}

func TestRunnersAreHeldToTheQuestion(t *testing.T) {
	q, scores := question(">=24"), twoColumns()
	judgeWith := func(q ask.Question, parts [][]byte, err error) error {
		_, failed := ask.JudgeWith(context.Background(), q, scores, nil,
			func(context.Context, int, int, func(int)) ([][]byte, error) { return parts, err })
		return failed
	}
	away := errors.New("the worker went away")
	assert.ErrorIs(t, judgeWith(q, nil, away), away)
	assert.ErrorContains(t, judgeWith(q, [][]byte{[]byte("tgpart")}, nil), "no part of replicates")

	part, err := ask.Part(context.Background(), q, scores, 0, 0, 8, nil)
	require.NoError(t, err)
	assert.ErrorContains(t, judgeWith(q, [][]byte{part}, nil), "other data", "the second column's replicates are others")
	q.Seed++
	assert.ErrorContains(t, judgeWith(q, [][]byte{part}, nil), "another question")
	q.Everyone = true
	assert.NoError(t, judgeWith(q, nil, away), "nobody is asked for replicates of an exact gap")

	for _, column := range []int{-1, 2} {
		_, err := ask.Part(context.Background(), q, scores, column, 0, 1, nil)
		assert.ErrorContains(t, err, "among 2")
	}
	_, err = ask.Part(context.Background(), q, scores, 0, 0, 1000, nil)
	assert.ErrorContains(t, err, "no blocks")
	q.Level = 2
	_, err = ask.Part(context.Background(), q, scores, 0, 0, 1, nil)
	assert.ErrorContains(t, err, "level")
}

// watcher holds progress to its promise: never back, and to the end.
type watcher struct {
	t           require.TestingT
	done, total int
}

func (w *watcher) progress(done, total int) {
	if w.total == 0 {
		w.total = total
	}
	assert.Greater(w.t, done, w.done)
	assert.Equal(w.t, w.total, total)
	w.done = done
}

func (w *watcher) ended() {
	assert.Positive(w.t, w.total)
	assert.Equal(w.t, w.total, w.done)
}

func TestProgressGoesToTheEnd(t *testing.T) {
	q := question(">=24")
	for _, everyone := range []bool{false, true} {
		q.Everyone = everyone
		progress := watcher{t: t}
		_, err := ask.Judge(context.Background(), q, twoColumns(), progress.progress)
		require.NoError(t, err)
		progress.ended()
	}
}
