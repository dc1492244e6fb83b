package intake_test

import (
	"context"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/demo"
	"tailgap/core/intake"
	"tailgap/core/sample"
)

func TestColumns(t *testing.T) {
	columns, err := intake.Columns(context.Background(), from(string(demo.CSV()))[0], sample.HeaderAuto)
	require.NoError(t, err)
	var numeric []string
	for i, c := range columns {
		assert.Equal(t, i+1, c.Number)
		assert.Equal(t, c.Name, c.Ask)
		if c.Numeric {
			numeric = append(numeric, c.Name)
		}
	}
	assert.Len(t, columns, 7)
	assert.Equal(t, []string{"words_per_minute", "vocabulary", "form_minutes", "years_away", "weight"}, numeric)
}

func TestColumnsWithAndWithoutNames(t *testing.T) {
	tests := []struct {
		name, text string
		header     sample.Header
		want       []intake.Column
	}{
		{"no header", "12,x\n15,y\n", sample.HeaderAuto, []intake.Column{{"column 1", 1, true, "column 1"}, {"column 2", 2, false, "column 2"}}},
		{"stated to be none", "a\n", sample.HeaderNo, []intake.Column{{"column 1", 1, false, "column 1"}}},
		{"header and nothing else", "a;b\n", "", []intake.Column{{"a", 1, false, "a"}, {"b", 2, false, "b"}}},
		{"names that aren't the only ones", "a,,A,b\n1,2,3,4\n", "", []intake.Column{{"a", 1, true, "a"}, {"column 2", 2, true, "column 2"}, {"A", 3, true, "A"}, {"b", 4, true, "b"}}},
		{"the same name twice", "a,a\n1,2\n", "", []intake.Column{{"a", 1, true, "1"}, {"a", 2, true, "2"}}},
		{"blanks, open commas, words and misplaced quotes", "a,b,c\n,\"1,5\",1\n,\"2,5\",x\n,3,y\n,,5\"\n", "", []intake.Column{{"a", 1, false, "a"}, {"b", 2, true, "b"}, {"c", 3, false, "c"}}},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			columns, err := intake.Columns(context.Background(), from(test.text)[0], test.header)
			require.NoError(t, err)
			assert.Equal(t, test.want, columns)
		})
	}
}

// Asking the way a Column says leads to that column.
func TestColumnsSayHowToAsk(t *testing.T) {
	const text = "a,a,A,b,2,a , b\n0,1,2,3,4,5,6\n"
	columns, err := intake.Columns(context.Background(), from(text)[0], sample.HeaderYes)
	require.NoError(t, err)
	require.Len(t, columns, 7)
	for i, c := range columns {
		s, err := intake.Read(context.Background(), from(text), intake.Options{Scores: []string{c.Ask}, Header: sample.HeaderYes})
		require.NoError(t, err, c.Ask)
		assert.Equal(t, []float64{float64(i)}, s.Columns[0].Scores, c.Ask)
	}
}

func TestFind(t *testing.T) {
	list := []intake.Column{{Name: "Errors made", Number: 1, Ask: "Errors made"}, {Name: "a", Number: 2, Ask: "2"}, {Name: "a", Number: 3, Ask: "3"}, {Name: "1", Number: 4, Ask: "1"}, {Name: "column 5", Number: 5, Ask: "column 5"}}
	for asked, number := range map[string]int{"Errors made": 1, "errors  MADE": 1, "2": 2, "column 3": 3, "1": 4, "5": 5} {
		c, ok := intake.Find(list, asked)
		assert.True(t, ok, asked)
		assert.Equal(t, number, c.Number, asked)
	}
	for _, asked := range []string{"", "a", "b", "0", "6", "column 6"} {
		_, ok := intake.Find(list, asked)
		assert.False(t, ok, asked)
	}
	_, ok := intake.Find(nil, "a")
	assert.False(t, ok)
}

func TestColumnsRefuses(t *testing.T) {
	for text, want := range map[string]string{
		"":                      "no usable score: the input is empty",
		"PK\x03\x04":            "this is a spreadsheet workbook or another packed file, not text; save the sheet as CSV (UTF-8) and use that",
		"Results\na,b\n1,2\n":   "line 1 has one cell where line 2 has 2; take out the lines above the header row",
		"a,b\n\"1,2\n3,\"4\"\n": "a quote that opens in the row on line 2 isn't closed properly, so that it runs together with the rows down to line 3; close it where it belongs or take it out",
	} {
		_, err := intake.Columns(context.Background(), from(text)[0], sample.HeaderAuto)
		assert.EqualError(t, err, want)
	}
	_, err := intake.Columns(context.Background(), from("a\n")[0], "perhaps")
	assert.EqualError(t, err, `the header setting "perhaps" can't be read; write auto, yes or no`)
}

// Only the head is read: what is wrong further down doesn't matter yet.
func TestColumnsReadsTheHead(t *testing.T) {
	text := "a,b\n" + strings.Repeat("1,x\n", 100_000)
	columns, err := intake.Columns(context.Background(), from(text + "\x00")[0], sample.HeaderAuto)
	require.NoError(t, err)
	assert.Len(t, columns, 2)
}
