package words_test

import (
	"testing"

	"github.com/stretchr/testify/assert"

	"tailgap/core/ask"
	"tailgap/core/words"
)

func TestSignedEffect(t *testing.T) {
	at := func(gap float64) ask.Finding {
		low, high := gap-0.3, gap+0.3
		return ask.Finding{Reading: ask.Reading{GapPoints: gap, GapLow: &low, GapHigh: &high}}
	}
	tests := []struct {
		name         string
		finding      ask.Finding
		effect       ask.Effect
		size, limits string
	}{
		{"a part of a large gap", at(-12.6), *of(-8.04, -10.8, -5.67), "-8.0", "-10.8 to -5.7"},
		{"no finer than the gap", at(-12.6), *of(0.123, 0.05, 0.2), "+0.1", "+0.1 to +0.2"},
		{"a small part of a small gap", at(0.3), *of(0.123, 0.05, 0.2), "+0.12", "+0.05 to +0.20"},
		{"no finer than its interval", at(0.3), *of(0.123, -1.04, 1.2), "+0.1", "-1.0 to +1.2"},
		{"less than can be printed", at(5), *of(-0.004, -0.3, 0.2), "-<0.1", "-0.3 to +0.2"},
		{"nothing", at(5), *of(0, 0, 0), "0.0", "0.0 to 0.0"},
		{"without an interval", at(-4.4), ask.Effect{Points: -0.6}, "-0.6", ""},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			assert.Equal(t, test.size, words.SignedEffect(test.finding, test.effect))
			assert.Equal(t, test.limits, words.SignedEffectLimits(test.finding, test.effect))
		})
	}
}
