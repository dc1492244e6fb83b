package ask_test

import (
	"testing"

	"github.com/stretchr/testify/assert"

	"tailgap/core/sample"
)

func TestWarningsAboutOneScore(t *testing.T) {
	q := question(">=4")
	q.Step, q.Range = sample.StepChoice{Size: 2}, &sample.Range{Low: 2, High: 10}
	warnings := judge(t, q, []float64{2, 4, 6, 8, 8, 10, 13}).Warnings
	assert.Contains(t, warnings, "1 score is outside the stated range 2 to 10; it was used as it is")
	assert.Contains(t, warnings, "1 score is not a whole number of steps of 2 from the lowest score; check the step")
}
