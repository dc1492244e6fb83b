// Package gap computes how far the curve's share is from the counted share
// over a region of the score scale, and how uncertain that is: its influence
// function, variance and ghost-studentised standard error.
//
// Everything is computed for upper tails and stretches. A lower tail is the
// complement of an upper one: its gap is minus the upper tail's, its limits
// are mirrored and its standard error is the same.
//
// # Formulas
//
// n scores x with mean m, SD s (divisor n-1) and central moments M2, M3, M4
// (divisor n); k of them at or beyond the cutoff c. The curve is read at
// d = c, or half a step beside it:
//
//	z = (d-m)/s,  f = φ(z),  a = f/s,  b = f·z/(2s²)
//	E = 1-Φ(z) - w·k/n                        the gap (w = 1), a proportion
//	v = n/(n-1)·[a²M2 + 2ab·M3 + b²(M4-M2²)]  n times the variance of 1-Φ(z)
//	h(x) = a(x-m) + b((x-m)²-M2)              what a score does to 1-Φ(z)
//	A = Σ h(x) over the k scores,  g = h(c)   g: a ghost observation
//	D = (A+g)/(k+1) - (g-A)/(n-k+1)           slope of 1-Φ(z) on the count
//	p̃ = (k+2)/(n+4)
//	κ = max(w²-2wD, -0.95·v/[p̃(1-p̃)])
//	SE² = [v + κ·p̃(1-p̃)]/n
//
// and, for a fitted curve, with a person unseen beyond each end of the scores,
// e being the mean excess of the outermost tenth of the people (five or more)
// over the next one inwards:
//
//	x_u = lowest score - 24^¼·e, highest score + 24^¼·e
//	ψ(x_u) = h(x_u) - w·(1{x_u inside} - k/n)
//	SE₋² = SE² + Σ_{ψ<0} ψ²/n²  for the limit below,  SE₊² = SE² + Σ_{ψ>0} ψ²/n²  above
//
// Curve and count come from the same people, so the two are far from
// independent: that is what D is for. A weight w other than 1 judges a
// tolerance in percent of the count. For a stretch a and b are the
// differences of those at its two ends, g is the mean of h at both, and k
// counts the scores inside. For a given curve v = D = 0.
//
// v is the delta method's variance of a normal share (as in Peacock et al.
// 2012), p̃ Agresti and Coull's (1998). The ghosts, which with p̃ keep the
// standard error from collapsing in an empty tail, have no published source.
//
// The person unseen has no published source either. About 1/n of a population
// lies beyond each extreme of a sample of n, where no sample shows it. Under
// strong skew that part moves mean and SD most of all, and a sample that has
// missed it has too small a variance just when its gap is off, in a direction
// that is known: so it widens one side only. Beyond any point of an
// exponential tail the excess has a mean fourth power of 24; h is quadratic
// and counts by its square, hence the fourth root. How much it helps is in
// DEVELOPERS.md.
//
// See package resample for what becomes of SE, and [Estimate.ScoreLimits] for
// the limits where few people are on one side.
package gap
