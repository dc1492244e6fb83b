// Package shape says what the shape of the scores does to the gaps at the
// cutoffs: how much of each gap asymmetry, tails and peak, the half-step, a
// floor or ceiling, heaps and single extreme scores account for, with
// intervals; and holds two tests of normality and a worm plot.
//
// # Parts that add up
//
// At a cutoff that is judged at the reading point j and would be read with
// the half-step at d (on a scale without a step d = j), let N be the share of
// the fitted curve, G that of a given one, S the counted share beyond the
// cutoff and R the share of the scores beyond d when they are reflected about
// their mean. The reflected scores have the same mean and SD, so the same
// curve, and (S+R)/2 is the counted share of scores and reflected scores
// together, which are symmetric. So the gap is the sum of
//
//	G(d) - N(d)      the given mean and SD are not these people's; none for a fitted curve
//	N(j) - N(d)      the curve is read without the half-step (for a given curve G instead of N)
//	(R-S)/2          asymmetry
//	N(d) - (S+R)/2   the rest: tails and peak of the symmetric scores
//
// On a scale with a step R is read from the scores spread evenly over their
// step. At every point midway between two attainable scores, where the
// half-step reads, this leaves the counted share as it is; and the mean, which
// lies anywhere, does not make an asymmetry where there is none.
//
// # What goes away
//
// A floor's, a ceiling's or the extreme scores' effect is the gap less the gap
// of the other people, with the curve fitted to them; for a given curve, which
// would not move, there is none. The effect of heaps is the gap less the gap
// with each heap's surplus over the mean of the scores around it spread evenly
// over those scores and its own: the attainable scores up to half the heaps'
// spacing away, those at exactly half of it with half the weight and a floor or
// ceiling itself left out. These
// effects overlap and do not add up.
//
// # Intervals
//
// They come from bootstrap samples of the count table, with a stream of random
// numbers of their own. Skewness, the logarithm of the kurtosis, and the parts
// that only move with mean and SD have a standard error from their influence
// function, and an interval of max(t, q) of these each way, q the level's
// quantile of the studentised replicates; where the given curve comes from norm
// people, what its mean and SD account for has the variance of gap.Estimate.V
// added. The others have the standard error of the replicates. For asymmetry
// and rest it is widened as by Agresti & Coull (1998) for the two shares in
// them, which does not collapse where nobody is beyond the cutoff: with Q = S+R, or 2-S-R if that is less, and Q̃ = (nQ+2)/(n+4),
//
//	SE² = Var* + max(0, Q̃(1-Q̃) - Q(1-Q))/(4n)
//
// and likewise for heaps, Q being the share of the people at and around the
// heaps that a region cuts in two. The interval holds both t·SE each way and
// the percentile interval: reflection about the mean puts a kink into
// asymmetry and rest where the scores begin, and there either alone is too
// short. The single most extreme score has no interval: it is what it is.
//
// testdata/shape/README.md has the coverage. Skewness and kurtosis of strongly
// skewed or heavy-tailed scores are badly known from any sample; their
// intervals are too short there, on the side away from 0 (core/words leaves
// that limit out), and end where those of n scores must: |skewness| at
// (n-2)/√(n-1), kurtosis at 1 and n-2+1/(n-1).
package shape
