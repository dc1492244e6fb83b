// Package cutoff is a threshold with its side: reading it, writing it, and
// where a curve is read for it with and without the half-step.
package cutoff

import (
	"fmt"
	"math"
	"regexp"
	"strconv"
	"strings"
)

// Side says which people a cutoff asks about.
type Side int

// The sides. Stretch has two ends, both in.
const (
	AtLeast Side = iota // >=
	Above               // >
	AtMost              // <=
	Below               // <
	Stretch             // a..b
)

var signs = [...]string{">=", ">", "<=", "<", ".."}

// String is the side's sign: ">=", ">", "<=", "<" or "..".
func (s Side) String() string { return signs[s] }

// MarshalText writes the side's sign.
func (s Side) MarshalText() ([]byte, error) { return []byte(s.String()), nil }

// UnmarshalText reads a side's sign; anything else is an error.
func (s *Side) UnmarshalText(text []byte) error {
	for i, sign := range signs {
		if sign == string(text) {
			*s = Side(i)
			return nil
		}
	}
	return fmt.Errorf("%q is not a side; a side is >=, >, <=, < or .. (a stretch)", text)
}

// Lower is true for the sides that ask about low scores.
func (s Side) Lower() bool { return s == AtMost || s == Below }

// Strict is true where a score equal to the threshold counts as short of it
// when the people are split into "below" and "at or beyond" from the lower
// end: > and <= split just above the threshold, >= and < just below it.
func (s Side) Strict() bool { return s == Above || s == AtMost }

// Cutoff is one threshold with its side; To is the upper end of a stretch
// and unused otherwise.
type Cutoff struct {
	Side Side
	At   float64
	To   float64
}

const (
	exponent = `(?:[eE][-+]?\d+)?`
	number   = `[-+]?(?:\d+(?:\.\d+)?|\.\d+)` + exponent
	// endpoint has digits before its point, so that 20...30 is no number.
	endpoint = `[-+]?\d+(?:\.\d+)?` + exponent
)

var (
	oneSided = regexp.MustCompile(`^(>=|≥|>|<=|≤|<)\s*(` + number + `)$`)
	twoEnded = regexp.MustCompile(`^(` + endpoint + `)\s*\.\.\s*(` + endpoint + `)$`)
	plain    = strings.NewReplacer("−", "-", "\u00a0", " ", "\u202f", " ")
)

// Parse reads ">=50", ">50", "<=20", "<20" or "20..30" (both ends in), with
// spaces, ≥ and ≤, decimals with a point and negative numbers. The error
// quotes what could not be read and says how a cutoff is written.
func Parse(text string) (Cutoff, error) {
	clean := strings.TrimSpace(plain.Replace(text))
	if m := oneSided.FindStringSubmatch(clean); m != nil {
		at, err := strconv.ParseFloat(m[2], 64)
		if err != nil {
			return Cutoff{}, unreadable(text)
		}
		side := map[string]Side{">=": AtLeast, "≥": AtLeast, ">": Above, "<=": AtMost, "≤": AtMost, "<": Below}[m[1]]
		return Cutoff{Side: side, At: at + 0}, nil
	}
	if m := twoEnded.FindStringSubmatch(clean); m != nil {
		from, errFrom := strconv.ParseFloat(m[1], 64)
		to, errTo := strconv.ParseFloat(m[2], 64)
		if errFrom != nil || errTo != nil {
			return Cutoff{}, unreadable(text)
		}
		if from > to {
			return Cutoff{}, fmt.Errorf("the stretch %q ends before it starts; write the lower end first", quote(text))
		}
		return Cutoff{Side: Stretch, At: from + 0, To: to + 0}, nil
	}
	return Cutoff{}, unreadable(text)
}

func unreadable(text string) error {
	return fmt.Errorf("the cutoff %q can't be read; write it as >=50, >50, <=20, <20 or 20..30, decimals with a point", quote(text))
}

// quote shortens what a message repeats.
func quote(text string) string {
	if runes := []rune(text); len(runes) > 40 {
		return string(runes[:40]) + "…"
	}
	return text
}

// String writes the cutoff as Parse reads it, in its plainest form.
func (c Cutoff) String() string {
	if c.Side == Stretch {
		return format(c.At) + ".." + format(c.To)
	}
	return c.Side.String() + format(c.At)
}

// Words is the cutoff in a sentence: "at 50 or above", "above 50", "at 20 or
// below", "below 20", "from 20 to 30".
func (c Cutoff) Words() string {
	switch c.Side {
	case AtLeast:
		return "at " + format(c.At) + " or above"
	case Above:
		return "above " + format(c.At)
	case AtMost:
		return "at " + format(c.At) + " or below"
	case Below:
		return "below " + format(c.At)
	}
	return "from " + format(c.At) + " to " + format(c.To)
}

// MarshalText writes the cutoff as String does.
func (c Cutoff) MarshalText() ([]byte, error) { return []byte(c.String()), nil }

// UnmarshalText reads a cutoff as Parse does.
func (c *Cutoff) UnmarshalText(text []byte) (err error) {
	*c, err = Parse(string(text))
	return err
}

// format writes a number so that it is read back as the same, without
// hundreds of zeros.
func format(x float64) string {
	if size := math.Abs(x); size != 0 && (size >= 1e15 || size < 1e-6) {
		return strconv.FormatFloat(x, 'g', -1, 64)
	}
	return strconv.FormatFloat(x, 'f', -1, 64)
}
