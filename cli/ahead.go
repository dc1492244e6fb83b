package main

import (
	"context"
	"io"
)

// aheadSize is one of the two buffers of a read-ahead.
const aheadSize = 256 << 10

// readAhead reads on while what it has read is being parsed. A run that is
// cancelled doesn't wait for a pipe that says nothing.
type readAhead struct {
	ctx    context.Context
	from   io.Reader
	chunks chan chunk  // read, not yet parsed
	free   chan []byte // to be read into
	chunk
	buffer []byte
}

type chunk struct {
	rest []byte
	err  error
}

func ahead(ctx context.Context, from io.Reader) io.Reader {
	return &readAhead{ctx: ctx, from: from}
}

// Read starts the reading at its first call: of many files, only the one
// that is being parsed takes up memory.
func (r *readAhead) Read(into []byte) (int, error) {
	if r.chunks == nil {
		r.chunks, r.free = make(chan chunk, 2), make(chan []byte, 2)
		r.free <- make([]byte, aheadSize)
		r.free <- make([]byte, aheadSize)
		go r.fetch()
	}
	for len(r.rest) == 0 {
		if r.err != nil {
			return 0, r.err
		}
		if r.buffer != nil {
			r.free <- r.buffer
			r.buffer = nil
		}
		select {
		case <-r.ctx.Done():
			return 0, r.ctx.Err()
		case r.chunk = <-r.chunks:
			r.buffer = r.rest
		}
	}
	n := copy(into, r.rest)
	r.rest = r.rest[n:]
	return n, nil
}

// fetch fills free buffers until the source ends or the run does.
func (r *readAhead) fetch() {
	for {
		select {
		case <-r.ctx.Done():
			return
		case buffer := <-r.free:
			n, err := r.from.Read(buffer[:cap(buffer)])
			r.chunks <- chunk{buffer[:n], err}
			if err != nil {
				return
			}
		}
	}
}
