package main

import (
	"context"
	"fmt"
	"io"
	"os"
	"slices"

	"tailgap/core/intake"
)

// input is what the scores are read from.
type input struct {
	sources []intake.Source
	files   []*os.File
	size    int64 // bytes altogether; 0 where that can't be known
}

// open opens the files in their order; "-" is standard input.
func (p *program) open(ctx context.Context, paths []string, watch func(read int64)) (*input, error) {
	in := &input{}
	counter, sized, piped := &counter{watch: watch}, true, false
	var regular []os.FileInfo
	for _, path := range paths {
		if path == "-" {
			if piped {
				return in, misuse(judgeName, "standard input can be read once only; leave out one -")
			}
			piped, sized = true, false
			in.add("standard input", counter.count(ahead(ctx, p.stdin)))
			continue
		}
		file, err := os.Open(path)
		if err != nil {
			return in, fmt.Errorf("%s can't be read: %w", path, reason(err))
		}
		in.files = append(in.files, file)
		info, err := file.Stat()
		switch {
		case err != nil:
			return in, fmt.Errorf("%s can't be read: %w", path, reason(err))
		case info.IsDir():
			return in, fmt.Errorf("%s is a folder; name the files in it", path)
		case !info.Mode().IsRegular():
			sized = false
		case slices.ContainsFunc(regular, func(other os.FileInfo) bool { return os.SameFile(info, other) }):
			return in, misuse(judgeName, "%s is named twice; its people would be counted twice", path)
		default:
			regular = append(regular, info)
		}
		in.size += info.Size()
		in.add(path, counter.count(ahead(ctx, file)))
	}
	if !sized {
		in.size = 0
	}
	return in, nil
}

func (in *input) add(name string, reader io.Reader) {
	in.sources = append(in.sources, intake.Source{Name: name, Reader: reader})
}

func (in *input) close() {
	for _, file := range in.files {
		file.Close()
	}
}

// counter tells how many bytes have been read from all that it counts.
type counter struct {
	read  int64
	watch func(read int64)
}

func (c *counter) count(from io.Reader) io.Reader { return &counted{c, from} }

type counted struct {
	*counter
	from io.Reader
}

func (c *counted) Read(into []byte) (int, error) {
	n, err := c.from.Read(into)
	c.read += int64(n)
	c.watch(c.read)
	return n, err
}
