package report

import (
	"bytes"
	"encoding/csv"
	"slices"

	"tailgap/core/ask"
)

// row is one line of the CSV; its fields and theirs are the columns.
type row struct {
	Score        string        `json:"score"`
	Group        *string       `json:"group"`
	*ask.Finding               // nil for a score that no cutoff was asked of
	Effects      *ask.Effects  `json:"effect"` // nil where Finding is, or where none were looked for
	Shape        *shape        `json:"shape"`
	Sample       ask.Described `json:"sample"`
	Curve        ask.Curve     `json:"curve"`
	Warnings     []string      `json:"warnings"`
	Demo         bool          `json:"demo"`
	Program      string        `json:"program"`
	Question     ask.Question  `json:"question"`
}

// shape is what of a score's shape is the same for all of its cutoffs.
type shape struct {
	Skewness       ask.Measured `json:"skewness"`
	ExcessKurtosis ask.Measured `json:"excess_kurtosis"`
	Tests          ask.Tests    `json:"tests"`
}

// CSV writes one row for each score and cutoff, and one for a score that no
// cutoff was asked of. A column's name is that of the value in the JSON
// answer, nested names joined by an underscore; numbers have every digit that
// the machine has, with a decimal point; what does not apply is an empty cell;
// lists are joined by " | ". Sweeps, the worm, piles and heaps, and the reasons
// for left-out rows are left to the JSON. A number that is none (NaN or infinite) is an error.
//
// Spreadsheets run a cell that begins with = + - or @ as a formula. Where a
// cell of text begins like that (a score's name, a cutoff such as -5..3), an
// apostrophe is put before it, and likewise after a separator inside the text,
// where a spreadsheet with other settings would begin a new cell. Line breaks
// and control characters in text are replaced. Numbers are left as they are.
func CSV(a ask.Answer) ([]byte, error) {
	heading, err := flatten(row{})
	if err != nil {
		return nil, err
	}
	lines := [][]string{heading.names}
	for _, r := range a.Results {
		line := row{
			Score: r.Score, Group: r.Group, Sample: r.Sample, Curve: r.Curve, Demo: a.Demo, Program: a.Program,
			Warnings: slices.Concat(a.General(), r.Warnings), Question: a.Question,
		}
		if s := r.Shape; s != nil {
			line.Shape = &shape{s.Skewness, s.ExcessKurtosis, s.Tests}
		}
		findings := r.Cutoffs
		for i := range max(1, len(findings)) {
			if len(findings) > 0 {
				line.Finding = &findings[i]
				if r.Shape != nil && i < len(r.Shape.Cutoffs) {
					line.Effects = &r.Shape.Cutoffs[i].Effects
				}
			}
			flat, err := flatten(line)
			if err != nil {
				return nil, err
			}
			lines = append(lines, flat.cells)
		}
	}
	var out bytes.Buffer
	err = csv.NewWriter(&out).WriteAll(lines)
	return out.Bytes(), err
}
