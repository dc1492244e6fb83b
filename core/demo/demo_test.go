package demo_test

import (
	"bytes"
	"crypto/sha256"
	"encoding/csv"
	"encoding/hex"
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/cutoff"
	"tailgap/core/demo"
	"tailgap/core/verdict"
)

// digest pins every byte of the demo: answers, figures and documents stand on
// it. These tests run natively and for js/wasm, so it also says that both
// write the same bytes.
const digest = "23f477b89adaca0e2be40331462d739d8e86eb0872fdaf62f9741dba67b366df"

func TestCSVNeverChanges(t *testing.T) {
	sum := sha256.Sum256(demo.CSV())
	assert.Equal(t, digest, hex.EncodeToString(sum[:]))
	assert.Equal(t, demo.CSV(), demo.CSV())
}

func TestCSVHasItsShape(t *testing.T) {
	rows := read(t)
	assert.Equal(t, []string{"words_per_minute", "vocabulary", "form_minutes", "years_away", "site", "class_id", "weight"}, rows[0])
	assert.Len(t, rows, 1+412)
	sites := map[string]int{}
	for _, row := range rows[1:] {
		sites[row[4]]++
		assert.True(t, strings.HasPrefix(row[5], row[4][:1]), "class %s stands at site %s", row[5], row[4])
		weight, err := strconv.ParseFloat(row[6], 64)
		require.NoError(t, err)
		assert.Greater(t, weight, 0.0)
	}
	assert.Len(t, sites, 3)
}

// The shapes are what makes the demo worth judging: a curve that fits, one
// that is wrong at its cutoff, and heaps.
func TestScoresHaveTheirShapes(t *testing.T) {
	vocabulary := scores(t, "vocabulary")
	mean, sd := moments(vocabulary)
	assert.InDelta(t, 26, mean, 1)
	assert.InDelta(t, 8.5, sd, 0.6)
	assert.GreaterOrEqual(t, slices.Min(vocabulary), 0.0)
	assert.LessOrEqual(t, slices.Max(vocabulary), 37.0)
	counted := share(vocabulary, func(x float64) bool { return x <= 11 })
	assert.InDelta(t, 0.09, counted, 0.01)
	assert.Greater(t, counted-math.Erfc((mean-11)/sd/math.Sqrt2)/2, 0.03, "the curve is visibly too low at 11 or below")

	words := scores(t, "words_per_minute")
	mean, sd = moments(words)
	for z := -2.0; z <= 2; z++ {
		counted := share(words, func(x float64) bool { return x >= mean+z*sd })
		assert.InDelta(t, math.Erfc(z/math.Sqrt2)/2, counted, 0.035, "the curve is about right at %v SD", z)
	}

	minutes := scores(t, "form_minutes")
	assert.InDelta(t, 0.68, share(minutes, func(x float64) bool { return math.Mod(x, 5) == 0 }), 0.08, "heaped on fives")
	assert.Greater(t, share(scores(t, "years_away"), func(x float64) bool { return x == 0 }), 0.3, "many zeros")
}

// The codes are asked for in every column at once, so no true value may look
// like one.
func TestCodesAreNoTrueValues(t *testing.T) {
	rows := read(t)
	found := map[string]int{}
	for _, row := range rows[1:] {
		for i, cell := range row {
			if slices.Contains(demo.Missing(), cell) {
				found[rows[0][i]+" "+cell]++
			}
		}
	}
	assert.Len(t, found, 2)
	assert.Contains(t, found, "vocabulary 99")
	assert.Contains(t, found, "form_minutes -9")
}

func TestWhatTheFacesAskCanBeRead(t *testing.T) {
	header := read(t)[0]
	for _, score := range append(demo.Scores(), "form_minutes") {
		assert.Contains(t, header, score)
		require.NotEmpty(t, demo.Cutoffs(score))
		for _, text := range demo.Cutoffs(score) {
			_, err := cutoff.Parse(text)
			assert.NoError(t, err)
		}
	}
	assert.Empty(t, demo.Cutoffs("site"))
	for _, text := range []string{demo.TooHigh, demo.TooLow} {
		_, err := verdict.ParseLimit(text)
		assert.NoError(t, err)
	}
}

func read(t *testing.T) [][]string {
	t.Helper()
	rows, err := csv.NewReader(bytes.NewReader(demo.CSV())).ReadAll()
	require.NoError(t, err)
	return rows
}

// scores are the usable cells of one column.
func scores(t *testing.T, name string) []float64 {
	t.Helper()
	rows := read(t)
	at := slices.Index(rows[0], name)
	var usable []float64
	for _, row := range rows[1:] {
		if row[at] == "" || slices.Contains(demo.Missing(), row[at]) {
			continue
		}
		x, err := strconv.ParseFloat(row[at], 64)
		require.NoError(t, err)
		usable = append(usable, x)
	}
	assert.InDelta(t, 400, len(usable), 15, "%s: some are missing, not many", name)
	return usable
}

func moments(x []float64) (mean, sd float64) {
	for _, v := range x {
		mean += v / float64(len(x))
	}
	for _, v := range x {
		sd += (v - mean) * (v - mean) / float64(len(x)-1)
	}
	return mean, math.Sqrt(sd)
}

func share(x []float64, beyond func(float64) bool) float64 {
	k := 0
	for _, v := range x {
		if beyond(v) {
			k++
		}
	}
	return float64(k) / float64(len(x))
}
