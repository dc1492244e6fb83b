package ask

import (
	"context"
	"fmt"

	"tailgap/core/resample"
	"tailgap/core/sample"
)

// Runner has the replicates of one score column (its index in the sample)
// made in parts, by Part, in several processes or wherever there is room. The
// parts must have each of the blocks 0 to blocks (out) once, in any split.
// progress, which may be called from the same goroutine only, takes the number
// of replicates that all parts have done.
type Runner func(ctx context.Context, column, blocks int, progress func(done int)) (parts [][]byte, err error)

// Part makes the replicates of one score column in the blocks from (in) to
// (out), for a Runner of JudgeWith: question and scores must be the same as
// there. It returns Judge's errors, and one for blocks and columns that there
// are not.
func Part(ctx context.Context, question Question, scores sample.Sample, column, from, to int, progress func(done int)) ([]byte, error) {
	question = question.filled()
	if err := question.Check(); err != nil {
		return nil, err
	}
	if column < 0 || column >= len(scores.Columns) {
		return nil, fmt.Errorf("there is no score %d among %d", column+1, len(scores.Columns))
	}
	w, err := newWork(question, scores.Columns[column])
	if err != nil {
		return nil, err
	}
	part, err := resample.RunBlocks(ctx, w.plan, from, to, progress)
	if err != nil {
		return nil, err
	}
	return part.MarshalBinary()
}

// run draws the replicates, or has them drawn, unless everyone was counted:
// then every gap is exact.
func (w *work) run(ctx context.Context, column int, runner Runner, progress func(done int)) (err error) {
	switch {
	case w.question.Everyone:
		return ctx.Err()
	case runner == nil:
		w.quantiles, err = resample.Run(ctx, w.plan, progress)
		return err
	}
	encoded, err := runner(ctx, column, w.plan.Blocks(), progress)
	if err != nil {
		return err
	}
	parts := make([]resample.Part, len(encoded))
	for i, data := range encoded {
		if err := parts[i].UnmarshalBinary(data); err != nil {
			return err
		}
	}
	w.quantiles, err = resample.Merge(w.plan, parts)
	return err
}
