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
// counts the scores inside.
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
//
// # Given curves
//
// A curve with a stated mean and SD does not come from the people who were
// counted, so each of the two shares has limits of its own, and no replicates
// are needed to join them ([Apart]): for the gap E = N - w·S, with N between
// N₁ and N₂ and S between S₁ and S₂,
//
//	E - √[(N-N₁)² + w²(S₂-S)²]  to  E + √[(N₂-N)² + w²(S-S₁)²]
//
// (MOVER, the method of variance estimates recovery; Zou & Donner 2008). S₁
// and S₂ are exact, from the binomial distribution ([ClopperPearson]).
//
// Where mean and SD are known, as norms without a number of people are taken
// to be, N₁ = N₂ = N and the interval is exact too: neither limit is missed
// more often than it may be, for any n, in any tail or stretch, at any weight.
//
// Where they were estimated from n₀ norm people, these are taken to be normal,
// as the curve says: the mean is normal with variance σ²/n₀, and (n₀-1)SD²/σ²
// is chi-squared with n₀-1 degrees of freedom. For a tail N₁ and N₂ are the
// shares at
//
//	z(1 - 1/(4(n₀-1))) ± q·√(1/n₀ + z²/(2(n₀-1))),
//
// q the normal quantile of the level: √n₀·z is noncentral t (Owen 1968), and
// these are its limits by Johnson and Welch's (1940) approximation. For a
// stretch they are those of its log odds, with Student's t with n₀-1 degrees
// of freedom and the delta method's variance
//
//	v₀/n₀ = (φ(zₐ)-φ(z_b))²/n₀ + (zₐφ(zₐ)-z_bφ(z_b))²/(2(n₀-1))
//
// (for a tail φ(z)²(1/n₀ + z²/(2(n₀-1)))), which is also the norms' part in the
// standard error SE² = v₀/n₀ + w²p̃(1-p̃)/n that a band is scaled by.
//
// With nobody's count in play, these limits of N are missed on either side at
// most 3.0% of the time where 2.5% are wanted (tails, n₀ from 2, z to 4) and
// 3.8% (stretches, n₀ from 5), in 100,000 to 400,000 draws of the norms. For
// the whole interval see TestNormsAreCovered, and TestKnownCurveIsCoveredForSure.
//
// The ghost-studentised interval with the norms' variance added and the norms
// redrawn in each replicate was tried first, in 600 samples a cell of 50 and 300
// people, at -2 to +3 SD. With norms from 50, 200 and 1,000 people it covered as
// well (93.7% at worst and 97.7% on the average; this one 93.8% and 97.0%) and
// was as wide in the middle, but in the median cell 13 to 18% wider at 2 SD and
// 60% at 3 SD; with norms from 3 and 5 people it fell to 78%, this one to 94.7%.
// Nor did it become the exact interval as n₀ grew.
package gap
