package ask_test

import (
	"context"
	"runtime"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
)

// watcher holds progress to its promise: never back, and to the end.
type watcher struct {
	t           require.TestingT
	told        int
	done, total int
}

func (w *watcher) progress(done, total int) {
	if w.total == 0 {
		w.total = total
	}
	assert.Greater(w.t, done, w.done)
	assert.Equal(w.t, w.total, total)
	w.done = done
	w.told++
}

func (w *watcher) ended() {
	assert.Positive(w.t, w.total)
	assert.Equal(w.t, w.total, w.done)
}

func TestProgressGoesToTheEnd(t *testing.T) {
	q := question(">=24", "20..30")
	for _, everyone := range []bool{false, true} {
		for _, workers := range []int{1, 3} {
			q.Everyone, q.Workers = everyone, workers
			progress := watcher{t: t}
			_, err := ask.Judge(context.Background(), q, twoColumns(), progress.progress)
			require.NoError(t, err)
			progress.ended()
			assert.Greater(t, progress.told, 8)
		}
	}
}

// Whenever the context ends, Judge does: after no more than what each worker
// had in hand, and with all its goroutines.
func TestJudgeEndsWithTheContext(t *testing.T) {
	q := question(">=24", "20..30")
	for _, everyone := range []bool{false, true} {
		for _, workers := range []int{1, 2} {
			q.Everyone, q.Workers = everyone, workers
			all := watcher{t: t}
			_, err := ask.Judge(context.Background(), q, twoColumns(), all.progress)
			require.NoError(t, err)
			before := runtime.NumGoroutine()
			for until := 1; until <= all.told-workers; until++ {
				ctx, cancel := context.WithCancel(context.Background())
				told := 0
				_, err := ask.Judge(ctx, q, twoColumns(), func(int, int) {
					if told++; told == until {
						cancel()
					}
				})
				require.ErrorIs(t, err, context.Canceled, until)
				require.LessOrEqual(t, told, until+workers, "of %d", all.told)
			}
			for range 10_000 { // the last of them have said that they end, and may not have come to it
				if runtime.NumGoroutine() <= before {
					break
				}
				time.Sleep(time.Millisecond)
			}
			assert.LessOrEqual(t, runtime.NumGoroutine(), before, "a goroutine is left")
		}
	}
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	_, err := ask.Judge(ctx, q, twoColumns(), func(int, int) { t.Error("nothing is done") })
	assert.ErrorIs(t, err, context.Canceled)
}
