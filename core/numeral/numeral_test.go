package numeral_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"

	"tailgap/core/numeral"
)

func TestPlain(t *testing.T) {
	for x, printed := range map[float64]string{
		70: "70", 25.5: "25.5", -3: "-3", 0: "0", math.Copysign(0, -1): "0", 0.1 + 0.2: "0.3",
		1e15: "1e+15", 123456789: "123456789", 1e-7: "1e-07", math.Inf(1): numeral.Unknown, math.NaN(): numeral.Unknown,
	} {
		assert.Equal(t, printed, numeral.Plain(x))
	}
}

func TestCount(t *testing.T) {
	for n, printed := range map[int]string{0: "0", 999: "999", 1000: "1,000", -1234567: "-1,234,567"} {
		assert.Equal(t, printed, numeral.Count(n))
	}
	assert.Equal(t, "12,345.678", numeral.Thousands("12345.678"))
}
