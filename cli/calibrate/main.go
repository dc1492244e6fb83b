// Calibrate runs the calibration study of core/calibration and writes its
// results as tables, for testdata/calibration:
//
//	go run ./cli/calibrate -out testdata/calibration
package main

import (
	"bytes"
	"context"
	"errors"
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
	sliceOnly := flag.Bool("slice", false, "make the slice again and nothing else")
	samples := flag.Int("samples", 0, "so many samples in each case, instead of the study's own number")
	flag.Parse()
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt)
	defer stop()
	if err := calibrate(ctx, *out, *only, *sliceOnly, *samples); err != nil {
		fmt.Fprintln(os.Stderr, "calibrate:", err)
		os.Exit(1)
	}
}

func calibrate(ctx context.Context, out, only string, sliceOnly bool, samples int) error {
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
	if err := write(out, "slice-", slice); err != nil || sliceOnly {
		return err
	}
	full, err := run(ctx, calibration.Full(), samples)
	if err != nil {
		return err
	}
	if err := write(out, "", full); err != nil {
		return err
	}
	return writeFile(out, "README.md", func(w io.Writer) error { return calibration.WriteSummary(w, full) })
}

// write writes the tables of some results, their names led by prefix.
func write(out, prefix string, results []calibration.Result) error {
	return errors.Join(
		writeFile(out, prefix+"cells.csv", func(w io.Writer) error { return calibration.WriteCells(w, results) }),
		writeFile(out, prefix+"bands.csv", func(w io.Writer) error { return calibration.WriteBands(w, results) }),
	)
}

func writeFile(out, name string, write func(w io.Writer) error) error {
	var page bytes.Buffer
	if err := write(&page); err != nil {
		return err
	}
	return os.WriteFile(filepath.Join(out, name), page.Bytes(), 0o644)
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
