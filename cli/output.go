package main

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"

	"github.com/spf13/pflag"
)

// fileFlag declares a flag that names a file to write or read. Only where
// streams is true may it be -, a standard stream.
func fileFlag(flags *pflag.FlagSet, to *string, name, usage string, streams bool) {
	flags.Func(name, usage, func(path string) error {
		if path == "" || path == "-" && !streams {
			return fmt.Errorf("--%s %q names no file; write the name of one", name, path)
		}
		*to = path
		return nil
	})
}

// parcel is something finished that is to be written to a file.
type parcel struct {
	flag string // that named the file
	path string
	data []byte
}

// deliver writes every parcel. It is called when all of them are ready: a run
// that goes wrong before leaves no file behind.
func deliver(parcels []parcel) error {
	for _, parcel := range parcels {
		if err := writeFile(parcel.path, parcel.data); err != nil {
			return failure(fmt.Errorf("%s can't be written: %w", parcel.path, reason(err)))
		}
	}
	return nil
}

// print writes to stdout.
func (p *program) print(data []byte) error {
	if _, err := io.Copy(p.stdout, bytes.NewReader(data)); err != nil {
		return failure(fmt.Errorf("standard output can't be written: %w", reason(err)))
	}
	return nil
}

// printOrWrite writes to the file, or to stdout where there is none.
func (p *program) printOrWrite(path string, data []byte) error {
	if path == "" || path == "-" {
		return p.print(data)
	}
	return deliver([]parcel{{"out", path, data}})
}

// writeFile writes a file whole or not at all: beside it under another name,
// then renamed. What is no plain file, such as a pipe, is written to as it is.
func writeFile(path string, data []byte) error {
	if real, err := filepath.EvalSymlinks(path); err == nil {
		path = real
	}
	mode := os.FileMode(0o666)
	switch info, err := os.Stat(path); {
	case err != nil && !errors.Is(err, os.ErrNotExist):
		return err
	case err == nil && info.IsDir():
		return errors.New("it is a folder")
	case err == nil && !info.Mode().IsRegular():
		return os.WriteFile(path, data, mode)
	case err == nil:
		mode = info.Mode().Perm()
	}
	beside := fmt.Sprintf("%s.%d.part", path, os.Getpid())
	file, err := os.OpenFile(beside, os.O_WRONLY|os.O_CREATE|os.O_EXCL, mode)
	if err != nil {
		return err
	}
	_, err = file.Write(data)
	if err = errors.Join(err, file.Close()); err == nil {
		err = os.Rename(beside, path)
	}
	if err != nil {
		os.Remove(beside)
	}
	return err
}

// checkParcels refuses files that would be written over each other or over
// what is read.
func checkParcels(command string, parcels []parcel, read []string) error {
	for i, parcel := range parcels {
		for _, other := range parcels[:i] {
			if sameFile(parcel.path, other.path) {
				return misuse(command, "--%s and --%s name the same file %s; give each its own", other.flag, parcel.flag, parcel.path)
			}
		}
		for _, path := range read {
			if sameFile(parcel.path, path) {
				return misuse(command, "--%s would write over %s, which is being read; name another file", parcel.flag, path)
			}
		}
	}
	return nil
}

func sameFile(a, b string) bool {
	if filepath.Clean(a) == filepath.Clean(b) || throughLinks(a) == throughLinks(b) {
		return true
	}
	infoA, errA := os.Stat(a)
	infoB, errB := os.Stat(b)
	return errA == nil && errB == nil && os.SameFile(infoA, infoB) && infoA.Mode().IsRegular()
}

// throughLinks is the path of a file, which need not be there yet, with the
// links in its folder's path followed.
func throughLinks(path string) string {
	folder, err := filepath.EvalSymlinks(filepath.Dir(path))
	if err != nil {
		return filepath.Clean(path)
	}
	if folder, err = filepath.Abs(folder); err != nil {
		return filepath.Clean(path)
	}
	return filepath.Join(folder, filepath.Base(path))
}
