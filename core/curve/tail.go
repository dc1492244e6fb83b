package curve

import (
	"math"

	"gonum.org/v1/gonum/mathext"
)

// Tail is the share of a standard normal curve at or beyond z together with
// its density there, for where both are wanted many times over. From the
// nearest place of a table, z₀, with d = z-z₀ and m halfway to z,
//
//	φ(m) = φ(z₀)·exp(-(z₀+d/4)·d/2)
//	φ(z) = φ(m)²/φ(z₀)·exp(-d²/4)
//	share = share(z₀) - φ(m)·d·[1 + (m²-1)d²/24 + (m⁴-6m²+3)d⁴/1920],
//
// the integral of the density by its derivatives at m, which are Hermite
// polynomials times φ(m), and exponentials of numbers below 1/40 by their
// series. Relative error below 2e-14 for |z| < 8, below 1e-12 as far as the
// share can be written.
func Tail(z float64) (share, density float64) {
	if !(z > -tableEnd && z < tableEnd) {
		return farTail(z)
	}
	index := int((z+tableEnd)*perUnit + 0.5)
	from := &table[index]
	z0 := float64(index)*(1.0/perUnit) - tableEnd
	d := z - z0
	half := 0.5 * d
	y := -half * (z0 + 0.5*half)
	y2 := y * y
	exp := 1 + y + y2*(1.0/2+y*(1.0/6)+y2*(1.0/24+y*(1.0/120)+y2*(1.0/720+y*(1.0/5040))))
	middle := from.density * exp
	d2, m2 := d*d, (z0+half)*(z0+half)
	share = from.share - middle*d*(1+d2*((m2-1)*(1.0/24)+d2*((m2-6)*m2+3)*(1.0/1920)))
	quarter := 0.25 * d2
	return share, middle * exp * (1 - quarter*(1-0.5*quarter))
}

const (
	tableEnd = 6
	perUnit  = 64 // places of the table for each SD
)

// table has the places -6, -6+1/64, ..., 6.
var table = func() *[2*tableEnd*perUnit + 1]struct{ share, density float64 } {
	var all [2*tableEnd*perUnit + 1]struct{ share, density float64 }
	for i := range all {
		z := float64(i)/perUnit - tableEnd
		all[i].share, all[i].density = UpperTail(z), Density(z)
	}
	return &all
}()

// farTail is Tail beyond the table: Cody's (1969) rational approximation of
// exp(x²)erfc(x), x = z/√2.
func farTail(z float64) (share, density float64) {
	scale := math.Exp(-0.5 * z * z)
	share = 0.5 * scale * scaledErfcFar(math.Abs(z)*(1/math.Sqrt2))
	if z < 0 {
		share = 1 - share
	}
	return share, scale * (1 / math.Sqrt(2*math.Pi))
}

// erfNearZero is erf(x)/x from y = x², for |x| <= 0.46875.
func erfNearZero(y float64) float64 {
	return ((((1.85777706184603153e-1*y+3.16112374387056560)*y+1.13864154151050156e2)*y+3.77485237685302021e2)*y + 3.20937758913846947e3) /
		((((y+2.36012909523441209e1)*y+2.44024637934444173e2)*y+1.28261652607737228e3)*y + 2.84423683343917062e3)
}

// scaledErfcMiddle is exp(x²)erfc(x) for 0.46875 <= x <= 4.
func scaledErfcMiddle(x float64) float64 {
	return ((((((((2.15311535474403846e-8*x+5.64188496988670089e-1)*x+8.88314979438837594)*x+6.61191906371416295e1)*x+2.98635138197400131e2)*x+8.81952221241769090e2)*x+1.71204761263407058e3)*x+2.05107837782607147e3)*x + 1.23033935479799725e3) /
		((((((((x+1.57449261107098347e1)*x+1.17693950891312499e2)*x+5.37181101862009858e2)*x+1.62138957456669019e3)*x+3.29079923573345963e3)*x+4.36261909014324716e3)*x+3.43936767414372164e3)*x + 1.23033935480374942e3)
}

// scaledErfcFar is exp(x²)erfc(x) for x >= 4.
func scaledErfcFar(x float64) float64 {
	y := 1 / (x * x)
	r := y * (((((1.63153871373020978e-2*y+3.05326634961232344e-1)*y+3.60344899949804439e-1)*y+1.25781726111229246e-1)*y+1.60837851487422766e-2)*y + 6.58749161529837803e-4) /
		(((((y+2.56852019228982242)*y+1.87295284992346725)*y+5.27905102951428412e-1)*y+6.05183413124413191e-2)*y + 2.33520497626869185e-3)
	return (1/1.7724538509055160273 - r) / x
}

// LogTail is the logarithm of the share of a standard normal curve at or
// beyond z. It has all its digits far into either tail, where the share itself
// can't be written or is 1.
func LogTail(z float64) float64 {
	x := z * (1 / math.Sqrt2)
	switch {
	case x < 0:
		return math.Log1p(-UpperTail(-z))
	case x <= 0.46875:
		return math.Log(0.5 - 0.5*x*erfNearZero(x*x))
	case x <= 4:
		return math.Log(0.5*scaledErfcMiddle(x)) - x*x
	}
	return math.Log(0.5*scaledErfcFar(x)) - x*x
}

// Quantile is the z beyond which lies that share of a standard normal curve:
// the z with UpperTail(z) = share, with all its digits for any share in (0,1),
// the smallest too. +Inf for 0, -Inf for 1.
func Quantile(share float64) float64 { return -mathext.NormalQuantile(share) }
