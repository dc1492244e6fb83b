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
	"io/fs"
	"os"
	"os/signal"
	"path/filepath"
	"strings"

	"tailgap/core/calibration"
)

func main() {
	out := flag.String("out", "testdata/calibration", "the folder to write to")
	only := flag.String("only", "", "run this one of the studies again, and keep the others as they are stored")
	sliceOnly := flag.Bool("slice", false, "make the slice again and nothing else")
	samples := flag.Int("samples", 0, "so many samples in each case, instead of the study's own number; print the summary and store nothing")
	flag.Parse()
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt)
	defer stop()
	if err := calibrate(ctx, *out, *only, *sliceOnly, *samples); err != nil {
		fmt.Fprintln(os.Stderr, "calibrate:", err)
		os.Exit(1)
	}
}

func calibrate(ctx context.Context, out, only string, sliceOnly bool, samples int) error {
	if samples == 0 {
		slice, err := run(ctx, calibration.Slice(), 0)
		if err != nil {
			return err
		}
		if err := write(out, "slice-", slice); err != nil || sliceOnly {
			return err
		}
	}
	studies, err := chosen(only)
	if err != nil {
		return err
	}
	results, err := run(ctx, studies, samples)
	switch {
	case err != nil:
		return err
	case samples > 0:
		return calibration.WriteSummary(os.Stdout, results)
	case only != "":
		if results, err = amended(out, results[0]); err != nil {
			return err
		}
	}
	if err := write(out, "", results); err != nil {
		return err
	}
	return writeFile(out, "README.md", func(w io.Writer) error { return calibration.WriteSummary(w, results) })
}

// chosen are all studies, or the one of that name.
func chosen(only string) ([]calibration.Named, error) {
	var names []string
	for _, study := range calibration.Full() {
		if study.Name == only {
			return []calibration.Named{study}, nil
		}
		names = append(names, study.Name)
	}
	if only != "" {
		return nil, fmt.Errorf("there is no study %q; the studies are: %s", only, strings.Join(names, ", "))
	}
	return calibration.Full(), nil
}

// amended are the stored results with one of them new.
func amended(out string, fresh calibration.Result) ([]calibration.Result, error) {
	var tables [2]*os.File
	for i, name := range []string{"cells.csv", "bands.csv"} {
		file, err := os.Open(filepath.Join(out, name))
		if errors.Is(err, fs.ErrNotExist) {
			return []calibration.Result{fresh}, nil
		}
		if err != nil {
			return nil, err
		}
		defer file.Close()
		tables[i] = file
	}
	stored, err := calibration.Read(tables[0], tables[1])
	if err != nil {
		return nil, err
	}
	byName := map[string]calibration.Result{}
	for _, r := range append(stored, fresh) {
		byName[r.Name] = r
	}
	var results []calibration.Result
	for _, study := range calibration.Full() {
		if r, known := byName[study.Name]; known {
			results = append(results, r)
		}
	}
	return results, nil
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
