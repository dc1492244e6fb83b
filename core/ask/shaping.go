package ask

import (
	"context"
	"fmt"

	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/sample"
	"tailgap/core/shape"
)

// shaping is the plan of what the shape of the scores does to the gaps.
func (w *work) shaping() shape.Plan {
	plan := shape.Plan{
		Table: w.table, Scale: w.scale, Everyone: w.question.Everyone, Level: w.question.Level,
		Replicates: w.question.shapeReplicates(), Seed: w.question.Seed, Workers: w.question.Workers,
	}
	for _, c := range w.question.Cutoffs {
		plan.Cutoffs = append(plan.Cutoffs, shape.Cutoff{
			Judged: gap.Ends(w.scale, c, w.halfStep), Half: gap.Ends(w.scale, c, true), Lower: c.Side.Lower(),
		})
	}
	return plan
}

// shapeReplicates are those that the intervals of the shape are made from,
// beside the question's own.
func (q Question) shapeReplicates() int { return min(shape.Replicates, q.Replicates) }

// find looks at the shape of the scores, and tests it.
func (w *work) find(ctx context.Context, tellRun, tellTest func(done, of int)) (err error) {
	if w.found, err = shape.Run(ctx, w.shaping(), tellRun); err == nil && !w.question.Everyone {
		w.tested, err = shape.Test(ctx, w.table, tellTest)
	}
	return err
}

// shape puts together what the shape of the scores does to the gaps at the
// cutoffs.
func (w *work) shape(cutoffs []Finding) *Shape {
	f := w.found.Features
	s := &Shape{
		Skewness: measured(w.found.Skewness), ExcessKurtosis: measured(w.found.ExcessKurtosis),
		Floor: w.pile(f.Floor), Ceiling: w.pile(f.Ceiling),
		Cutoffs: []ShapeAt{}, Replicates: w.found.Replicates,
	}
	if f.Heaps.Spacing > 0 {
		s.Heaps = &Heaps{Spacing: f.Heaps.Spacing, Share: f.Heaps.Share}
	}
	if f.Extremes > 0 {
		s.Extremes = &Extremes{People: f.Extremes, ShareOfSquares: f.ExtremeShare}
	}
	if f.Outlier {
		s.Farthest = &Farthest{Score: f.Farthest, Z: (f.Farthest - w.table.Moments.Mean) / w.table.Moments.SD}
	}
	for i, at := range cutoffs {
		from, to := w.places(at.Cutoff)
		s.Cutoffs = append(s.Cutoffs, ShapeAt{
			Cutoff: at.Cutoff, GapPoints: at.GapPoints, Effects: w.effects(i), Quantile: from, QuantileTo: to,
		})
	}
	s.Tests, s.Worm = w.tests(), w.worm()
	return s
}

func (w *work) effects(cutoff int) Effects {
	found := w.found.Cutoffs[cutoff]
	return Effects{
		MeanAndSD: effect(found[shape.MeanAndSD]), HalfStep: effect(found[shape.HalfStep]),
		Asymmetry: effect(found[shape.Asymmetry]), Rest: effect(found[shape.Rest]),
		Floor: effect(found[shape.Floor]), Ceiling: effect(found[shape.Ceiling]), Heaps: effect(found[shape.Heaps]),
		Extremes: effect(found[shape.Extremes]), Farthest: effect(found[shape.Farthest]),
	}
}

// places are where the cutoff's ends part the worm.
func (w *work) places(c cutoff.Cutoff) (from, to *float64) {
	var places [2]*float64
	for i, end := range gap.Ends(w.scale, c, false) {
		if place, ok := shape.Place(w.table, end); ok {
			places[i] = &place
		}
	}
	return places[0], places[1]
}

func (w *work) tests() Tests {
	var tests Tests
	if a := w.tested.AndersonDarling; a != nil {
		tests.AndersonDarling = &AndersonDarling{A2: a.A2, A2Star: a.A2Star, P: a.P}
	}
	if l := w.tested.Lilliefors; l != nil {
		tests.Lilliefors = &Lilliefors{D: l.D, P: l.P}
	}
	switch n := w.table.Counts.N; {
	case w.question.Everyone:
		tests.LeftOut = "these are all the people, and a test is about those who were not seen"
	case !w.table.Curve.Fitted:
		tests.LeftOut = "the tests are for a curve that is fitted to the scores"
	case n < shape.FewestForLilliefors:
		tests.LeftOut = fmt.Sprintf("the tests need at least %d people", shape.FewestForLilliefors)
	case n < shape.FewestForAndersonDarling:
		tests.LeftOut = fmt.Sprintf("the Anderson-Darling test needs at least %d people", shape.FewestForAndersonDarling)
	}
	return tests
}

func (w *work) worm() Worm {
	worm := shape.NewWorm(w.table, w.question.Level)
	out := Worm{Score: worm.Score, Quantile: worm.Quantile, Deviation: worm.Deviation, Limit: worm.Limit}
	if w.question.Everyone {
		out.Limit = nil
	}
	return out
}

func measured(v shape.Value) Measured {
	m := Measured{Value: v.Estimate}
	if v.Interval != nil {
		m.Low, m.High = &v.Interval.Low, &v.Interval.High
	}
	return m
}

func effect(v *shape.Value) *Effect {
	if v == nil {
		return nil
	}
	e := &Effect{Points: toPoints(v.Estimate)}
	if v.Interval != nil {
		e.Low, e.High = new(toPoints(v.Interval.Low)), new(toPoints(v.Interval.High))
	}
	return e
}

func (w *work) pile(p sample.Pile) *Pile {
	if p.People == 0 {
		return nil
	}
	return &Pile{Score: p.Score, People: p.People, Share: float64(p.People) / float64(w.table.Counts.N)}
}
