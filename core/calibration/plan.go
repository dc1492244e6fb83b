package calibration

import "strings"

// Named is a study with the name that its results are kept under.
type Named struct {
	Name string
	Study
}

// Result is what came of a named study.
type Result struct {
	Name    string
	Sweeps  bool // bands were judged too
	Tallies []Tally
}

// Main is the name of the study of fitted curves at the usual level.
const Main = "fitted"

var (
	sizes     = []int{20, 50, 100, 300, 1000, 5000}
	distances = []float64{-2, -1.5, -1, -0.5, 0, 0.5, 1, 1.5, 2, 2.5, 3}
)

// Full is the whole calibration study: every population at every size, and
// then the other ways of asking at two sizes.
func Full() []Named {
	study := Study{Distances: distances, Samples: 2000, Replicates: 599, Level: 0.95, Seed: 1}
	study.Cases = cases(Populations(), sizes)
	return append([]Named{{Main, study}}, others(1000)...)
}

// Slice is a small part of Full, with fewer samples: the first ones of the
// same.
func Slice() []Named {
	study := Study{Distances: []float64{-2, -1, 0, 1, 2, 3}, Samples: 30, Replicates: 199, Level: 0.95, Seed: 1}
	study.Cases = cases(named("Poisson(3)", "beta-binomial(30; 0.6, 2)", "lognormal, log-SD 0.8"), []int{20, 100})
	slice := []Named{{Main, study}}
	for _, other := range others(20) {
		other.Replicates = 199
		other.Cases = other.Cases[:1]
		slice = append(slice, other)
	}
	return slice
}

// others are the ways of asking beside Main.
func others(samples int) []Named {
	base := Study{Distances: distances, Samples: samples, Replicates: 599, Level: 0.95, Seed: 1}
	base.Cases = cases(named("normal(50, 10) rounded", "negative binomial, mean 10, variance 40", "beta-binomial(30; 0.6, 2)", "two groups", "lognormal, log-SD 0.8"), []int{50, 300})
	vary := func(name string, change func(s *Study)) Named {
		study := base
		change(&study)
		return Named{name, study}
	}
	return []Named{
		vary("half-step", func(s *Study) {
			s.HalfStep = true
			s.Cases = cases(named("normal(50, 10) rounded", "negative binomial, mean 10, variance 40", "beta-binomial(30; 0.6, 2)", "uniform", "one five-point item"), []int{50, 300})
		}),
		vary("level 0.8", func(s *Study) { s.Level = 0.8 }),
		vary("level 0.99", func(s *Study) { s.Level = 0.99 }),
		vary("percent of the count", func(s *Study) { s.OfCount = true }),
		vary("stretches", func(s *Study) { s.Stretches = true }),
		vary("known norms", func(s *Study) { s.Norms = &Norms{Shift: 0.3} }),
		vary("norms from 50 people", func(s *Study) { s.Norms = &Norms{Shift: 0.3, People: 50} }),
		vary("norms from 500 people", func(s *Study) { s.Norms = &Norms{Shift: 0.3, People: 500} }),
	}
}

// named are the populations whose names begin so.
func named(beginnings ...string) (found []Population) {
	for _, beginning := range beginnings {
		for _, p := range Populations() {
			if strings.HasPrefix(p.Name, beginning) {
				found = append(found, p)
			}
		}
	}
	return found
}

func cases(populations []Population, sizes []int) (all []Case) {
	for _, p := range populations {
		for _, n := range sizes {
			all = append(all, Case{p, n})
		}
	}
	return all
}
