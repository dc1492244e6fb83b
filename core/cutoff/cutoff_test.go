package cutoff_test

import (
	"encoding/json"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"tailgap/core/cutoff"
)

func TestParse(t *testing.T) {
	tests := []struct{ text, plain, words string }{
		{">=50", ">=50", "at 50 or above"},
		{" >= 50 ", ">=50", "at 50 or above"},
		{"≥50", ">=50", "at 50 or above"},
		{">50", ">50", "above 50"},
		{"<=20", "<=20", "at 20 or below"},
		{"≤ 20", "<=20", "at 20 or below"},
		{"<20", "<20", "below 20"},
		{"<-2.5", "<-2.5", "below -2.5"},
		{">=−4", ">=-4", "at -4 or above"},
		{">=+4", ">=4", "at 4 or above"},
		{">=.5", ">=0.5", "at 0.5 or above"},
		{">=1e2", ">=100", "at 100 or above"},
		{">=1e300", ">=1e+300", "at 1e+300 or above"},
		{"<1e-9", "<1e-09", "below 1e-09"},
		{">=-0", ">=0", "at 0 or above"},
		{"20..30", "20..30", "from 20 to 30"},
		{"20 .. 30", "20..30", "from 20 to 30"},
		{"-30..-20.5", "-30..-20.5", "from -30 to -20.5"},
		{"20.5..20.5", "20.5..20.5", "from 20.5 to 20.5"},
		{">=\u00a050", ">=50", "at 50 or above"},
	}
	for _, test := range tests {
		c, err := cutoff.Parse(test.text)
		require.NoError(t, err, test.text)
		assert.Equal(t, test.plain, c.String(), test.text)
		assert.Equal(t, test.words, c.Words(), test.text)
	}
}

func TestParseRefuses(t *testing.T) {
	unreadable := func(text string) string {
		return `the cutoff "` + text + `" can't be read; write it as >=50, >50, <=20, <20 or 20..30, decimals with a point`
	}
	for _, text := range []string{"", "50", "=50", "=>50", ">=", ">=x", ">=5,5", ">=NaN", ">=Inf", ">=1e999", ">=0x10", ">=1_000", "20...30", "20..", "..30", "20-30", ">=50 >=60", "<>5"} {
		_, err := cutoff.Parse(text)
		assert.EqualError(t, err, unreadable(text))
	}
	_, err := cutoff.Parse("30..20")
	assert.EqualError(t, err, `the stretch "30..20" ends before it starts; write the lower end first`)
	_, err = cutoff.Parse(strings.Repeat("x", 500))
	assert.EqualError(t, err, unreadable(strings.Repeat("x", 40)+"…"))
}

func TestWhatIsWrittenIsReadBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		c := cutoff.Cutoff{Side: cutoff.Side(rapid.IntRange(0, 4).Draw(t, "side")), At: rapid.Float64Range(-1e9, 1e9).Draw(t, "at") + 0}
		if c.Side == cutoff.Stretch {
			c.To = c.At + rapid.Float64Range(0, 1e6).Draw(t, "width")
		}
		text, err := json.Marshal(c)
		require.NoError(t, err)
		var back cutoff.Cutoff
		require.NoError(t, json.Unmarshal(text, &back))
		assert.Equal(t, c, back)
	})
}

func TestSides(t *testing.T) {
	for side, want := range map[cutoff.Side][2]bool{ // lower, strict
		cutoff.AtLeast: {false, false}, cutoff.Above: {false, true},
		cutoff.AtMost: {true, true}, cutoff.Below: {true, false},
	} {
		assert.Equal(t, want, [2]bool{side.Lower(), side.Strict()}, side)
	}
	var side cutoff.Side
	assert.EqualError(t, side.UnmarshalText([]byte("!")), `"!" is not a side; a side is >=, >, <=, < or .. (a stretch)`)
}

// Whatever is read can be written and read again as the same, and a stretch
// never ends before it starts.
func FuzzParse(f *testing.F) {
	for _, seed := range []string{">=50", "<20", "20..30", "≥ .5", "-1e-5..+7", ">=−4", "1..2..3", "", "<=", ">=\xff", "5e-324..1e308"} {
		f.Add(seed)
	}
	f.Fuzz(func(t *testing.T, text string) {
		c, err := cutoff.Parse(text)
		if err != nil {
			return
		}
		back, err := cutoff.Parse(c.String())
		if err != nil || back != c {
			t.Fatalf("%q was read as %v, which is read as %v (%v)", text, c, back, err)
		}
		if c.Side == cutoff.Stretch && !(c.At <= c.To) {
			t.Fatalf("%q ends before it starts", text)
		}
	})
}
