package main

import (
	"context"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"

	"tailgap/core/ask"
	"tailgap/core/sample"
)

func TestBarLine(t *testing.T) {
	for _, c := range []struct {
		share float64
		spent time.Duration
		want  string
	}{
		{0, 0, "judging [                              ]   0%"},
		{0.25, 2 * time.Second, "judging [#######                       ]  25%, 6s left"},
		{0.5, 90 * time.Second, "judging [###############               ]  50%, 1m30s left"},
		{1, time.Hour, "judging [##############################] 100%, 0s left"},
	} {
		assert.Equal(t, c.want, barLine("judging", c.share, c.spent))
	}
}

// The bar waits before it shows, draws seldom, and leaves an empty line.
func TestBar(t *testing.T) {
	var screen strings.Builder
	clock := time.Unix(0, 0)
	b := &bar{to: &screen, now: func() time.Time { return clock }}
	drawn := func() int { return strings.Count(screen.String(), "\r") }

	b.show("reading", 0, 100)
	b.clear()
	assert.Zero(t, drawn(), "too early to show anything")
	clock = clock.Add(barDelay)
	b.show("reading", 10, 100)
	assert.Equal(t, 1, drawn())
	b.show("reading", 20, 100)
	assert.Equal(t, 1, drawn(), "no sooner than barEvery")
	clock = clock.Add(barEvery)
	b.show("reading", 30, 100)
	assert.Equal(t, 2, drawn())
	b.show("judging", 0, 100)
	assert.Equal(t, 2, drawn(), "a new kind of work has a delay of its own")
	b.show("reading", 5, 0)
	assert.Equal(t, 2, drawn(), "no share without a total")

	width := len(screen.String()[strings.LastIndex(screen.String(), "\r")+1:])
	b.clear()
	assert.True(t, strings.HasSuffix(screen.String(), "\r"+strings.Repeat(" ", width)+"\r"))
	before := screen.Len()
	b.clear()
	assert.Equal(t, before, screen.Len())
}

// Progress of the judging reaches a terminal, and nothing else.
func TestProgressOnTerminalOnly(t *testing.T) {
	for _, onTerminal := range []bool{true, false} {
		var stdout, stderr strings.Builder
		p := &program{
			stdout: &stdout, stderr: &stderr,
			terminal: func(stream any) bool { return onTerminal && stream == any(&stderr) },
			judge: func(ctx context.Context, q ask.Question, s sample.Sample, progress ask.Progress) (ask.Answer, error) {
				progress(0, 2)
				time.Sleep(barDelay + barEvery)
				progress(1, 2)
				return ask.Judge(ctx, q, s, nil)
			},
		}
		assert.Equal(t, statusFails, p.run(context.Background(), []string{"judge", "--demo"}))
		assert.Equal(t, onTerminal, strings.Contains(stderr.String(), "judging [###############               ]  50%"), stderr.String())
	}
}
