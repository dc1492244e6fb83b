package words

import (
	"strconv"

	"tailgap/core/ask"
)

// Cautions are what anyone who uses the figures must bear in mind.
func Cautions() []string {
	return []string{
		"A share in a group says nothing certain about one person.",
		"Cutoffs and norms belong to the instrument's manual, to local rules and to licensed practice.",
		"Screening is not diagnosis.",
	}
}

// Demo marks everything that was made from the demo data.
func Demo() string { return "DEMO: made-up scores of nobody. Nothing here is a finding." }

// Method says how the figures came about: "95% intervals and bands from
// 10,000 replicates, seed 1."
func Method(q ask.Question) string {
	if q.Everyone {
		return "These are all the people: the gaps are exact and have no interval."
	}
	return Level(q.Level) + " intervals and bands from " + Count(q.Replicates) + " " +
		plural(q.Replicates, "replicate") + ", seed " + strconv.FormatUint(q.Seed, 10) + "."
}
