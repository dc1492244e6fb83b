package calibration

import (
	"math"
	"math/rand/v2"

	"gonum.org/v1/gonum/stat/distuv"

	"tailgap/core/curve"
)

// Group is some of the study's populations, by what part they had in the
// choice of the method.
type Group struct {
	Name        string
	Populations []Population
}

// Groups are all populations of the study.
func Groups() []Group {
	return []Group{
		{"eleven that the method was chosen by", chosen()},
		{"eight that it was checked with", checked()},
		{"three more it was tuned with", tuned()},
		{"four that had no part in it", fresh()},
		{"gross errors", grossErrors()},
	}
}

// Populations are those of all groups.
func Populations() (all []Population) {
	for _, group := range Groups() {
		all = append(all, group.Populations...)
	}
	return all
}

func chosen() []Population {
	return []Population{
		rounded("normal(50, 10) rounded", 0, 100, func(x float64) float64 { return normalBelow(x, 50, 10) }),
		discrete("Poisson(3)", 0, 1, weights(60, distuv.Poisson{Lambda: 3}.Prob)),
		discrete("negative binomial, mean 10, variance 40", 0, 1, weights(400, negativeBinomial(10, 40))),
		discrete("beta-binomial(30; 0.6, 2)", 0, 1, weights(31, betaBinomial(30, 0.6, 2))),
		discrete("beta-binomial(30; 5, 5)", 0, 1, weights(31, betaBinomial(30, 5, 5))),
		discrete("uniform 7 to 32", 7, 1, weights(26, func(float64) float64 { return 1 })),
		rounded("two groups: 0.7 normal(20, 4) + 0.3 normal(40, 4), rounded", -30, 90, func(x float64) float64 {
			return 0.7*normalBelow(x, 20, 4) + 0.3*normalBelow(x, 40, 4)
		}),
		logNormal("lognormal, log-SD 0.8", 0.8),
		exponential(),
		studentFive(),
		heaped(),
	}
}

func checked() []Population {
	return []Population{
		rounded("normal(100, 15) rounded", -50, 250, func(x float64) float64 { return normalBelow(x, 100, 15) }),
		discrete("zero-inflated Poisson: 0.3 zeros, else Poisson(4)", 0, 1, weights(60, func(k float64) float64 {
			p := 0.7 * distuv.Poisson{Lambda: 4}.Prob(k)
			if k == 0 {
				p += 0.3
			}
			return p
		})),
		discrete("binomial(20; 0.93), a ceiling", 0, 1, weights(21, distuv.Binomial{N: 20, P: 0.93}.Prob)),
		discrete("geometric(0.2)", 0, 1, weights(400, func(k float64) float64 { return math.Pow(0.8, k) })),
		inTens(),
		logNormal("lognormal, log-SD 0.4", 0.4),
		gammaTwo(),
		logistic(),
	}
}

// tuned are scores as they are met with in questionnaires and at the clock.
func tuned() []Population {
	return []Population{
		discrete("one five-point item", 1, 1, []float64{0.05, 0.1, 0.2, 0.4, 0.25}),
		minutes(),
		exponentiallyModified(),
	}
}

func fresh() []Population {
	return []Population{
		discrete("negative binomial, mean 4, variance 24", 0, 1, weights(400, negativeBinomial(4, 24))),
		rounded("100·beta(8, 2) rounded", 0, 100, func(x float64) float64 {
			return distuv.Beta{Alpha: 8, Beta: 2}.CDF(math.Max(0, math.Min(1, x/100)))
		}),
		weibull(),
		laplace(),
	}
}

// grossErrors are rare, and far enough off to make the SD: the samples without
// one can't tell, whatever the method.
func grossErrors() []Population {
	return []Population{
		rounded("two in a hundred far off: 0.98 normal(27, 5) + 0.02 normal(-20, 20), rounded", -120, 80, func(x float64) float64 {
			return 0.98*normalBelow(x, 27, 5) + 0.02*normalBelow(x, -20, 20)
		}),
	}
}

func weights(n int, probability func(k float64) float64) []float64 {
	w := make([]float64, n)
	for k := range w {
		w[k] = probability(float64(k))
	}
	return w
}

func normalBelow(x, mean, sd float64) float64 { return curve.UpperTail((mean - x) / sd) }

// rounded is a distribution rounded to whole numbers.
func rounded(name string, low, high int, below func(x float64) float64) Population {
	return discrete(name, float64(low), 1, weights(high-low+1, func(k float64) float64 {
		x := float64(low) + k
		return below(x+0.5) - below(x-0.5)
	}))
}

func negativeBinomial(mean, variance float64) func(k float64) float64 {
	p := mean / variance
	size := mean * p / (1 - p)
	return func(k float64) float64 {
		return math.Exp(logGamma(k+size) - logGamma(size) - logGamma(k+1) + size*math.Log(p) + k*math.Log1p(-p))
	}
}

func betaBinomial(n, a, b float64) func(k float64) float64 {
	logBeta := func(a, b float64) float64 { return logGamma(a) + logGamma(b) - logGamma(a+b) }
	return func(k float64) float64 {
		choose := logGamma(n+1) - logGamma(k+1) - logGamma(n-k+1)
		return math.Exp(choose + logBeta(k+a, n-k+b) - logBeta(a, b))
	}
}

func logGamma(x float64) float64 {
	y, _ := math.Lgamma(x)
	return y
}

// heaped is normal(50, 10) rounded to whole numbers, half of them to fives.
func heaped() Population {
	below := func(x float64) float64 { return normalBelow(x, 50, 10) }
	return discrete("normal(50, 10), half heaped on fives", 0, 1, weights(101, func(x float64) float64 {
		p := 0.5 * (below(x+0.5) - below(x-0.5))
		if math.Mod(x, 5) == 0 {
			p += 0.5 * (below(x+2.5) - below(x-2.5))
		}
		return p
	}))
}

// inTens is normal(50, 20) rounded to tens.
func inTens() Population {
	return discrete("normal(50, 20) in tens", -60, 10, weights(23, func(k float64) float64 {
		x := -60 + 10*k
		return normalBelow(x+5, 50, 20) - normalBelow(x-5, 50, 20)
	}))
}

// minutes is a lognormal time with median 20 in whole minutes, a third of it
// told in fives.
func minutes() Population {
	below := func(x float64) float64 {
		if x <= 0 {
			return 0
		}
		return normalBelow(math.Log(x), math.Log(20), 0.5)
	}
	return discrete("minutes: lognormal, log-SD 0.5, a third told in fives", 0, 1, weights(300, func(x float64) float64 {
		p := (below(x+0.5) - below(x-0.5)) * 2 / 3
		if math.Mod(x, 5) == 0 {
			p += (below(x+2.5) - below(x-2.5)) / 3
		}
		return p
	}))
}

func logNormal(name string, logSD float64) Population {
	variance := logSD * logSD
	return Population{
		Name: name, Mean: math.Exp(variance / 2), SD: math.Sqrt(math.Expm1(variance) * math.Exp(variance)),
		draw: func(random *rand.Rand) float64 { return math.Exp(logSD * random.NormFloat64()) },
		beyond: func(x float64) float64 {
			if x <= 0 {
				return 1
			}
			return curve.UpperTail(math.Log(x) / logSD)
		},
	}
}

func exponential() Population {
	return Population{
		Name: "exponential", Mean: 1, SD: 1,
		draw:   func(random *rand.Rand) float64 { return random.ExpFloat64() },
		beyond: func(x float64) float64 { return math.Exp(-math.Max(0, x)) },
	}
}

func gammaTwo() Population {
	return Population{
		Name: "gamma(2)", Mean: 2, SD: math.Sqrt2,
		draw: func(random *rand.Rand) float64 { return random.ExpFloat64() + random.ExpFloat64() },
		beyond: func(x float64) float64 {
			if x <= 0 {
				return 1
			}
			return (1 + x) * math.Exp(-x)
		},
	}
}

func logistic() Population {
	return Population{
		Name: "logistic", Mean: 0, SD: math.Pi / math.Sqrt(3),
		draw: func(random *rand.Rand) float64 {
			u := random.Float64()
			return math.Log(u / (1 - u))
		},
		beyond: func(x float64) float64 { return 1 / (1 + math.Exp(x)) },
	}
}

func studentFive() Population {
	t := distuv.StudentsT{Mu: 0, Sigma: 1, Nu: 5}
	return Population{
		Name: "t with 5 degrees of freedom", Mean: 0, SD: math.Sqrt(5.0 / 3),
		draw: func(random *rand.Rand) float64 {
			squares := 0.0
			for range 5 {
				x := random.NormFloat64()
				squares += x * x
			}
			return random.NormFloat64() / math.Sqrt(squares/5)
		},
		beyond: func(x float64) float64 { return t.CDF(-x) },
	}
}

// exponentiallyModified is normal(400, 40) + exponential(mean 150), as response
// times in milliseconds often are.
func exponentiallyModified() Population {
	const mean, sd, tail = 400.0, 40.0, 150.0
	beyond := func(x float64) float64 {
		z := (x - mean) / sd
		shift := sd / tail
		return curve.UpperTail(z) + math.Exp(shift*shift/2-z*shift)*curve.UpperTail(shift-z)
	}
	return Population{
		Name: "normal(400, 40) + exponential(150)", Mean: mean + tail, SD: math.Hypot(sd, tail),
		draw:   func(random *rand.Rand) float64 { return mean + sd*random.NormFloat64() + tail*random.ExpFloat64() },
		beyond: beyond,
	}
}

// weibull has shape 0.8: a longer tail than the exponential.
func weibull() Population {
	const shape = 0.8
	moment := func(k float64) float64 { return math.Gamma(1 + k/shape) }
	return Population{
		Name: "Weibull, shape 0.8", Mean: moment(1), SD: math.Sqrt(moment(2) - moment(1)*moment(1)),
		draw:   func(random *rand.Rand) float64 { return math.Pow(random.ExpFloat64(), 1/shape) },
		beyond: func(x float64) float64 { return math.Exp(-math.Pow(math.Max(0, x), shape)) },
	}
}

func laplace() Population {
	return Population{
		Name: "Laplace", Mean: 0, SD: math.Sqrt2,
		draw: func(random *rand.Rand) float64 { return random.ExpFloat64() - random.ExpFloat64() },
		beyond: func(x float64) float64 {
			if x < 0 {
				return 1 - math.Exp(x)/2
			}
			return math.Exp(-x) / 2
		},
	}
}
