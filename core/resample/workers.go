package resample

import (
	"context"
	"sync/atomic"
)

// Worker does one block of some work, in a goroutine of its own, and tells how
// much more of it is done. It returns soon after the context ends.
type Worker func(ctx context.Context, block int, tell func(done int))

// InBlocks has the workers do so many blocks, each the next that nobody has
// taken, until there are no more or the context ends. progress, which may be
// nil, is called from the calling goroutine with how much is done. When it
// returns, or panics because progress or a worker did, its goroutines have
// ended.
func InBlocks(ctx context.Context, blocks int, workers []Worker, progress func(done int)) {
	ctx, cancel := context.WithCancel(ctx)
	reports := make(chan report)
	working := len(workers)
	defer func() {
		cancel()
		for working > 0 {
			if (<-reports).ended {
				working--
			}
		}
	}()
	var next atomic.Int64
	for _, worker := range workers {
		go worker.work(ctx, &next, blocks, reports)
	}
	for done := 0; working > 0; {
		r := <-reports
		if r.ended {
			working--
			if r.failure != nil {
				panic(r.failure) // here the caller can recover it
			}
			continue
		}
		done += r.done
		if progress != nil {
			progress(done)
		}
	}
}

// report is what a worker tells: so much more done, or that it has ended, and
// with what panic if there was one.
type report struct {
	done    int
	ended   bool
	failure any
}

func (w Worker) work(ctx context.Context, next *atomic.Int64, blocks int, reports chan<- report) {
	defer func() { reports <- report{ended: true, failure: recover()} }()
	for ctx.Err() == nil {
		block := int(next.Add(1)) - 1
		if block >= blocks {
			return
		}
		w(ctx, block, func(done int) { reports <- report{done: done} })
	}
}
