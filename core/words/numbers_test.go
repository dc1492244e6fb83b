package words

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"
)

func below(x float64) float64 { return math.Nextafter(x, math.Inf(-1)) }
func above(x float64) float64 { return math.Nextafter(x, math.Inf(1)) }

// Each threshold of the rule with its neighbours on both sides.
func TestShareAtTheEdges(t *testing.T) {
	for _, c := range []struct {
		share    float64
		expected string
	}{
		{0, "0%"}, {math.Copysign(0, -1), "0%"}, {math.SmallestNonzeroFloat64, "under 0.0001%"}, {1e-19, "under 0.0001%"},
		{below(1e-6), "under 0.0001%"}, {1e-6, "0.00010%"}, {above(1e-6), "0.00010%"},
		{0.0000054, "0.00054%"}, {0.0013, "0.13%"}, {0.000996, "0.10%"}, {0.0099, "0.99%"}, {0.00996, "1.0%"},
		{below(0.01), "1.0%"}, {0.01, "1.0%"}, {above(0.01), "1.0%"}, {0.0345001, "3.5%"}, {0.034, "3.4%"},
		{0.5, "50.0%"}, {0.9849, "98.5%"}, {below(0.99), "99.0%"}, {0.99, "99.0%"}, {above(0.99), "99.0%"},
		{0.9987, "99.87%"}, {0.99996, "99.9960%"}, {0.9999989, "99.99989%"},
		{0.9999995, "over 99.9999%"}, {below(1), "over 99.9999%"}, {1, "100%"},
		{above(1), unknown}, {-0.01, unknown}, {math.NaN(), unknown}, {math.Inf(1), unknown},
	} {
		assert.Equal(t, c.expected, Share(c.share), "%v", c.share)
	}
}

// value reads a printed share back, and how far off its last digit lets it be.
func value(t *rapid.T, printed string) (p, halfDigit float64) {
	digits := strings.TrimSuffix(printed, "%")
	percent, err := strconv.ParseFloat(digits, 64)
	require.NoError(t, err)
	_, decimals, _ := strings.Cut(digits, ".")
	return percent / 100, math.Pow10(-len(decimals)) / 200
}

// proportions draws from the whole of 0..1, the ends as often as the middle.
func proportions() *rapid.Generator[float64] {
	return rapid.Custom(func(t *rapid.T) float64 {
		p := rapid.Float64Range(0, 1).Draw(t, "p")
		switch rapid.IntRange(0, 2).Draw(t, "end") {
		case 0:
			return math.Pow(p, 8)
		case 1:
			return 1 - math.Pow(p, 8)
		}
		return p
	})
}

func TestShareIsNeverOffByMoreThanHalfItsLastDigit(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := proportions().Draw(t, "share")
		printed := Share(p)
		switch {
		case strings.HasPrefix(printed, "under"):
			assert.True(t, 0 < p && p < 1e-6, "%v is printed %s", p, printed)
		case strings.HasPrefix(printed, "over"):
			assert.True(t, 1-1e-6 < p && p < 1, "%v is printed %s", p, printed)
		default:
			back, halfDigit := value(t, printed)
			assert.InDelta(t, p, back, halfDigit+1e-15, printed)
			assert.Equal(t, p == 0, back == 0, printed)
			assert.Equal(t, p == 1, back == 1, printed)
		}
	})
}

func TestNumber(t *testing.T) {
	for _, c := range []struct {
		x        float64
		expected string
	}{
		{70, "70"}, {25.5, "25.5"}, {-3, "-3"}, {0, "0"}, {math.Copysign(0, -1), "0"}, {4000, "4000"},
		{0.1 + 0.2, "0.3"}, {3 * 1.1, "3.3"}, {0.000001, "0.000001"}, {1e-7, "1e-07"}, {-1e-13, "-1e-13"},
		{123456789012, "123456789012"}, {1e15, "1e+15"}, {below(1e15), "1e+15"}, {999999999999999, "1e+15"}, {1e300, "1e+300"},
		{math.NaN(), unknown}, {math.Inf(-1), unknown},
	} {
		assert.Equal(t, c.expected, Number(c.x), "%v", c.x)
	}
}

func TestCount(t *testing.T) {
	for n, expected := range map[int]string{
		0: "0", 7: "7", 999: "999", 1000: "1,000", 4000: "4,000", 123456: "123,456", 1234567: "1,234,567", -1000: "-1,000", -999: "-999",
	} {
		assert.Equal(t, expected, Count(n))
	}
	assert.Equal(t, "1,000.5 people", People(1000.5))
	assert.Equal(t, "1 person", People(1))
}

func TestLevel(t *testing.T) {
	for level, expected := range map[float64]string{0.95: "95%", 0.999: "99.9%", 0.9: "90%", 0.07: "7%", 0.55: "55%"} {
		assert.Equal(t, expected, Level(level))
	}
}

func TestZ(t *testing.T) {
	for z, expected := range map[float64]string{1.826: "+1.83", -1.594: "-1.59", -0.001: "0.00", 12: "+12.00"} {
		assert.Equal(t, expected, Z(z))
	}
}

func TestBrief(t *testing.T) {
	for figure, expected := range map[string]string{
		Share(1e-9): "<0.0001%", Share(1 - 1e-9): ">99.9999%", Share(0.034): "3.4%", RatioNumber(2000): ">1,000", RatioNumber(1e-6): "<0.001",
	} {
		assert.Equal(t, expected, Brief(figure))
	}
}
