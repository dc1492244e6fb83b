package ask

import (
	"context"
	"encoding/binary"
	"errors"
	"math"

	"tailgap/core/resample"
	"tailgap/core/sample"
)

// Runner has the replicates of a job made in parts: by its own Maker, by
// others that were made from its order in other processes, or by both. The
// parts must have each of the job's blocks once, in any split. progress, which
// may be called from the same goroutine only, takes the number of replicates
// that all of them have made.
type Runner func(ctx context.Context, job Job, progress func(done int)) (parts [][]byte, err error)

// Job is the replicates of one score column.
type Job struct {
	Column     int // its index in the sample
	Blocks     int
	Replicates int
	Memory     int // bytes that each maker comes to take, about
	work       *work
}

// Maker makes replicates of the job here.
func (j Job) Maker() *Maker { return &Maker{resample.NewMaker(j.work.plan)} }

// Order is all that NewMaker needs to make replicates of the job elsewhere:
// the question and the count table.
func (j Job) Order() ([]byte, error) {
	question, err := WriteQuestion(j.work.question)
	if err != nil {
		return nil, err
	}
	counts := j.work.table.Counts
	order := binary.LittleEndian.AppendUint32([]byte(orderFormat), uint32(len(question)))
	order = append(order, question...)
	for i, score := range counts.Score {
		order = binary.LittleEndian.AppendUint64(order, math.Float64bits(score))
		order = binary.LittleEndian.AppendUint64(order, uint64(counts.Count[i]))
	}
	return order, nil
}

const orderFormat = "tgorder1"

// Maker makes replicates of a job, a range of blocks at a time in any order.
type Maker struct{ maker *resample.Maker }

// NewMaker makes replicates of the job that gave the order. It returns an error
// for bytes that are no order, and Judge's for a question that can't be asked
// of the scores, or the context's.
func NewMaker(ctx context.Context, order []byte) (*Maker, error) {
	question, counts, err := readOrder(order)
	if err != nil {
		return nil, err
	}
	w, err := newWork(question, sample.Column{Name: "the score"}, counts, &steps{ctx: ctx})
	if err != nil {
		return nil, err
	}
	return Job{work: w}.Maker(), nil
}

func readOrder(order []byte) (question Question, counts sample.Counts, err error) {
	wrong := errors.New("these bytes are no order for replicates")
	const header = len(orderFormat) + 4
	if len(order) < header || string(order[:len(orderFormat)]) != orderFormat {
		return question, counts, wrong
	}
	length, order := int64(binary.LittleEndian.Uint32(order[len(orderFormat):])), order[header:]
	if length > int64(len(order)) || (int64(len(order))-length)%16 != 0 {
		return question, counts, wrong
	}
	if question, err = ReadQuestion(order[:length]); err != nil {
		return question, counts, err
	}
	for table := order[length:]; len(table) > 0; table = table[16:] {
		score, count := math.Float64frombits(binary.LittleEndian.Uint64(table)), binary.LittleEndian.Uint64(table[8:])
		last := len(counts.Score) - 1
		if !finite(score) || last >= 0 && score <= counts.Score[last] || count == 0 || count > uint64(math.MaxInt32-counts.N) {
			return question, sample.Counts{}, wrong
		}
		counts.Score, counts.Count = append(counts.Score, score), append(counts.Count, int(count))
		counts.N += int(count)
	}
	return question, counts, nil
}

// Make makes the replicates of the blocks from (in) to (out). progress, which
// may be nil, takes how many of these are done. It returns an error for blocks
// that there are not, and the context's when it ends first.
func (m *Maker) Make(ctx context.Context, from, to int, progress func(done int)) error {
	return m.maker.Make(ctx, from, to, progress)
}

// Part is everything made so far, for the job's Runner to return.
func (m *Maker) Part() ([]byte, error) {
	part, err := m.maker.Part()
	if err != nil {
		return nil, err
	}
	return part.MarshalBinary()
}

// run draws the replicates, or has them drawn, unless everyone was counted:
// then every gap is exact.
func (w *work) run(ctx context.Context, column int, runner Runner, tell func(done, of int)) error {
	if w.question.Everyone {
		return ctx.Err()
	}
	progress := func(done int) { tell(done, w.question.Replicates) }
	quantiles, err := w.replicate(ctx, column, runner, progress)
	w.judged = resample.Judge(w.plan, quantiles, w.scale.Step > 0)
	return err
}

func (w *work) replicate(ctx context.Context, column int, runner Runner, progress func(done int)) (resample.Quantiles, error) {
	if runner == nil {
		return resample.Run(ctx, w.plan, progress)
	}
	encoded, err := runner(ctx, Job{column, w.plan.Blocks(), w.question.Replicates, w.plan.Memory(), w}, progress)
	if err != nil {
		return resample.Quantiles{}, err
	}
	parts := make([]resample.Part, len(encoded))
	for i, data := range encoded {
		if err := parts[i].UnmarshalBinary(data); err != nil {
			return resample.Quantiles{}, err
		}
	}
	return resample.Merge(w.plan, parts)
}
