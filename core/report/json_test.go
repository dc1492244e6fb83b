package report

import (
	"encoding/json"
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestReadJSONReadsWhatJSONWrote(t *testing.T) {
	for name, made := range answers {
		t.Run(name, func(t *testing.T) {
			a := made()
			text, err := JSON(a)
			require.NoError(t, err)
			back, err := ReadJSON(text)
			require.NoError(t, err)
			assert.Equal(t, a, back)
		})
	}
}

func TestJSONRefusesWhatIsNoNumber(t *testing.T) {
	for said, x := range map[string]float64{"NaN": math.NaN(), "+Inf": math.Inf(1), "-Inf": math.Inf(-1)} {
		a := fitted()
		a.Results[0].Sweeps[1].BandLow[3] = x
		text, err := JSON(a)
		assert.Empty(t, text)
		assert.EqualError(t, err, "the answer can't be written: one of its numbers came out as "+said)
	}
}

func TestReadJSONIgnoresUnknownFields(t *testing.T) {
	text, err := JSON(given())
	require.NoError(t, err)
	added := strings.Replace(string(text), `"program":`, `"mood": {"good": [1, 2]}, "program":`, 1)
	require.NotEqual(t, string(text), added)
	back, err := ReadJSON([]byte(added))
	require.NoError(t, err)
	assert.Equal(t, given(), back)
}

func TestReadJSONRefuses(t *testing.T) {
	text, err := JSON(given())
	require.NoError(t, err)
	whole := string(text)
	for _, c := range []struct{ name, old, new, expected string }{
		{"another version", "tailgap/answer/1", "tailgap/answer/2", `this is no answer this program can read: its format is "tailgap/answer/2", not "tailgap/answer/1"`},
		{"a question of another version", "tailgap/question/1", "tailgap/question/9", `the answer can't be read: the question has the format "tailgap/question/9"; this program reads "tailgap/question/1"`},
		{"no format", `"format": "tailgap/answer/1",`, "", `this is no answer this program can read: its format is "", not "tailgap/answer/1"`},
		{"no JSON", `"program":`, `program:`, "the answer can't be read: line 3, column 3 is not JSON"},
		{"a broken end", "]\n}\n", "]\n", "the answer can't be read: line 183, column 4 is not JSON"},
		{"more than an answer", "]\n}\n", "]\n}\n{}", "the answer can't be read: line 185, column 1 is not JSON"},
		{"a word for a number", `"replicates": 10000`, `"replicates": "many"`, `the answer can't be read: line 27, column 24 has a value of the wrong kind for "question.replicates"`},
		{"a cutoff", `"cutoff": ">=30"`, `"cutoff": "over 30"`, `the answer can't be read: the cutoff "over 30" can't be read; write it as >=50, >50, <=20, <20 or 20..30, decimals with a point`},
		{"a level", `"level": 0.95`, `"level": 95`, "the answer can't be read: the level 95 is not between 0 and 1; write 0.95 for 95% intervals"},
		{"a short sweep", `"curve_share": [`, `"curve_share": [0.5,`, "the answer can't be read: the sweep >= has 5 thresholds but 6 of curve_share"},
		{"a sweep of a stretch", `"side": ">=",` + "\n" + `          "thinned"`, `"side": "..", "thinned"`, "the answer can't be read: a sweep has the side .., which no sweep has"},
	} {
		t.Run(c.name, func(t *testing.T) {
			changed := strings.Replace(whole, c.old, c.new, 1)
			require.NotEqual(t, whole, changed)
			_, err := ReadJSON([]byte(changed))
			assert.EqualError(t, err, c.expected)
		})
	}
	_, err = ReadJSON(nil)
	assert.EqualError(t, err, "the answer can't be read: line 1, column 1 is not JSON")
}

// Whatever is read can be written, in every form, and read again.
func FuzzReadJSON(f *testing.F) {
	for _, made := range answers {
		text, err := JSON(made())
		require.NoError(f, err)
		f.Add(text)
	}
	f.Add([]byte(`{"format":"tailgap/answer/1","question":{"format":"tailgap/question/1","level":0.5,"replicates":200},"results":[{"cutoffs":[{"ratio":-1}]}]}`))
	f.Fuzz(func(t *testing.T, text []byte) {
		a, err := ReadJSON(text)
		if err != nil {
			return
		}
		assert.NotContains(t, Text(a), "\x1b")
		_, err = CSV(a)
		require.NoError(t, err)
		written, err := JSON(a)
		require.NoError(t, err)
		back, err := ReadJSON(written)
		require.NoError(t, err)
		again, err := JSON(back)
		require.NoError(t, err)
		assert.True(t, json.Valid(written))
		assert.Equal(t, string(written), string(again))
	})
}
