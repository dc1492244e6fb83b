package figure_test

import (
	"bytes"
	"context"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/demo"
	"tailgap/core/figure"
	"tailgap/core/intake"
)

// judged is what Judge makes of the demo, with fewer replicates.
func judged(t *testing.T, change func(*ask.Question)) ask.Answer {
	t.Helper()
	q := demo.Question()
	q.Replicates = 1000
	change(&q)
	from, err := intake.Read(context.Background(), []intake.Source{{Name: demo.Name, Reader: bytes.NewReader(demo.CSV())}},
		intake.Options{Scores: q.Scores, Missing: q.Missing, Header: q.Header})
	require.NoError(t, err)
	from.Demo = true
	a, err := ask.Judge(context.Background(), q, from, nil)
	require.NoError(t, err)
	return a
}

func TestDemo(t *testing.T) {
	a := judged(t, func(*ask.Question) {})
	svg := figure.Sheet(a)
	golden(t, "demo", svg)
	d := read(t, svg)
	d.legible(t)
	assert.Contains(t, d.desc, "DEMO")
}

// What Judge gives is drawn at every width, on every kind of scale.
func TestDemoColumns(t *testing.T) {
	for _, column := range []string{"words_per_minute", "vocabulary", "form_minutes", "years_away"} {
		for _, step := range []string{"auto", "none"} {
			a := judged(t, func(q *ask.Question) {
				q.Scores = []string{column}
				require.NoError(t, q.Step.UnmarshalText([]byte(step)))
			})
			for _, width := range []int{320, 1100} {
				for _, r := range a.Results {
					for _, s := range r.Sweeps {
						read(t, figure.Sweep(a.Question, r, s, figure.Options{Width: width, Selected: 0})).legible(t)
					}
					for _, f := range r.Cutoffs {
						read(t, figure.Counted(a.Question, r, f, figure.Options{Width: width})).legible(t)
					}
				}
			}
		}
	}
}
