package sample

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

// StepChoice says on which step the scores stand: detected (the zero value),
// none, or stated.
type StepChoice struct {
	None bool
	Size float64 // 0: detect
}

// ParseStep reads "auto", "none" or a positive number.
func ParseStep(text string) (StepChoice, error) {
	switch t := strings.TrimSpace(text); t {
	case "auto":
		return StepChoice{}, nil
	case "none":
		return StepChoice{None: true}, nil
	default:
		size, err := strconv.ParseFloat(t, 64)
		if err != nil || !(size > 0) || math.IsInf(size, 0) {
			return StepChoice{}, fmt.Errorf("the step %.40q can't be read; write auto, none or a number above zero", text)
		}
		return StepChoice{Size: size}, nil
	}
}

// String writes the choice as ParseStep reads it.
func (s StepChoice) String() string {
	switch {
	case s.None:
		return "none"
	case s.Size == 0:
		return "auto"
	}
	return strconv.FormatFloat(s.Size, 'f', -1, 64)
}

// MarshalText writes the choice as String does.
func (s StepChoice) MarshalText() ([]byte, error) { return []byte(s.String()), nil }

// UnmarshalText reads the choice as ParseStep does.
func (s *StepChoice) UnmarshalText(text []byte) (err error) {
	*s, err = ParseStep(string(text))
	return err
}

// Range is the two ends of a scale, both in.
type Range struct {
	Low, High float64
}

// ParseRange reads "0:83".
func ParseRange(text string) (Range, error) {
	low, high, found := strings.Cut(text, ":")
	l, errLow := strconv.ParseFloat(strings.TrimSpace(low), 64)
	h, errHigh := strconv.ParseFloat(strings.TrimSpace(high), 64)
	if !found || errLow != nil || errHigh != nil || math.IsInf(h-l, 0) || math.IsNaN(h-l) {
		return Range{}, fmt.Errorf("the range %.40q can't be read; write it as 0:83", text)
	}
	if l >= h {
		return Range{}, fmt.Errorf("the range %.40q ends before it starts; write the lower end first, as in 0:83", text)
	}
	return Range{Low: l, High: h}, nil
}

// String writes the range as ParseRange reads it.
func (r Range) String() string {
	return strconv.FormatFloat(r.Low, 'f', -1, 64) + ":" + strconv.FormatFloat(r.High, 'f', -1, 64)
}

// MarshalText writes the range as String does.
func (r Range) MarshalText() ([]byte, error) { return []byte(r.String()), nil }

// UnmarshalText reads the range as ParseRange does.
func (r *Range) UnmarshalText(text []byte) (err error) {
	*r, err = ParseRange(string(text))
	return err
}
