// Package testdata gives tests the open data and the published and
// independently computed values that stand beside this file. Sources are in
// each folder's own README or SOURCES file.
package testdata

import (
	"embed"
	"encoding/csv"
	"encoding/json"
	"fmt"
	"strconv"
	"strings"
)

// Files holds everything that tests of core read.
//
//go:embed open expected nist interval shape worked calibration/*.csv bench/scores.csv
var Files embed.FS

// Open returns the values of one column of the open data, without the blank
// cells.
func Open(dataset, column string) []float64 {
	return Column("open/"+dataset+".csv", column)
}

// Column returns the values of one column of a file, without the blank cells.
func Column(path, column string) []float64 {
	file, err := Files.Open(path)
	must(err)
	rows, err := csv.NewReader(file).ReadAll()
	must(err)
	var values []float64
	for i, name := range rows[0] {
		if name != column {
			continue
		}
		for _, row := range rows[1:] {
			if row[i] == "" {
				continue
			}
			value, err := strconv.ParseFloat(row[i], 64)
			must(err)
			values = append(values, value)
		}
		return values
	}
	panic("no column " + column + " in " + path)
}

// NIST returns the n values of one NIST StRD univariate data set: the file's
// last n lines.
func NIST(name string, n int) []float64 {
	text, err := Files.ReadFile("nist/" + name + ".dat")
	must(err)
	var values []float64
	lines := strings.Split(strings.TrimSpace(string(text)), "\n")
	for _, line := range lines[len(lines)-n:] {
		value, err := strconv.ParseFloat(strings.TrimSpace(line), 64)
		must(err)
		values = append(values, value)
	}
	return values
}

// JSON reads a JSON file into value.
func JSON(path string, value any) {
	text, err := Files.ReadFile(path)
	must(err)
	if err := json.Unmarshal(text, value); err != nil {
		panic(fmt.Sprintf("%s: %v", path, err))
	}
}

// Expected lists the files of expected values.
func Expected() []string {
	entries, err := Files.ReadDir("expected")
	must(err)
	var paths []string
	for _, entry := range entries {
		if strings.HasSuffix(entry.Name(), ".json") {
			paths = append(paths, "expected/"+entry.Name())
		}
	}
	return paths
}

func must(err error) {
	if err != nil {
		panic(err)
	}
}
