package resample

import "math"

// binomial draws from the binomial distribution with n trials of probability
// p: by inversion where few successes are expected, else by transformed
// rejection with squeeze (Hörmann 1993, algorithm BTRS). gonum's
// distuv.Binomial allocates and takes several log-gammas for each draw, and
// this is the inner loop.
func (r *stream) binomial(n int, p float64) int {
	switch {
	case n == 0 || p <= 0:
		return 0
	case p >= 1:
		return n
	case p > 0.5:
		return n - r.binomial(n, 1-p)
	case float64(n)*p < 10:
		return r.binomialByInversion(n, p)
	}
	return r.binomialByRejection(n, p)
}

// binomialByInversion walks up the distribution from 0 (Kachitvichyanukul &
// Schmeiser 1988, algorithm BINV).
func (r *stream) binomialByInversion(n int, p float64) int {
	odds := p / (1 - p)
	probability := math.Exp(float64(n) * math.Log1p(-p))
	u := r.uniform()
	for k := 0; ; k++ {
		if u < probability || k == n {
			return k
		}
		u -= probability
		probability *= odds * float64(n-k) / float64(k+1)
	}
}

func (r *stream) binomialByRejection(n int, p float64) int {
	size, odds := float64(n), p/(1-p)
	spread := math.Sqrt(size * p * (1 - p))
	b := 1.15 + 2.53*spread
	a := -0.0873 + 0.0248*b + 0.01*p
	centre := size*p + 0.5
	squeeze := 0.92 - 4.2/b
	for {
		v := r.uniform()
		u := r.uniform() - 0.5
		us := 0.5 - math.Abs(u)
		k := math.Floor((2*a/us+b)*u + centre)
		if us >= 0.07 && v <= squeeze {
			return int(k)
		}
		if k < 0 || k > size {
			continue
		}
		mode := math.Floor((size + 1) * p)
		alpha := (2.83 + 5.1/b) * spread
		v = math.Log(v * alpha / (a/(us*us) + b))
		bound := (mode+0.5)*math.Log((mode+1)/(odds*(size-mode+1))) +
			(size+1)*math.Log((size-mode+1)/(size-k+1)) +
			(k+0.5)*math.Log(odds*(size-k+1)/(k+1)) +
			stirling(mode) + stirling(size-mode) - stirling(k) - stirling(size-k)
		if v <= bound {
			return int(k)
		}
	}
}

// stirling is the remainder of Stirling's formula for log k!.
func stirling(k float64) float64 {
	if k < 10 {
		return smallStirling[int(k)]
	}
	square := (k + 1) * (k + 1)
	return (1.0/12 - (1.0/360-1.0/1260/square)/square) / (k + 1)
}

// smallStirling has log k! - [(k+½)log(k+1) - (k+1) + ½log 2π] for k = 0..9
// (Hörmann 1993, table of fc).
var smallStirling = [...]float64{
	0.08106146679532726, 0.04134069595540929, 0.02767792568499834,
	0.02079067210376509, 0.01664469118982119, 0.01387612882307075,
	0.01189670994589177, 0.01041126526197209, 0.009255462182712733,
	0.008330563433362871,
}
