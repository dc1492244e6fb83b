// Package ask turns a question and data into an answer: one call for each
// command, the same from every face.
package ask

import (
	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/sample"
	"tailgap/core/verdict"
)

// QuestionFormat is the version of Question that this program reads and writes.
const QuestionFormat = "tailgap/question/1"

// Question is everything that is asked, and none of the data: a file to
// share, archive or preregister. Question and data give one Answer.
type Question struct {
	Format     string            `json:"format"`
	Scores     []string          `json:"scores"`     // columns, by name or by number from 1
	Missing    []string          `json:"missing"`    // cells that stand for "no score", such as -9 or 99
	Header     sample.Header     `json:"header"`     // "auto", "yes" or "no"
	Cutoffs    []cutoff.Cutoff   `json:"cutoffs"`    // ">=70", "20..30"
	Step       sample.StepChoice `json:"step"`       // "auto", "none" or the step itself
	Range      *sample.Range     `json:"range"`      // "0:83", the ends of the scale; null: the lowest and highest seen
	Curve      *curve.Given      `json:"curve"`      // {"mean":54.6,"sd":13.1}, with "norm_n":870 if from 870 people; null: fitted to the scores
	HalfStep   bool              `json:"half_step"`  // judge with the half-step
	TooHigh    *verdict.Limit    `json:"too_high"`   // "1pt", "20%count" or "40heads"; null: no limit
	TooLow     *verdict.Limit    `json:"too_low"`    // likewise
	Heads      *float64          `json:"heads"`      // how many people the share will be applied to
	Everyone   bool              `json:"everyone"`   // these are all the people: the gap is exact
	Level      float64           `json:"level"`      // of intervals and bands, in (0,1)
	Replicates int               `json:"replicates"` // bootstrap samples
	Seed       uint64            `json:"seed"`

	Workers int `json:"-"` // how many goroutines share the work; 0: one for each core. The answer is the same for any.
}
