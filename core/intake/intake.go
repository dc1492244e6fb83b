// Package intake turns bytes into a Sample: delimited text, with what was
// read, used and dropped, and why.
package intake

import (
	"errors"
	"io"

	"tailgap/core/sample"
)

// Source is one file or paste.
type Source struct {
	Name   string // as the user knows it; used in messages
	Reader io.Reader
}

// Options say what to read.
type Options struct {
	Scores  []string // columns by name or by number from 1; empty: the only column there is
	Missing []string // cells that stand for "no score"
	Header  sample.Header
}

// Read reads the score columns of all sources, one after the other, into one
// Sample: rows of several sources are pooled.
func Read(sources []Source, options Options) (sample.Sample, error) {
	return sample.Sample{}, errors.New("not yet")
}

// Column is a column of a file as a person chooses it.
type Column struct {
	Name    string // from the header, or "column 3"
	Number  int    // from 1
	Numeric bool   // most of its first cells are numbers
}

// Columns reads the head of a source and says what columns it has.
func Columns(source Source, header sample.Header) ([]Column, error) {
	return nil, errors.New("not yet")
}
