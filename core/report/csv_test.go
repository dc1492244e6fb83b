package report

import (
	"bytes"
	"encoding/csv"
	"encoding/json"
	"math"
	"strconv"
	"strings"
	"testing"
	"unicode"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"tailgap/core/ask"
)

func readCSV(t require.TestingT, a ask.Answer) [][]string {
	text, err := CSV(a)
	require.NoError(t, err)
	lines, err := csv.NewReader(bytes.NewReader(text)).ReadAll()
	require.NoError(t, err)
	return lines
}

// Each single value of the JSON's finding, sample, curve and question stands
// in the CSV under its own name, digit for digit.
func TestCSVHasTheNamesAndValuesOfTheJSON(t *testing.T) {
	for name, made := range answers {
		t.Run(name, func(t *testing.T) {
			a := made()
			text, err := JSON(a)
			require.NoError(t, err)
			var tree map[string]any
			decoder := json.NewDecoder(bytes.NewReader(text))
			decoder.UseNumber()
			require.NoError(t, decoder.Decode(&tree))

			lines := readCSV(t, a)
			heading, row := lines[0], 0
			assert.Len(t, distinct(heading), len(heading), "a name stands twice")
			for _, one := range tree["results"].([]any) {
				result := one.(map[string]any)
				findings := result["cutoffs"].([]any)
				if len(findings) == 0 {
					findings = []any{map[string]any{}}
				}
				for _, finding := range findings {
					row++
					cells := map[string]string{}
					for i, column := range heading {
						cells[column] = lines[row][i]
					}
					compareCells(t, cells, "", finding)
					compareCells(t, cells, "sample", result["sample"])
					compareCells(t, cells, "curve", result["curve"])
					compareCells(t, cells, "question", tree["question"])
				}
			}
			assert.Len(t, lines, row+1)
		})
	}
}

func compareCells(t *testing.T, cells map[string]string, name string, value any) {
	t.Helper()
	switch v := value.(type) {
	case map[string]any:
		for field, inner := range v {
			compareCells(t, cells, strings.Trim(name+"_"+field, "_"), inner)
		}
	case []any: // lists have forms of their own
	case nil:
		if cell, there := cells[name]; there { // a nested record has no column itself
			assert.Empty(t, cell, name)
		}
	case string:
		assert.Equal(t, v, strings.TrimPrefix(cells[name], "'"), name)
	case bool:
		assert.Equal(t, strconv.FormatBool(v), cells[name], name)
	case json.Number:
		expected, err := v.Float64()
		require.NoError(t, err)
		written, err := strconv.ParseFloat(cells[name], 64)
		require.NoError(t, err, name)
		assert.Equal(t, expected, written, name)
	}
}

func distinct(names []string) map[string]bool {
	all := map[string]bool{}
	for _, name := range names {
		all[name] = true
	}
	return all
}

func TestCSVRefusesWhatIsNoNumber(t *testing.T) {
	a := fitted()
	a.Results[0].Cutoffs[1].HalfStep.GapLow = some(math.NaN())
	text, err := CSV(a)
	assert.Empty(t, text)
	assert.EqualError(t, err, "half_step_gap_low can't be written: it came out as NaN")
}

func TestHarmless(t *testing.T) {
	for text, expected := range map[string]string{
		"vocabulary": "vocabulary", "": "", "a=b": "a=b", "x-y": "x-y",
		"=1+1": "'=1+1", "+1": "'+1", "-1": "'-1", "@SUM(A1)": "'@SUM(A1)", "＝1": "'＝1",
		"  =1": "'=1", "\t=1": "'=1", "\r\n=1": "'=1", "\u200b=1": "�=1",
		"a;=1": "a;'=1", "a; =1": "a;' =1", "a,=1,+2": "a,'=1,'+2", "a\n=1": "a =1", "\x1b[31m": "�[31m",
		"-5..3": "'-5..3", ">=70": ">=70",
	} {
		assert.Equal(t, expected, harmless(text), "%q", text)
	}
}

// No cell of text begins with what a spreadsheet runs, whatever a score is
// called, and none holds a control character.
func TestNoCellIsRun(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		name := rapid.StringOf(rapid.RuneFrom([]rune("=+-@ \t\r\n\";,|'a1(\x1b\u202e＝"), unicode.Letter)).Draw(t, "name")
		a := fitted()
		a.Results[0].Score, a.Question.Scores = name, []string{name, name}
		for _, line := range readCSV(t, a) {
			for i, cell := range line {
				for _, part := range strings.FieldsFunc(cell, func(r rune) bool { return strings.ContainsRune(";,|", r) }) {
					if i == 0 {
						assert.NotRegexp(t, `^ *[=+\-@＝]`, part)
					}
				}
				assert.NotRegexp(t, `[[:cntrl:]]`, cell)
			}
		}
	})
}
