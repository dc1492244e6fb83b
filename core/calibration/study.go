package calibration

import (
	"context"
	"fmt"
	"runtime"
	"sync"
	"sync/atomic"

	"tailgap/core/curve"
	"tailgap/core/gap"
)

// Study says what is simulated. Its results depend on nothing but its fields;
// the number of Workers changes only the time they take.
type Study struct {
	Cases      []Case
	Distances  []float64 // of the cutoffs from the population's mean, in SDs
	OfCount    bool      // judge in percent of the count: the interval of curve - weight·count, which is 0 in truth
	Stretches  bool      // stretches from each distance to the next, instead of upper tails
	Samples    int       // in each case
	Replicates int       // in each sample
	Level      float64
	HalfStep   bool
	Norms      *Norms // a curve from norms, instead of one fitted to the sample
	Seed       uint64
	Workers    int // 0: one for each core
}

// Case is one population and how many people are drawn from it.
type Case struct {
	Population Population
	N          int
}

// Trust is the tolerance, in points to either side, by which false trust is
// counted.
const Trust = 2.0

// Run simulates the study and returns a Tally for each case, in their order. It
// returns the context's error when it ends first, and that of a sample that
// can't be judged. progress, which may be nil, is called from the calling
// goroutine with how many cases are done.
func (s Study) Run(ctx context.Context, progress func(done int, c Case)) ([]Tally, error) {
	tallies := make([]Tally, len(s.Cases))
	for i, c := range s.Cases {
		trials, err := s.trials(ctx, c)
		if err != nil {
			return nil, err
		}
		tallies[i] = s.tally(c, trials)
		if progress != nil {
			progress(i+1, c)
		}
	}
	return tallies, nil
}

// trials runs the samples of one case, each from a seed of its own, so that it
// does not matter who runs which.
func (s Study) trials(ctx context.Context, c Case) ([]trial, error) {
	trials := make([]trial, s.Samples)
	workers := s.Workers
	if workers <= 0 {
		workers = runtime.GOMAXPROCS(0)
	}
	var next atomic.Int64
	var group sync.WaitGroup
	for range workers {
		group.Go(func() {
			for {
				i := int(next.Add(1)) - 1
				if i >= s.Samples || ctx.Err() != nil {
					return
				}
				trials[i] = s.try(ctx, c, i)
			}
		})
	}
	group.Wait()
	for _, trial := range trials {
		if trial.failure != nil {
			return nil, fmt.Errorf("%s, n = %d: %w", c.Population.Name, c.N, trial.failure)
		}
	}
	return trials, ctx.Err()
}

// regions are what is judged in every sample of a population: an upper tail at
// each of its cutoffs, or the stretches between them.
func (s Study) regions(p Population, split func(at float64, strict bool) gap.Threshold) (regions [][]gap.Threshold) {
	cutoffs := s.cutoffs(p)
	for i, at := range cutoffs {
		from := split(at, false)
		switch {
		case !s.Stretches:
			regions = append(regions, []gap.Threshold{from})
		case i+1 < len(cutoffs):
			regions = append(regions, []gap.Threshold{from, split(cutoffs[i+1], true)})
		}
	}
	return regions
}

// cutoffs are the scores at the distances, each once. Where the study is in
// percent of the count those beyond the last score are left out: no curve can
// be so much percent of nobody.
func (s Study) cutoffs(p Population) (cutoffs []float64) {
	for _, z := range s.Distances {
		at := p.Cutoff(z)
		if len(cutoffs) > 0 && at == cutoffs[len(cutoffs)-1] || s.OfCount && p.Share(at, false) == 0 {
			continue
		}
		cutoffs = append(cutoffs, at)
	}
	return cutoffs
}

// truth is the true gap of a region, a proportion.
func (s Study) truth(p Population, ends []gap.Threshold) float64 {
	curve, share := s.shares(p, ends)
	return curve - share
}

// weight is the curve's share of a region over the true one.
func (s Study) weight(p Population, ends []gap.Threshold) float64 {
	curve, share := s.shares(p, ends)
	return curve / share
}

// shares are what the population's own curve, or the norms', says of a region,
// and what is there.
func (s Study) shares(p Population, ends []gap.Threshold) (byCurve, share float64) {
	c := s.trueCurve(p)
	byCurve, share = curve.UpperTail(c.Z(ends[0].Point)), p.Share(ends[0].At, ends[0].Strict)
	if len(ends) == 2 {
		byCurve -= curve.UpperTail(c.Z(ends[1].Point))
		share -= p.Share(ends[1].At, ends[1].Strict)
	}
	return byCurve, share
}
