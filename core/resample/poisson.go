package resample

import "math"

// poissons draw how many people a resample has of each score, nearly: a
// Poisson number for each, together a few less than the n that are wanted.
// Given how many they come to, Poisson numbers are multinomial; with the
// people still missing drawn one by one, and a draw of more than n thrown
// away, all n are exactly so. That takes one random number for each score and
// about shortBy·√n for people, instead of n.
//
// Each number comes from an alias table (Walker 1977, filled as by Vose 1991),
// whose probabilities are right to 2⁻³².
type poissons struct {
	scores  []aliasTable
	columns []aliasColumn // of all tables
}

// aliasTable is one score's: 2ᵏ columns from first on, of numbers from least on.
type aliasTable struct {
	first, mask uint32
	least       int32
}

// aliasColumn is its own number, or, where 32 random bits are at or above the
// threshold, the alias.
type aliasColumn struct {
	threshold uint32
	alias     uint32
}

// shortBy is how many SDs fewer than n the Poisson numbers are together, so
// that they are more than n once in 700 draws.
const shortBy = 3

// newPoissons makes the tables for these counts.
func newPoissons(counts []int, n int) *poissons {
	p := &poissons{}
	part := 1 - shortBy/math.Sqrt(float64(n))
	for _, count := range counts {
		p.add(float64(count) * part)
	}
	return p
}

// add adds the table of a Poisson distribution. Its probabilities come from
// ratios of neighbours alone, which every platform computes alike.
func (p *poissons) add(mean float64) {
	const negligible = 1e-14
	mode := int(mean)
	var below []float64 // from the mode down
	for w, k := 1.0, mode; w > negligible && k >= 0; k-- {
		below = append(below, w)
		w *= float64(k) / mean
	}
	least := mode - len(below) + 1
	var weights []float64
	for i := range below {
		weights = append(weights, below[len(below)-1-i])
	}
	for w, k := mean/float64(mode+1), mode+1; w > negligible; k++ {
		weights = append(weights, w)
		w *= mean / float64(k+1)
	}
	size := 1
	for size < len(weights) {
		size *= 2
	}
	p.scores = append(p.scores, aliasTable{uint32(len(p.columns)), uint32(size - 1), int32(least)})
	p.columns = append(p.columns, aliasColumns(weights, size)...)
}

// aliasColumns are the columns of a table of so many, at least as many as
// there are weights.
func aliasColumns(weights []float64, size int) []aliasColumn {
	total := 0.0
	for _, w := range weights {
		total += w
	}
	filled := make([]float64, size) // of each column, by its own number; 1 is full
	columns := make([]aliasColumn, size)
	var small, large []int
	for i := range filled {
		if i < len(weights) {
			filled[i] = weights[i] * float64(size) / total
		}
		if filled[i] < 1 {
			small = append(small, i)
		} else {
			large = append(large, i)
		}
		columns[i] = aliasColumn{math.MaxUint32, uint32(i)}
	}
	for len(small) > 0 && len(large) > 0 {
		short, long := small[len(small)-1], large[len(large)-1]
		small = small[:len(small)-1]
		columns[short] = aliasColumn{uint32(filled[short] * (1 << 32)), uint32(long)}
		filled[long] -= 1 - filled[short]
		if filled[long] < 1 {
			large = large[:len(large)-1]
			small = append(small, long)
		}
	}
	return columns
}

// draw fills into and returns how many people that are.
func (p *poissons) draw(r *stream, into []int32) int {
	state := *r
	var random uint64
	people := 0
	for i := range p.scores {
		table := &p.scores[i]
		random, state = state.next()
		number := uint32(random) & table.mask
		if column := p.columns[table.first+number]; uint32(random>>32) >= column.threshold {
			number = column.alias
		}
		into[i] = table.least + int32(number)
		people += int(into[i])
	}
	*r = state
	return people
}
