package report

import (
	"bytes"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/demo"
	"tailgap/core/intake"
)

// demoAnswer is the demo's question answered on the demo's data.
func demoAnswer(t *testing.T, q ask.Question) ask.Answer {
	t.Helper()
	source := intake.Source{Name: demo.Name, Reader: bytes.NewReader(demo.CSV())}
	read, err := intake.Read([]intake.Source{source}, intake.Options{Scores: q.Scores, Missing: q.Missing, Header: q.Header})
	require.NoError(t, err)
	read.Demo = true
	a, err := ask.Judge(t.Context(), q, read, nil)
	require.NoError(t, err)
	return a
}

// The whole way from bytes to words. Text alone is compared: its figures are
// rounded, while the last digits of CSV and JSON differ between machines.
func TestDemo(t *testing.T) {
	q := demo.Question()
	checkGolden(t, "demo.txt", []byte(Text(demoAnswer(t, q))))

	several := q
	several.Scores = []string{"form_minutes", "years_away"}
	several.HalfStep = true
	several.Cutoffs = []cutoff.Cutoff{parsed(">=45"), parsed("<5")}
	checkGolden(t, "demo-several.txt", []byte(Text(demoAnswer(t, several))))
}

func TestDemoAnswerIsReadBack(t *testing.T) {
	a := demoAnswer(t, demo.Question())
	text, err := JSON(a)
	require.NoError(t, err)
	back, err := ReadJSON(text)
	require.NoError(t, err)
	assert.Equal(t, a, back)
	assert.Len(t, readCSV(t, a), 1+len(a.Question.Cutoffs))
}
