// Package intake turns bytes into a Sample: delimited text, with what was
// read, used and dropped, and why.
//
// A source is read once, as a stream; only the usable scores are kept. Errors
// are sentences for the user that say where (lines and columns from 1) and
// what to do, and never repeat a row of data.
package intake

import (
	"context"
	"errors"
	"fmt"
	"io"
	"slices"

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
// Sample: rows of several sources are pooled. Comma, semicolon, tab or one
// column, header or none, and the decimal mark are found out for each source.
//
// It refuses what isn't plain text, a column that isn't there or isn't
// certain, infinite values, decimals written in two ways, quotes that run
// rows together, and a column without a usable score. A reader's own error is
// wrapped, and so is the context's when it ends before all is read; a reader
// that waits is not interrupted.
func Read(ctx context.Context, sources []Source, options Options) (sample.Sample, error) {
	if len(sources) == 0 {
		return sample.Sample{}, errors.New("no usable score: there is no input")
	}
	if err := checkHeader(options.Header); err != nil {
		return sample.Sample{}, err
	}
	var tallies []*tally
	for i, source := range sources {
		name := ""
		if len(sources) > 1 {
			name = source.label(i)
		}
		var err error
		if tallies, err = readSource(ctx, source.Reader, name, options, tallies); err != nil && name != "" {
			return sample.Sample{}, fmt.Errorf("%s: %w", name, err)
		} else if err != nil {
			return sample.Sample{}, err
		}
	}
	var s sample.Sample
	for _, t := range tallies {
		if err := t.check(); err != nil {
			return sample.Sample{}, err
		}
		t.column.Doubts = t.doubts()
		s.Columns = append(s.Columns, t.column)
	}
	return s, nil
}

func (s Source) label(i int) string {
	if name := printable(s.Name, 80); name != "" {
		return name
	}
	return fmt.Sprintf("source %d", i+1)
}

func checkHeader(header sample.Header) error {
	if header == "" {
		return nil // as auto
	}
	return new(sample.Header).UnmarshalText([]byte(header))
}

// readSource adds one source to the tallies; with none yet, it starts them.
// The name is empty when there is no other source to tell it from.
func readSource(ctx context.Context, source io.Reader, name string, options Options, tallies []*tally) ([]*tally, error) {
	r, err := open(ctx, source, options)
	if err != nil {
		return nil, err
	}
	asked, err := r.findAll(options.Scores)
	if err != nil {
		return nil, err
	}
	if tallies == nil {
		tallies = make([]*tally, len(asked))
		for i, a := range asked {
			tallies[i] = &tally{column: sample.Column{Name: r.label(a.index)}}
		}
	}
	for i, a := range asked {
		if err := tallies[i].join(r, a.index); err != nil {
			return nil, err
		}
	}
	r.score = asked[0].index
	return tallies, r.tallyAll(tallies, asked, name)
}

// tallyAll reads all rows into the tallies.
func (r *rows) tallyAll(tallies []*tally, asked []found, name string) error {
	place := func(line int) string {
		if name == "" {
			return fmt.Sprintf("line %d", line)
		}
		return fmt.Sprintf("line %d of %s", line, name)
	}
	fit := fit{width: r.width}
	for {
		data, err := r.next()
		if err == io.EOF {
			break
		}
		if err != nil {
			return err
		}
		fit.add(data)
		for i, t := range tallies {
			if err := t.add(r, data, asked[i].index, place); err != nil {
				return err
			}
		}
	}
	if slices.ContainsFunc(asked, func(f found) bool { return f.byName }) {
		return fit.check()
	}
	return nil
}
