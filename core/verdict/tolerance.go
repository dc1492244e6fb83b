package verdict

import "math"

// Edge is one edge of a tolerance: the curve's share minus Weight times the
// counted share is held against At (proportions). Weight 1 is a tolerance in
// points; a tolerance τ in percent of the count is no known number, so
// curve share - (1±τ)·counted share is held against 0 instead.
type Edge struct {
	Weight float64
	At     float64
	Moves  bool // with the counted share: a part of it, be it 0%
}

// Tolerance has the edges that were asked for; nil: no limit on that side.
type Tolerance struct {
	High, Low *Edge
}

// NewTolerance turns limits into edges. heads is the number of people that
// limits in heads are out of. A count can't be missed by more than all of it,
// so "too low" by 100% of the count or more is no limit.
func NewTolerance(tooHigh, tooLow *Limit, heads float64) Tolerance {
	tolerance := Tolerance{High: tooHigh.edge(+1, heads), Low: tooLow.edge(-1, heads)}
	if tolerance.Low != nil && tolerance.Low.Weight <= 0 {
		tolerance.Low = nil
	}
	return tolerance
}

func (l *Limit) edge(sign, heads float64) *Edge {
	switch {
	case l == nil:
		return nil
	case l.Unit == OfCount:
		return &Edge{Weight: 1 + sign*l.Size/100, Moves: true}
	case l.Unit == Heads:
		return &Edge{Weight: 1, At: sign * l.Size / heads}
	}
	return &Edge{Weight: 1, At: sign * l.Size / 100}
}

// None is true when there is nothing to judge.
func (t Tolerance) None() bool { return t.High == nil && t.Low == nil }

// OfCount is true when an edge moves with the counted share.
func (t Tolerance) OfCount() bool {
	return (t.High != nil && t.High.Moves) || (t.Low != nil && t.Low.Moves)
}

// InPoints is the tolerance without the edges that move with the counted share.
func (t Tolerance) InPoints() Tolerance {
	if t.High != nil && t.High.Moves {
		t.High = nil
	}
	if t.Low != nil && t.Low.Moves {
		t.Low = nil
	}
	return t
}

// Weights are the weights whose limits a verdict needs, 1 first.
func (t Tolerance) Weights() []float64 {
	weights := []float64{1}
	for _, edge := range []*Edge{t.High, t.Low} {
		if edge != nil && edge.Weight != 1 {
			weights = append(weights, edge.Weight)
		}
	}
	return weights
}

// Trivial is true where a gap could not leave the tolerance, so small are the
// shares: a gap is never above the curve's share nor below minus the counted
// share, and the same holds for the shares on the other side of the
// threshold. Only a tolerance in points or heads can hold trivially.
func (t Tolerance) Trivial(curveShare, countedShare float64) bool {
	if t.None() || t.OfCount() {
		return false
	}
	high, low := math.Inf(1), math.Inf(-1)
	if t.High != nil {
		high = t.High.At
	}
	if t.Low != nil {
		low = t.Low.At
	}
	beyond := curveShare <= high && countedShare <= -low
	short := 1-countedShare <= high && 1-curveShare <= -low
	return beyond || short
}
