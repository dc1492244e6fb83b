package words

import (
	"slices"
	"strconv"
	"strings"

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

// Method says how the figures came about: "95% intervals (ghost-studentised)
// and bands from 10,000 replicates, seed 1. Made by tailgap 0.1.0." Where all
// the people were counted a curve from norms is judged as it is printed, and
// how it came about is left out.
func Method(a ask.Answer) string {
	q := a.Question
	text := "These are all the people: the gaps are exact and have no interval."
	if q.Curve != nil && q.Curve.NormN != nil {
		text = "These are all the people, and the curve is judged as its norms are printed: the gaps are exact and have no interval."
	}
	if !q.Everyone {
		text = Level(q.Level) + " intervals" + methods(a) + " and bands from " + Count(q.Replicates) + " " +
			plural(q.Replicates, "replicate") + ", seed " + strconv.FormatUint(q.Seed, 10) + "."
	}
	if a.Program != "" {
		text += " Made by " + Line(a.Program) + "."
	}
	return text
}

// methods names each method that an interval of the answer was made with.
func methods(a ask.Answer) string {
	var named []string
	for _, r := range a.Results {
		for _, f := range r.Cutoffs {
			if method := Line(f.Method); method != "" && !slices.Contains(named, method) {
				named = append(named, method)
			}
		}
	}
	if len(named) == 0 {
		return ""
	}
	return " (" + strings.Join(named, "; ") + ")"
}
