package main

import (
	"bufio"
	"errors"
	"fmt"
	"math/rand/v2"
	"os"
	"os/exec"
	"path/filepath"
	"testing"
)

const built = "../bin/tailgap" // "make build" puts it there

// BenchmarkProcess times tailgap judge as one uses it: the whole process,
// from its start to its last line.
func BenchmarkProcess(b *testing.B) {
	for _, rows := range []int{1_000, 1_000_000} {
		b.Run(fmt.Sprintf("%d_rows", rows), func(b *testing.B) {
			path := idsAndScores(b, rows)
			for b.Loop() {
				process(b, "judge", path, "--score", "score", "--cutoff", "<=11", "--cutoff", ">=30", "--tolerance", "1pt", "--out", os.DevNull)
			}
		})
	}
	b.Run("version", func(b *testing.B) {
		for b.Loop() {
			process(b, "version")
		}
	})
}

// process runs the built command; any verdict will do.
func process(b *testing.B, args ...string) {
	var status *exec.ExitError
	err := exec.Command(built, args...).Run()
	if errors.As(err, &status) && (status.ExitCode() == statusFails || status.ExitCode() == statusUnsettled) {
		return
	}
	if err != nil {
		b.Fatalf("%s: %v (make build comes first)", built, err)
	}
}

// idsAndScores writes a file with ids and whole-number scores, about fifty of
// them distinct.
func idsAndScores(b *testing.B, rows int) string {
	path := filepath.Join(b.TempDir(), "scores.csv")
	file, err := os.Create(path)
	if err != nil {
		b.Fatal(err)
	}
	defer file.Close()
	out, random := bufio.NewWriter(file), rand.New(rand.NewPCG(1, 2))
	fmt.Fprintln(out, "id,score")
	for i := range rows {
		fmt.Fprintf(out, "%d,%.0f\n", i+1, 25+6*random.NormFloat64())
	}
	if err := out.Flush(); err != nil {
		b.Fatal(err)
	}
	return path
}
