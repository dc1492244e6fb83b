package resample

import (
	"cmp"
	"context"
	"flag"
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"tailgap/core/curve"
	"tailgap/core/gap"
	"tailgap/core/sample"
)

// shapes are populations without a step.
var shapes = map[string]func(r *rand.Rand) float64{
	"normal":    func(r *rand.Rand) float64 { return r.NormFloat64() },
	"lognormal": func(r *rand.Rand) float64 { return math.Exp(0.8 * r.NormFloat64()) },
	"mixture": func(r *rand.Rand) float64 {
		if r.Float64() < 0.3 {
			return 40 + 4*r.NormFloat64()
		}
		return 20 + 4*r.NormFloat64()
	},
}

func scoresOf(shape string, n int) []float64 {
	r := rand.New(rand.NewPCG(1, 2))
	scores := make([]float64, n)
	for i := range scores {
		scores[i] = shapes[shape](r)
	}
	return scores
}

// sparsePlan asks for so many thresholds evenly over the people, and some
// near both ends. With few thresholds cells are wide and hold many people.
func sparsePlan(scores []float64, thresholds int) Plan {
	counts := sample.Count(scores)
	moments := counts.Moments()
	table := gap.NewTable(counts, moments, curve.FitNormal(moments))
	plan := Plan{Table: table, Weights: []float64{1}, Level: 0.95, Replicates: 2000}
	n := len(counts.Score)
	at := []int{1, 2, 5, 10, 20, n - 20, n - 10, n - 5, n - 2}
	for i := range thresholds {
		at = append(at, (2*i+1)*n/(2*thresholds))
	}
	for _, i := range at {
		plan.Regions = append(plan.Regions, table.Tail(gap.Threshold{At: counts.Score[i], Point: counts.Score[i]}))
	}
	plan.Groups = [][2]int{{0, len(plan.Regions)}}
	plan.Estimates = table.Estimates(plan.Regions)
	return plan
}

// matrix has the covariances of u, u², u³ and u⁴.
type matrix [4][4]float64

func (m *matrix) add(weight float64, a, b [4]float64) {
	for i := range m {
		for j := range m {
			m[i][j] += weight * a[i] * b[j]
		}
	}
}

func (p powers) less(q powers) [4]float64 {
	return [4]float64{p.u1 - q.u1, p.u2 - q.u2, p.u3 - q.u3, p.u4 - q.u4}
}

// multinomial are the covariances of the sums of powers over a resample: n
// times those over the people.
func multinomial(table gap.Table) (mean powers, covariance matrix) {
	n := float64(table.Counts.N)
	for i, u := range table.U {
		p, share := powersOf(u), float64(table.Counts.Count[i])/n
		mean = powers{mean.u1 + share*p.u1, mean.u2 + share*p.u2, mean.u3 + share*p.u3, mean.u4 + share*p.u4}
	}
	for i, u := range table.U {
		d := powersOf(u).less(mean)
		covariance.add(float64(table.Counts.Count[i]), d, d)
	}
	return mean, covariance
}

// Between cells, within them and what is left make the covariance that
// multinomial counts of all scores have: exactly, however wide the cells are.
func TestCellsKeepMeansAndCovariances(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		shape := rapid.SampledFrom([]string{"normal", "lognormal", "mixture"}).Draw(t, "shape")
		scores := scoresOf(shape, rapid.IntRange(3, 2000).Draw(t, "people"))
		tied := rapid.SampledFrom([]float64{0, 0.1, 1}).Draw(t, "step")
		for i := range scores {
			if tied > 0 {
				scores[i] = tied * math.Round(scores[i]/tied)
			}
		}
		counts := sample.Count(scores)
		if len(counts.Score) < 2 {
			return
		}
		moments := counts.Moments()
		table := gap.NewTable(counts, moments, curve.FitNormal(moments))
		first := rapid.SliceOfN(rapid.IntRange(0, len(counts.Score)), 0, 20).Draw(t, "first")
		first = append(first, 0, len(counts.Score))
		slices.Sort(first)
		c := binned(table, slices.Compact(first))

		mean, want := multinomial(table)
		var got matrix
		var sums [4]float64
		for i, people := range c.drawer.counts.Count {
			n, by := float64(people), c.spread[i]
			for j, x := range c.means[i].less(mean) {
				sums[j] += n * x
			}
			got.add(n, c.means[i].less(mean), c.means[i].less(mean))
			got.add(n, [4]float64{by.u1, by.u2, by.u3, by.u4}, [4]float64{by.u1, by.u2, by.u3, by.u4})
			got.add(n, [4]float64{0, by.v2, by.v3, by.v4}, [4]float64{0, by.v2, by.v3, by.v4})
		}
		got.add(1, [4]float64{0, 0, c.rest.three, c.rest.both}, [4]float64{0, 0, c.rest.three, c.rest.both})
		got[3][3] += c.rest.four * c.rest.four
		for i := range got {
			assert.InDelta(t, 0, sums[i], 1e-9*math.Sqrt(want[i][i])*math.Sqrt(float64(counts.N)))
			for j := range got {
				size := math.Sqrt(want[i][i] * want[j][j])
				assert.InDeltaf(t, want[i][j], got[i][j], 1e-9*size, "u^%d with u^%d", i+1, j+1)
			}
		}
	})
}

// What is drawn has those covariances, as have the sums beyond a threshold.
func TestBinnedSumsVaryAsMultinomialOnes(t *testing.T) {
	for shape := range shapes {
		plan := sparsePlan(scoresOf(shape, 3000), 10)
		s := newStudy(plan, binned(plan.Table, edges(&plan)))
		mean, covariance := multinomial(plan.Table)
		n, region := float64(plan.Table.Counts.N), 12
		in := plan.Table.SampleInside(plan.Regions[region])

		const draws = 20_000
		var total matrix
		var tail [3]float64 // squares of the deviations of K, S1 and S2
		for block := range draws / 100 {
			s.stream.restart(9, block)
			for range 100 {
				s.cells.drawer.draw(&s.stream, s.counts)
				all, s3, s4 := s.sumCells()
				inside := s.tails[s.spans[region][0]]
				for i, d := range []float64{inside.K - in.K, inside.S1 - in.S1, inside.S2 - in.S2} {
					tail[i] += d * d / draws
				}
				d := powers{all.S1 / n, all.S2 / n, s3 / n, s4 / n}.less(mean)
				total.add(n*n/draws, d, d)
				require.Equal(t, n, all.K)
			}
		}
		for i := range total {
			for j := range total {
				size := math.Sqrt(covariance[i][i] * covariance[j][j])
				assert.InDeltaf(t, covariance[i][j], total[i][j], 0.06*size, "%s, u^%d with u^%d", shape, i+1, j+1)
			}
		}
		var squares [3]float64
		for i := plan.Regions[region].From; i < len(plan.Table.U); i++ {
			u, count := plan.Table.U[i], float64(plan.Table.Counts.Count[i])
			squares[0] += count
			squares[1] += count * u * u
			squares[2] += count * u * u * u * u
		}
		for i, sum := range []float64{in.K, in.S1, in.S2} {
			exact := squares[i] - sum*sum/n
			assert.InEpsilonf(t, exact, tail[i], 0.06, "%s, sum of u^%d beyond a threshold", shape, i)
		}
	}
}

// largestBy are the largest tenth of T* of all the plan's replicates, the
// largest first, at each place, by the given cells.
func largestBy(plan Plan, c *cells) [][]float64 {
	plan.Level = 0.9
	s := newStudy(plan, c)
	for block := range plan.Blocks() {
		s.block(context.Background(), block, plan.replicates(blocks{{block, block + 1}}), func(int) {})
	}
	all := make([][]float64, plan.places())
	for i := range all {
		kept := s.largest(i)
		kept.shrink()
		for _, square := range kept.values {
			all[i] = append(all[i], math.Sqrt(square))
		}
		slices.SortFunc(all[i], func(a, b float64) int { return cmp.Compare(b, a) })
	}
	return all
}

// difference compares T* of two forms at one place.
type difference struct {
	beyond   float64 // part of the second's replicates beyond the 95% quantile of the first's: 5%, but for Monte Carlo error
	quantile float64 // the second's 95% quantile over the first's, less 1
}

func compare(first, second []float64, replicates int) difference {
	rank := replicates / 20
	beyond := 0
	for _, x := range second {
		if x > first[rank] {
			beyond++
		}
	}
	return difference{float64(beyond) / float64(replicates), second[rank]/first[rank] - 1}
}

// sePartBeyond is the standard error of difference.beyond, both quantile and
// count being from so many replicates.
func sePartBeyond(replicates int) float64 {
	return math.Sqrt(2 * 0.05 * 0.95 / float64(replicates))
}

// The binned form's T*, at each threshold and the largest over all of them,
// goes beyond the direct form's 95% quantile in 5% of the replicates, but for
// Monte Carlo error: 4.5 standard errors of it. testdata/bench has the same
// with more scores and replicates: -accuracy -v makes it.
func TestBinnedQuantilesAreTheDirectOnes(t *testing.T) {
	people, replicates := 1500, 24_000
	if *accuracy {
		people, replicates = 6000, 100_000
	}
	for i, shape := range []string{"normal", "lognormal", "mixture"} {
		plan := sparsePlan(scoresOf(shape, people), 15)
		plan.Replicates, plan.Seed = replicates, uint64(2*i)
		exact := largestBy(plan, direct(plan.Table))
		plan.Seed++
		worst := difference{}
		places := largestBy(plan, binned(plan.Table, edges(&plan)))
		for place, quick := range places {
			d := compare(exact[place], quick, plan.Replicates)
			if math.Abs(d.quantile) > 0.001 { // else it may stand on an atom, where next to nobody is beyond
				assert.InDeltaf(t, 0.05, d.beyond, 4.5*sePartBeyond(plan.Replicates), "%s, place %d", shape, place)
			}
			if place < len(places)-1 && math.Abs(d.quantile) > math.Abs(worst.quantile) {
				worst = d
			}
		}
		band := compare(exact[len(places)-1], places[len(places)-1], plan.Replicates)
		t.Logf("| %s | %d | %+.2f%% (%.2f%% beyond) | %+.2f%% (%.2f%% beyond) |", shape, people, 100*worst.quantile, 100*worst.beyond, 100*band.quantile, 100*band.beyond)
	}
}

var accuracy = flag.Bool("accuracy", false, "compare the binned form with the direct one by more scores and replicates")

func TestFormIsChosenByItsCost(t *testing.T) {
	for _, c := range []struct {
		scores []float64
		binned bool
	}{
		{scoresOf("normal", 100), false},
		{scoresOf("normal", 3000), false},
		{wholeNumbers(200_000), false}, // heavily tied
		{scoresOf("normal", 20_000), true},
		{scoresOf("lognormal", 100_000), true},
	} {
		plan := planFor(c.scores, 1)
		cells := newCells(&plan)
		assert.Equal(t, c.binned, cells.spread != nil, len(c.scores))
		assert.Equal(t, len(c.scores), sum(cells.drawer.counts.Count))
		assert.Less(t, len(cells.means), 3500)
		for _, r := range plan.Regions {
			assert.Equal(t, plan.Table.SampleInside(r).K, float64(sum(cells.drawer.counts.Count[cells.cell(r.From):cells.cell(r.To)])))
		}
	}
}

func sum(counts []int) (all int) {
	for _, count := range counts {
		all += count
	}
	return all
}

// How far the binned form's T* is from the direct form's: the part beyond the
// direct form's 95% quantile, in percent, at the threshold where it is farthest
// from 5, on average, and for the band, with the standard error of one such
// figure; and the quantiles' differences in percent, on average and for the band.
func BenchmarkBinnedForm(b *testing.B) {
	for _, shape := range []string{"normal", "lognormal", "mixture"} {
		for _, n := range []int{2_500, 20_000} {
			plan := planFor(scoresOf(shape, n), 1)
			plan.Replicates = 100_000
			b.Run(fmt.Sprintf("%s/distinct=%d", shape, n), func(b *testing.B) {
				for b.Loop() {
					exact := largestBy(plan, direct(plan.Table))
					plan.Seed++
					quick := largestBy(plan, binned(plan.Table, edges(&plan)))
					mean, worst, thresholds := difference{}, difference{beyond: 0.05}, float64(len(plan.Regions))
					for i := range plan.Regions {
						d := compare(exact[i], quick[i], plan.Replicates)
						mean.beyond += d.beyond / thresholds
						mean.quantile += d.quantile / thresholds
						if math.Abs(d.beyond-0.05) > math.Abs(worst.beyond-0.05) {
							worst = d
						}
					}
					band := compare(exact[len(exact)-1], quick[len(exact)-1], plan.Replicates)
					for name, value := range map[string]float64{
						"worst%": worst.beyond, "mean%": mean.beyond, "band%": band.beyond, "SE%": sePartBeyond(plan.Replicates),
						"mean-quantile%": mean.quantile, "band-quantile%": band.quantile,
					} {
						b.ReportMetric(100*value, name)
					}
				}
			})
		}
	}
}
