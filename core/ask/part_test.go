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
			func(ctx context.Context, job ask.Job, progress func(done int)) (parts [][]byte, err error) {
				assert.Equal(t, asked, job.Column)
				assert.Equal(t, q.Replicates, job.Replicates)
				assert.Greater(t, job.Memory, 10_000)
				assert.Less(t, job.Memory, 1_000_000)
				asked++
				makers := []*ask.Maker{job.Maker(), elsewhere(t, job), elsewhere(t, job)}
				ends := append(rapid.SliceOfN(rapid.IntRange(0, job.Blocks), 0, 4).Draw(t, "ends"), 0, job.Blocks)
				slices.Sort(ends)
				before := 0
				for i := range len(ends) - 1 {
					now := 0
					maker := rapid.SampledFrom(makers).Draw(t, "maker")
					require.NoError(t, maker.Make(ctx, ends[i], ends[i+1], func(done int) { now = done; progress(before + done) }))
					before += now
				}
				for _, maker := range makers {
					part, err := maker.Part()
					require.NoError(t, err)
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

// elsewhere is a maker of the job's replicates that has only its order.
func elsewhere(t require.TestingT, job ask.Job) *ask.Maker {
	order, err := job.Order()
	require.NoError(t, err)
	maker, err := ask.NewMaker(context.Background(), order)
	require.NoError(t, err)
	return maker
}

func TestRunnersAreHeldToTheQuestion(t *testing.T) {
	q, scores := question(">=24"), twoColumns()
	judgeWith := func(q ask.Question, runner ask.Runner) error {
		_, failed := ask.JudgeWith(context.Background(), q, scores, nil, runner)
		return failed
	}
	gives := func(parts [][]byte, err error) ask.Runner {
		return func(context.Context, ask.Job, func(int)) ([][]byte, error) { return parts, err }
	}
	away := errors.New("the worker went away")
	assert.ErrorIs(t, judgeWith(q, gives(nil, away)), away)
	assert.ErrorContains(t, judgeWith(q, gives([][]byte{[]byte("tgpart")}, nil)), "no part of replicates")

	var part []byte
	second := judgeWith(q, func(ctx context.Context, job ask.Job, _ func(int)) ([][]byte, error) {
		if job.Column == 0 {
			maker := job.Maker()
			assert.ErrorContains(t, maker.Make(ctx, 0, 1000, nil), "no blocks")
			require.NoError(t, maker.Make(ctx, 0, job.Blocks, nil))
			var err error
			part, err = maker.Part()
			require.NoError(t, err)
		}
		return [][]byte{part}, nil
	})
	assert.ErrorContains(t, second, "other data", "the second column's replicates are others")
	q.Seed++
	assert.ErrorContains(t, judgeWith(q, gives([][]byte{part}, nil)), "another question")
	q.Everyone = true
	assert.NoError(t, judgeWith(q, gives(nil, away)), "nobody is asked for replicates of an exact gap")
}

// anOrder is one that a job gives.
func anOrder(t require.TestingT) (order []byte) {
	_, err := ask.JudgeWith(context.Background(), question(">=24"), of(testdata.Open("mathexam", "tests")), nil,
		func(_ context.Context, job ask.Job, _ func(int)) (_ [][]byte, err error) {
			order, err = job.Order()
			require.NoError(t, err)
			return nil, nil
		})
	require.Error(t, err)
	return order
}

func TestMakersRefuseOtherBytes(t *testing.T) {
	good := anOrder(t)
	_, err := ask.NewMaker(context.Background(), good)
	require.NoError(t, err)
	table := 12 + int(good[8]) + 256*int(good[9]) // behind the question
	for name, c := range map[string]struct {
		order []byte
		error string
	}{
		"nothing":            {nil, "no order"},
		"another format":     {append([]byte("tgorder9"), good[8:]...), "no order"},
		"cut short":          {good[:len(good)-1], "no order"},
		"cut in the middle":  {good[:table-1], "no order"},
		"scores that repeat": {append(slices.Clone(good), good[len(good)-16:]...), "no order"},
		"no scores":          {good[:table], "no usable score"},
		"one score":          {good[:table+16], "one usable score"},
		"another question":   {slices.Concat(good[:12], []byte("[ "), good[14:]), "question"},
	} {
		_, err := ask.NewMaker(context.Background(), c.order)
		assert.ErrorContains(t, err, c.error, name)
	}
}

// Whatever the bytes, a maker is made of them or an error says why not.
func FuzzOrder(f *testing.F) {
	good := anOrder(f)
	f.Add(good)
	f.Add(good[:len(good)-16])
	f.Add([]byte("tgorder1"))
	f.Fuzz(func(t *testing.T, order []byte) {
		maker, err := ask.NewMaker(context.Background(), order)
		assert.NotEqual(t, maker == nil, err == nil)
	})
}
