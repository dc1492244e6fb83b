package ask

import (
	"context"
	"errors"

	"tailgap/core/sample"
)

// Progress is told how much of the work is done; it may be nil. It is called
// from the goroutine that called Judge.
type Progress func(done, total int)

// Judge answers the question on the sample.
func Judge(ctx context.Context, question Question, from sample.Sample, progress Progress) (Answer, error) {
	return Answer{}, errors.New("not yet")
}
