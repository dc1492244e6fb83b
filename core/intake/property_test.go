package intake_test

import (
	"context"
	"fmt"
	"io"
	"strconv"
	"strings"
	"testing"
	"testing/iotest"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"tailgap/core/intake"
	"tailgap/core/sample"
)

// table is a written table and what must come out of it.
type table struct {
	text    string
	options intake.Options
	want    sample.Column
}

// drawTable writes a random table in a random way.
func drawTable(t *rapid.T) table {
	var (
		delimiter = rapid.SampledFrom([]string{"", ",", ";", "\t"}).Draw(t, "delimiter")
		lineEnd   = rapid.SampledFrom([]string{"\n", "\r\n", "\r"}).Draw(t, "line end")
		named     = rapid.Bool().Draw(t, "header")
		quoteAll  = rapid.Bool().Draw(t, "quote all")
		width     = 1
		mark      = "."
		table     = table{options: intake.Options{Missing: []string{"-9", "refused"}}}
		lines     []string // rows as written; a row may span several lines
		line      = 1
	)
	if delimiter != "" {
		width = rapid.IntRange(2, 5).Draw(t, "width")
	}
	if delimiter == ";" || named && delimiter != "," && rapid.Bool().Draw(t, "decimal commas") {
		mark = ","
	}
	at := rapid.IntRange(0, width-1).Draw(t, "score column")
	write := func(score string) {
		cells := make([]string, width)
		for i := range cells {
			cells[i] = rapid.StringMatching(`[a-z ,;"\t\n]{0,6}`).Draw(t, "cell")
			if i == at {
				cells[i] = score
			}
			if quoteAll || strings.ContainsAny(cells[i], ",;\t\n\"") && !(i == at && delimiter != ",") {
				cells[i] = `"` + strings.ReplaceAll(cells[i], `"`, `""`) + `"`
			}
		}
		lines = append(lines, strings.Join(cells, delimiter))
	}
	drop := func(reason string) {
		table.want.Rows++
		for i := range table.want.Dropped {
			if table.want.Dropped[i].Reason == reason {
				table.want.Dropped[i].Count++
				return
			}
		}
		table.want.Dropped = append(table.want.Dropped, sample.Dropped{Reason: reason, Count: 1, First: fmt.Sprintf("line %d", line)})
	}

	if named {
		table.options.Scores, table.want.Name = []string{"score"}, "score"
		write("score")
	} else {
		table.options.Scores, table.options.Header = []string{strconv.Itoa(at + 1)}, sample.HeaderNo
		table.want.Name = fmt.Sprintf("column %d", at+1)
	}
	rows := rapid.IntRange(1, 30).Draw(t, "rows")
	for i := range rows {
		line = 1 + strings.Count(strings.Join(lines, "\n"), "\n") + min(len(lines), 1)
		what := rapid.IntRange(0, 7).Draw(t, "what")
		if i == rows-1 {
			what = 8 // one usable score at least, and no blank line at the end
		}
		switch what {
		case 0, 1, 2, 3:
			whole, decimals := rapid.IntRange(-999, 9999).Draw(t, "whole"), rapid.StringMatching(`(\.[0-9]{1,2})?`).Draw(t, "decimals")
			text := strconv.Itoa(whole) + decimals
			x, err := strconv.ParseFloat(text, 64)
			require.NoError(t, err)
			if x == -9 {
				drop("coded -9")
			} else {
				table.want.Rows++
				table.want.Scores = append(table.want.Scores, x)
			}
			write(strings.ReplaceAll(text, ".", mark))
		case 8:
			table.want.Rows++
			table.want.Scores = append(table.want.Scores, 7)
			write("7")
		case 4:
			drop("blank")
			write(rapid.SampledFrom([]string{"", "NA", "."}).Draw(t, "blank"))
		case 5:
			drop("coded -9")
			write(rapid.SampledFrom([]string{"-9", "−9", "-9" + mark + "0"}).Draw(t, "code"))
		case 6:
			drop("coded refused")
			write("refused")
		case 7:
			drop("unreadable")
			write(rapid.SampledFrom([]string{"x", "12a", "1:2", "5%"}).Draw(t, "word"))
		}
	}
	table.text = strings.Join(lines, lineEnd)
	if rapid.Bool().Draw(t, "last line ends") {
		table.text += lineEnd + strings.Repeat(lineEnd, rapid.IntRange(0, 2).Draw(t, "blank lines at the end"))
	}
	if rapid.Bool().Draw(t, "byte order mark") {
		table.text = "\ufeff" + table.text
	}
	return table
}

func TestWhatIsWrittenIsRead(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		table := drawTable(t)
		s, err := intake.Read(context.Background(), from(table.text), table.options)
		require.NoError(t, err, "%q", table.text)
		assert.Equal(t, table.want, s.Columns[0], "%q", table.text)
	})
}

// However a source hands over its bytes, the same comes out.
func TestChunksDontMatter(t *testing.T) {
	readers := map[string]func(io.Reader) io.Reader{
		"one byte at a time": iotest.OneByteReader, "half": iotest.HalfReader, "data with the end": iotest.DataErrReader,
	}
	rapid.Check(t, func(t *rapid.T) {
		table := drawTable(t)
		want, wantErr := intake.Read(context.Background(), from(table.text), table.options)
		for name, reader := range readers {
			s, err := intake.Read(context.Background(), []intake.Source{{Reader: reader(strings.NewReader(table.text))}}, table.options)
			assert.Equal(t, wantErr, err, name)
			assert.Equal(t, want, s, name)
		}
	})
}

// A line end may fall on either side of every buffer's end.
func TestLineEndsAcrossBuffers(t *testing.T) {
	for _, lineEnd := range []string{"\n", "\r\n", "\r"} {
		for shift := range 8 {
			rows := 15_000
			text := "id,score" + strings.Repeat("x", shift) + lineEnd + strings.Repeat("123,45"+lineEnd, rows)
			s, err := intake.Read(context.Background(), from(text), intake.Options{Scores: []string{"2"}})
			require.NoError(t, err)
			assert.Len(t, s.Columns[0].Scores, rows, "%q, %d", lineEnd, shift)
			assert.Equal(t, rows, s.Columns[0].Rows)
			one := "12" + strings.Repeat("0", shift) + lineEnd + strings.Repeat("123456"+lineEnd, rows)
			s, err = intake.Read(context.Background(), from(one), intake.Options{})
			require.NoError(t, err)
			assert.Len(t, s.Columns[0].Scores, rows+1)
			assert.Empty(t, s.Columns[0].Dropped)
		}
	}
}

// Pooling sources gives the scores of one after the other.
func TestPoolingConcatenates(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a, b := drawTable(t), drawTable(t)
		a.options.Header, b.options.Header = "", ""
		options := intake.Options{Scores: []string{"score"}, Missing: a.options.Missing}
		first, errA := intake.Read(context.Background(), from(a.text), options)
		second, errB := intake.Read(context.Background(), from(b.text), options)
		both, err := intake.Read(context.Background(), from(a.text, b.text), options)
		if errA != nil || errB != nil {
			return // without a header there is no column of that name
		}
		require.NoError(t, err)
		assert.Equal(t, append(first.Columns[0].Scores, second.Columns[0].Scores...), both.Columns[0].Scores)
		assert.Equal(t, first.Columns[0].Rows+second.Columns[0].Rows, both.Columns[0].Rows)
		assert.Equal(t, leftOut(first)+leftOut(second), leftOut(both))
	})
}

// leftOut counts all that was left out.
func leftOut(s sample.Sample) int {
	n := 0
	for _, d := range s.Columns[0].Dropped {
		n += d.Count
	}
	return n
}
