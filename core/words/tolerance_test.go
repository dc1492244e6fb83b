package words

import (
	"testing"

	"github.com/stretchr/testify/assert"

	"tailgap/core/ask"
	"tailgap/core/verdict"
)

func TestTolerance(t *testing.T) {
	count := &verdict.Limit{Size: 20, Unit: verdict.OfCount}
	for _, c := range []struct {
		high, low *verdict.Limit
		expected  string
	}{
		{nil, nil, ""},
		{points(1), points(2), "at most 1 point too high or 2 points too low"},
		{points(1.5), points(1.5), "at most 1.5 points too high or too low"},
		{points(0), nil, "at most 0 points too high; no limit on too low"},
		{nil, points(0.5), "at most 0.5 points too low; no limit on too high"},
		{count, count, "at most 20% of the count too high or too low"},
		{&verdict.Limit{Size: 1, Unit: verdict.Heads}, &verdict.Limit{Size: 4000, Unit: verdict.Heads}, "at most 1 person too high or 4,000 people too low"},
	} {
		assert.Equal(t, c.expected, Tolerance(ask.Question{TooHigh: c.high, TooLow: c.low}))
	}
}

func TestVerdict(t *testing.T) {
	count := &verdict.Limit{Size: 20, Unit: verdict.OfCount}
	forty := &verdict.Limit{Size: 40, Unit: verdict.Heads} // 1 point of 4,000
	for _, c := range []struct {
		high, low          *verdict.Limit
		gap, lower, higher float64
		said, expected     string
	}{
		{points(1), points(2), 1.4, 1.1, 1.8, "fails", "fails: too high by more than 1 point"},
		{points(1), points(2), 1.4, 1.04, 1.8, "fails", "fails: too high by just over 1 point"},
		{points(1), points(2), -3.9, -6, -2.2, "fails", "fails: too low by more than 2 points"},
		{forty, nil, 1.4, 1.1, 1.8, "fails", "fails: too high by more than 40 people"},
		{forty, nil, 1.4, 1.01, 1.8, "fails", "fails: too high by just over 40 people"},
		{count, count, 1.4, 1.1, 1.8, "fails", "fails: too high by more than 20% of the count"},
		{points(1), points(2), 0.4, -0.1, 0.9, "holds", "holds: within 1 point too high and 2 points too low"},
		{points(1), points(1), 0.4, -0.1, 0.9, "holds", "holds: within 1 point too high or too low"},
		{points(1), nil, -30, -40, -20, "holds", "holds: not too high by more than 1 point"},
		{nil, points(2), 3, 2, 4, "holds", "holds: not too low by more than 2 points"},
		{points(1), points(2), 0.4, -0.5, 1.3, "unsettled", "unsettled: could be inside or outside 1 point too high"},
		{points(1), points(2), -1.4, -2.5, 0.3, "unsettled", "unsettled: could be inside or outside 2 points too low"},
		{points(1), points(2), 0.4, -2.5, 3.3, "unsettled", "unsettled: could be inside or outside 1 point too high and 2 points too low"},
		{points(1), nil, 1, 1, 1.2, "unsettled", "unsettled: could be inside or outside 1 point too high"},
		{count, points(2), 0.4, 0.1, 1.3, "unsettled", "unsettled: could be inside or outside 20% of the count too high"},
	} {
		q := ask.NewQuestion()
		q.Heads, q.TooHigh, q.TooLow = some(4000.0), c.high, c.low
		f := seventy(c.said)
		f.GapPoints, f.GapLow, f.GapHigh = c.gap, &c.lower, &c.higher
		assert.Equal(t, c.expected, Verdict(q, f))
	}
	assert.Empty(t, Verdict(ask.NewQuestion(), ask.Finding{}), "no tolerance, no verdict")
}

func TestVerdictWhereNobodyWasCounted(t *testing.T) {
	q, f := asked(), seventy("unsettled")
	q.TooHigh = &verdict.Limit{Size: 20, Unit: verdict.OfCount}
	f.Counted, f.CountedShare = 0, 0
	assert.Equal(t, "unsettled: none were counted, so there is no count to take a part of", Verdict(q, f))
	assert.Equal(t, "how many more people would settle it can't be said", Settle(q, f))
}

// Of an exact gap that prints like the limit it has passed, "more than" would
// read as a contradiction.
func TestExactVerdictJustOver(t *testing.T) {
	q, f := asked(), seventy("fails")
	f.GapPoints, f.GapLow, f.GapHigh = 1.02, nil, nil
	assert.Equal(t, "fails: too high by just over 1 point", Verdict(q, f))
}

func TestSettle(t *testing.T) {
	for more, expected := range map[int]string{
		1:     "about 1 more person would settle it if the gap is as estimated (an 80% chance)",
		999:   "about 999 more people would settle it if the gap is as estimated (an 80% chance)",
		1247:  "about 1,250 more people would settle it if the gap is as estimated (an 80% chance)",
		1250:  "about 1,250 more people would settle it if the gap is as estimated (an 80% chance)",
		9991:  "about 10,000 more people would settle it if the gap is as estimated (an 80% chance)",
		39801: "about 39,900 more people would settle it if the gap is as estimated (an 80% chance)",
	} {
		f := seventy("unsettled")
		f.PeopleToSettle = &more
		assert.Equal(t, expected, Settle(asked(), f))
	}
	assert.Equal(t, "no realistic number of people would settle it", Settle(asked(), seventy("unsettled")))
	assert.Empty(t, Settle(asked(), seventy("holds")))
	assert.Empty(t, Settle(asked(), ask.Finding{}))
}
