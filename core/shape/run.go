package shape

import (
	"context"
	"math"
	"runtime"

	"tailgap/core/resample"
)

// Run finds the features of the plan's sample and splits the gap at each
// cutoff. It returns the context's error soon after the context ends, having
// stopped all its goroutines. progress, which may be nil, is called from the
// calling goroutine with how much of the work is done.
func Run(ctx context.Context, plan Plan, progress func(done, of int)) (Findings, error) {
	work := preparation{ctx: ctx, progress: progress, of: mostPreparing + plan.Replicates}
	features := Find(plan.Table, plan.Scale)
	fitted := plan.fitted()
	work.step()
	scores := newSpans(fitted, plan.Scale.Step)
	work.step()
	whole := newEvaluator(&plan, scores, features)
	whole.pause = work.step
	work.step()
	count := make([]int32, len(plan.Table.Counts.Count))
	for i, people := range plan.Table.Counts.Count {
		count[i] = int32(people)
	}
	estimates := values{cutoffs: make([]parts, len(plan.Cutoffs))}
	whole.evaluate(&plan, count, &estimates)
	if ctx.Err() != nil {
		return Findings{}, ctx.Err()
	}
	if plan.Everyone {
		work.tell(work.of)
		return assemble(&plan, features, &estimates, nil, scores.bins), nil
	}
	if len(count) > mostEntries {
		scores = scores.binned(whole.edges())
		work.step()
	}
	features.Outlier = false // one score has no interval
	replicates, err := draw(ctx, &plan, func() *evaluator { return newEvaluator(&plan, scores, features) },
		func(done int) { work.tell(mostPreparing + done) })
	if err != nil {
		return Findings{}, err
	}
	return assemble(&plan, whole.features, &estimates, replicates, scores.bins), nil
}

// mostPreparing is more steps than are taken before the first replicate; in
// progress each counts as one.
const mostPreparing = 16

// preparation is the work before the replicates. Of many distinct scores each
// step takes some milliseconds.
type preparation struct {
	ctx      context.Context
	progress func(done, of int)
	done, of int
}

// step comes after each step; false when the context has ended.
func (p *preparation) step() bool {
	p.tell(p.done + 1)
	return p.ctx.Err() == nil
}

func (p *preparation) tell(done int) {
	if p.done = done; p.progress != nil && p.ctx.Err() == nil {
		p.progress(done, p.of)
	}
}

// edges are the entries at which something begins that is counted.
func (e *evaluator) edges() []int {
	var at []int
	for _, r := range e.regions {
		at = append(at, r.judged.From, r.judged.To)
	}
	counts := e.table.Counts
	for _, pile := range []float64{e.features.Floor.Score, e.features.Ceiling.Score} {
		at = append(at, counts.IndexAtLeast(pile), counts.IndexAbove(pile))
	}
	return at
}

// blockSize is how many replicates share one stream of random numbers.
const blockSize = 16

// ownStream keeps the numbers drawn here apart from those of the intervals of
// the gaps, which have the same seed.
const ownStream = 0x5368617065 // any number but 0

// draw evaluates the replicates. Those without a spread are left out.
func draw(ctx context.Context, plan *Plan, newEvaluator func() *evaluator, progress func(done int)) ([]values, error) {
	workers := plan.Workers
	if workers <= 0 {
		workers = runtime.GOMAXPROCS(0)
	}
	blocks := (plan.Replicates + blockSize - 1) / blockSize
	d := &draws{plan: plan, all: make([]values, plan.Replicates), spread: make([]bool, plan.Replicates)}
	var all []resample.Worker
	for range min(workers, blocks) {
		e := newEvaluator()
		if all == nil {
			d.drawer = resample.NewDrawer(e.table.Counts)
		}
		all = append(all, d.worker(e))
	}
	resample.InBlocks(ctx, blocks, all, progress)
	kept := d.all[:0]
	for i, v := range d.all {
		if d.spread[i] {
			kept = append(kept, v)
		}
	}
	return kept, ctx.Err()
}

// draws are the replicates in the making. Each has its place, so that it
// doesn't matter which worker makes it.
type draws struct {
	plan   *Plan
	drawer resample.Drawer
	all    []values
	spread []bool // those that have a spread
}

// worker makes blocks of replicates.
func (d *draws) worker(e *evaluator) resample.Worker {
	var stream resample.Stream
	count := make([]int32, len(e.table.U))
	return func(ctx context.Context, block int, tell func(done int)) {
		from, to := block*blockSize, min((block+1)*blockSize, len(d.all))
		stream.Restart(d.plan.Seed^ownStream, block)
		cutoffs := len(d.plan.Cutoffs)
		room := make([]parts, (to-from)*cutoffs)
		for i := from; i < to; i++ {
			if ctx.Err() != nil {
				return
			}
			d.drawer.Draw(&stream, count)
			d.all[i].cutoffs, room = room[:cutoffs:cutoffs], room[cutoffs:]
			d.spread[i] = e.evaluate(d.plan, count, &d.all[i])
		}
		tell(to - from)
	}
}

// usable is the share of the replicates that must have a value for it to get
// an interval.
const usable = 0.9

func (p *Plan) enough(n int) bool { return float64(n) >= math.Max(2, usable*float64(p.Replicates)) }
