package ask

import (
	"fmt"
	"math"

	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/resample"
	"tailgap/core/sample"
	"tailgap/core/shape"
	"tailgap/core/verdict"
)

// work is one score column on its way to a Result: what is to be judged,
// each region once however many places of the answer show it.
type work struct {
	question  Question
	column    sample.Column
	table     gap.Table
	scale     sample.Scale
	tolerance verdict.Tolerance
	halfStep  bool // judge with the half-step: asked for, and there is a step
	plan      resample.Plan
	known     map[key]int
	sweeps    []sweepPlan
	judged    *resample.Judged // what the replicates came to; nil when everyone was counted
	found     shape.Findings
	tested    shape.Tests
}

// key tells regions apart; one-sided regions have no To.
type key struct {
	from, to gap.Threshold
	stretch  bool
}

// sweepPlan is one side's thresholds, their regions, and the group whose
// band they share.
type sweepPlan struct {
	side       cutoff.Side
	thinned    bool
	group      int
	thresholds []float64
	regions    []int
}

// newWork plans the judging of one column with this count table; it refuses a
// column that has no spread, a scale of too many steps, a cutoff at which no
// curve can be read and more replicates than there is memory for, and ends
// with the context of its steps.
func newWork(question Question, column sample.Column, counts sample.Counts, steps *steps) (*work, error) {
	steps.of = 4
	moments, err := describe(column.Name, counts)
	if err != nil {
		return nil, err
	}
	if err := steps.next(); err != nil {
		return nil, err
	}
	normal := curve.FitNormal(moments)
	if given := question.Curve; given != nil {
		normal = given.Normal()
	}
	heads := 0.0
	if question.Heads != nil {
		heads = *question.Heads
	}
	w := &work{
		question: question, column: column,
		table:     gap.NewTable(counts, moments, normal),
		scale:     sample.NewScale(counts, moments.SD, question.Step, question.Range),
		tolerance: verdict.NewTolerance(question.TooHigh, question.TooLow, heads),
		known:     map[key]int{},
	}
	if !w.countable() {
		return nil, fmt.Errorf("the steps of %v on the scale of %s are too many to count; check the step and the range", w.scale.Step, column.Name)
	}
	if err := steps.next(); err != nil {
		return nil, err
	}
	w.halfStep = question.HalfStep && w.scale.Step > 0
	w.planSweeps()
	if err := w.planCutoffs(); err != nil {
		return nil, err
	}
	if err := steps.next(); err != nil {
		return nil, err
	}
	w.plan.Table, w.plan.Estimates = w.table, w.table.Estimates(w.plan.Regions)
	w.plan.Weights, w.plan.BandsOnly = w.tolerance.Weights(), !normal.Fitted
	if normal.Known() { // its studentised gap is the same at every weight
		w.plan.Weights = []float64{1}
	}
	w.plan.Level, w.plan.Replicates = question.Level, question.Replicates
	w.plan.Seed, w.plan.Workers = question.Seed, question.Workers
	if err := w.affordable(); err != nil {
		return nil, err
	}
	return w, steps.next()
}

// affordable is an error where the replicates' largest gaps, which are kept
// for every region, would fill the memory. The fewer are out of the level,
// the fewer are kept.
func (w *work) affordable() error {
	const most = 1 << 28 // numbers, of eight bytes
	kept := math.Min(1, 4*(1-w.question.Level))
	places := float64(len(w.plan.Groups) * len(w.plan.Weights))
	if !w.plan.BandsOnly {
		places += float64(len(w.plan.Regions) * len(w.plan.Weights))
	}
	if w.question.Everyone || places*kept*float64(w.question.Replicates) <= most {
		return nil
	}
	return fmt.Errorf("%d replicates at a level of %v take too much memory for %s; ask for at most %.0f", w.question.Replicates, w.question.Level, w.column.Name, math.Floor(most/(places*kept)))
}

// countable is true where a float64 can number every step of the scale.
func (w *work) countable() bool {
	low, high := math.Min(w.scale.Low, w.table.Counts.Min()), math.Max(w.scale.High, w.table.Counts.Max())
	return w.scale.Step == 0 || (high-low)/w.scale.Step < 1<<53
}

// readable is true where the cutoff has a z that can be written.
func (w *work) readable(c cutoff.Cutoff, halfStep bool) bool {
	for _, end := range gap.Ends(w.scale, c, halfStep) {
		if !finite(w.table.Curve.Z(end.Point)) {
			return false
		}
	}
	return true
}

func shortened(c cutoff.Cutoff) string {
	text := c.String()
	if len(text) > 40 {
		return text[:40] + "…"
	}
	return text
}

// region is the index of the cutoff's region, planned if it is new.
func (w *work) region(c cutoff.Cutoff, halfStep bool) int {
	return w.add(gap.Ends(w.scale, c, halfStep))
}

func (w *work) add(ends []gap.Threshold) int {
	k := key{from: ends[0]}
	if len(ends) == 2 {
		k.to, k.stretch = ends[1], true
	}
	index, planned := w.known[k]
	if !planned {
		index = len(w.plan.Regions)
		w.known[k] = index
		w.plan.Regions = append(w.plan.Regions, w.table.Region(ends))
	}
	return index
}

// planCutoffs plans the regions of the cutoffs, in both readings.
func (w *work) planCutoffs() error {
	for _, c := range w.question.Cutoffs {
		for _, halfStep := range []bool{false, true} {
			if halfStep && w.scale.Step == 0 {
				continue
			}
			if !w.readable(c, halfStep) {
				return fmt.Errorf("the cutoff %s is too many SDs from the curve's mean to compute with; check it, the curve and the step", shortened(c))
			}
			w.region(c, halfStep)
		}
	}
	return nil
}

// planSweeps plans a sweep for each side in use. Sides that part the people
// at the same places share their replicates: a lower tail is the complement
// of an upper one.
func (w *work) planSweeps() {
	grid, thinned := gap.Grid(w.table.Counts, w.scale, thresholdsOf(w.question.Cutoffs))
	planned := map[bool]sweepPlan{}
	for _, side := range sidesOf(w.question.Cutoffs) {
		strict := side.Strict() && w.scale.Step > 0 // without a step both kinds share one grid
		sweep, known := planned[strict]
		if !known {
			sweep = w.planGroup(grid, strict)
			planned[strict] = sweep
		}
		sweep.side, sweep.thinned = side, thinned
		w.sweeps = append(w.sweeps, sweep)
	}
}

// planGroup plans the regions of one band: the grid, which sweeps show, and
// what lies past it.
func (w *work) planGroup(grid []float64, strict bool) sweepPlan {
	sweep := sweepPlan{group: len(w.plan.Groups)}
	from := len(w.plan.Regions)
	w.planThresholds(gap.Beyond(grid, w.scale.Step), strict)
	for _, at := range grid {
		for _, region := range w.planThresholds([]float64{at}, strict) {
			sweep.thresholds = append(sweep.thresholds, at)
			sweep.regions = append(sweep.regions, region)
		}
	}
	w.plan.Groups = append(w.plan.Groups, [2]int{from, len(w.plan.Regions)})
	return sweep
}

// planThresholds plans the region of each threshold; without a step two, at
// the score and just past it.
func (w *work) planThresholds(thresholds []float64, strict bool) (regions []int) {
	for _, at := range thresholds {
		regions = append(regions, w.add([]gap.Threshold{gap.Split(w.scale, at, strict, w.halfStep)}))
		if w.scale.Step == 0 {
			regions = append(regions, w.add([]gap.Threshold{gap.Split(w.scale, at, true, false)}))
		}
	}
	return regions
}

// sidesOf are the sides in use, in the order of the cutoffs; a stretch alone,
// or no cutoff at all, is swept as "at or above".
func sidesOf(cutoffs []cutoff.Cutoff) []cutoff.Side {
	var sides []cutoff.Side
	used := map[cutoff.Side]bool{cutoff.Stretch: true}
	for _, c := range cutoffs {
		if !used[c.Side] {
			used[c.Side] = true
			sides = append(sides, c.Side)
		}
	}
	if sides == nil {
		sides = []cutoff.Side{cutoff.AtLeast}
	}
	return sides
}

func thresholdsOf(cutoffs []cutoff.Cutoff) []float64 {
	var at []float64
	for _, c := range cutoffs {
		at = append(at, c.At)
		if c.Side == cutoff.Stretch {
			at = append(at, c.To)
		}
	}
	return at
}
