package calibration

import (
	"context"
	"hash/fnv"
	"math"
	"math/rand/v2"
	"slices"

	"tailgap/core/curve"
	"tailgap/core/gap"
	"tailgap/core/resample"
	"tailgap/core/sample"
	"tailgap/core/verdict"
)

// Norms make the curve of a study: the mean and SD that people drawn from a
// normal population have, which lies Shift of the SD above the population that
// is judged.
type Norms struct {
	People int // 0: the norms are known
	Shift  float64
}

// trial is what came of one sample; none: all its scores were equal.
type trial struct {
	none       bool
	failure    error
	outcomes   []outcome // by region
	bandHolds  bool
	falseTrust bool
}

// outcome is the interval of one region, proportions, and the verdicts at the
// two edges that the true gap could be.
type outcome struct {
	gap    float64
	limits resample.Interval
}

// try draws the i-th sample of a case and judges it.
func (s Study) try(ctx context.Context, c Case, i int) trial {
	random := rand.New(rand.NewPCG(s.Seed, c.seed(i)))
	scores := make([]float64, c.N)
	c.Population.Draw(random, scores)
	if slices.Min(scores) == slices.Max(scores) {
		return trial{none: true}
	}
	j := s.judging(c.Population, scores, random)
	if s.OfCount {
		return j.ofCount(ctx)
	}
	return j.inPoints(ctx)
}

// judging is one sample on its way to a trial.
type judging struct {
	Study
	population Population
	table      gap.Table
	scale      sample.Scale
	seed       uint64
}

func (s Study) judging(p Population, scores []float64, random *rand.Rand) judging {
	counts := sample.Count(scores)
	moments := counts.Moments()
	return judging{
		Study: s, population: p,
		table: gap.NewTable(counts, moments, s.curve(p, moments, random)),
		scale: sample.NewScale(counts, moments.SD, sample.StepChoice{None: p.Step == 0, Size: p.Step}, nil),
		seed:  random.Uint64(),
	}
}

func (j judging) split(at float64, strict bool) gap.Threshold {
	return gap.Split(j.scale, at, strict, j.HalfStep)
}

// resample draws the replicates; those regions from the sweep on are one group.
func (j judging) resample(ctx context.Context, weight float64, regions [][]gap.Threshold, sweep int) (*resample.Judged, []*gap.Estimate, error) {
	plan := resample.Plan{Table: j.table, Weights: []float64{weight}, Level: j.Level, Replicates: j.Replicates, Seed: j.seed, Workers: 1}
	for _, ends := range regions {
		plan.Regions = append(plan.Regions, j.table.Region(ends))
	}
	if sweep < len(regions) {
		plan.Groups = [][2]int{{sweep, len(regions)}}
	}
	plan.Estimates = j.table.Estimates(plan.Regions)
	quantiles, err := resample.Run(ctx, plan, nil)
	return resample.Judge(plan, quantiles, j.scale.Step > 0), plan.Estimates, err
}

// inPoints judges the gaps at the cutoffs and, for upper tails, over the sweep.
func (j judging) inPoints(ctx context.Context) trial {
	cutoffs := j.regions(j.population, j.split)
	regions, shown := cutoffs, 0
	if !j.Stretches {
		var sweep []gap.Threshold
		sweep, shown = j.sweep()
		for _, threshold := range sweep {
			regions = append(regions, []gap.Threshold{threshold})
		}
	}
	judged, estimates, err := j.resample(ctx, 1, regions, len(cutoffs))
	if err != nil {
		return trial{failure: err}
	}
	out := trial{bandHolds: true}
	for i := range cutoffs {
		out.outcomes = append(out.outcomes, outcome{estimates[i].Gap(1), judged.Interval(i, false, 1, 1)})
	}
	for i := len(cutoffs); i < len(cutoffs)+shown; i++ {
		band, truth := judged.Band(i, 0, false, 1), j.truth(j.population, regions[i])
		out.bandHolds = out.bandHolds && band.Low <= truth+rounding && truth-rounding <= band.High
		trusted := band.Low >= -Trust/100 && band.High <= Trust/100
		out.falseTrust = out.falseTrust || trusted && math.Abs(truth) > Trust/100
	}
	return out
}

// ofCount judges each cutoff in percent of the count, by the weight at which
// the truth is neither too high nor too low.
func (j judging) ofCount(ctx context.Context) trial {
	var out trial
	for _, ends := range j.regions(j.population, j.split) {
		weight := j.weight(j.population, ends)
		judged, estimates, err := j.resample(ctx, weight, [][]gap.Threshold{ends}, 1)
		if err != nil {
			return trial{failure: err}
		}
		out.outcomes = append(out.outcomes, outcome{estimates[0].Gap(weight), judged.Interval(0, false, weight, weight)})
	}
	return out
}

// sweep has the thresholds of the sweep as an answer shows it, and then those
// beyond them that the band is held to as well.
func (j judging) sweep() (all []gap.Threshold, shown int) {
	grid, _ := gap.Grid(j.table.Counts, j.scale, nil)
	for _, at := range grid {
		all = append(all, j.split(at, false))
		if j.scale.Step == 0 {
			all = append(all, j.split(at, true))
		}
	}
	shown = len(all)
	for _, at := range gap.Beyond(grid, j.scale.Step) {
		all = append(all, j.split(at, false))
	}
	return all, shown
}

// curve is what the sample is judged by.
func (s Study) curve(p Population, moments sample.Moments, random *rand.Rand) curve.Normal {
	if s.Norms == nil {
		return curve.FitNormal(moments)
	}
	c := s.trueCurve(p)
	if s.Norms.People > 0 {
		people := make([]float64, s.Norms.People)
		for i := range people {
			people[i] = c.Mean + c.SD*random.NormFloat64()
		}
		m := sample.Count(people).Moments()
		c.Mean, c.SD, c.NormN = m.Mean, m.SD, m.N
	}
	return c
}

// trueCurve is the curve that a sample without end would be judged by.
func (s Study) trueCurve(p Population) curve.Normal {
	c := curve.Normal{Mean: p.Mean, SD: p.SD}
	if s.Norms != nil {
		c.Mean += s.Norms.Shift * p.SD
	}
	return c
}

// seed is the i-th sample's, whatever else the study looks at.
func (c Case) seed(i int) uint64 {
	hash := fnv.New64a()
	hash.Write([]byte(c.Population.Name))
	return hash.Sum64() ^ uint64(c.N)<<32 ^ uint64(i)
}

// rounding is what a limit may be off. Where nobody of a population is on one
// side of a cutoff, one exact limit under a known curve is the truth itself.
const rounding = 1e-12

// edges are the tolerance that the truth is just at the edge of, outside it:
// its gap in points to either side, or its ratio, of which weight is the
// curve's share over the true one.
func edges(truth, weight float64) verdict.Tolerance {
	if weight != 1 {
		edge := &verdict.Edge{Weight: weight}
		if weight > 1 {
			return verdict.Tolerance{High: edge}
		}
		return verdict.Tolerance{Low: edge}
	}
	limit := &verdict.Limit{Size: 100 * math.Max(0, math.Abs(truth)-rounding), Unit: verdict.Points}
	return verdict.NewTolerance(limit, limit, 0)
}

// verdict is the sample's under a tolerance.
func (o outcome) verdict(tolerance verdict.Tolerance) verdict.Verdict {
	return verdict.Of(tolerance, func(float64) verdict.Limits {
		return verdict.Limits{Gap: o.gap, Low: o.limits.Low, High: o.limits.High}
	})
}
