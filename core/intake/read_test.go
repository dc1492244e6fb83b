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
	"tailgap/testdata"
)

// from is one source for each text.
func from(texts ...string) []intake.Source {
	var sources []intake.Source
	for i, text := range texts {
		sources = append(sources, intake.Source{Name: []string{"north.csv", "south.csv"}[i], Reader: strings.NewReader(text)})
	}
	return sources
}

func left(reason string, count int, first string) sample.Dropped {
	return sample.Dropped{Reason: reason, Count: count, First: first}
}

func TestRead(t *testing.T) {
	const thousands = "comma that could be decimal or thousands"
	tests := []struct {
		name    string
		text    string
		ask     string // one column; empty: the only one
		header  sample.Header
		missing []string
		label   string // "score" when empty
		scores  []float64
		dropped []sample.Dropped
	}{
		// How the file is written.
		{name: "commas", text: "id,score\n1,12\n2,15\n", ask: "score", scores: []float64{12, 15}},
		{name: "semicolons", text: "id;score\n1;12\n2;15\n", ask: "score", scores: []float64{12, 15}},
		{name: "tabs", text: "id\tscore\n1\t12\n2\t15\n", ask: "score", scores: []float64{12, 15}},
		{name: "one column", text: "score\n12\n15\n", scores: []float64{12, 15}},
		{name: "no line end at the end", text: "score\n12\n15", scores: []float64{12, 15}},
		{name: "byte order mark", text: "\ufeffscore\n12\n15\n", scores: []float64{12, 15}},
		{name: "CR LF", text: "id,score\r\n1,12\r\n2,15\r\n", ask: "score", scores: []float64{12, 15}},
		{name: "CR alone", text: "id,score\r1,12\r2,15\r", ask: "score", scores: []float64{12, 15}},
		{name: "line ends of three kinds", text: "score\r12\r\n15\n18", scores: []float64{12, 15, 18}},
		{name: "quotes", text: "\"id\",\"score\"\n\"a, \"\"b\"\"\",\"12\"\n", ask: "score", scores: []float64{12}},
		{name: "a space before a quote", text: "id, score\n1, \"12\"\n", ask: "score", scores: []float64{12}},
		{name: "a line break in a cell", text: "note,score\n\"first\nsecond\",12\nnone,15\nx,?\n", ask: "score", scores: []float64{12, 15}, dropped: []sample.Dropped{left("unreadable", 1, "line 5")}},
		{name: "a line break in a name", text: "id,\"score\n(raw)\"\n1,12\n2,?\n", ask: "Score (raw)", label: "score (raw)", scores: []float64{12}, dropped: []sample.Dropped{left("unreadable", 1, "line 4")}},
		{name: "a row longer and a row without the last cell", text: "id,score,note\n1,12,a,b\n2,15\n", ask: "score", scores: []float64{12, 15}},
		{name: "a delimiter at the end of every row", text: "score,age\n12,40,\n15,41,\n18,42,late\n", ask: "score", scores: []float64{12, 15, 18}},
		{name: "most rows longer, but not all", text: "score,age\n12,40,a\n15,41\n18,42,b\n21,43,c\n", ask: "score", scores: []float64{12, 15, 18, 21}},
		{name: "a header with a name too few, by number", text: "score,age\n1,12,40\n2,15,41\n", ask: "2", label: "age", scores: []float64{12, 15}},
		{name: "commas in the cells of a file with semicolons", text: "id;score, raw\n1;3,5\n2;4,5\n", ask: "score, raw", label: "score, raw", scores: []float64{3.5, 4.5}},
		{name: "semicolons in some cells of a file with commas", text: "note,score\na;b,12\nc,15\n", ask: "score", scores: []float64{12, 15}},
		{name: "a delimiter within quotes is none", text: "\"score; raw\"\n\"12\"\n\"15\"\n", label: "score; raw", scores: []float64{12, 15}},
		{name: "a comma in the only name is no delimiter", text: "score, raw\n12\n15\n", label: "score, raw", scores: []float64{12, 15}},
		{name: "Latin-1", text: "id;Gr\xf6\xdfe\n1;12\xa0\n2;k\xf6\n", ask: "größe", missing: []string{"kö"}, label: "Größe", scores: []float64{12}, dropped: []sample.Dropped{left("coded kö", 1, "line 3")}},

		// Header or none.
		{name: "no header, by number", text: "1,12\n2,15\n", ask: "2", label: "column 2", scores: []float64{12, 15}},
		{name: "no header, one column", text: "12\n15\n", label: "column 1", scores: []float64{12, 15}},
		{name: "a number among the names", text: "id,2024\n1,12\n", ask: "2024", header: sample.HeaderYes, label: "2024", scores: []float64{12}},
		{name: "a number among the names, found by another", text: "score,2024\n1,12\n", ask: "score", scores: []float64{1}},
		{name: "names, stated to be data", text: "id,score\n1,12\n", ask: "2", header: sample.HeaderNo, label: "column 2", scores: []float64{12}, dropped: []sample.Dropped{left("unreadable", 1, "line 1")}},
		{name: "a first row that equals the number asked for is data", text: "2,5\n1,7\n3,4\n", ask: "2", label: "column 2", scores: []float64{5, 7, 4}},
		{name: "a first row without a word is data", text: "NA\n12\n15\n", label: "column 1", scores: []float64{12, 15}, dropped: []sample.Dropped{left("blank", 1, "line 1")}},
		{name: "a first row of codes is data", text: "refused\n12\n", missing: []string{"refused"}, label: "column 1", scores: []float64{12}, dropped: []sample.Dropped{left("coded refused", 1, "line 1")}},
		{name: "a column without a name", text: "id,\n1,12\n", ask: "2", label: "column 2", scores: []float64{12}},
		{name: "a title of several cells", text: "Results,2024\nid,score\n1,12\n", ask: "2", label: "column 2", scores: []float64{2024, 12}, dropped: []sample.Dropped{left("unreadable", 1, "line 2")}},

		// Which column.
		{name: "another case and spaces", text: "ID, Reading  Score \n1,12\n", ask: "reading score", label: "Reading Score", scores: []float64{12}},
		{name: "exactly, though another is nearly", text: "Score,score\n1,12\n", ask: "score", scores: []float64{12}},
		{name: "a name that is a number wins", text: "2,x\n12,15\n", ask: "2", header: sample.HeaderYes, label: "2", scores: []float64{12}},
		{name: "by number under a header", text: "id,score\n1,12\n", ask: " 2 ", scores: []float64{12}},
		{name: "a name that can't be seen whole", text: "id,sc\x1bore\n1,12\n", ask: "2", label: "score", scores: []float64{12}},

		// Decimal commas.
		{name: "semicolons make commas decimal", text: "id;score\n1;3,5\n2;4\n3;1,234\n4;-0,25\n", ask: "score", scores: []float64{3.5, 4, 1.234, -0.25}},
		{name: "tabs leave three digits open", text: "id\tscore\n1\t3,5\n2\t3,50\n3\t1,234\n4\t1234,567\n5\t-12,345\n", ask: "score", scores: []float64{3.5, 3.5, 1234.567}, dropped: []sample.Dropped{left(thousands, 2, "line 4")}},
		{name: "so does one column", text: "score\n3,5\n1,234\n3\n", scores: []float64{3.5, 3}, dropped: []sample.Dropped{left(thousands, 1, "line 3")}},
		{name: "commas leave all open", text: "id,score\n1,\"3,5\"\n2,4\n3,\"1,234\"\n", ask: "score", scores: []float64{4}, dropped: []sample.Dropped{left(thousands, 2, "line 2")}},
		{name: "thousands are never guessed", text: "id;score\n1;1.234,5\n2;12\n3;1 234\n4;1'234\n5;1,234,567\n", ask: "score", scores: []float64{12}, dropped: []sample.Dropped{left("unreadable", 4, "line 2")}},

		// Missing codes, blanks, and what can't be read.
		{name: "codes by text and by value", text: "score\n12\n99\n99.0\n-9\n−9\nrefused\n 99 \n", missing: []string{"99", "-9", "refused"}, scores: []float64{12}, dropped: []sample.Dropped{
			left("coded 99", 3, "line 3"), left("coded -9", 2, "line 5"), left("coded refused", 1, "line 7")}},
		{name: "a code with a decimal comma", text: "id;score\n1;-9,0\n2;12\n", ask: "score", missing: []string{"-9"}, scores: []float64{12}, dropped: []sample.Dropped{left("coded -9", 1, "line 2")}},
		{name: "an infinite code", text: "score\ninf\n12\n", missing: []string{"inf"}, scores: []float64{12}, dropped: []sample.Dropped{left("coded inf", 1, "line 2")}},
		{name: "a blank can be named as a code", text: "score\nNA\n.\n12\n", missing: []string{"NA", ""}, scores: []float64{12}, dropped: []sample.Dropped{left("coded NA", 1, "line 2"), left("blank", 1, "line 3")}},
		{name: "blanks", text: "id,score\n1,\n2, \n3,NA\n4,n/a\n5,NaN\n6,NULL\n7,.\n8,\u00a0\n9,12\n", ask: "score", scores: []float64{12}, dropped: []sample.Dropped{left("blank", 8, "line 2")}},
		{name: "unreadable", text: "id,score\n1,twelve\n2,12\n3,1.5.2\n4,0x1p4\n5,1_000\n6,12%\n7,1e\n8,--1\n9,-\n", ask: "score", scores: []float64{12}, dropped: []sample.Dropped{left("unreadable", 8, "line 2")}},
		{name: "a row too short", text: "id,score,age\n1,12,40\n2\n3,15\n", ask: "age", label: "age", scores: []float64{40}, dropped: []sample.Dropped{left("past the end of their row", 2, "line 3")}},
		{name: "a misplaced quote costs its row only", text: "id,note,score\n1,5\" tall,12\n2,\"a\" b,15\n3,c,18\n", ask: "score", scores: []float64{18}, dropped: []sample.Dropped{left("misplaced quote", 2, "line 2")}},
		{name: "a quote left open in the last line", text: "id,score\n1,12\n2,\"15", ask: "score", scores: []float64{12}, dropped: []sample.Dropped{left("misplaced quote", 1, "line 3")}},

		// Blank lines.
		{name: "a blank line in one column is a blank cell", text: "score\n12\n\n15\n\n\n18\n\n\n", scores: []float64{12, 15, 18}, dropped: []sample.Dropped{left("blank", 3, "line 3")}},
		{name: "above a header it is nothing", text: "\n\nscore\n\n12\n", scores: []float64{12}, dropped: []sample.Dropped{left("blank", 1, "line 4")}},
		{name: "above data it is a cell", text: "\n12\n", label: "column 1", scores: []float64{12}, dropped: []sample.Dropped{left("blank", 1, "line 1")}},
		{name: "behind a quoted line break", text: "score\n\"12\n\"\n\n15\n", scores: []float64{12, 15}, dropped: []sample.Dropped{left("blank", 1, "line 4")}},
		{name: "behind a misplaced quote", text: "score\n1\"2\n\n15\n", scores: []float64{15}, dropped: []sample.Dropped{left("misplaced quote", 1, "line 2"), left("blank", 1, "line 3")}},
		{name: "with CR LF", text: "score\r\n12\r\n\r\n15\r\n", scores: []float64{12, 15}, dropped: []sample.Dropped{left("blank", 1, "line 3")}},
		{name: "in several columns it is no row", text: "id,score\n1,12\n\n  \n2,15\n,\n", ask: "score", scores: []float64{12, 15}, dropped: []sample.Dropped{left("blank", 1, "line 6")}},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			options := intake.Options{Missing: test.missing, Header: test.header}
			if test.ask != "" {
				options.Scores = []string{test.ask}
			}
			if test.label == "" {
				test.label = "score"
			}
			rows := len(test.scores)
			for _, d := range test.dropped {
				rows += d.Count
			}
			s, err := intake.Read(context.Background(), from(test.text), options)
			require.NoError(t, err)
			assert.Equal(t, []sample.Column{{Name: test.label, Rows: rows, Scores: test.scores, Dropped: test.dropped}}, s.Columns)
			assert.False(t, s.Demo)
		})
	}
}

func TestReadSeveralColumns(t *testing.T) {
	s, err := intake.Read(context.Background(), from("id;words;vocabulary\n1;60,5;30\n2;;99\n3;48\n"), intake.Options{Scores: []string{"vocabulary", "2"}, Missing: []string{"99"}})
	require.NoError(t, err)
	assert.Equal(t, []sample.Column{
		{Name: "vocabulary", Rows: 3, Scores: []float64{30}, Dropped: []sample.Dropped{left("coded 99", 1, "line 3"), left("past the end of their row", 1, "line 4")}},
		{Name: "words", Rows: 3, Scores: []float64{60.5, 48}, Dropped: []sample.Dropped{left("blank", 1, "line 3")}},
	}, s.Columns)
}

// Sources may be written differently; a column counts as the same by its name.
func TestReadSeveralSources(t *testing.T) {
	s, err := intake.Read(context.Background(), from("id,score\n1,12.5\n2,\n", "SCORE;id\n3,5;1\n;2\n?;3\n"), intake.Options{Scores: []string{"score"}})
	require.NoError(t, err)
	assert.Equal(t, []sample.Column{{Name: "score", Rows: 5, Scores: []float64{12.5, 3.5}, Dropped: []sample.Dropped{
		left("blank", 2, "line 3 of north.csv"), left("unreadable", 1, "line 4 of south.csv"),
	}}}, s.Columns)

	for _, sources := range [][]intake.Source{from("id,score\n", "1,12\n2,15\n"), from("1,12\n2,15\n", "id,score\n")} {
		s, err = intake.Read(context.Background(), sources, intake.Options{Scores: []string{"2"}})
		require.NoError(t, err, "one source may have no rows, or no header")
		assert.Equal(t, []sample.Column{{Name: "score", Rows: 2, Scores: []float64{12, 15}}}, s.Columns)
	}
}

func TestReadDemo(t *testing.T) {
	s, err := intake.Read(context.Background(), from(string(demo.CSV())), intake.Options{Scores: []string{"vocabulary", "form_minutes"}, Missing: demo.Missing()})
	require.NoError(t, err)
	for _, column := range s.Columns {
		assert.Equal(t, 412, column.Rows)
		var reasons []string
		for _, d := range column.Dropped {
			reasons = append(reasons, d.Reason)
		}
		code := map[string]string{"vocabulary": "coded 99", "form_minutes": "coded -9"}[column.Name]
		assert.ElementsMatch(t, []string{"blank", code}, reasons)
	}
}

// Every column of the open data, against the plain reader of the check values.
func TestReadOpenData(t *testing.T) {
	columns := map[string][]string{
		"cd4": {"baseline", "oneyear"}, "crimtab": {"height_cm", "finger_cm"}, "faithful": {"eruptions", "waiting"},
		"mathexam": {"tests", "nsolved"}, "newcomb": {"time"}, "pima": {"glu", "bp", "bmi", "age"},
	}
	for dataset, names := range columns {
		file, err := testdata.Files.Open("open/" + dataset + ".csv")
		require.NoError(t, err)
		s, err := intake.Read(context.Background(), []intake.Source{{Reader: file}}, intake.Options{Scores: names})
		require.NoError(t, err)
		for i, name := range names {
			assert.Equal(t, name, s.Columns[i].Name)
			assert.Equal(t, testdata.Open(dataset, name), s.Columns[i].Scores, "%s %s", dataset, name)
			for _, d := range s.Columns[i].Dropped {
				assert.Equal(t, "blank", d.Reason)
			}
		}
	}
}

// 1.234;… may be a decimal or a thousand and more: it is read as a decimal,
// and said to be one.
func TestMarksThatMayPartThousands(t *testing.T) {
	doubts := func(text string) []string {
		s, err := intake.Read(context.Background(), []intake.Source{{Name: "a.csv", Reader: strings.NewReader(text)}}, intake.Options{Scores: []string{"score"}})
		require.NoError(t, err)
		return s.Columns[0].Doubts
	}
	said := []string{"every number with a decimal mark has three digits after it (first on line 3): if the marks part thousands, those scores are 1,000 times too small"}
	assert.Equal(t, said, doubts("id;score\n1;900\n2;1.234\n3;2.001\n"))
	assert.Equal(t, said, doubts("id;score\n1;900\n2;1,234\n3;2,001\n"))
	assert.Empty(t, doubts("id;score\n1;1.234\n2;1.2\n"))
	assert.Empty(t, doubts("id;score\n1;1234\n2;12\n"))
	assert.Empty(t, doubts("id,score\n1,1.234\n2,1.235\n"), "where commas part the cells, points are decimal points")
}
