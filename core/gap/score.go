package gap

import (
	"math"

	"tailgap/core/curve"
)

// ScoreLimits are the limits of Gap(weight) that do not lean on the counted
// share's being approximately normal: limits of the curve's share on the
// scale asinh(z/√2), which stay inside 0..1, and Wilson's (1927) limits of
// the counted share, put together as in MOVER (Zou & Donner 2008) with the
// covariance of the two in Kappa. They apply to tails, not to stretches; t
// is the quantile of Student's t for the wanted level.
func (e *Estimate) ScoreLimits(weight, t float64) (low, high float64) {
	curveLow, curveHigh := e.fittedLimits(t)
	spread := t * t * e.Kappa(weight) / (weight * weight * e.N)
	below := (e.Curve - curveLow) / weight
	above := (curveHigh - e.Curve) / weight
	return e.Curve - weight*upperRoot(e.Counted, below*below, spread),
		e.Curve - weight*lowerRoot(e.Counted, above*above, spread)
}

// fittedLimits are the limits of a fitted curve's share alone.
func (e *Estimate) fittedLimits(t float64) (low, high float64) {
	if e.V == 0 || e.slope == 0 {
		return e.Curve, e.Curve
	}
	zeta := math.Asinh(e.z / math.Sqrt2)
	se := math.Sqrt(e.V/e.N) / (e.slope * math.Sqrt(2+e.z*e.z))
	return curve.UpperTail(math.Sqrt2 * math.Sinh(zeta+t*se)), curve.UpperTail(math.Sqrt2 * math.Sinh(zeta-t*se))
}

// lowerRoot and upperRoot solve (y-p)² = base + spread·y(1-y) for y, below
// and above p.
func lowerRoot(p, base, spread float64) float64 {
	if p*p <= base {
		return p - math.Sqrt(base)
	}
	return min(p, root(p, base, spread, -1))
}

func upperRoot(p, base, spread float64) float64 {
	if (1-p)*(1-p) <= base {
		return p + math.Sqrt(base)
	}
	return max(p, root(p, base, spread, +1))
}

// root solves the quadratic in y-p, which loses no digits near 0 and 1; where
// it has no root worth the name, the spread at p itself is taken.
func root(p, base, spread, sign float64) float64 {
	discriminant := spread*spread + 4*spread*p*(1-p) + 4*(1+spread)*base
	if discriminant < 0 || 1+spread < 0.05 {
		return p + sign*math.Sqrt(math.Max(0, base+spread*p*(1-p)))
	}
	return p + (spread*(1-2*p)+sign*math.Sqrt(discriminant))/(2*(1+spread))
}
