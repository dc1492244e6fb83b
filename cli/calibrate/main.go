// Calibrate runs the calibration study of core/calibration and writes its
// results as tables, for testdata/calibration:
//
//	go run ./cli/calibrate -out testdata/calibration
package main

import (
	"bytes"
	"context"
	"flag"
	"fmt"
	"io"
	"os"
	"os/signal"
	"path/filepath"

	"tailgap/core/calibration"
)

func main() {
	out := flag.String("out", "testdata/calibration", "the folder to write to")
	only := flag.String("only", "", "run this one of the studies and print its summary; write nothing")
	samples := flag.Int("samples", 0, "so many samples in each case, instead of the study's own number")
	flag.Parse()
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt)
	defer stop()
	if err := calibrate(ctx, *out, *only, *samples); err != nil {
		fmt.Fprintln(os.Stderr, "calibrate:", err)
		os.Exit(1)
	}
}

func calibrate(ctx context.Context, out, only string, samples int) error {
	if only != "" {
		var studies []calibration.Named
		for _, study := range calibration.Full() {
			if study.Name == only {
				studies = append(studies, study)
			}
		}
		results, err := run(ctx, studies, samples)
		if err != nil {
			return err
		}
		return calibration.WriteSummary(os.Stdout, results)
	}
	slice, err := run(ctx, calibration.Slice(), 0)
	if err != nil {
		return err
	}
	full, err := run(ctx, calibration.Full(), samples)
	if err != nil {
		return err
	}
	for name, write := range map[string]func(io.Writer) error{
		"slice-cells.csv": func(w io.Writer) error { return calibration.WriteCells(w, slice) },
		"slice-bands.csv": func(w io.Writer) error { return calibration.WriteBands(w, slice) },
		"cells.csv":       func(w io.Writer) error { return calibration.WriteCells(w, full) },
		"bands.csv":       func(w io.Writer) error { return calibration.WriteBands(w, full) },
		"README.md":       func(w io.Writer) error { return calibration.WriteSummary(w, full) },
	} {
		var page bytes.Buffer
		if err := write(&page); err != nil {
			return err
		}
		if err := os.WriteFile(filepath.Join(out, name), page.Bytes(), 0o644); err != nil {
			return err
		}
	}
	return nil
}

// run runs the studies, saying on the way what is done.
func run(ctx context.Context, studies []calibration.Named, samples int) ([]calibration.Result, error) {
	var results []calibration.Result
	for _, named := range studies {
		if samples > 0 {
			named.Samples = samples
		}
		tallies, err := named.Run(ctx, func(done int, c calibration.Case) {
			fmt.Fprintf(os.Stderr, "%s: %d of %d, %s, n = %d\n", named.Name, done, len(named.Cases), c.Population.Name, c.N)
		})
		if err != nil {
			return nil, err
		}
		results = append(results, calibration.Result{Name: named.Name, Sweeps: !named.Stretches && !named.OfCount, Tallies: tallies})
	}
	return results, nil
}
