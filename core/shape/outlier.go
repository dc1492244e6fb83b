package shape

import (
	"math"

	"gonum.org/v1/gonum/stat/distuv"
)

// outlying is true where the score that is farthest from the mean of n, so
// many SDs away, would be an outlier among normal scores: Grubbs's (1969)
// two-sided test at 1%. Among other scores it says no more than that the
// score is far out.
func outlying(n int, z float64) bool {
	const level = 0.01
	if n < 3 {
		return false
	}
	people := float64(n)
	t := distuv.StudentsT{Mu: 0, Sigma: 1, Nu: people - 2}.Quantile(level / (2 * people))
	return math.Abs(z) > (people-1)/math.Sqrt(people)*math.Sqrt(t*t/(people-2+t*t))
}
