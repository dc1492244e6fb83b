package calibration

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
)

// A large sample from every population has its mean, SD and shares.
func TestPopulationsAreWhatTheySay(t *testing.T) {
	for i, p := range Populations() {
		const n = 200_000
		scores := make([]float64, n)
		p.Draw(rand.New(rand.NewPCG(1, uint64(i))), scores)
		sum, squares := 0.0, 0.0
		for _, x := range scores {
			sum += x - p.Mean
			squares += (x - p.Mean) * (x - p.Mean)
		}
		assert.InDelta(t, 0, sum/n/p.SD, 5/math.Sqrt(n), p.Name)
		assert.InDelta(t, 1, math.Sqrt(squares/n)/p.SD, 0.04, p.Name)
		for _, z := range []float64{-2, -1, 0, 1, 2, 3} {
			at, beyond, above := p.Cutoff(z), 0, 0
			for _, x := range scores {
				if x >= at {
					beyond++
				}
				if x > at {
					above++
				}
			}
			share := p.Share(at, false)
			assert.InDelta(t, share, float64(beyond)/n, 5*math.Sqrt(share*(1-share)/n)+1e-12, "%s at %v", p.Name, at)
			share = p.Share(at, true)
			assert.InDelta(t, share, float64(above)/n, 5*math.Sqrt(share*(1-share)/n)+1e-12, "%s above %v", p.Name, at)
		}
	}
}
