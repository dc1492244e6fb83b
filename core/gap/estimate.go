package gap

import (
	"math"

	"tailgap/core/curve"
)

// Estimate is the curve's share and the counted share of one region, with
// what their uncertainty is made of. Shares are proportions.
//
// The standard error is the ghost-studentised one: the counted share's part
// of the variance of the gap is shrunk towards one half by Agresti and
// Coull's (1998) rule of two successes and two failures, and the covariance
// of the two shares is estimated with one made-up ("ghost") observation at
// the threshold on each side of it. So it does not collapse where nobody, or
// everybody, is beyond the cutoff, as the plug-in influence function does.
type Estimate struct {
	N       float64 // people in all
	Inside  float64 // people inside the region
	Curve   float64 // share by the curve
	Counted float64 // share counted
	V       float64 // n times the variance of the curve's share; 0 where the curve is known
	D       float64 // slope of the curve's share on the counted share, with ghosts; 0 for a given curve
	slope   float64 // the curve's density at its reading point, in SDs of the curve
	z       float64
	unseen  []unseen // beyond the lowest and the highest score; only in a sample's own estimate, by a fitted curve
}

// Set estimates the region from the sums of the sample, or of a resample, and
// from the curve as they make it read. Readings, one for each place where the
// curve is read, and estimates, one for each region, are the inner loop of
// every answer: one look at the curve a reading, one division an estimate.
func (e *Estimate) Set(r *Region, s *Sums, c *Reading, in Inside) {
	e.N, e.Inside, e.Counted = s.N, in.K, in.K*s.perN
	e.Curve, e.V, e.slope, e.z = c.share, c.v, c.slope, c.z
	ghost := c.influence(r.lowerGhost-s.Mean, s)
	if r.Stretch {
		ghost = (ghost + c.influence(r.upperGhost-s.Mean, s)) / 2
	}
	deviations := in.S1 - in.K*s.Mean
	squares := in.S2 - s.Mean*(in.S1+deviations)
	total := c.a*deviations + c.b*(squares-in.K*s.M2)
	inside, outside := in.K+1, s.N-in.K+1
	e.D = ((total+ghost)*outside - (ghost-total)*inside) / (inside * outside)
}

// Gap is the curve's share minus weight times the counted share. Weight 1 is
// the gap itself; other weights judge a tolerance in percent of the count.
func (e *Estimate) Gap(weight float64) float64 { return e.Curve - weight*e.Counted }

// CurveShort is the curve's share short of a tail, with all its digits where
// the tail is nearly everything.
func (e *Estimate) CurveShort() float64 { return curve.UpperTail(-e.z) }

// Shrunk is the counted share with two made-up people inside the region and
// two outside (Agresti & Coull 1998).
func (e *Estimate) Shrunk() float64 { return (e.Inside + 2) / (e.N + 4) }

// Kappa is what the binomial variance of the counted share is multiplied by
// in the variance of Gap(weight); floored so that the variance stays above zero.
func (e *Estimate) Kappa(weight float64) float64 {
	p := e.Shrunk()
	return math.Max(e.KappaUnfloored(weight), -0.95*e.V/(p*(1-p)))
}

// KappaUnfloored is Kappa without its floor, as resamples use it.
func (e *Estimate) KappaUnfloored(weight float64) float64 {
	return weight * (weight - 2*e.D)
}

// SE is the ghost-studentised standard error of Gap(weight), a proportion.
func (e *Estimate) SE(weight float64) float64 {
	p := e.Shrunk()
	variance := e.V + e.Kappa(weight)*p*(1-p)
	return math.Sqrt(max(variance, smallestVariance*p*(1-p)) / e.N)
}

// smallestVariance, of the binomial variance, keeps the standard error above
// zero where curve and weighted count move in step, as at one cutoff of a
// score with two values; the quantile of the replicates makes up for it.
const smallestVariance = 1e-6

// Few is true where fewer than ten people are inside the region, or outside it.
func (e *Estimate) Few() bool { return math.Min(e.Inside, e.N-e.Inside) < FewPeople }

// FewPeople is the number of people below which a side of a cutoff is sparse.
const FewPeople = 10
