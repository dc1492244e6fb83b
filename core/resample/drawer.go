package resample

import "tailgap/core/sample"

// Drawer draws resampled count tables for the rooms that judge replicates of
// their own. It may be used by several goroutines, each with its own Stream.
type Drawer struct{ drawer }

// NewDrawer makes a drawer of n people, with replacement, from the n people of
// a count table.
func NewDrawer(counts sample.Counts) Drawer { return Drawer{newDrawer(counts)} }

// Draw fills into with the number of people drawn of each distinct score.
func (d Drawer) Draw(r *Stream, into []int32) { d.draw(&r.stream, into) }

// Stream is a source of random numbers for Draw.
type Stream struct{ stream }

// Restart puts the stream at the start of a block of replicates: its numbers
// depend on seed and block alone.
func (r *Stream) Restart(seed uint64, block int) { r.restart(seed, block) }
