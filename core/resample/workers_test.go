package resample

import (
	"context"
	"sync/atomic"
	"testing"

	"github.com/stretchr/testify/assert"
)

// counting are workers that count those of them that are at work.
func counting(workers int, atWork, blocks *atomic.Int64, each func(block int)) (all []Worker) {
	for range workers {
		all = append(all, func(ctx context.Context, block int, tell func(int)) {
			atWork.Add(1)
			defer atWork.Add(-1)
			blocks.Add(1)
			each(block)
			tell(1)
			tell(1)
		})
	}
	return all
}

func TestInBlocks(t *testing.T) {
	var atWork, blocks atomic.Int64
	last := 0
	InBlocks(context.Background(), 100, counting(3, &atWork, &blocks, func(int) {}), func(done int) { last = done })
	assert.Equal(t, 200, last)
	assert.EqualValues(t, 100, blocks.Load())
	InBlocks(context.Background(), 10, counting(20, &atWork, &blocks, func(int) {}), nil)
	assert.EqualValues(t, 110, blocks.Load())
	ended, cancel := context.WithCancel(context.Background())
	cancel()
	InBlocks(ended, 1<<40, counting(3, &atWork, &blocks, func(int) {}), nil)
	assert.EqualValues(t, 110, blocks.Load())
}

// No worker goes on, or waits to tell, after a panic of one of them or of
// progress.
func TestInBlocksEndsWithAPanic(t *testing.T) {
	var atWork, blocks atomic.Int64
	none := func(int) {}
	assert.PanicsWithValue(t, "progress", func() {
		InBlocks(context.Background(), 1<<40, counting(4, &atWork, &blocks, none), func(done int) {
			if done == 10 {
				panic("progress")
			}
		})
	})
	assert.Zero(t, atWork.Load())
	assert.PanicsWithValue(t, "worker", func() {
		InBlocks(context.Background(), 1<<40, counting(4, &atWork, &blocks, func(block int) {
			if block == 7 {
				panic("worker")
			}
		}), nil)
	})
	assert.Zero(t, atWork.Load())
	made := blocks.Load()
	assert.Less(t, made, int64(1<<20))
}
