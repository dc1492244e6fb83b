// Package verdict holds a gap against a tolerance: verdict, trusted range,
// and how many more people would settle what is unsettled.
package verdict

import (
	"fmt"
	"math"
	"regexp"
	"strconv"
	"strings"
)

// Unit is what a limit is counted in.
type Unit int

// The units of a limit.
const (
	Points  Unit = iota // percentage points
	OfCount             // percent of the counted share
	Heads               // people, of the question's heads
)

// Limit is the largest miss on one side that one can live with.
type Limit struct {
	Size float64 // points, percent, or people
	Unit Unit
}

var limitForm = regexp.MustCompile(`^(\d+\.?\d*|\.\d+)\s*(pt|%\s*count|heads)$`)

// ParseLimit reads "1.5pt", "20%count" or "40heads". A bare "1%" is refused,
// because it could mean points or a part of the count.
func ParseLimit(text string) (Limit, error) {
	m := limitForm.FindStringSubmatch(strings.TrimSpace(text))
	if m == nil {
		if bare, ok := strings.CutSuffix(strings.TrimSpace(text), "%"); ok {
			return Limit{}, fmt.Errorf("the tolerance %.40q could mean two things; write %.20spt for percentage points or %.20s%%count for a part of the counted share", text, bare, bare)
		}
		return Limit{}, fmt.Errorf("the tolerance %.40q can't be read; write it as 1.5pt (percentage points), 20%%count (part of the counted share) or 40heads (people)", text)
	}
	size, err := strconv.ParseFloat(m[1], 64)
	if err != nil || math.IsInf(size, 0) {
		return Limit{}, fmt.Errorf("the tolerance %.40q can't be read; its number is too large", text)
	}
	unit := Points
	switch m[2][0] {
	case '%':
		unit = OfCount
	case 'h':
		unit = Heads
	}
	return Limit{Size: size, Unit: unit}, nil
}

// Points is the gap in percentage points at which the limit is reached, heads
// being the number of people that limits in heads are out of; false where
// that isn't known, and for a part of the count, which is no known gap.
func (l Limit) Points(heads *float64) (points float64, known bool) {
	switch {
	case l.Unit == Points:
		return l.Size, true
	case l.Unit == Heads && heads != nil && *heads > 0:
		return 100 * l.Size / *heads, true
	}
	return 0, false
}

// String writes the limit as ParseLimit reads it.
func (l Limit) String() string {
	return strconv.FormatFloat(l.Size, 'f', -1, 64) + [...]string{"pt", "%count", "heads"}[l.Unit]
}

// MarshalText writes the limit as String does.
func (l Limit) MarshalText() ([]byte, error) { return []byte(l.String()), nil }

// UnmarshalText reads the limit as ParseLimit does.
func (l *Limit) UnmarshalText(text []byte) (err error) {
	*l, err = ParseLimit(string(text))
	return err
}
