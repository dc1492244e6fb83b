package main

import (
	"context"
	"errors"
	"time"

	"tailgap/core/ask"
)

// When replicates are shared, and in what portions. A helper is at work some
// 50 ms after it was asked for; a portion is so short that the progress shown
// is of now, and so long that dealing it out costs nothing beside it.
const (
	aloneFor     = 50 * time.Millisecond  // by then it is known how long the rest takes
	worthSharing = 300 * time.Millisecond // of work left
	portionTime  = 40 * time.Millisecond
)

// roomFor is how many bytes the makers of all workers together may come to
// take.
const roomFor = 768 << 20

// sharing has replicates made here, and where there is much to do also by
// those workers of the crew that have nothing to do.
func (b *bench) sharing(r request, line line) ask.Runner {
	return func(ctx context.Context, job ask.Job, progress func(done int)) (parts [][]byte, err error) {
		told := func(made, here int) { progress(made*job.Replicates/job.Blocks + here) }
		b.maker = job.Maker()
		begun := b.now()
		for made, next := 0, 1; made < job.Blocks; {
			done, err := b.make(request{From: made, To: min(made+next, job.Blocks)}, func(here int) { told(made, here) })
			if err != nil {
				return nil, err
			}
			made, next = made+done.Made, done.Next
			taken := b.now().Sub(begun)
			left := taken / time.Duration(made) * time.Duration(job.Blocks-made)
			if r.Helpers > 0 && taken >= aloneFor && left >= worthSharing {
				parts, err = b.together(line, job, share{made, job.Blocks, next, 1 + roomFor/max(1, job.Memory)}, told)
				if err != nil {
					return nil, err
				}
				break
			}
		}
		own, err := b.part()
		return append(parts, own), err
	}
}

// together offers what is left to the crew, makes what it is dealt of it, and
// returns the parts that others have made.
func (b *bench) together(line line, job ask.Job, s share, told func(made, here int)) ([][]byte, error) {
	order, err := job.Order()
	if err != nil {
		return nil, err
	}
	line.say(guarded(0, sayShare, func() (any, error) { return s, nil }), order)
	for {
		m := line.hear()
		switch {
		case m.err != nil:
			return nil, m.err
		case m.Kind == askMerge:
			return m.parcels, nil
		case m.Kind != askBlocks:
			return nil, errors.New("the page asked for something else while the work was shared")
		}
		made := guarded(m.ID, m.Kind, func() (any, error) { return b.make(m.request, func(here int) { told(m.Made, here) }) })
		if made.Error != "" {
			return nil, errors.New(made.Error)
		}
		line.say(made)
	}
}

// make makes some blocks of replicates.
func (b *bench) make(r request, progress func(done int)) (portion, error) {
	if b.maker == nil {
		return portion{}, errors.New("the page asked for replicates without an order")
	}
	begun := b.now()
	if err := b.maker.Make(context.Background(), r.From, r.To, progress); err != nil {
		return portion{}, err
	}
	made, taken := r.To-r.From, max(b.now().Sub(begun), time.Microsecond)
	next := float64(made) * min(float64(portionTime)/float64(taken), 8) // some browsers' clocks are coarse
	return portion{Made: made, Next: max(1, int(next))}, nil
}

// part is everything that was made; then the maker is done with.
func (b *bench) part() ([]byte, error) {
	if b.maker == nil {
		return nil, errors.New("the page asked for a part of nothing")
	}
	maker := b.maker
	b.maker = nil
	return maker.Part()
}
