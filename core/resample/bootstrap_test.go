package resample

import (
	"math"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/stat/distuv"

	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/gap"
	"tailgap/core/sample"
	"tailgap/testdata"
)

// The resampler itself is checked by the plain percentile and BCa limits of
// the gap, which R's boot computed (testdata/expected, boot 1.3-28.1, 20,000
// replicates of its own). They are no intervals that tailgap reports.

// replicates are the gaps of 20,000 resamples, in points, by region.
func replicates(table gap.Table, regions []gap.Region, seed uint64) [][]float64 {
	const size = 20_000
	plan := Plan{Table: table, Regions: regions, Estimates: table.Estimates(regions), Weights: []float64{1}, Level: 0.95, Replicates: size, Seed: seed}
	s := newStudy(plan, newCells(&plan))
	gaps := make([][]float64, len(regions))
	for block := range size / 100 {
		s.stream.restart(seed, block)
		for range 100 {
			s.cells.drawer.draw(&s.stream, s.counts)
			sums := s.sum()
			for i := range s.points {
				s.readings[i].Set(&table, &s.points[i], &sums)
			}
			for i := range regions {
				var e gap.Estimate
				s.estimate(&e, i, &sums)
				gaps[i] = append(gaps[i], 100*e.Gap(1))
			}
		}
	}
	for _, g := range gaps {
		slices.Sort(g)
	}
	return gaps
}

// quantile is the value of rank (size+1)p, interpolated.
func quantile(sorted []float64, p float64) float64 {
	rank := math.Min(math.Max(p*float64(len(sorted)+1), 1), float64(len(sorted)))
	below := int(rank)
	if below == len(sorted) {
		return sorted[below-1]
	}
	return sorted[below-1] + (rank-float64(below))*(sorted[below]-sorted[below-1])
}

// acceleration is the jackknife's (Efron & Tibshirani 1993, eq. 14.15).
func acceleration(table gap.Table, region gap.Region) float64 {
	n := float64(table.Counts.N)
	var s0, s1, s2, s3, s4 float64
	for i, u := range table.U {
		c := float64(table.Counts.Count[i])
		s0, s1, s2, s3, s4 = s0+c, s1+c*u, s2+c*u*u, s3+c*u*u*u, s4+c*u*u*u*u
	}
	inside := table.SampleInside(region)
	without := make([]float64, len(table.U))
	mean := 0.0
	for i, u := range table.U {
		sums := gap.NewSums(s0-1, s1-u, s2-u*u, s3-u*u*u, s4-u*u*u*u)
		in := inside
		if i >= region.From && i < region.To {
			in = gap.Inside{K: in.K - 1, S1: in.S1 - u, S2: in.S2 - u*u}
		}
		reading := table.ReadRegion(&region, &sums)
		var e gap.Estimate
		e.Set(&region, &sums, &reading, in)
		without[i] = e.Gap(1)
		mean += float64(table.Counts.Count[i]) * without[i] / n
	}
	var square, cube float64
	for i, value := range without {
		d, c := mean-value, float64(table.Counts.Count[i])
		square += c * d * d
		cube += c * d * d * d
	}
	return cube / (6 * math.Pow(square, 1.5))
}

func bca(sorted []float64, estimate, a float64) (low, high float64) {
	below, _ := slices.BinarySearch(sorted, estimate)
	z0 := distuv.UnitNormal.Quantile(float64(below) / float64(len(sorted)))
	at := func(z float64) float64 {
		return quantile(sorted, distuv.UnitNormal.CDF(z0+(z0+z)/(1-a*(z0+z))))
	}
	z := distuv.UnitNormal.Quantile(0.975)
	return at(-z), at(z)
}

// medianBCa are the medians of the BCa limits over nine seeds. Newcomb's two
// outliers make the limits jump by the luck of the draw: at 0 the upper one is
// on one of two atoms, about 8.6 and 9.7, R's on the one, SciPy's on the
// other; at 24 the lower one is anywhere from -37.8 to -36.1.
func medianBCa(table gap.Table, region gap.Region) (low, high float64) {
	var lows, highs []float64
	for seed := range uint64(9) {
		gaps := replicates(table, []gap.Region{region}, seed)[0]
		e := table.Estimate(region)
		l, h := bca(gaps, 100*e.Gap(1), acceleration(table, region))
		lows, highs = append(lows, l), append(highs, h)
	}
	slices.Sort(lows)
	slices.Sort(highs)
	return lows[4], highs[4]
}

func TestResamplerAgreesWithBoot(t *testing.T) {
	checked := 0
	for _, path := range testdata.Expected() {
		var want struct {
			Dataset, Column string
			Step            *float64
			Cutoffs         []struct {
				Cutoff float64
				Boot   map[string]struct {
					SE         float64    `json:"boot_se_pp"`
					Percentile [2]float64 `json:"percentile95"`
					BCa        [2]float64 `json:"bca95"`
				} `json:"bootstrap_normal_minus_observed"`
			}
		}
		testdata.JSON(path, &want)
		counts := sample.Count(testdata.Open(want.Dataset, want.Column))
		moments := counts.Moments()
		table := gap.NewTable(counts, moments, curve.FitNormal(moments))
		names, step := []string{"ge_raw", "le_raw", "ge_cc", "le_cc"}, sample.StepChoice{None: true}
		if want.Step == nil {
			names = names[:2]
		} else {
			step = sample.StepChoice{Size: *want.Step}
		}
		scale := sample.NewScale(counts, moments.SD, step, nil)
		var regions []gap.Region
		for _, c := range want.Cutoffs {
			for j := range names {
				side := []cutoff.Side{cutoff.AtLeast, cutoff.AtMost}[j%2]
				regions = append(regions, table.Region(gap.Ends(scale, cutoff.Cutoff{Side: side, At: c.Cutoff}, j >= 2)))
			}
		}
		gaps := replicates(table, regions, 20)
		for i, c := range want.Cutoffs {
			for j, name := range names {
				at := i*len(names) + j
				e := table.Estimate(regions[at])
				few := math.Min(e.Inside, e.N-e.Inside) < 10
				tolerance := 0.15
				if want.Dataset == "newcomb" && c.Cutoff == 0 {
					few, tolerance = false, 0.5 // two gross outliers: even R and SciPy differ by half a standard error
				}
				if few {
					continue
				}
				checked++
				boot := c.Boot[name]
				require.NotZero(t, boot.SE)
				percentile, accelerated := boot.Percentile, boot.BCa
				if j%2 == 1 { // the complement of an upper tail
					percentile = [2]float64{-percentile[1], -percentile[0]}
					accelerated = [2]float64{-accelerated[1], -accelerated[0]}
				}
				low, high := bca(gaps[at], 100*e.Gap(1), acceleration(table, regions[at]))
				if want.Dataset == "newcomb" {
					low, high = medianBCa(table, regions[at])
				}
				for _, limit := range [][2]float64{
					{percentile[0], quantile(gaps[at], 0.025)}, {percentile[1], quantile(gaps[at], 0.975)},
					{accelerated[0], low}, {accelerated[1], high},
				} {
					assert.InDeltaf(t, limit[0], limit[1], tolerance*boot.SE, "%s at %v, %s", path, c.Cutoff, name)
				}
			}
		}
	}
	assert.Equal(t, 178, checked, "every cutoff with ten people on both sides, and newcomb at 0")
}
