package gap_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
	"gonum.org/v1/gonum/stat/distuv"

	"tailgap/core/curve"
	"tailgap/core/gap"
	"tailgap/core/sample"
)

// tailCounts is a sample of n people of whom k are at 1, the others at 0, with
// the tail "1 or above" read from the norms at a point.
func tailCounts(n, k int, norms curve.Normal, point float64) (gap.Table, gap.Region) {
	counts := sample.Counts{Score: []float64{0, 1}, Count: []int{n - k, k}, N: n}
	table := gap.NewTable(counts, sample.Moments{N: n, SD: 1, M2: 1, M4: 1}, norms) // their own moments play no part
	return table, table.Tail(gap.Threshold{At: 1, Point: point})
}

// The exact interval under a known curve is never missed more often than it
// may be, on either side, whatever the share and however few people: summed
// over every count there can be.
func TestKnownCurveIsCoveredForSure(t *testing.T) {
	known := curve.Normal{Mean: 0, SD: 1}
	for _, n := range []int{2, 5, 20, 100} {
		for _, miss := range []float64{0.1, 0.025, 0.005} {
			for share := 0.001; share < 1; share += 0.037 {
				tooHigh, tooLow := 0.0, 0.0
				for k := range n + 1 {
					table, region := tailCounts(n, k, known, 0.7)
					low, high := table.Apart(region, table.Estimate(region), false, miss).Limits(1)
					truth := curve.UpperTail(0.7) - share
					probability := distuv.Binomial{N: float64(n), P: share}.Prob(float64(k))
					if low > truth {
						tooHigh += probability
					}
					if high < truth {
						tooLow += probability
					}
				}
				assert.LessOrEqual(t, tooHigh, miss+1e-12, "n %d, share %v", n, share)
				assert.LessOrEqual(t, tooLow, miss+1e-12, "n %d, share %v", n, share)
			}
		}
	}
}

// The 95% interval with norms from people, both drawn 4,000 times: norms and
// scores normal on one scale (and the scores a quarter of an SD higher), read
// at -2 to +3 SD. In all cells together 96.7% of the intervals hold the truth,
// in the worst 94.3%, and no side is missed more than 3.8% of the time, one
// simulation error of 0.3% included.
func TestNormsAreCovered(t *testing.T) {
	const draws, level = 2000, 0.95
	r := rand.New(rand.NewPCG(5, 6))
	worst, total, side, cells := 1.0, 0.0, 0.0, 0.0
	for _, people := range []int{10, 50, 200, 1000} {
		deviations := distuv.ChiSquared{K: float64(people - 1), Src: r}
		for _, n := range []int{50, 300} {
			for _, higher := range []float64{0, 0.25} {
				for z := -2.0; z <= 3; z++ {
					share := curve.UpperTail(z - higher)
					truth := curve.UpperTail(z) - share
					counted := distuv.Binomial{N: float64(n), P: share, Src: r}
					hit, above, below := 0.0, 0.0, 0.0
					for range draws {
						norms := curve.Normal{
							Mean: r.NormFloat64() / math.Sqrt(float64(people)), NormN: people,
							SD: math.Sqrt(deviations.Rand() / float64(people-1)),
						}
						table, region := tailCounts(n, int(counted.Rand()), norms, z)
						low, high := table.Apart(region, table.Estimate(region), false, (1-level)/2).Limits(1)
						switch {
						case truth < low:
							below++
						case truth > high:
							above++
						default:
							hit++
						}
					}
					worst, total, cells = min(worst, hit/draws), total+hit/draws, cells+1
					side = max(side, above/draws, below/draws)
				}
			}
		}
	}
	t.Logf("mean %.4f, worst %.4f, most on one side %.4f", total/cells, worst, side)
	assert.GreaterOrEqual(t, worst, 0.94)
	assert.InDelta(t, 0.967, total/cells, 0.005)
	assert.LessOrEqual(t, side, 0.04)
}
