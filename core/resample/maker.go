package resample

import (
	"context"
	"errors"
	"fmt"
)

// Maker makes replicates of a plan, a range of blocks at a time in any order,
// and keeps of all of them together no more than it would of one range.
type Maker struct {
	plan   Plan
	study  *study
	made   blocks
	broken bool // a range was not finished
}

// NewMaker has made nothing yet.
func NewMaker(plan Plan) *Maker {
	return &Maker{plan: plan, study: newStudy(plan, newCells(&plan))}
}

// Memory is about how many bytes a maker of the plan comes to take: what it
// keeps, and half as much again in the part and in the part's bytes, each with
// the room that collecting garbage leaves.
func (p Plan) Memory() int { return 3 * 8 * 2 * upperRank(p.Replicates, p.Level) * p.places() }

// Make draws the replicates of the blocks from (in) to (out). progress, which
// may be nil, takes how many of these replicates are done. It returns an error
// for blocks that the plan doesn't have, and the context's when it ends first;
// then no part can be had any more.
func (m *Maker) Make(ctx context.Context, from, to int, progress func(done int)) error {
	if from < 0 || to < from || to > m.plan.Blocks() {
		return fmt.Errorf("there are no blocks %d to %d of %d", from, to, m.plan.Blocks())
	}
	done := 0
	tell := func(more int) {
		if done += more; progress != nil {
			progress(done)
		}
	}
	for block := from; block < to; block++ {
		if !m.study.block(ctx, block, m.plan.replicates(blocks{{block, block + 1}}), tell) {
			m.broken = true
			return ctx.Err()
		}
	}
	m.made = append(m.made, [2]int{from, to})
	return nil
}

// Part is what Merge needs of everything made so far.
func (m *Maker) Part() (Part, error) {
	if m.broken {
		return Part{}, errors.New("these replicates were not finished")
	}
	part, err := newPart(m.plan, m.made.joined(), []*study{m.study})
	part.plan = m.plan.fingerprint()
	return part, err
}
