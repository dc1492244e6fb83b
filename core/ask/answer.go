package ask

import (
	"slices"

	"tailgap/core/cutoff"
	"tailgap/core/sample"
)

// AnswerFormat is the version of Answer that this program writes.
const AnswerFormat = "tailgap/answer/1"

// Answer is everything that came out. Shares are proportions in 0..1, gaps
// points in -100..100; what does not apply is null.
type Answer struct {
	Format     string   `json:"format"`
	Program    string   `json:"program"`
	Demo       bool     `json:"demo"` // made from the made-up demo data
	Question   Question `json:"question"`
	Warnings   []string `json:"warnings"` // of all results, each led by its score's name where there are several
	Suppressed []string `json:"suppressed"`
	Results    []Result `json:"results"`
}

// General are the answer's warnings but those that a result has as its own:
// what is left to say where the results' own have been said.
func (a Answer) General() []string {
	own := map[string]bool{}
	for _, r := range a.Results {
		for _, warning := range r.Warnings {
			own[warning], own[r.led(warning)] = true, true
		}
	}
	return slices.DeleteFunc(slices.Clone(a.Warnings), func(warning string) bool { return own[warning] })
}

// led is a warning led by the score's name, for where there are several.
func (r Result) led(warning string) string { return r.Score + ": " + warning }

// Result is the answer for one score column.
type Result struct {
	Score    string    `json:"score"`
	Group    *string   `json:"group"`
	Sample   Described `json:"sample"`
	Curve    Curve     `json:"curve"`
	Warnings []string  `json:"warnings"`
	Cutoffs  []Finding `json:"cutoffs"`
	Sweeps   []Sweep   `json:"sweeps"`
	Worst    Worst     `json:"worst"`
	Shape    *Shape    `json:"shape"` // null in answers of programs that did not look at it
}

// Described is the sample in figures. N counts the rows read, Used the
// usable scores among them. Step is null on a scale without one.
type Described struct {
	N              int              `json:"n"`
	Used           int              `json:"used"`
	Dropped        []sample.Dropped `json:"dropped"`
	Mean           float64          `json:"mean"`
	SD             float64          `json:"sd"` // divisor n-1
	Skewness       float64          `json:"skewness"`
	ExcessKurtosis float64          `json:"excess_kurtosis"`
	Min            float64          `json:"min"`
	Max            float64          `json:"max"`
	Distinct       int              `json:"distinct"`
	Step           *float64         `json:"step"`
	StepSource     string           `json:"step_source"` // "detected" or "stated"
	Low            float64          `json:"low"`         // ends of the scale
	High           float64          `json:"high"`
	RangeSource    string           `json:"range_source"` // "observed" or "stated"
}

// Curve is the curve that was judged. Source is "fitted" or "given"; NormN is
// how many people a given one was estimated from, null where it is known.
type Curve struct {
	Kind   string  `json:"kind"`
	Mean   float64 `json:"mean"`
	SD     float64 `json:"sd"`
	Source string  `json:"source"`
	NormN  *int    `json:"norm_n"`
}

// Finding is the answer at one cutoff. Its own Reading is the one that is
// judged; WithoutHalfStep and HalfStep are both ways of reading the curve,
// the latter null on a scale without a step.
type Finding struct {
	Cutoff cutoff.Cutoff `json:"cutoff"`
	Reading
	Counted         int        `json:"counted"` // people at or beyond the cutoff
	CountedShare    float64    `json:"counted_share"`
	Ratio           *float64   `json:"ratio"` // curve share over counted share; null when nobody was counted
	RatioLow        *float64   `json:"ratio_low"`
	RatioHigh       *float64   `json:"ratio_high"` // null: no upper limit
	Heads           *HeadCount `json:"heads"`
	PeopleToSettle  *int       `json:"people_to_settle"` // more people needed; null when not unsettled, or no realistic number
	Method          string     `json:"method"`
	WithoutHalfStep Reading    `json:"without_half_step"`
	HalfStep        *Reading   `json:"half_step"`
	Notes           []string   `json:"notes"`
}

// Reading is the curve read at one cutoff in one way. ZTo is the upper end's
// z for a stretch. GapLow and GapHigh are null when everyone was counted.
type Reading struct {
	Z          float64  `json:"z"`
	ZTo        *float64 `json:"z_to"`
	CurveShare float64  `json:"curve_share"`
	GapPoints  float64  `json:"gap_points"`
	GapLow     *float64 `json:"gap_low"`
	GapHigh    *float64 `json:"gap_high"`
	Verdict    *string  `json:"verdict"` // "holds", "fails" or "unsettled"; null without a tolerance
}

// HeadCount is the gap in people of the question's heads; Low and High are
// null when everyone was counted.
type HeadCount struct {
	Gap  float64  `json:"gap"`
	Low  *float64 `json:"low"`
	High *float64 `json:"high"`
}

// Sweep is the gap at every threshold of the score range for one side. All
// slices have one entry for each threshold, ascending; Low to BandHigh are
// null when everyone was counted. On a scale without a step each score
// stands twice: at the score itself and just past it, where the count jumps.
type Sweep struct {
	Side         cutoff.Side `json:"side"`
	Thinned      bool        `json:"thinned"` // not every threshold of the scale was looked at
	Threshold    []float64   `json:"threshold"`
	CurveShare   []float64   `json:"curve_share"`
	CountedShare []float64   `json:"counted_share"`
	GapPoints    []float64   `json:"gap_points"`
	Low          []float64   `json:"low"`
	High         []float64   `json:"high"`
	BandLow      []float64   `json:"band_low"`
	BandHigh     []float64   `json:"band_high"`
	Trusted      []Stretch   `json:"trusted"` // null without a tolerance
}

// Stretch is a run of thresholds, both ends in, at which the band lies
// inside the tolerance. Trivial: it does so only because both shares there
// (or both shares on the other side) are below the tolerance themselves.
type Stretch struct {
	From    float64 `json:"from"`
	To      float64 `json:"to"`
	Trivial bool    `json:"trivial"`
}

// Worst is the largest gap of all sweeps.
type Worst struct {
	Side      cutoff.Side `json:"side"`
	Threshold float64     `json:"threshold"`
	GapPoints float64     `json:"gap_points"`
}
