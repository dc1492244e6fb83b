// Package demo is a made-up adult reading programme that takes in learners at
// three sites. No person stands behind any row. The data come from a seeded
// generator and are the same bytes on every machine.
package demo

// What a face asks of the demo until it is asked something else.
const (
	Name    = "demo.csv" // what the data are called in messages and as a file
	TooHigh = "1pt"      // tolerances as verdict.ParseLimit reads them
	TooLow  = "2pt"
	Heads   = 4000 // learners expected in the coming year
)

// Scores is the score column the demo opens with.
func Scores() []string { return []string{"vocabulary"} }

// Cutoffs are the programme's rules for one score column, as cutoff.Parse
// reads them: a tutor at 11 or below in vocabulary and the advanced group at
// 30 or above; extra time at 45 form minutes or more. Nil for the others.
func Cutoffs(score string) []string {
	switch score {
	case "vocabulary":
		return []string{"<=11", ">=30"}
	case "form_minutes":
		return []string{">=45"}
	}
	return nil
}

// Missing are the codes that stand for "no score": 99 in vocabulary, -9 in
// form_minutes. Neither is a true value in any column.
func Missing() []string { return []string{"99", "-9"} }
