package demo

import (
	"testing"

	"github.com/stretchr/testify/assert"
)

func TestQuestion(t *testing.T) {
	q := Question()
	assert.NoError(t, q.Check())
	assert.Equal(t, []string{"vocabulary"}, q.Scores)
	assert.Equal(t, []string{"99", "-9"}, q.Missing)
	assert.Equal(t, "at 11 or below", q.Cutoffs[0].Words())
	assert.Equal(t, "at 30 or above", q.Cutoffs[1].Words())
	assert.Len(t, q.Cutoffs, 2)
	assert.Equal(t, "1pt", q.TooHigh.String())
	assert.Equal(t, "2pt", q.TooLow.String())
	assert.Equal(t, 4000.0, *q.Heads)
}
