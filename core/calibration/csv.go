package calibration

import (
	"encoding/csv"
	"fmt"
	"io"
	"math"
	"strconv"
)

var cellColumns = []string{"study", "population", "n", "samples", "distance_sd", "from", "to", "gap_points", "weight",
	"too_high", "too_low", "width_points", "oracle_points", "false_holds", "false_fails"}

var bandColumns = []string{"study", "population", "n", "samples", "band_holds", "false_trust"}

// WriteCells writes one row for each cell of the named studies.
func WriteCells(w io.Writer, results []Result) error {
	rows := [][]string{cellColumns}
	for _, r := range results {
		for _, t := range r.Tallies {
			for _, c := range t.Cells {
				rows = append(rows, []string{r.Name, t.Population, whole(t.N), whole(t.Samples), short(c.Distance), short(c.From), short(c.To), short(c.Gap), short(c.Weight),
					whole(c.TooHigh), whole(c.TooLow), short(c.Width), short(c.Oracle), whole(c.FalseHolds), whole(c.FalseFails)})
			}
		}
	}
	return csv.NewWriter(w).WriteAll(rows)
}

// WriteBands writes one row for each case of the studies that have a sweep.
func WriteBands(w io.Writer, results []Result) error {
	rows := [][]string{bandColumns}
	for _, r := range results {
		for _, t := range r.Tallies {
			if r.Sweeps {
				rows = append(rows, []string{r.Name, t.Population, whole(t.N), whole(t.Samples), whole(t.Band), whole(t.FalseTrust)})
			}
		}
	}
	return csv.NewWriter(w).WriteAll(rows)
}

func whole(n int) string { return strconv.Itoa(n) }

// short has six digits: more than the samples are good for.
func short(x float64) string { return strconv.FormatFloat(x, 'g', 6, 64) }

// Read reads what WriteCells and WriteBands wrote, or says which line can't be
// read.
func Read(cells, bands io.Reader) ([]Result, error) {
	var results []Result
	err := eachRow(cells, len(cellColumns), func(text func(i int) string, number func(i int) float64) {
		t := tallyIn(&results, text(0), text(1), number(2), number(3))
		t.Cells = append(t.Cells, Cell{
			Distance: number(4), From: number(5), To: number(6), Gap: number(7), Weight: number(8),
			TooHigh: int(number(9)), TooLow: int(number(10)), Width: number(11), Oracle: number(12),
			FalseHolds: int(number(13)), FalseFails: int(number(14)),
		})
	})
	if err != nil {
		return nil, fmt.Errorf("cells: %w", err)
	}
	err = eachRow(bands, len(bandColumns), func(text func(i int) string, number func(i int) float64) {
		t := tallyIn(&results, text(0), text(1), number(2), number(3))
		t.Band, t.FalseTrust = int(number(4)), int(number(5))
	})
	if err != nil {
		return nil, fmt.Errorf("bands: %w", err)
	}
	for i := range results {
		results[i].Sweeps = results[i].Tallies[0].Band > 0
	}
	return results, nil
}

// tallyIn finds the tally of a case, or begins it.
func tallyIn(results *[]Result, study, population string, n, samples float64) *Tally {
	at := -1
	for i := range *results {
		if (*results)[i].Name == study {
			at = i
		}
	}
	if at < 0 {
		*results = append(*results, Result{Name: study})
		at = len(*results) - 1
	}
	tallies := &(*results)[at].Tallies
	for i := range *tallies {
		if t := &(*tallies)[i]; t.Population == population && t.N == int(n) {
			return t
		}
	}
	*tallies = append(*tallies, Tally{Population: population, N: int(n), Samples: int(samples)})
	return &(*tallies)[len(*tallies)-1]
}

func eachRow(from io.Reader, columns int, do func(text func(i int) string, number func(i int) float64)) error {
	reader := csv.NewReader(from)
	reader.FieldsPerRecord = columns
	rows, err := reader.ReadAll()
	if err != nil {
		return err
	}
	for line, row := range rows[min(1, len(rows)):] {
		bad := -1
		number := func(i int) float64 {
			x, err := strconv.ParseFloat(row[i], 64)
			if err != nil || math.IsNaN(x) {
				bad = i
			}
			return x
		}
		do(func(i int) string { return row[i] }, number)
		if bad >= 0 {
			return fmt.Errorf("line %d: %q is no number", line+2, row[bad])
		}
	}
	return nil
}
