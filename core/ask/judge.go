package ask

import (
	"context"
	"errors"
	"fmt"
	"math"

	"tailgap/core/sample"
)

// Progress is told how much of the work is done; it may be nil. It is called
// from the goroutine that called Judge, never goes back, and ends at the total.
type Progress func(done, total int)

// Judge answers the question on the sample: for each score column the gap at
// every cutoff and over the whole score range, with intervals, bands and
// verdicts. The answer depends on question, sample and the question's seed
// only. Errors are sentences for the person who asks: a question that Check
// refuses, a column without a score, with one person or without any spread;
// or the context's error when it ends first.
func Judge(ctx context.Context, question Question, from sample.Sample, progress Progress) (Answer, error) {
	return JudgeWith(ctx, question, from, progress, nil)
}

// JudgeWith is Judge with the replicates made by the runner; with nil it makes
// them itself. The answer is the same. A runner's error is returned as it is,
// and so is one for parts that are not the question's.
func JudgeWith(ctx context.Context, question Question, from sample.Sample, progress Progress, runner Runner) (Answer, error) {
	question = question.filled()
	if err := question.Check(); err != nil {
		return Answer{}, err
	}
	if len(from.Columns) == 0 {
		return Answer{}, errors.New("there is no score to judge; choose a column")
	}
	answer := Answer{
		Format: AnswerFormat, Program: Program, Demo: from.Demo, Question: question,
		Warnings: []string{}, Suppressed: []string{}, Results: []Result{},
	}
	meter := newMeter(progress, question, from.Columns)
	for i, column := range from.Columns {
		result, err := judgeColumn(ctx, question, column, i, runner, meter)
		if err != nil {
			return Answer{}, err
		}
		answer.Results = append(answer.Results, result)
		for _, warning := range result.Warnings {
			if len(from.Columns) > 1 {
				warning = result.led(warning)
			}
			answer.Warnings = append(answer.Warnings, warning)
		}
	}
	return answer, nil
}

func judgeColumn(ctx context.Context, question Question, column sample.Column, index int, runner Runner, meter *meter) (Result, error) {
	units := stagesOf(question, column)
	counts, err := sample.CountContext(ctx, column.Scores, meter.stage(units.counting))
	if err != nil {
		return Result{}, err
	}
	w, err := newWork(question, column, counts, &steps{ctx: ctx, tell: meter.stage(units.planning)})
	if err != nil {
		return Result{}, err
	}
	if err := w.run(ctx, index, runner, meter.stage(units.drawing)); err != nil {
		return Result{}, err
	}
	if err := w.find(ctx, meter.stage(units.shape), meter.stage(units.testing)); err != nil {
		return Result{}, err
	}
	return w.result(&steps{ctx: ctx, tell: meter.stage(units.assembling)})
}

// describe returns the moments of a count table that a curve can be held
// against, or an error that says why none can.
func describe(name string, counts sample.Counts) (sample.Moments, error) {
	switch {
	case counts.N == 0:
		return sample.Moments{}, fmt.Errorf("%s has no usable score", name)
	case !finite(counts.Min()) || !finite(counts.Max()):
		return sample.Moments{}, fmt.Errorf("%s has an infinite score; take it out or code it as missing", name)
	case counts.N == 1:
		return sample.Moments{}, fmt.Errorf("%s has one usable score; a spread needs at least two people", name)
	case len(counts.Score) == 1:
		return sample.Moments{}, fmt.Errorf("all %d scores of %s are equal; without any spread there is no curve", counts.N, name)
	}
	m := counts.Moments()
	if !(m.M2 > 0) || !(m.M4 > 0) || !finite(m.M4) || !finite(m.Mean) || !(m.M4 >= m.M2*m.M2*(1-1e-6)) {
		return sample.Moments{}, fmt.Errorf("the scores of %s are too large, or too close together for their size, to compute with; give them in another unit", name)
	}
	return m, nil
}

func toPoints(share float64) float64 { return 100 * math.Max(-1, math.Min(1, share)) }
