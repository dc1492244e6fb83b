package calibration

import (
	"fmt"
	"io"
	"math"
	"slices"
	"strings"
)

// Summary is the spread of a figure over cells: its worst, its 5th percentile
// (the value with a twentieth of the cells below it) and its mean.
type Summary struct{ Worst, Fifth, Mean float64 }

func summarise(values []float64) Summary {
	if len(values) == 0 {
		return Summary{math.NaN(), math.NaN(), math.NaN()}
	}
	sorted := slices.Sorted(slices.Values(values))
	sum := 0.0
	for _, v := range sorted {
		sum += v
	}
	return Summary{sorted[0], sorted[len(sorted)/20], sum / float64(len(sorted))}
}

// Coverage is that of the intervals over all cells of the tallies that want
// is true for.
func Coverage(tallies []Tally, want func(t Tally) bool) Summary {
	var values []float64
	for _, t := range tallies {
		if want(t) {
			for _, c := range t.Cells {
				values = append(values, t.Coverage(c))
			}
		}
	}
	return summarise(values)
}

// BandCoverage is that of the bands likewise.
func BandCoverage(tallies []Tally, want func(t Tally) bool) Summary {
	var values []float64
	for _, t := range tallies {
		if want(t) {
			values = append(values, t.BandCoverage())
		}
	}
	return summarise(values)
}

// RelativeWidth is the median, over the cells, of the mean width over the
// oracle's. Cells in which the oracle's interval is narrower than a hundredth
// of a point are left out.
func RelativeWidth(tallies []Tally, want func(t Tally) bool) float64 {
	var values []float64
	for _, t := range tallies {
		for _, c := range t.Cells {
			if want(t) && c.Oracle >= 0.01 {
				values = append(values, c.Width/c.Oracle)
			}
		}
	}
	return median(values)
}

// Wrong is how often a verdict at the boundary was wrong: the median and the
// largest part of the samples over all cells; NaN where there is none.
func Wrong(tallies []Tally, want func(t Tally) bool, of func(c Cell) int) (middle, largest float64) {
	var values []float64
	for _, t := range tallies {
		if want(t) {
			for _, c := range t.Cells {
				values = append(values, float64(of(c))/float64(t.Samples))
			}
		}
	}
	if len(values) == 0 {
		return math.NaN(), math.NaN()
	}
	return median(values), slices.Max(values)
}

func median(values []float64) float64 {
	if len(values) == 0 {
		return math.NaN()
	}
	sorted := slices.Sorted(slices.Values(values))
	return (sorted[(len(sorted)-1)/2] + sorted[len(sorted)/2]) / 2
}

// StrongSkew is the population that defeats every method: no sample shows its
// SD.
const StrongSkew = "lognormal, log-SD 0.8"

// Has is true for the tallies of a group's populations, without those named.
func (g Group) Has(t Tally, without ...string) bool {
	return !slices.Contains(without, t.Population) && slices.ContainsFunc(g.Populations, func(p Population) bool { return p.Name == t.Population })
}

const heading = `# How well interval, band and verdict are calibrated

Made by "make calibrate"; DEVELOPERS.md says how to read it. cells.csv has a
row for each population, sample size and cutoff, bands.csv one for each
population and sample size; the files beginning with slice- are the small part
that "make test" simulates again. A coverage from 2,000 samples is uncertain by
0.005 (one standard error, where it is 0.95; 0.007 from 1,000), and the worst of
many cells is so partly by chance: it tends to be worse than any is in truth.

`

// WriteSummary writes the results as a page of Markdown tables.
func WriteSummary(w io.Writer, results []Result) error {
	page := &strings.Builder{}
	page.WriteString(heading)
	for _, r := range results {
		if r.Name == Main {
			mainTables(page, r.Tallies)
		}
	}
	otherTable(page, results)
	_, err := io.WriteString(w, page.String())
	return err
}

func mainTables(page *strings.Builder, tallies []Tally) {
	page.WriteString("## Fitted curves, level 0.95\n\nCoverage of the interval over populations and cutoffs (worst cell, 5th percentile of the cells, mean), its width over the oracle's (median cell), coverage of the band (worst, mean population).\n\n")
	page.WriteString("| populations | n | worst | 5th | mean | width | band, worst | mean |\n| --- | --- | --- | --- | --- | --- | --- | --- |\n")
	row := func(name string, has func(t Tally) bool) {
		for _, n := range sizes {
			want := func(t Tally) bool { return t.N == n && has(t) }
			c, b := Coverage(tallies, want), BandCoverage(tallies, want)
			fmt.Fprintf(page, "| %s | %d | %.3f | %.3f | %.3f | %.2f | %.3f | %.3f |\n", name, n, c.Worst, c.Fifth, c.Mean, RelativeWidth(tallies, want), b.Worst, b.Mean)
		}
	}
	for i, group := range Groups() {
		row(group.Name, func(t Tally) bool { return group.Has(t) })
		if i == 0 {
			row("the same without the strong lognormal", func(t Tally) bool { return group.Has(t, StrongSkew) })
		}
	}
	page.WriteString("\nEach population: the interval's worst cutoff / mean over cutoffs, and the band.\n\n| population |")
	for _, n := range sizes {
		fmt.Fprintf(page, " n = %d | band |", n)
	}
	page.WriteString("\n| --- |" + strings.Repeat(" --- | --- |", len(sizes)) + "\n")
	for _, p := range Populations() {
		fmt.Fprintf(page, "| %s |", p.Name)
		for _, n := range sizes {
			want := func(t Tally) bool { return t.N == n && t.Population == p.Name }
			c := Coverage(tallies, want)
			fmt.Fprintf(page, " %.3f / %.3f | %.3f |", c.Worst, c.Mean, BandCoverage(tallies, want).Mean)
		}
		page.WriteString("\n")
	}
	page.WriteString("\nVerdicts when the tolerance is the true gap itself, in percent of the samples; false trust: some threshold in the trusted range though its gap is beyond 2 points. Without the gross errors.\n\n")
	grossErrors := Groups()[len(Groups())-1]
	page.WriteString("| n | false holds, median cell | largest | false fails, median cell | largest | false trust, largest |\n| --- | --- | --- | --- | --- | --- |\n")
	for _, n := range sizes {
		want := func(t Tally) bool { return t.N == n && !grossErrors.Has(t) }
		holds, mostHolds := Wrong(tallies, want, func(c Cell) int { return c.FalseHolds })
		fails, mostFails := Wrong(tallies, want, func(c Cell) int { return c.FalseFails })
		trust := 0.0
		for _, t := range tallies {
			if want(t) {
				trust = max(trust, float64(t.FalseTrust)/float64(t.Samples))
			}
		}
		fmt.Fprintf(page, "| %d | %.1f | %.1f | %.1f | %.1f | %.1f |\n", n, 100*holds, 100*mostHolds, 100*fails, 100*mostFails, 100*trust)
	}
}

func otherTable(page *strings.Builder, results []Result) {
	page.WriteString("\n## Other ways of asking\n\nFive populations, n = 50 and 300; columns as above.\n\n")
	page.WriteString("| asked | n | worst | 5th | mean | width | band, worst | false holds, median | largest |\n| --- | --- | --- | --- | --- | --- | --- | --- | --- |\n")
	for _, r := range results {
		if r.Name == Main {
			continue
		}
		for _, n := range sizes {
			want := func(t Tally) bool { return t.N == n }
			c := Coverage(r.Tallies, want)
			if math.IsNaN(c.Mean) {
				continue
			}
			band := "–"
			if r.Sweeps {
				band = fmt.Sprintf("%.3f", BandCoverage(r.Tallies, want).Worst)
			}
			holds, most := Wrong(r.Tallies, want, func(c Cell) int { return c.FalseHolds })
			fmt.Fprintf(page, "| %s | %d | %.3f | %.3f | %.3f | %.2f | %s | %.1f | %.1f |\n", r.Name, n, c.Worst, c.Fifth, c.Mean, RelativeWidth(r.Tallies, want), band, 100*holds, 100*most)
		}
	}
}
