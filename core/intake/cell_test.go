package intake

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"
)

func TestReadCell(t *testing.T) {
	const (
		no    = unreadable
		empty = blank
		open  = ambiguous
	)
	type want struct {
		x float64
		k kind
	}
	one := func(x float64) [3]want { return [3]want{{x, usable}, {x, usable}, {x, usable}} }
	all := func(k kind) [3]want { return [3]want{{0, k}, {0, k}, {0, k}} }
	tests := map[string][3]want{ // under commaAmbiguous, commaDecimal, commaUnlessThousands
		"0": one(0), "12": one(12), "-12": one(-12), "+12": one(12), "−12": one(-12), "007": one(7),
		"-0": one(0), "-0.0": one(0), "-0e5": one(0), "0.5": one(.5), ".5": one(.5), "-.5": one(-.5), "5.": one(5),
		" 12 ": one(12), "\t12": one(12), "\u00a012\u202f": one(12), "\ufeff12\u200b": one(12), "\xa012": one(12),
		"1e3": one(1000), "1E-2": one(.01), "2.5e+1": one(25), "1e-999": one(0),
		"0.1": one(.1), "123456789012.345": one(123456789012.345), "999999999999999": one(999999999999999),
		"9007199254740993": one(9007199254740992), "1.7976931348623157e308": one(math.MaxFloat64), "3.141592653589793238": one(math.Pi),

		"": all(empty), " ": all(empty), ".": all(empty), "NA": all(empty), "na": all(empty), "N/A": all(empty), "nan": all(empty), "Null": all(empty),

		"inf": all(infinite), "-Inf": all(infinite), "+Infinity": all(infinite), "∞": all(infinite), "−∞": all(infinite), "1e999": all(infinite), "-1e999": all(infinite),

		"x": all(no), "-": all(no), "+": all(no), "e5": all(no), "1e": all(no), "1 2": all(no), "1.5.2": all(no), "..": all(no), "-.": all(no), "--1": all(no),
		"0x1p4": all(no), "0b1": all(no), "1_000": all(no), "1'000": all(no), "12%": all(no), "5-6": all(no), "infinite": all(no), "nano": all(no), "٣": all(no), "1−": all(no),
		"1,234.5": all(no), "1.234,5": all(no), "1,234,567": all(no), ",": all(no), "a,5": all(no), "3,x": all(no),

		"3,5":      {{0, open}, {3.5, usable}, {3.5, usable}},
		"3,50":     {{0, open}, {3.5, usable}, {3.5, usable}},
		"-3,5":     {{0, open}, {-3.5, usable}, {-3.5, usable}},
		"−3,5 ":    {{0, open}, {-3.5, usable}, {-3.5, usable}},
		"1,234":    {{0, open}, {1.234, usable}, {0, open}},
		"-123,456": {{0, open}, {-123.456, usable}, {0, open}},
		"0,125":    {{0, open}, {.125, usable}, {0, open}},
		"1234,567": {{0, open}, {1234.567, usable}, {1234.567, usable}},
		"1,2345":   {{0, open}, {1.2345, usable}, {1.2345, usable}},
		",5":       {{0, open}, {.5, usable}, {.5, usable}},
		",500":     {{0, open}, {.5, usable}, {.5, usable}},
		"3,5e2":    {{0, open}, {350, usable}, {350, usable}},
	}
	for cell, wants := range tests {
		for rule, want := range wants {
			x, k, _ := (&cellReader{comma: commaRule(rule)}).read(cell)
			assert.Equal(t, want.k, k, "kind of %q under rule %d", cell, rule)
			if want.k == usable {
				assert.Equal(t, want.x, x, "value of %q under rule %d", cell, rule)
				assert.False(t, x == 0 && math.Signbit(x), "%q is no negative nought", cell)
			}
		}
	}
}

func TestReadCellWithCodes(t *testing.T) {
	reader := newCellReader(';', []string{" -9 ", "99", "1,5", "n.a.", "9.90e1", "1e999"})
	for cell, want := range map[string]string{
		"-9": "coded -9", "−9": "coded -9", "-9.00": "coded -9", "-9,0": "coded -9", "-90e-1": "coded -9",
		"99": "coded 99", "+99": "coded 99", "9.90e1": "coded 9.90e1", "1,5": "coded 1,5", "1.50": "coded 1,5", "1e999": "coded 1e999", "n.a.": "coded n.a.", "N.A.": "unreadable", "": "blank",
	} {
		if _, k, _ := reader.read(cell); assert.NotEqual(t, usable, k, cell) {
			assert.Equal(t, want, reader.reason(k), cell)
		}
	}
	_, k, _ := reader.read("9")
	assert.Equal(t, usable, k)
}

// The short way of reading a number must agree with strconv in every bit.
func TestParsePlainIsExact(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := rapid.StringMatching(`-?[0-9]{0,9}\.?[0-9]{0,9}`).Draw(t, "number")
		x, mark, ok := (&cellReader{}).parsePlain(text)
		want, err := strconv.ParseFloat(text, 64)
		switch digits := strings.TrimLeft(text, "-"); {
		case ok:
			assert.NoError(t, err)
			assert.Equal(t, want+0, x)
			assert.Equal(t, strings.Contains(text, "."), mark == '.')
		case err == nil:
			assert.Greater(t, len(digits), 15, "only long numbers go the long way")
		}
	})
}

func TestDetectDelimiter(t *testing.T) {
	cut := strings.Repeat("id;score, raw\n1;3,5\n", 3) + "1,2,3,4"
	for _, test := range []struct {
		head  string
		whole bool
		want  rune
	}{
		{"a,b\n1,2\n", true, ','},
		{"a;b\n1;2\n", true, ';'},
		{"a\tb\n1\t2\n", true, '\t'},
		{"a\n1\n2\n", true, noDelimiter},
		{"", true, noDelimiter},
		{"\n \n", true, noDelimiter},
		{"a,b", true, ','},
		{"a,b", false, ','},
		{"1,5;2,5;3,5\n2,5;3,5;4,5\n", true, ';'},
		{"a;b;c\n1,5;2,5;3,5\n", true, ';'},
		{"a,b,c\n1,x;y,3\n2,z,4\n", true, ','},
		{"a\tb, c; d\n1\t2,3;4\n", true, '\t'},
		{"\"a;b\",c\n\"d;e\",f\n", true, ','},
		{"\"a\"\";b\",c\n\"d;\"\"\"\"e\",f\n", true, ','},
		{"\"a;\nb;\",c\n1,2\n", true, ','},
		{"a,b\n5\" x;y,2\n1;2,3\n", true, ','},
		{"a, \"x;y\"\n1, \"2;3\"\n", true, ','},
		{"a,b\n1,2,3\n4,5,6\n", true, ','},
		{"a;b\n1;\"2,3\n4;5", true, ';'},
		{cut, false, ';'},
	} {
		got, err := detectDelimiter([]byte(test.head), test.whole)
		assert.NoError(t, err, "%q", test.head)
		assert.Equal(t, string(test.want), string(got), "%q", test.head)
	}
}
