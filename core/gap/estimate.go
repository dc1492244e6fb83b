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
	V       float64 // n times the variance of the curve's share; 0 for a given curve
	D       float64 // slope of the curve's share on the counted share, with ghosts; 0 for a given curve
	slope   float64 // the curve's density at its reading point, in SDs of the curve
	z       float64
}

// At estimates the region from power sums: those of the sample, or of a
// resample. A fitted curve moves with the sums; a given one stays.
func (t *Table) At(r *Region, s *Sums, in Inside) Estimate {
	e := Estimate{N: s.N, Inside: in.K, Counted: in.K / s.N}
	if !t.Curve.Fitted {
		e.z = r.lower.z
		e.Curve = r.lower.tail
		if r.stretch {
			e.Curve -= r.upper.tail
		}
		return e
	}
	if s.M2 <= 0 { // a resample of one score only: its curve is a step
		e.Curve = step(r.lower.point, s.Mean)
		if r.stretch {
			e.Curve -= step(r.upper.point, s.Mean)
		}
		return e
	}
	// The influence of a score x on the curve's share is
	// a(x-mean) + b((x-mean)²-M2).
	var a, b, ghost float64
	e.z = (r.lower.point - s.Mean) / s.SD
	e.slope = curve.Density(e.z)
	e.Curve = curve.UpperTail(e.z)
	a = e.slope / s.SD
	b = a * e.z / (2 * s.SD)
	ghost = r.lower.ghost - s.Mean
	g := a*ghost + b*(ghost*ghost-s.M2)
	if r.stretch {
		z := (r.upper.point - s.Mean) / s.SD
		e.Curve -= curve.UpperTail(z)
		a2 := curve.Density(z) / s.SD
		a, b = a-a2, b-a2*z/(2*s.SD)
		other := r.upper.ghost - s.Mean
		g = (a*ghost + b*(ghost*ghost-s.M2) + a*other + b*(other*other-s.M2)) / 2
	}
	e.V = s.N / (s.N - 1) * (a*a*s.M2 + 2*a*b*s.M3 + b*b*(s.M4-s.M2*s.M2))
	first := in.S1 - in.K*s.Mean
	second := in.S2 - 2*s.Mean*in.S1 + in.K*s.Mean*s.Mean
	influence := a*first + b*(second-in.K*s.M2)
	e.D = (influence+g)/(in.K+1) - (g-influence)/(s.N-in.K+1)
	return e
}

func step(point, mean float64) float64 {
	if mean >= point {
		return 1
	}
	return 0
}

// Gap is the curve's share minus weight times the counted share. Weight 1 is
// the gap itself; other weights judge a tolerance in percent of the count.
func (e Estimate) Gap(weight float64) float64 { return e.Curve - weight*e.Counted }

// CurveShort is the curve's share short of a tail, with all its digits where
// the tail is nearly everything.
func (e Estimate) CurveShort() float64 { return curve.UpperTail(-e.z) }

// Shrunk is the counted share with two made-up people inside the region and
// two outside (Agresti & Coull 1998).
func (e Estimate) Shrunk() float64 { return (e.Inside + 2) / (e.N + 4) }

// Kappa is what the binomial variance of the counted share is multiplied by
// in the variance of Gap(weight); floored so that the variance stays above zero.
func (e Estimate) Kappa(weight float64) float64 {
	p := e.Shrunk()
	return math.Max(e.KappaUnfloored(weight), -0.95*e.V/(p*(1-p)))
}

// KappaUnfloored is Kappa without its floor, as resamples use it.
func (e Estimate) KappaUnfloored(weight float64) float64 {
	return weight * (weight - 2*e.D)
}

// SE is the ghost-studentised standard error of Gap(weight), a proportion.
func (e Estimate) SE(weight float64) float64 {
	p := e.Shrunk()
	return math.Sqrt((e.V + e.Kappa(weight)*p*(1-p)) / e.N)
}

// Few is true where fewer than ten people are inside the region, or outside it.
func (e Estimate) Few() bool { return math.Min(e.Inside, e.N-e.Inside) < FewPeople }

// FewPeople is the number of people below which a side of a cutoff is sparse.
const FewPeople = 10
