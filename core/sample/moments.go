package sample

import "math"

// Moments describe a sample. SD has the divisor n-1; M2, M3 and M4 are the
// central moments with divisor n.
type Moments struct {
	N          int
	Mean, SD   float64
	M2, M3, M4 float64
}

// Moments computes mean, SD and central moments in two passes with
// compensated sums, so that the mean's own rounding error does not reach the
// SD (Chan, Golub & LeVeque 1983, the corrected two-pass algorithm). The SD
// of one person is NaN.
func (c Counts) Moments() Moments {
	n := float64(c.N)
	first := sum{}
	for i, score := range c.Score {
		first.addProduct(float64(c.Count[i]), score)
	}
	mean := first.value() / n

	var d1, d2, d3, d4 sum
	for i, score := range c.Score {
		d, count := score-mean, float64(c.Count[i])
		d1.add(count * d)
		d2.add(count * d * d)
		d3.add(count * d * d * d)
		d4.add(count * d * d * d * d)
	}
	// Move the sums from the rounded mean to the mean itself.
	shift := d1.value() / n
	r2, r3, r4 := d2.value()/n, d3.value()/n, d4.value()/n
	m2 := r2 - shift*shift
	return Moments{
		N: c.N, Mean: mean + shift, SD: math.Sqrt(m2 * n / (n - 1)),
		M2: m2,
		M3: r3 - 3*shift*r2 + 2*shift*shift*shift,
		M4: r4 - 4*shift*r3 + 6*shift*shift*r2 - 3*shift*shift*shift*shift,
	}
}

// Skewness is the third standardised moment, g1 = m3/m2^1.5 (Joanes & Gill
// 1998); NaN when all scores are equal.
func (m Moments) Skewness() float64 { return m.M3 / (m.M2 * math.Sqrt(m.M2)) }

// ExcessKurtosis is the fourth standardised moment less 3, g2 = m4/m2² - 3
// (Joanes & Gill 1998); NaN when all scores are equal.
func (m Moments) ExcessKurtosis() float64 { return m.M4/(m.M2*m.M2) - 3 }

// sum adds with the rounding errors carried along (Neumaier 1974).
type sum struct{ total, lost float64 }

func (s *sum) add(x float64) {
	t := s.total + x
	if math.Abs(s.total) >= math.Abs(x) {
		s.lost += (s.total - t) + x
	} else {
		s.lost += (x - t) + s.total
	}
	s.total = t
}

// addProduct adds x*y with the product's own rounding error.
func (s *sum) addProduct(x, y float64) {
	product := float64(x * y)
	s.add(product)
	s.lost += math.FMA(x, y, -product)
}

func (s *sum) value() float64 { return s.total + s.lost }
