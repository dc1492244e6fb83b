package ask

import (
	"context"

	"tailgap/core/sample"
)

// meter tells how far the work is, but only what is new. It goes through
// stages of so many units each; a unit is about one replicate's time.
type meter struct {
	progress    Progress
	done, total int
	begun       int // where the present stage began
}

// stages are the units of the stages of one column, in their order.
type stages struct{ counting, planning, drawing, shape, testing, assembling int }

// What a stage takes, in replicates of as many scores.
func stagesOf(question Question, column sample.Column) stages {
	scores := len(column.Scores)
	s := stages{
		counting: 1 + scores/500, planning: 1 + scores/1000,
		drawing: question.Replicates, shape: question.shapeReplicates() + scores/1000,
		testing: 1 + scores/2000, assembling: 1 + len(question.Cutoffs),
	}
	if question.Everyone {
		s.drawing = 0
	}
	return s
}

func (s stages) total() int {
	return s.counting + s.planning + s.drawing + s.shape + s.testing + s.assembling
}

func newMeter(progress Progress, question Question, columns []sample.Column) *meter {
	m := &meter{progress: progress}
	for _, column := range columns {
		m.total += stagesOf(question, column).total()
	}
	return m
}

// stage begins the next stage, of so many units, and returns its teller: of
// how much it does of how much. A stage that has done all is over.
func (m *meter) stage(units int) func(done, of int) {
	from := m.begun
	m.begun += units
	return func(done, of int) {
		m.tell(from + units*min(done, of)/of)
	}
}

func (m *meter) tell(done int) {
	if done <= m.done {
		return
	}
	m.done = done
	if m.progress != nil {
		m.progress(done, m.total)
	}
}

// steps tells a stage of some steps, and ends it with the context.
type steps struct {
	ctx      context.Context
	tell     func(done, of int)
	done, of int
}

// next comes after each step.
func (s *steps) next() error {
	if s.done++; s.tell != nil && s.ctx.Err() == nil {
		s.tell(s.done, s.of)
	}
	return s.ctx.Err()
}
