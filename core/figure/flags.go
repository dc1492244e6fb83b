package figure

import (
	"math"
	"strings"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
)

// flag is the label of a cutoff: it flies from the top of the cutoff's pole,
// to the side of the people the cutoff asks about where there is room.
type flag struct {
	index   int // among the result's cutoffs
	cutoff  cutoff.Cutoff
	verdict string // empty: none, or it is told elsewhere
	aside   bool   // the cutoff asks about another side than the sweep
	name    string // what the cutoff is called on the flag
	word    string // the verdict in a word, where there is room
	pole    float64
	left    float64
	width   float64
	turned  float64 // where its left end would be if it flew to the other side; NaN: no room
	row     int     // from the bottom
}

const (
	flagHeight = 21.0
	flagRow    = flagHeight + 4
	markWidth  = 20.0 // of the field with the verdict's mark
	flagGap    = 5.0  // between two flags of one row
	mostRounds = 40   // of raising flags
)

func (f *flag) right() float64 { return f.left + f.width }

// ends are a cutoff's thresholds: one, or the two of a stretch.
func ends(c cutoff.Cutoff) []float64 {
	if c.Side == cutoff.Stretch {
		return []float64{c.At, c.To}
	}
	return []float64{c.At}
}

// flags names and places the cutoffs. Names are said in words and verdicts
// with them, unless that takes too many rows.
func flags(r ask.Result, side cutoff.Side, f Frame, size float64) (laid []flag, rows int) {
	return lay(len(r.Cutoffs), func(i, style int) flag { return newFlag(i, r.Cutoffs[i], side, f, size, style) })
}

// lay stacks n flags in the longest of three styles that takes two rows.
func lay(n int, named func(index, style int) flag) (laid []flag, rows int) {
	for style := range 3 {
		laid = laid[:0]
		for i := range n {
			laid = append(laid, named(i, style))
		}
		rows = stack(laid)
		if rows <= 2 {
			break
		}
	}
	return laid, rows
}

// newFlag words a flag in one of three lengths: "30 or above: fails",
// "≥ 30: fails" and "≥ 30" beside its mark.
func newFlag(index int, finding ask.Finding, side cutoff.Side, f Frame, size float64, style int) flag {
	c := finding.Cutoff
	pole, out := f.pin(c.At)
	if c.Side == cutoff.Stretch && out < 0 {
		if pole, out = f.pin(c.To); out > 0 { // the whole frame lies inside the stretch
			pole, out = f.Left, 0
		}
	}
	return flagAt(index, finding, c.Side != side && c.Side != cutoff.Stretch, pole, out, f, size, style)
}

// flagAt words a flag whose pole stands at so many px; out says on which side
// of the frame the cutoff lies outside.
func flagAt(index int, finding ask.Finding, aside bool, pole float64, out int, f Frame, size float64, style int) flag {
	c := finding.Cutoff
	l := flag{index: index, cutoff: c, aside: aside}
	if !l.aside {
		l.verdict = verdictOf(finding)
	}
	if style == 0 && size == textWide {
		l.name = strings.TrimPrefix(strings.TrimPrefix(c.Words(), "at "), "from ")
	} else {
		l.name = strings.NewReplacer(">=", "≥ ", "<=", "≤ ", ">", "> ", "<", "< ", "..", "–").Replace(c.String())
	}
	l.name = shorten(l.name, size*bolder, (f.Right-f.Left)/2)
	switch out {
	case -1:
		l.name = "← " + l.name
	case 1:
		l.name += " →"
	}
	l.width = textWidth(l.name, size*bolder) + 12
	if l.verdict != "" {
		l.width += markWidth
		if style < 2 {
			l.word = l.verdict
			l.width += textWidth(" "+l.word, size)
		}
	}
	l.pole = pole
	l.fly(f)
	return l
}

// fly chooses the side to which the flag flies.
func (l *flag) fly(f Frame) {
	leftward, rightward := l.pole-l.width, l.pole
	most := f.Right + rightSmall - 2 - l.width // the farthest right its left end may be
	l.turned = math.NaN()
	switch fitsLeft, fitsRight := leftward >= 2, rightward <= most; {
	case fitsLeft && fitsRight && l.cutoff.Side.Lower():
		l.left, l.turned = leftward, rightward
	case fitsLeft && fitsRight:
		l.left, l.turned = rightward, leftward
	case fitsLeft:
		l.left = leftward
	case fitsRight:
		l.left = rightward
	default:
		l.left = max(2, min(rightward, most))
	}
}

// turn makes flags that cover each other's poles fly apart or to one side,
// where one of them has room to do so.
func turn(laid []flag) {
	for i := range laid {
		for j := range laid {
			a, b := &laid[i], &laid[j]
			if i != j && !math.IsNaN(a.turned) && a.covers(b.pole) && b.covers(a.pole) {
				a.left, a.turned = a.turned, a.left
			}
		}
	}
}

// stack gives each flag a row so that no two overlap and, where it can, no
// pole passes behind another's flag; it returns how many rows there are.
func stack(laid []flag) int {
	turn(laid)
	rows := 0
	// A flag goes above all flags whose poles it covers. Each round raises it
	// by a row at least, so a chain of flags takes as many rounds as it is
	// long; among very many flags there are rings, which would never end.
	for range min(len(laid), mostRounds) {
		raised := false
		for i := range laid {
			for j := range laid {
				if i != j && mustRise(laid, i, j) {
					laid[i].row++
					raised = true
				}
			}
		}
		if !raised {
			break
		}
	}
	for i := range laid {
		for free := false; !free; {
			free = true
			for j := range laid[:i] {
				if laid[i].row == laid[j].row && laid[i].touches(&laid[j]) {
					laid[i].row++
					free = false
				}
			}
		}
		rows = max(rows, laid[i].row+1)
	}
	return rows
}

func (l *flag) touches(other *flag) bool {
	return l.left < other.right()+flagGap && other.left < l.right()+flagGap
}

func (l *flag) covers(pole float64) bool { return l.left < pole && pole < l.right() }

// mustRise tells whether flag i has to go above flag j.
func mustRise(laid []flag, i, j int) bool {
	a, b := &laid[i], &laid[j]
	if a.row > b.row || !a.touches(b) {
		return false
	}
	switch over, under := a.covers(b.pole), b.covers(a.pole); {
	case over && under: // each covers the other's pole: one has to give way
		return i > j && a.row == b.row
	case over:
		return true
	case under:
		return false
	}
	return i > j && a.row == b.row
}
