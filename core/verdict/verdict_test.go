package verdict_test

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"tailgap/core/verdict"
)

func limit(t require.TestingT, text string) *verdict.Limit {
	l, err := verdict.ParseLimit(text)
	require.NoError(t, err)
	return &l
}

func TestParseLimit(t *testing.T) {
	for text, want := range map[string]verdict.Limit{
		"1.5pt": {Size: 1.5}, "0pt": {}, " 2 pt ": {Size: 2}, ".5pt": {Size: 0.5},
		"20%count": {Size: 20, Unit: verdict.OfCount}, "20 % count": {Size: 20, Unit: verdict.OfCount},
		"40heads": {Size: 40, Unit: verdict.Heads},
	} {
		got, err := verdict.ParseLimit(text)
		require.NoError(t, err, text)
		assert.Equal(t, want, got, text)
		back, err := verdict.ParseLimit(got.String())
		require.NoError(t, err, text)
		assert.Equal(t, got, back, text)
	}
	for text, sentence := range map[string]string{
		"1%":     `the tolerance "1%" could mean two things; write 1pt for percentage points or 1%count for a part of the counted share`,
		"1":      `the tolerance "1" can't be read; write it as 1.5pt (percentage points), 20%count (part of the counted share) or 40heads (people)`,
		"-1pt":   `the tolerance "-1pt" can't be read; write it as 1.5pt (percentage points), 20%count (part of the counted share) or 40heads (people)`,
		"NaNpt":  `the tolerance "NaNpt" can't be read; write it as 1.5pt (percentage points), 20%count (part of the counted share) or 40heads (people)`,
		"1,5pt":  `the tolerance "1,5pt" can't be read; write it as 1.5pt (percentage points), 20%count (part of the counted share) or 40heads (people)`,
		"points": `the tolerance "points" can't be read; write it as 1.5pt (percentage points), 20%count (part of the counted share) or 40heads (people)`,
	} {
		_, err := verdict.ParseLimit(text)
		assert.EqualError(t, err, sentence)
	}
}

func TestPoints(t *testing.T) {
	heads, none := 4000.0, 0.0
	for _, test := range []struct {
		limit  string
		heads  *float64
		points float64
		known  bool
	}{
		{"1.5pt", nil, 1.5, true}, {"40heads", &heads, 1, true}, {"40heads", nil, 0, false},
		{"40heads", &none, 0, false}, {"20%count", &heads, 0, false},
	} {
		points, known := limit(t, test.limit).Points(test.heads)
		assert.Equal(t, test.points, points, test.limit)
		assert.Equal(t, test.known, known, test.limit)
	}
}

func at(gap, low, high float64) func(float64) verdict.Limits {
	return func(float64) verdict.Limits { return verdict.Limits{Gap: gap, Low: low, High: high} }
}

func TestVerdict(t *testing.T) {
	both := verdict.NewTolerance(limit(t, "1pt"), limit(t, "2pt"), 0)
	high := verdict.NewTolerance(limit(t, "1pt"), nil, 0)
	low := verdict.NewTolerance(nil, limit(t, "2pt"), 0)
	heads := verdict.NewTolerance(limit(t, "40heads"), limit(t, "80heads"), 4000)
	assert.InDelta(t, both.High.At, heads.High.At, 1e-15)
	assert.InDelta(t, both.Low.At, heads.Low.At, 1e-15)
	tests := []struct {
		name      string
		tolerance verdict.Tolerance
		low, high float64
		want      verdict.Verdict
	}{
		{"inside", both, -0.019, 0.009, verdict.Holds},
		{"the edges are inside", both, -0.02, 0.01, verdict.Holds},
		{"over the upper edge", both, 0, 0.0100001, verdict.Unsettled},
		{"over the lower edge", both, -0.0200001, 0, verdict.Unsettled},
		{"over both", both, -1, 1, verdict.Unsettled},
		{"above", both, 0.0100001, 0.5, verdict.Fails},
		{"below", both, -0.5, -0.0200001, verdict.Fails},
		{"no lower limit", high, -0.9, 0.01, verdict.Holds},
		{"no upper limit", low, -0.02, 0.9, verdict.Holds},
		{"no upper limit, below", low, -0.9, -0.03, verdict.Fails},
	}
	for _, test := range tests {
		assert.Equal(t, test.want, verdict.Of(test.tolerance, at((test.low+test.high)/2, test.low, test.high)), test.name)
	}
}

// A tolerance of 20% of the count holds curve - 1.2·count against 0 for "too
// high" and curve - 0.8·count for "too low".
func TestVerdictInPercentOfTheCount(t *testing.T) {
	tolerance := verdict.NewTolerance(limit(t, "20%count"), limit(t, "20%count"), 0)
	assert.Equal(t, []float64{1, 1.2, 0.8}, tolerance.Weights())
	assert.True(t, tolerance.OfCount())
	limits := func(high12, low08 float64) func(float64) verdict.Limits {
		return func(weight float64) verdict.Limits {
			if weight == 1 {
				return verdict.Limits{Low: high12 - 0.02, High: low08 + 0.02}
			}
			if weight == 1.2 {
				return verdict.Limits{Gap: high12 - 0.01, Low: high12 - 0.02, High: high12}
			}
			return verdict.Limits{Gap: low08 + 0.01, Low: low08, High: low08 + 0.02}
		}
	}
	assert.Equal(t, verdict.Holds, verdict.Of(tolerance, limits(0, 0)))
	assert.Equal(t, verdict.Unsettled, verdict.Of(tolerance, limits(0.001, 0)))
	assert.Equal(t, verdict.Fails, verdict.Of(tolerance, limits(0.021, 0)))
	assert.Equal(t, verdict.Fails, verdict.Of(tolerance, limits(0, -0.021)))
	none := verdict.NewTolerance(limit(t, "0%count"), nil, 0)
	assert.True(t, none.OfCount(), "a part of the count, be it none of it")
	assert.True(t, none.InPoints().None())
	assert.Nil(t, verdict.NewTolerance(nil, limit(t, "100%count"), 0).Low, "a count can't be missed by more than all of it")
}

// Too high by more than a part of the count, for sure, but not for sure too
// high: that is unsettled.
func TestAPartOfTheCountFailsWithTheGap(t *testing.T) {
	tolerance := verdict.NewTolerance(limit(t, "20%count"), limit(t, "20%count"), 0)
	limits := func(gapLow, gapHigh, low, high float64) func(float64) verdict.Limits {
		return func(weight float64) verdict.Limits {
			if weight == 1 {
				return verdict.Limits{Low: gapLow, High: gapHigh}
			}
			return verdict.Limits{Low: low, High: high}
		}
	}
	assert.Equal(t, verdict.Fails, verdict.Of(tolerance, limits(0.01, 0.2, 0.02, 0.03)))
	assert.Equal(t, verdict.Unsettled, verdict.Of(tolerance, limits(-0.01, 0.2, 0.02, 0.03)))
	assert.Equal(t, verdict.Fails, verdict.Of(tolerance, limits(-0.2, -0.01, -0.03, -0.02)))
	assert.Equal(t, verdict.Unsettled, verdict.Of(tolerance, limits(-0.2, 0.01, -0.03, -0.02)))
}

func TestTrivial(t *testing.T) {
	both := verdict.NewTolerance(limit(t, "1pt"), limit(t, "2pt"), 0)
	assert.True(t, both.Trivial(0.0013, 0.0103), "a gamma's far tail: 8 times too low, inside any point")
	assert.True(t, both.Trivial(0.999, 0.995), "the other side of the threshold")
	assert.False(t, both.Trivial(0.011, 0.0103))
	assert.False(t, both.Trivial(0.001, 0.0201))
	assert.False(t, verdict.NewTolerance(limit(t, "20%count"), nil, 0).Trivial(0, 0))
	assert.False(t, verdict.Tolerance{}.Trivial(0, 0))
	assert.True(t, verdict.NewTolerance(limit(t, "1pt"), nil, 0).Trivial(0.009, 0.5), "never too high by more than its own share")
}

// Trivial never says so of a gap that could leave the tolerance.
func TestTrivialGapsAreInside(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		high, low := rapid.Float64Range(0, 30).Draw(t, "high"), rapid.Float64Range(0, 30).Draw(t, "low")
		tolerance := verdict.NewTolerance(&verdict.Limit{Size: high}, &verdict.Limit{Size: low}, 0)
		curve, counted := rapid.Float64Range(0, 1).Draw(t, "curve"), rapid.Float64Range(0, 1).Draw(t, "counted")
		if tolerance.Trivial(curve, counted) {
			gap := curve - counted
			assert.LessOrEqual(t, gap, tolerance.High.At+1e-15)
			assert.GreaterOrEqual(t, gap, tolerance.Low.At-1e-15)
		}
	})
}

// n' = n(w/δ)²(1+z_0.8/z_0.975)², worked by hand: gap 0.5, edge 1, half-width
// 2 points, n = 100: 100·16·(1+0.841621/1.959964)² = 3269.1, so 3270 people in all.
func TestPeopleToSettle(t *testing.T) {
	one := verdict.NewTolerance(limit(t, "1pt"), nil, 0)
	more, ok := verdict.PeopleToSettle(one, 100, 0.95, at(0.005, -0.015, 0.025))
	assert.True(t, ok)
	assert.Equal(t, 3170, more)
	_, ok = verdict.PeopleToSettle(one, 100, 0.95, at(0.0099, -0.02, 0.04))
	assert.False(t, ok, "above a hundred times the people at hand")
	_, ok = verdict.PeopleToSettle(one, 100, 0.95, at(0.01, -0.01, 0.03))
	assert.False(t, ok, "on the edge itself nothing settles it")
	both := verdict.NewTolerance(limit(t, "1pt"), limit(t, "2pt"), 0)
	inside, _ := verdict.PeopleToSettle(both, 100, 0.95, at(0.005, -0.015, 0.025))
	assert.Equal(t, more, inside, "inside both edges the nearer one counts")
	outside, _ := verdict.PeopleToSettle(both, 100, 0.95, at(0.015, -0.005, 0.035))
	assert.Equal(t, more, outside, "outside one edge that one counts")
	lopsided, _ := verdict.PeopleToSettle(both, 100, 0.95, at(0.005, -0.012, 0.025))
	assert.Equal(t, more, lopsided, "the limit on the edge's side is what has to clear it")
	lopsided, _ = verdict.PeopleToSettle(both, 100, 0.95, at(0.015, -0.005, 0.095))
	assert.Equal(t, more, lopsided, "and outside the edge the other one")
}

// A part f of the squared width that stays: w² is then f + (1-f)n/n' of what it
// is, and what must be cleared, δ = w·1.429403, is reached at
// n' = n·r(1-f)/(1-rf), r = 16·2.043194 = 32.691: f = 0.02 gives 100·32.037/0.34618
// = 9254.6, so 9,255 people in all; f = 1/r or more can never be reached.
func TestPeopleToSettleWhatOnlyPartlyShrinks(t *testing.T) {
	one := verdict.NewTolerance(limit(t, "1pt"), nil, 0)
	fixed := func(f float64) func(float64) verdict.Limits {
		return func(float64) verdict.Limits {
			return verdict.Limits{Gap: 0.005, Low: -0.015, High: 0.025, FixedHigh: f}
		}
	}
	more, ok := verdict.PeopleToSettle(one, 100, 0.95, fixed(0.02))
	assert.True(t, ok)
	assert.Equal(t, 9155, more)
	_, ok = verdict.PeopleToSettle(one, 100, 0.95, fixed(0.03))
	assert.False(t, ok, "realistic in number only below a hundred times the people at hand")
	for _, f := range []float64{0.031, 0.5, 1} {
		_, ok = verdict.PeopleToSettle(one, 100, 0.95, fixed(f))
		assert.False(t, ok, f)
	}
}
