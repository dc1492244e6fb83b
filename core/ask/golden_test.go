package ask_test

import (
	"bytes"
	"context"
	"encoding/json"
	"flag"
	"fmt"
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/floats/scalar"

	"tailgap/core/ask"
	"tailgap/core/curve"
	"tailgap/core/sample"
	"tailgap/testdata"
)

var update = flag.Bool("update", false, "write the golden answers anew")

// Golden answers, written natively and read by the tests natively and under
// js/wasm: the same question, data and seed give the same answer, to 1e-10
// relative or 1e-12 absolute, whatever the platform and the workers.
func TestGoldenAnswers(t *testing.T) {
	heads := 4000.0
	cases := map[string]struct {
		dataset, column string
		change          func(q *ask.Question)
		cutoffs         []string
	}{
		"points":    {"pima", "glu", func(q *ask.Question) { q.TooHigh, q.TooLow, q.Heads = points(2), points(4), &heads }, []string{">=140", "<100", ">=200", "100..125"}},
		"half-step": {"mathexam", "nsolved", func(q *ask.Question) { q.TooHigh, q.HalfStep = points(3), true }, []string{"<=4", ">10"}},
		"of-count":  {"pima", "age", func(q *ask.Question) { q.TooHigh, q.TooLow = ofCount(20), ofCount(20) }, []string{">=40", "<=21"}},
		"no-step":   {"faithful", "eruptions", func(q *ask.Question) { q.TooHigh, q.TooLow = points(5), points(5) }, []string{">=4.5", "2..3"}},
		"small":     {"cd4", "oneyear", func(q *ask.Question) { q.Level = 0.9 }, []string{">=5.5", "<3"}},
		"given":     {"crimtab", "finger_cm", func(q *ask.Question) { q.Curve, q.TooLow = &curve.Given{Mean: 11.5, SD: 0.55}, points(1) }, []string{">=12.5"}},
		"norms": {"faithful", "waiting", func(q *ask.Question) {
			q.Curve, q.TooHigh, q.TooLow, q.Level = norms(71, 13.6, 200), points(8), ofCount(30), 0.9
		}, []string{">=90", "<=45", "60..80"}},
		"outliers":   {"newcomb", "time", func(q *ask.Question) { q.TooHigh, q.Range = points(5), &sample.Range{Low: -50, High: 50} }, []string{">=24", "<=0"}},
		"no-cutoffs": {"faithful", "waiting", func(q *ask.Question) { q.Everyone, q.TooHigh, q.TooLow = true, points(5), points(5) }, nil},
	}
	for name, c := range cases {
		q := question(c.cutoffs...)
		q.Replicates = 2000
		c.change(&q)
		answer, err := ask.Judge(context.Background(), q, of(testdata.Open(c.dataset, c.column)), nil)
		require.NoError(t, err, name)
		path := filepath.Join("..", "..", "testdata", "golden", "answer-"+name+".json")
		if *update {
			require.NoError(t, os.WriteFile(path, encode(t, answer), 0o644))
		}
		want, err := os.ReadFile(path)
		require.NoError(t, err)
		var a, b any
		require.NoError(t, json.Unmarshal(want, &a))
		require.NoError(t, json.Unmarshal(encode(t, answer), &b))
		same(t, name, a, b)
	}
}

func encode(t require.TestingT, answer ask.Answer) []byte {
	var text bytes.Buffer
	encoder := json.NewEncoder(&text)
	encoder.SetEscapeHTML(false)
	require.NoError(t, encoder.Encode(answer))
	return text.Bytes()
}

// same compares two JSON trees, numbers within the tolerance.
func same(t *testing.T, where string, want, got any) {
	switch want := want.(type) {
	case map[string]any:
		fields, ok := got.(map[string]any)
		require.True(t, ok, where)
		for name := range fields {
			assert.Contains(t, want, name, where)
		}
		for name := range want {
			same(t, where+"."+name, want[name], fields[name])
		}
	case []any:
		items, ok := got.([]any)
		require.True(t, ok, where)
		require.Len(t, items, len(want), where)
		for i := range want {
			same(t, fmt.Sprintf("%s[%d]", where, i), want[i], items[i])
		}
	case float64:
		number, ok := got.(float64)
		require.True(t, ok, where)
		assert.Truef(t, scalar.EqualWithinAbsOrRel(want, number, 1e-12, 1e-10), "%s: want %.17g, got %.17g", where, want, number)
	default:
		assert.Equal(t, want, got, where)
	}
}
