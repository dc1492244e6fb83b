package intake_test

import (
	"bytes"
	"context"
	"math"
	"strings"
	"testing"
	"testing/iotest"
	"unicode"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/intake"
	"tailgap/core/sample"
)

// FuzzRead holds for any bytes: no panic; scores or a sentence, never both;
// every row accounted for; only finite scores; and neither chunks nor line
// ends change what comes out.
func FuzzRead(f *testing.F) {
	for _, seed := range []string{
		"id,score\n1,12\n2,\n", "id;score\r\n1;3,5\r\n2;-9\r\n", "score\t x\r1,234\t\r", "\ufeffscore\n\n\"12\n\"\n\n",
		"12\n15\n", "score\n\"12\n13\n", "a,score\n1,\"x\"y,3\n", "1e999\n", "score\n-0\n−3\n.5\n5.\n1e-400\n", "x\n1,5\n2.5\n",
		"score,score\n1,2\n", "Results\nid,score\n1,2\n", "PK\x03\x04", "\xff\xfe1\x00", "a\x00", "\xa0\n5\xa0\n", ",,,\n\n,,\n", "\"", "\r\r\n\n",
	} {
		f.Add([]byte(seed), "score", "-9", byte(0))
		f.Add([]byte(seed), "1", "", byte(2))
		f.Add([]byte(seed), "", "99,inf,1\u202f2", byte(1))
	}
	f.Fuzz(func(t *testing.T, text []byte, score, missing string, header byte) {
		options := intake.Options{
			Missing: strings.Split(missing, ","),
			Header:  []sample.Header{sample.HeaderAuto, sample.HeaderYes, sample.HeaderNo}[header%3],
		}
		if score != "" {
			options.Scores = strings.Split(score, "|")
		}
		s, err := intake.Read(context.Background(), []intake.Source{{Reader: bytes.NewReader(text)}}, options)
		checkOutcome(t, s, err)

		slow, slowErr := intake.Read(context.Background(), []intake.Source{{Reader: iotest.OneByteReader(bytes.NewReader(text))}}, options)
		assert.Equal(t, err, slowErr)
		assert.Equal(t, s, slow)

		if !bytes.ContainsRune(text, '\r') && !bytes.HasPrefix(text, []byte("\n")) {
			windows := bytes.ReplaceAll(text, []byte("\n"), []byte("\r\n"))
			other, otherErr := intake.Read(context.Background(), []intake.Source{{Reader: bytes.NewReader(windows)}}, options)
			assert.Equal(t, err, otherErr)
			assert.Equal(t, s, other)
		}

		columns, err := intake.Columns(context.Background(), intake.Source{Reader: bytes.NewReader(text)}, options.Header)
		assert.Equal(t, err == nil, len(columns) > 0)
		for i, c := range columns {
			assert.Equal(t, i+1, c.Number)
			assert.NotEmpty(t, c.Name)
			assert.NotEmpty(t, c.Ask)
		}
	})
}

func checkOutcome(t *testing.T, s sample.Sample, err error) {
	t.Helper()
	if err != nil {
		assert.Empty(t, s.Columns)
		assert.NotEmpty(t, err.Error())
		for _, r := range err.Error() {
			assert.True(t, unicode.IsPrint(r), "%q stands in the message %q", r, err)
		}
		return
	}
	require.NotEmpty(t, s.Columns)
	for _, c := range s.Columns {
		rows := len(c.Scores)
		for _, d := range c.Dropped {
			assert.Positive(t, d.Count)
			assert.NotEmpty(t, d.Reason)
			assert.NotEmpty(t, d.First)
			rows += d.Count
		}
		assert.Equal(t, c.Rows, rows)
		assert.NotEmpty(t, c.Scores)
		assert.NotEmpty(t, c.Name)
		for _, x := range c.Scores {
			assert.False(t, math.IsNaN(x) || math.IsInf(x, 0) || x == 0 && math.Signbit(x))
		}
	}
}
