package figure_test

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/figure"
	"tailgap/core/words"
)

func TestSweepSaysItsFinding(t *testing.T) {
	a := recipes["vocabulary"].answer()
	r := a.Results[0]
	d := read(t, figure.Sweep(a.Question, r, r.Sweeps[1], figure.Options{Width: 1100, Selected: 1, Prefix: "upper"}))
	assert.Equal(t, "How far the curve is from the count: vocabulary, at this score or above", d.title)
	assert.Contains(t, d.desc, words.Sentence(a.Question, r.Cutoffs[1]))
	assert.Contains(t, d.desc, words.Sentence(a.Question, r.Cutoffs[2]))
	assert.NotContains(t, d.desc, words.Sentence(a.Question, r.Cutoffs[0]), "a cutoff of the other side")
	for _, sentence := range words.Trusted(a.Question, r, r.Sweeps[1]) {
		assert.Contains(t, d.desc, sentence)
	}
	assert.Contains(t, d.raw, `role="img" aria-labelledby="upper-title upper-description"`)
	for _, id := range d.ids {
		assert.True(t, strings.HasPrefix(id, "upper-"), id)
	}
}

func TestSweepDrawsWhatThereIs(t *testing.T) {
	classes := func(m recipe, sweep int) map[string]int {
		a := m.answer()
		return read(t, figure.Sweep(a.Question, a.Results[0], a.Results[0].Sweeps[sweep], figure.Options{Width: 1100, Selected: -1})).classes
	}
	vocabulary := classes(recipes["vocabulary"], 1)
	assert.Equal(t, 1, vocabulary["band"])
	assert.Equal(t, 1, vocabulary["corridor"])
	assert.Equal(t, 2, vocabulary["edge"], "both limits of the tolerance")
	assert.Equal(t, 2, vocabulary["dot"], "one for each cutoff of this side")
	assert.Equal(t, 2, vocabulary["solid"], "both fail")
	assert.Equal(t, 1, vocabulary["aside"], "the cutoff of the other side")
	assert.NotZero(t, vocabulary["trivial"])

	minutes := classes(recipes["minutes"], 0)
	assert.Equal(t, 1, minutes["corridor"])
	assert.Equal(t, 1, minutes["edge"], "no limit on too low")

	everyone := classes(recipes["everyone"], 0)
	for _, absent := range []string{"band", "corridor", "edge", "trusted", "trivial", "whisker"} {
		assert.Zero(t, everyone[absent], absent)
	}
	assert.Equal(t, 1, everyone["span"])
}

func TestEveryCutoffHasItsGrip(t *testing.T) {
	a := recipes["crowd"].answer()
	r := a.Results[0]
	require.Len(t, r.Sweeps, 4)
	for _, s := range r.Sweeps {
		d := read(t, figure.Sweep(a.Question, r, s, figure.Options{Width: 320, Selected: -1}))
		assert.ElementsMatch(t, []string{"0", "1", "2", "3", "4", "5", "6", "7"}, d.cutoffs)
	}
}

// Among very many flags some ask each other to give way in a ring; that must
// neither keep the drawing from ending nor lose a cutoff.
func TestManyCutoffs(t *testing.T) {
	m := recipes["crowd"]
	m.cutoffs = nil
	for i := range 200 {
		m.cutoffs = append(m.cutoffs, ">="+strconv.FormatFloat(float64(i)/2, 'f', -1, 64))
	}
	a := m.answer()
	d := read(t, figure.Sweep(a.Question, a.Results[0], a.Results[0].Sweeps[0], figure.Options{Width: 960, Selected: -1}))
	assert.Len(t, d.cutoffs, 200)
}

// A scale without a step has a jump at each score: an upright line.
func TestJumpsAreDrawn(t *testing.T) {
	m := recipe{name: "x", scores: []float64{1, 2, 4, 7.5}, cutoffs: []string{">=4"}}
	a := m.answer()
	svg := figure.Sweep(a.Question, a.Results[0], a.Results[0].Sweeps[0], figure.Options{Width: 600, Selected: -1})
	_, path, found := strings.Cut(svg, `<path class="gap" d="`)
	require.True(t, found)
	path, _, _ = strings.Cut(path, `"`)
	assert.Equal(t, 4, strings.Count(path, "V"), "one at each score: %s", path)
}

// On a scale with a step the gap is level over each score.
func TestStepsAreDrawn(t *testing.T) {
	m := recipe{name: "x", scores: []float64{1, 2, 4, 7}, step: 1, cutoffs: []string{">=4"}}
	a := m.answer()
	svg := figure.Sweep(a.Question, a.Results[0], a.Results[0].Sweeps[0], figure.Options{Width: 600, Selected: -1})
	_, path, found := strings.Cut(svg, `<path class="gap" d="`)
	require.True(t, found)
	path, _, _ = strings.Cut(path, `"`)
	assert.Equal(t, 7, strings.Count(path, "H"), "one for each score from 1 to 7: %s", path)
	assert.Equal(t, 6, strings.Count(path, "V"), "and a rise between two: %s", path)
}

func TestTheBandDoesNotPressTheGapFlat(t *testing.T) {
	a := recipe{name: "x", scores: whole(20, 11, 50, 10, 0, 100), step: 1, low: 0, high: 100, cutoffs: []string{">=60"}}.answer()
	s := &a.Results[0].Sweeps[0]
	worst := 0.0
	for i, gap := range s.GapPoints {
		s.BandLow[i], s.BandHigh[i] = -90, 90
		worst = math.Max(worst, math.Abs(gap))
	}
	d := read(t, figure.Sweep(a.Question, a.Results[0], *s, figure.Options{Width: 1100, Selected: -1}))
	var highest float64
	labelled := false
	for _, l := range d.lines {
		if points, found := strings.CutPrefix(l.text, "+"); found {
			highest = math.Max(highest, number(t, points))
		}
		labelled = labelled || l.text == "95% band, -90 to +90"
	}
	assert.Less(t, highest, 5*worst)
	assert.True(t, labelled, "a band that leaves the picture says how far it goes")
}

// A number below zero looks the same on an axis, on a flag, in the sentences
// and in a table.
func TestNumbersBelowZeroLookTheSameEverywhere(t *testing.T) {
	m := recipe{name: "x", scores: whole(200, 29, -20, 5, -50, 0), step: 1, cutoffs: []string{"<=-25", "-22..-18"}, tooLow: "1pt"}
	var axis, flag bool
	for _, svg := range m.all(figure.Options{Width: 900, Selected: 0}) {
		assert.NotContains(t, svg, "−")
		for _, l := range read(t, svg).lines {
			axis, flag = axis || l.text == "-20", flag || strings.HasPrefix(l.text, "-25 or below")
		}
	}
	assert.True(t, axis && flag)
}

func TestCountedSaysItsFinding(t *testing.T) {
	a := recipes["vocabulary"].answer()
	r := a.Results[0]
	f := r.Cutoffs[0]
	for _, width := range []int{320, 1100} {
		d := read(t, figure.Counted(a.Question, r, f, figure.Options{Width: width}))
		assert.Equal(t, "Counted against curve: vocabulary, at 11 or below", d.title)
		assert.Contains(t, d.desc, words.Sentence(a.Question, f))
		var written []string
		for _, l := range d.lines {
			written = append(written, l.text)
		}
		assert.Contains(t, written, "curve "+words.Share(f.CurveShare)+" · counted "+words.Share(f.CountedShare))
	}
}

func TestFiguresOfOneResultShareTheirScale(t *testing.T) {
	for name, m := range recipes {
		a := m.answer()
		r := a.Results[0]
		o := figure.Options{Width: 900, Selected: -1}
		ticks := func(svg string) []line {
			var ticks []line
			for _, l := range read(t, svg).lines {
				if l.text != "" && strings.Trim(l.text, "0123456789-.") == "" && l.left > figure.SweepFrame(r, o).Left-30 {
					ticks = append(ticks, line{text: l.text, left: math.Round(l.left)})
				}
			}
			return ticks
		}
		sweep := ticks(figure.Sweep(a.Question, r, r.Sweeps[0], o))
		counted := ticks(figure.Counted(a.Question, r, r.Cutoffs[0], o))
		require.NotEmpty(t, counted, name)
		assert.Subset(t, sweep, counted, name)
	}
}

func TestSheet(t *testing.T) {
	for name, m := range recipes {
		t.Run(name, func(t *testing.T) {
			a := m.answer()
			d := read(t, figure.Sheet(a))
			assert.Equal(t, m.demo, strings.Contains(d.desc, "DEMO"))
			assert.Equal(t, m.demo, strings.HasPrefix(d.title, "DEMO"))
			for _, f := range a.Results[0].Cutoffs {
				assert.Equal(t, 1, strings.Count(d.desc, words.Sentence(a.Question, f)), "each cutoff once, a stretch too")
			}
			for _, caution := range words.Cautions() {
				assert.Contains(t, d.desc, caution)
			}
			assert.Contains(t, d.raw, "prefers-color-scheme:dark")
			assert.NotContains(t, d.raw, "var(--", "a file of its own has no page to take colours from")
		})
	}
}

func TestSheetSaysEachThingOnce(t *testing.T) {
	a := recipes["vocabulary"].answer()
	own := "scores pile up on multiples of 5"
	a.Results[0].Warnings = []string{own}
	a.Warnings = []string{a.Results[0].Score + ": " + own, "the columns have odd names"}
	d := read(t, figure.Sheet(a))
	for _, once := range []string{"cores pile up on multiples of 5.", "The columns have odd names.", a.Program} {
		assert.Equal(t, 1, strings.Count(d.desc, once), once)
	}
}

func TestSheetOfNothing(t *testing.T) {
	read(t, figure.Sheet(ask.Answer{})).legible(t)
}

func TestSameBytesEveryTime(t *testing.T) {
	for _, m := range recipes {
		o := figure.Options{Width: 700, Selected: 0}
		assert.Equal(t, m.all(o), m.all(o))
	}
}

func TestHostileNames(t *testing.T) {
	for _, name := range []string{
		`</svg><script>alert(1)</script>`, `" onload="x`, `a & b < c > d ' e`, "nul\x00 bell\x07 bad\xff",
		"\u202eright to left", strings.Repeat("a very long name ", 60), "", "漢字の得点 ПРИВЕТ",
	} {
		m := recipes["vocabulary"]
		m.name = name
		for _, svg := range m.all(figure.Options{Width: 320, Selected: 0}) {
			d := read(t, svg)
			d.legible(t)
			assert.NotContains(t, svg, "<script")
			assert.NotContains(t, svg, "\u202e")
			assert.Equal(t, 1, strings.Count(svg, `role="img"`))
		}
	}
}

// What Judge never gives must still not break a figure.
func TestHostileNumbers(t *testing.T) {
	bad := []float64{math.NaN(), math.Inf(1), math.Inf(-1), math.MaxFloat64, -math.MaxFloat64, 0}
	zero := 0.0
	for _, x := range bad {
		a := recipes["twenty"].answer()
		r := &a.Results[0]
		r.Sample.Low, r.Sample.High, r.Curve.SD, r.Curve.Mean = x, x, x, x
		r.Sweeps[0].GapPoints[3], r.Sweeps[0].Threshold[5], r.Sweeps[0].BandHigh[7], r.Sweeps[0].CountedShare[2] = x, x, x, x
		r.Cutoffs[0].GapPoints, r.Cutoffs[0].GapLow, r.Cutoffs[0].CurveShare = x, &x, x
		r.Cutoffs[1].Cutoff = cutoff.Cutoff{Side: cutoff.Stretch, At: x, To: x}
		a.Question.Heads = &x
		read(t, figure.Sheet(a))
		r.Sample.Step = &x
		read(t, figure.Sheet(a))
		r.Sample.Step = &zero
		read(t, figure.Sheet(a))
	}
	a := recipes["twenty"].answer()
	a.Results[0].Sweeps[0].CountedShare = a.Results[0].Sweeps[0].CountedShare[:4]
	read(t, figure.Sheet(a))
	a.Results[0].Sweeps = nil
	read(t, figure.Sheet(a))
	read(t, figure.Counted(a.Question, a.Results[0], a.Results[0].Cutoffs[0], figure.Options{}))
	read(t, figure.Sweep(ask.Question{}, ask.Result{}, ask.Sweep{}, figure.Options{}))
}

// On a scale without a step a stretch can be a single score, and its bar has
// no width to speak of.
func TestStretchOfOneScore(t *testing.T) {
	m := recipe{name: "x", scores: []float64{1, 2.5, 2.5, 4, 7}, cutoffs: []string{"2.5..2.5"}}
	a := m.answer()
	d := read(t, figure.Counted(a.Question, a.Results[0], a.Results[0].Cutoffs[0], figure.Options{Width: 700}))
	d.legible(t)
	assert.Equal(t, 1, d.classes["beyond"])
	assert.NotContains(t, d.raw, "1000000")
}
