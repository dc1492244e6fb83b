// Package sample holds what was observed: scores on people, as rows and as a
// count table, with their moments and the step of the scale they stand on.
package sample

// Sample is what intake read: one Column for each score that was asked for.
type Sample struct {
	Columns []Column
	Demo    bool // the made-up demo: everything made from it says DEMO
}

// Column is one score. Scores are the usable ones in the order of the rows;
// Rows counts every row of data read, usable or not, so
// Rows = len(Scores) + the counts of Dropped.
type Column struct {
	Name    string
	Rows    int
	Scores  []float64
	Dropped []Dropped
	Doubts  []string // what about the reading may be otherwise: sentences
}

// Dropped counts the rows left out for one reason. First says where the
// first of them stands, as the user counts rows ("line 12").
type Dropped struct {
	Reason string `json:"reason"`
	Count  int    `json:"count"`
	First  string `json:"first"`
}
