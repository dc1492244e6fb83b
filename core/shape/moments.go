package shape

import "math"

// moments are skewness and kurtosis of a resample with n times the variance
// of each, from their influence functions: of the standardised score u,
//
//	skewness g: u³ - 3u - g - 3g(u²-1)/2
//	kurtosis b: u⁴ - 4gu - 2bu² + b
//
// with moments about the mean, divisor n.
type moments struct {
	skewness, skewnessVariance float64
	kurtosis, kurtosisVariance float64 // 3 for a normal score
}

func (s *spans) moments(count []int32, n, mean float64) moments {
	var m2, m3, m4, m5, m6, m8 float64
	for i, u := range s.table.U {
		if count[i] == 0 {
			continue
		}
		d := u - mean
		dd := d * d
		p := float64(count[i]) * dd
		m2 += p
		m3 += p * d
		p *= dd
		m4 += p
		m5 += p * d
		p *= dd
		m6 += p
		m8 += p * dd
	}
	perVariance := n / m2
	perSD := math.Sqrt(perVariance)
	square := perVariance * perVariance
	g, b := m3/n*perVariance*perSD, m4/n*square
	s5, s6, s8 := m5/n*square*perSD, m6/n*square*perVariance, m8/n*square*square
	return moments{
		skewness: g, kurtosis: b,
		// E[(u³ - 3u - g - 1.5g(u²-1))²] and E[(u⁴ - 4gu - 2bu² + b)²], multiplied out.
		skewnessVariance: math.Max(0, s6-g*g-6*b+9-3*g*(s5-g)+9*g*g+2.25*g*g*(b-1)),
		kurtosisVariance: math.Max(0, s8-b*b+16*g*g+4*b*b*(b-1)-8*g*s5-4*b*(s6-b)+16*g*g*b),
	}
}
