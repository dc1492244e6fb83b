package words

import "tailgap/core/verdict"

// Limit says one side of a tolerance: "1 point", "20% of the count", "40
// people".
func Limit(l verdict.Limit) string { return limit(l) }

// People says how many people a share is applied to: "4,000 people", "1
// person".
func People(n float64) string {
	if n == 1 {
		return "1 person"
	}
	return people(n) + " people"
}

// SettleNumber prints how many more people would settle a verdict, rounded up
// to three digits: "1,240".
func SettleNumber(more int) string { return Count(roundUp(more)) }

// Z prints how many SDs from the mean a cutoff lies, for a table: "-1.59".
func Z(z float64) string { return signed(z, 2) }
