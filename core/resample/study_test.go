package resample

import (
	"testing"

	"github.com/stretchr/testify/assert"
)

// A replicate takes no memory, whichever way it is drawn and added up.
func TestReplicatesDoNotAllocate(t *testing.T) {
	for _, c := range []struct {
		name   string
		scores []float64
		way    int
		binned bool
	}{
		{"index draws", scoresOf("normal", 1000), byIndex, false},
		{"Poisson draws", wholeNumbers(1000), byPoissons, false},
		{"binomial draws", wholeNumbers(1_000_000), byBinomials, false},
		{"cells", scoresOf("normal", 100_000), byPoissons, true},
	} {
		plan := planFor(c.scores, 1)
		plan.Weights = []float64{1, 1.2}
		cells := direct(plan.Table)
		if c.binned {
			cells = binned(plan.Table, edges(&plan))
		}
		way, _ := fastest(cells.drawer.counts.N, len(cells.means))
		assert.Equal(t, c.way, way, c.name)
		s := newStudy(plan, cells)
		s.stream.restart(1, 1)
		s.replicate() // makes room for what is kept
		assert.Zero(t, testing.AllocsPerRun(50, s.replicate), c.name)
	}
}
