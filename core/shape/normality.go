package shape

import (
	"context"
	"math"

	"tailgap/core/curve"
	"tailgap/core/gap"
)

// Fewest people for whom the tests' p-values hold.
const (
	FewestForAndersonDarling = 8
	FewestForLilliefors      = 5
)

// Tests are two tests of normality with mean and SD fitted to the scores. A
// test is there only where it is meant for so many people; with a given curve
// there is none.
type Tests struct {
	AndersonDarling *AndersonDarling
	Lilliefors      *Lilliefors
}

// AndersonDarling is A², A* = A²(1+0.75/n+2.25/n²) and the p-value of A*
// (Stephens 1986, tables 4.7 and 4.9, mean and SD unknown).
type AndersonDarling struct{ A2, A2Star, P float64 }

// Lilliefors is the largest distance D between the shares counted below a
// score and the fitted curve's, on either side of each jump, with its p-value:
// Dallal & Wilkinson's (1986) up to 0.1 and Molin & Abdi's (1998) above.
//
// Dallal & Wilkinson's formula drifts above some hundred people: where Molin &
// Abdi's critical values are those of p = 0.05 it has 0.052 at n = 300, 0.057 at
// 1,000, 0.069 at 10⁴ and 0.097 at 10⁶. Up to 1,000 people, and below 0.001, it
// is kept, because it is the published one and what R's nortest gives. Else D is
// brought to that of 100 people by the factor of those critical values,
// (0.83+n)/√n - 0.01 (Abdi & Molin 2007), which has 0.050 at any n.
type Lilliefors struct{ D, P float64 }

// atOnce is how many scores are looked at between two looks at the context.
const atOnce = 4096

// Test computes the tests. Their p-values are for scores without a step, and
// too small with one: of samples of 100 people from a normal curve rounded to
// whole numbers 8% (Anderson-Darling) and 18% (Lilliefors) had p < 0.05 where
// its SD was 10, 14% and 36% where it was 5; of 1,000 people, SD 10, 55% and 93%
// (200 samples each). It returns the context's error soon after the context
// ends. progress, which may be nil, is told how many of the scores are done.
func Test(ctx context.Context, t gap.Table, progress func(done, of int)) (Tests, error) {
	var tests Tests
	n := t.Counts.N
	if !t.Curve.Fitted || n < min(FewestForAndersonDarling, FewestForLilliefors) {
		return tests, nil
	}
	var a compensated
	d, before, people := 0.0, 0.0, float64(n)
	for i, z := range t.U {
		if i%atOnce == 0 {
			if err := ctx.Err(); err != nil {
				return Tests{}, err
			}
			if i > 0 && progress != nil {
				progress(i, len(t.U))
			}
		}
		count := float64(t.Counts.Count[i])
		after := before + count
		// The weights 2i-1 of the ordered scores, added up over equal ones.
		a.add((after*after - before*before) / people * curve.LogTail(-z))
		left, right := people-before, people-after
		a.add((left*left - right*right) / people * curve.LogTail(z))
		below := curve.UpperTail(-z)
		d = math.Max(d, math.Max(after/people-below, below-before/people))
		before = after
	}
	if n >= FewestForAndersonDarling {
		a.add(people)
		a2 := -a.value()
		star := a2 * (1 + 0.75/people + 2.25/(people*people))
		tests.AndersonDarling = &AndersonDarling{a2, star, andersonDarlingP(star)}
	}
	if n >= FewestForLilliefors {
		tests.Lilliefors = &Lilliefors{d, lillieforsP(d, people)}
	}
	return tests, nil
}

// andersonDarlingP is Stephens's (1986, table 4.9) p-value of A*. From 10 on,
// where nothing is known of it, it is given as at 10.
func andersonDarlingP(a float64) float64 {
	const at10 = 3.7e-24
	switch {
	case a < 0.2:
		return 1 - math.Exp(-13.436+101.14*a-223.73*a*a)
	case a < 0.34:
		return 1 - math.Exp(-8.318+42.796*a-59.938*a*a)
	case a < 0.6:
		return math.Exp(0.9177 - 4.279*a - 1.38*a*a)
	case a < 10:
		return math.Exp(1.2937 - 5.709*a + 0.0186*a*a)
	}
	return at10
}

func lillieforsP(d, n float64) float64 {
	p := dallalWilkinsonP(d, n)
	if n > 1000 && p >= 0.001 {
		p = math.Max(0.001, dallalWilkinsonP(d*molinAbdiFactor(n)/molinAbdiFactor(100), 100))
	}
	if p > 0.1 {
		return math.Max(0.1, molinAbdiP(d, n))
	}
	return p
}

// dallalWilkinsonP is meant for p-values up to 0.1. Above 100 people D is
// brought to that of 100 by the power 0.49 of their ratio.
func dallalWilkinsonP(d, n float64) float64 {
	if n > 100 {
		d *= math.Pow(n/100, 0.49)
		n = 100
	}
	root := math.Sqrt(n + 2.78019)
	return math.Exp(-7.01256*d*d*(n+2.78019) + 2.99587*d*root - 0.122119 + 0.974598/math.Sqrt(n) + 1.67997/n)
}

// molinAbdiFactor times D's critical values is about the same for any n.
func molinAbdiFactor(n float64) float64 { return (0.83+n)/math.Sqrt(n) - 0.01 }

// molinAbdiP is a polynomial in a, which does away with the number of people
// (as in Abdi & Molin 2007).
func molinAbdiP(d, n float64) float64 {
	const b0, b1, b2 = 0.37872256037043, 1.30748185078790, 0.08861783849346
	a := (-(b1 + n) + math.Sqrt((b1+n)*(b1+n)-4*b2*(b0-1/(d*d)))) / (2 * b2)
	p := 0.0
	for _, coefficient := range [...]float64{
		0.00000575586834, -0.00011872227037, 0.00069650013110, 0.00287462087623, -0.06353440854207, 0.40466213484419,
		-1.39874347510845, 2.80015798142101, -3.02959249450445, 1.67819837908004, -0.37782822932809,
	} {
		p = p*a + coefficient
	}
	return math.Min(1, math.Max(0, p))
}

// compensated adds with the rounding errors carried along (Neumaier 1974):
// A² is the small difference of sums as large as the number of people.
type compensated struct{ total, lost float64 }

func (s *compensated) add(x float64) {
	t := s.total + x
	if math.Abs(s.total) >= math.Abs(x) {
		s.lost += (s.total - t) + x
	} else {
		s.lost += (x - t) + s.total
	}
	s.total = t
}

func (s *compensated) value() float64 { return s.total + s.lost }
