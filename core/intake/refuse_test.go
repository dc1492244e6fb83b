package intake_test

import (
	"context"
	"errors"
	"fmt"
	"io"
	"strings"
	"testing"
	"testing/iotest"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/intake"
	"tailgap/core/sample"
)

// The sentences are part of the product: each is here in full.
func TestReadRefuses(t *testing.T) {
	wide := "c1"
	for i := 2; i <= 23; i++ {
		wide += fmt.Sprintf(",c%d", i)
	}
	const (
		workbook = "this is a spreadsheet workbook, not text; save the sheet as CSV (UTF-8) and use that"
		utf16    = "this is text in UTF-16; save it as CSV (UTF-8) and use that"
	)
	tests := []struct {
		name    string
		text    string
		ask     []string
		header  sample.Header
		missing []string
		want    string
	}{
		// Columns.
		{"no such column", "words_per_minute,vocabulary\n60,30\n", []string{"vocab"}, "", nil,
			`there is no column "vocab"; the columns are: words_per_minute, vocabulary`},
		{"no such number", "id,score\n1,12\n", []string{"3"}, "", nil,
			`there is no column "3"; the columns are: id, score`},
		{"column nought", "id,score\n1,12\n", []string{"0"}, "", nil,
			`there is no column "0"; the columns are: id, score`},
		{"no name", "id,\n1,12\n", []string{""}, "", nil,
			`there is no column ""; the columns are: id, column 2`},
		{"no header, and no row of data in the message", "1,12,Mill\n2,15,North\n", []string{"score"}, "", nil,
			`there is no column "score"; there are columns 1 to 3, no header row; if the first row names the columns, set header to yes`},
		{"stated to have no header", "id,score\n1,12\n", []string{"score"}, sample.HeaderNo, nil,
			`there is no column "score"; there are columns 1 to 2, no header row`},
		{"no header, no such number", "1,12\n2,15\n", []string{"3"}, "", nil,
			`there is no column "3"; there are columns 1 to 2, no header row`},
		{"one column, no header", "12\n15\n", []string{"2"}, "", nil,
			`there is no column "2"; there is one column, no header row`},
		{"one column", "score\n12\n", []string{"age"}, "", nil,
			`there is no column "age"; the only column is score`},
		{"many columns, one of them long, and signs that can't be seen", wide + ",d\n", []string{"age\x1b[31m" + strings.Repeat("e", 50)}, "", nil,
			`there is no column "age[31m` + strings.Repeat("e", 33) + `…"; the columns are: c1, c2, c3, c4, c5, c6, c7, c8, c9, c10, c11, c12, c13, c14, c15, c16, c17, c18, c19, c20 and 4 more`},
		{"a long name", "id," + strings.Repeat("n", 50) + "\n1,2\n", []string{"age"}, "", nil,
			`there is no column "age"; the columns are: id, ` + strings.Repeat("n", 40) + `…`},
		{"a name over two columns", "score,id,score\n1,2,3\n", []string{"score"}, "", nil,
			`the name "score" stands over columns 1 and 3; give the number of the one you mean`},
		{"a name nearly over three", "Score,SCORE,scorE\n1,2,3\n", []string{"score"}, "", nil,
			`the name "score" stands over columns 1, 2 and 3; give the number of the one you mean`},
		{"asked for twice", "id,score\n1,12\n", []string{"score", "2"}, "", nil,
			`"score" and "2" are the same column; ask for it once`},
		{"not asked for", "id,score\n1,12\n", nil, "", nil,
			`say which column is the score; the columns are: id, score`},
		{"not asked for, no header", "1,12,4\n2,15,4\n", nil, "", nil,
			`say which column is the score; there are columns 1 to 3, no header row`},
		{"not asked for, perhaps one column of decimals", "3,5\n4,2\n", nil, "", nil,
			`say which column is the score; there are columns 1 to 2, no header row; if the comma is the decimal mark of one column, put a name above it`},
		{"a title", "Results 2024\n\nid,score\n1,12\n2,15\n", []string{"score"}, "", nil,
			`line 1 has one cell where line 3 has 2; take out the lines above the header row`},
		{"a title over tabs", "Results, 2024\nid\tage\tscore\n1\t40\t12\n", []string{"2"}, "", nil,
			`line 1 has one cell where line 2 has 3; take out the lines above the header row`},
		{"a header with a name too few", "score,age\n1,12,40\n2,15,\n3,\"x\"y,\n4,18,39\n5,18,41\n", []string{"score"}, "", nil,
			`the rows have 3 cells but the header names 2, so it can't be told which name is over which column; add the name that is missing, or give the column's number`},
		{"an unknown header setting", "id,score\n1,12\n", []string{"score"}, "maybe", nil,
			`the header setting "maybe" can't be read; write auto, yes or no`},

		// Numbers.
		{"two decimal marks", "id;score\n1;3\n2;3,5\n3;4.5\n", []string{"score"}, "", nil,
			`column "score" has a decimal comma on line 3 and a decimal point on line 4; write all its numbers the same way`},
		{"two decimal marks, the point first", "4.5\n3,5\n", nil, "", nil,
			`column "column 1" has a decimal comma on line 2 and a decimal point on line 1; write all its numbers the same way`},
		{"infinity", "id,score\n1,12\n2,-Inf\n", []string{"score"}, "", nil,
			`column "score" has a value on line 3 that is infinite or too large to compute with; correct it, or list it as a missing code`},
		{"too large", "score\n1e999\n", nil, "", nil,
			`column "score" has a value on line 2 that is infinite or too large to compute with; correct it, or list it as a missing code`},

		// Quotes.
		{"a quote never closed", "id,score\n1,12\n2,\"15\n3,18\n4,21\n", []string{"score"}, "", nil,
			`a quote that opens in the row on line 3 isn't closed properly, so that it runs together with the rows down to line 5; close it where it belongs or take it out`},
		{"a quote closed by the next one", "id,note,score\n1,\"a,12\n2,\"b\",15\n", []string{"score"}, "", nil,
			`a quote that opens in the row on line 2 isn't closed properly, so that it runs together with the rows down to line 3; close it where it belongs or take it out`},
		{"a quote that swallows a row", "id,note,score\n1,\"a,12\n2,b\",15\n3,c,18\n", []string{"score"}, "", nil,
			`a quote that opens in the row on line 2 closes only on line 3, and its lines look like rows of their own; close it where it belongs or take it out`},
		{"a quote that swallows a code", "id,note,score\n1,\"a,99\n2,b\",15\n", []string{"score"}, "", []string{"99"},
			`a quote that opens in the row on line 2 closes only on line 3, and its lines look like rows of their own; close it where it belongs or take it out`},
		{"a quote that swallows cells", "score\n\"12\n13\n14\"\n15\n", nil, "", nil,
			`a quote that opens in the row on line 2 closes only on line 4, and its lines look like rows of their own; close it where it belongs or take it out`},
		{"a quote in the header", "id,sc\"ore\n1,12\n", []string{"2"}, "", nil,
			`line 1, the first row, has a misplaced quote, so its columns can't be told; correct it`},

		// No text, no scores.
		{"a workbook", "PK\x03\x04\x14\x00", nil, "", nil, strings.Replace(workbook, "workbook", "workbook or another packed file", 1)},
		{"an old workbook", "\xd0\xcf\x11\xe0\xa1\xb1\x1a\xe1", nil, "", nil, workbook},
		{"UTF-16, low byte first", "\xff\xfes\x00", nil, "", nil, utf16},
		{"UTF-16, high byte first", "\xfe\xff\x00s", nil, "", nil, utf16},
		{"compressed", "\x1f\x8b\x08\x00", nil, "", nil, `this is a compressed file; unpack it and use what is inside`},
		{"a zero byte", "score\n12\n1\x005\n", nil, "", nil,
			`line 3 holds a zero byte, so this isn't plain text; save it as CSV (UTF-8) and use that`},
		{"nothing", "", nil, "", nil, `no usable score: the input is empty`},
		{"blank lines", "\r\n\n\n", nil, "", nil, `no usable score: the input is empty`},
		{"a header and nothing else", "id,score\n", []string{"score"}, "", nil,
			`no usable score in column "score": there is no row below the header`},
		{"no usable score", "id,score\n1,\n2,99\n3,x\n4,\n", []string{"score"}, "", []string{"99"},
			`no usable score in column "score": all 4 rows were left out (blank: 2, coded 99: 1, unreadable: 1); check the column and the missing codes`},
		{"one row", "id,score\n1,?\n", []string{"score"}, "", nil,
			`no usable score in column "score": the only row was left out (unreadable: 1); check the column and the missing codes`},
		{"decimal commas throughout", "id,score\n1,\"3,5\"\n2,\"4,5\"\n", []string{"score"}, "", nil,
			`no usable score in column "score": all 2 rows were left out (comma that could be decimal or thousands: 2); write decimals with a point`},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			options := intake.Options{Scores: test.ask, Header: test.header, Missing: test.missing}
			s, err := intake.Read(context.Background(), from(test.text), options)
			assert.EqualError(t, err, test.want)
			assert.Empty(t, s.Columns)
		})
	}
}

func TestReadRefusesAmongSources(t *testing.T) {
	tests := []struct {
		name         string
		north, south string
		ask          []string
		want         string
	}{
		{"no such column in one", "id,score\n1,12\n", "id,points\n1,12\n", []string{"score"},
			`south.csv: there is no column "score"; the columns are: id, points`},
		{"another name over the same number", "id,score\n1,12\n", "id,age\n1,40\n", []string{"2"},
			`south.csv: column 2 is "age" here but "score" in the sources before; ask for it by its name`},
		{"an empty one", "score\n12\n", "", nil, `south.csv: no usable score: the input is empty`},
		{"no text", "score\n12\n\x00", "score\n12\n", nil, `north.csv: line 3 holds a zero byte, so this isn't plain text; save it as CSV (UTF-8) and use that`},
		{"no scores in any", "score\n?\n", "score\n.\n", nil,
			`no usable score in column "score": all 2 rows were left out (unreadable: 1, blank: 1); check the column and the missing codes`},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			_, err := intake.Read(context.Background(), from(test.north, test.south), intake.Options{Scores: test.ask})
			assert.EqualError(t, err, test.want)
		})
	}
	_, err := intake.Read(context.Background(), nil, intake.Options{})
	assert.EqualError(t, err, "no usable score: there is no input")
	_, err = intake.Read(context.Background(), []intake.Source{{Reader: strings.NewReader("1\n")}, {Reader: strings.NewReader("")}}, intake.Options{})
	assert.EqualError(t, err, "source 2: no usable score: the input is empty", "a source without a name")
}

// Decimal marks must agree within a source only.
func TestDecimalMarksMayDifferBetweenSources(t *testing.T) {
	s, err := intake.Read(context.Background(), from("score\n3.5\n", "score\n3,5\n"), intake.Options{})
	require.NoError(t, err)
	assert.Equal(t, []float64{3.5, 3.5}, s.Columns[0].Scores)
}

func TestReadWrapsAReadersError(t *testing.T) {
	broken := errors.New("the disk is gone")
	for rows, want := range map[int]string{
		0:       "reading stopped before the first line ended: the disk is gone",
		3:       "reading stopped after line 3: the disk is gone",
		100_000: "reading stopped after line 100000: the disk is gone",
	} {
		text := strings.Repeat("12\n", rows)
		source := io.MultiReader(strings.NewReader(text), iotest.ErrReader(broken))
		_, err := intake.Read(context.Background(), []intake.Source{{Reader: source}}, intake.Options{})
		assert.ErrorIs(t, err, broken)
		assert.EqualError(t, err, want)
	}
}

// A quote that opens in a large file must not load the rest of it.
func TestReadRefusesARowWithoutEnd(t *testing.T) {
	source := io.MultiReader(strings.NewReader("id,score\n1,12\n2,\""), &endless{})
	_, err := intake.Read(context.Background(), []intake.Source{{Reader: source}}, intake.Options{Scores: []string{"score"}})
	assert.EqualError(t, err, "the row below line 2 is longer than 16 million bytes; close the quote that is open there, or check that this is a file of scores")

	_, err = intake.Read(context.Background(), []intake.Source{{Reader: &endless{}}}, intake.Options{})
	assert.EqualError(t, err, "the first row is longer than 16 million bytes; close the quote that is open there, or check that this is a file of scores")
}

// endless is 1 GB of x, as good as endless here.
type endless struct{ read int }

func (e *endless) Read(p []byte) (int, error) {
	if e.read > 1<<30 {
		return 0, io.EOF
	}
	for i := range p {
		p[i] = 'x'
	}
	e.read += len(p)
	return len(p), nil
}

// When the context ends, no more than what is being read is read.
func TestReadEndsWithTheContext(t *testing.T) {
	for _, reads := range []int{1, 2, 40} {
		ctx, cancel := context.WithCancel(context.Background())
		source := &watched{Reader: strings.NewReader(strings.Repeat("12\n", 2_000_000))}
		source.before = func() {
			if source.reads == reads {
				cancel()
			}
		}
		_, err := intake.Read(ctx, []intake.Source{{Reader: source}}, intake.Options{})
		assert.ErrorIs(t, err, context.Canceled)
		assert.Equal(t, reads, source.reads)
		assert.LessOrEqual(t, source.most, 64<<10)

		_, err = intake.Columns(ctx, from("a,b\n1,2\n")[0], sample.HeaderAuto)
		assert.ErrorIs(t, err, context.Canceled)
	}
}

// watched counts how often it is read and how much is taken at a time.
type watched struct {
	io.Reader
	before      func()
	reads, most int
}

func (w *watched) Read(p []byte) (int, error) {
	w.reads++
	w.before()
	w.most = max(w.most, len(p))
	return w.Reader.Read(p)
}
