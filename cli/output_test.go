package main

import (
	"errors"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/demo"
	"tailgap/web"
)

func TestWriteFile(t *testing.T) {
	folder := t.TempDir()
	path := filepath.Join(folder, "out.txt")
	require.NoError(t, writeFile(path, []byte("first")))
	require.NoError(t, os.Chmod(path, 0o640))
	require.NoError(t, writeFile(path, []byte("second")))
	assert.Equal(t, "second", read(t, path))
	info, err := os.Stat(path)
	require.NoError(t, err)
	assert.Equal(t, os.FileMode(0o640), info.Mode().Perm(), "a file keeps its permissions")

	link := filepath.Join(folder, "link")
	require.NoError(t, os.Symlink(path, link))
	require.NoError(t, writeFile(link, []byte("third")))
	assert.Equal(t, "third", read(t, path), "a link is written through")
	info, err = os.Lstat(link)
	require.NoError(t, err)
	assert.NotZero(t, info.Mode()&os.ModeSymlink)

	require.NoError(t, writeFile(os.DevNull, []byte("gone")))
	info, err = os.Stat(os.DevNull)
	require.NoError(t, err)
	assert.NotZero(t, info.Mode()&os.ModeDevice, "a device stays one")

	assert.ErrorContains(t, writeFile(folder, nil), "it is a folder")
	assert.ErrorIs(t, writeFile(filepath.Join(folder, "no", "out"), nil), os.ErrNotExist)

	left, err := os.ReadDir(folder)
	require.NoError(t, err)
	assert.Len(t, left, 2, "nothing half-written stays behind")
}

func TestSameFile(t *testing.T) {
	folder := t.TempDir()
	at := func(names ...string) string { return filepath.Join(append([]string{folder}, names...)...) }
	require.NoError(t, os.MkdirAll(at("real"), 0o777))
	require.NoError(t, os.Symlink("real", at("link")))
	require.NoError(t, os.WriteFile(at("real", "there"), nil, 0o666))
	require.NoError(t, os.Link(at("real", "there"), at("other")))
	assert.True(t, sameFile(at("real", "there"), at("link", "there")))
	assert.True(t, sameFile(at("real", "there"), at("other")), "two names of one file")
	assert.True(t, sameFile(at("real", "new"), at("link", "new")), "of a file that isn't there yet")
	assert.False(t, sameFile(at("real", "new"), at("new")))
	assert.False(t, sameFile(at("nowhere", "new"), at("real", "new")))
	assert.False(t, sameFile(os.DevNull, at("real", "there")))
}

func read(t *testing.T, path string) string {
	t.Helper()
	text, err := os.ReadFile(path)
	require.NoError(t, err)
	return string(text)
}

func TestOutHoldsWhatStdoutWould(t *testing.T) {
	for _, format := range []string{"text", "json", "csv"} {
		path := filepath.Join(t.TempDir(), "out")
		said, _, status := tailgap("", "judge", "--demo", "--replicates", "500", "--format", format)
		quiet, _, statusQuiet := tailgap("", "judge", "--demo", "--replicates", "500", "--format", format, "--out", path)
		assert.Equal(t, said, read(t, path))
		assert.Empty(t, quiet)
		assert.Equal(t, statusFails, status)
		assert.Equal(t, statusFails, statusQuiet)
		dash, _, _ := tailgap("", "judge", "--demo", "--replicates", "500", "--format", format, "--out", "-")
		assert.Equal(t, said, dash)
	}
}

func TestFigure(t *testing.T) {
	path := filepath.Join(t.TempDir(), "sweep.svg")
	_, _, status := tailgap("", "judge", "--demo", "--replicates", "500", "--figure", path)
	assert.Equal(t, statusFails, status)
	assert.True(t, strings.HasPrefix(read(t, path), "<svg "))
	assert.Contains(t, read(t, path), "DEMO")
}

func TestWorm(t *testing.T) {
	path := filepath.Join(t.TempDir(), "worm.svg")
	_, _, status := tailgap("", "judge", "--demo", "--replicates", "500", "--worm", path)
	assert.Equal(t, statusFails, status)
	assert.Contains(t, read(t, path), "95% limits")
	assert.Contains(t, read(t, path), "DEMO")
}

// A figure is an SVG, whatever its name promises; a name that promises
// something else is refused before anything is read.
func TestFigureIsAnSVG(t *testing.T) {
	for _, name := range []string{"sweep.png", "sweep.pdf", "sweep", "svg", "sweep.svg.png", "sweep.svg/"} {
		path := t.TempDir() + string(filepath.Separator) + name
		_, stderr, status := tailgap("", "judge", "--demo", "--replicates", "500", "--figure", path)
		assert.Equal(t, statusInput, status, name)
		assert.Contains(t, stderr, "give --figure a name that ends in .svg")
		assert.NoFileExists(t, path)
	}
	path := filepath.Join(t.TempDir(), "SWEEP.SVG")
	_, _, status := tailgap("", "judge", "--demo", "--replicates", "500", "--figure", path)
	assert.Equal(t, statusFails, status)
	assert.FileExists(t, path)
}

func TestWarningsGoToStderrWhereTheResultsAreForPrograms(t *testing.T) {
	scores := file(t, "few.csv", "score\n1\n2\n3\n4\n5\n6\n7\n8\n9\n30\n")
	text, stderr, _ := tailgap("", "judge", scores, "--cutoff", ">=9", "--cutoff", "<40", "--replicates", "500")
	assert.Empty(t, stderr)
	said := strings.Count(text, "Warning: ") + strings.Count(text, "Note: ")
	assert.NotZero(t, said)
	for _, format := range []string{"json", "csv"} {
		_, stderr, status := tailgap("", "judge", scores, "--cutoff", ">=9", "--cutoff", "<40", "--replicates", "500", "--format", format)
		assert.Equal(t, statusDone, status)
		assert.Contains(t, stderr, "tailgap: warning: ")
		assert.Equal(t, said, strings.Count(stderr, "\n"), stderr)
	}
}

func TestUnwritableOutputIsAFailure(t *testing.T) {
	nowhere := filepath.Join(t.TempDir(), "nowhere", "out.svg")
	for _, args := range [][]string{
		{"judge", "--demo", "--replicates", "500", "--out", nowhere},
		{"judge", "--demo", "--replicates", "500", "--figure", nowhere},
		{"judge", "--demo", "--replicates", "500", "--worm", nowhere},
		{"judge", "--demo", "--replicates", "500", "--save-question", nowhere},
		{"demo", "--out", nowhere},
	} {
		stdout, stderr, status := tailgap("", args...)
		assert.Equal(t, statusFailure, status)
		assert.Empty(t, stdout)
		assert.Equal(t, "tailgap: "+nowhere+" can't be written: no such file or directory\n", stderr)
	}
}

// full is a stream that takes nothing, as a full disk does.
type full struct{}

func (full) Write([]byte) (int, error) { return 0, errors.New("no space left") }

func TestFullStdoutIsAFailure(t *testing.T) {
	for _, args := range [][]string{{"judge", "--demo", "--replicates", "500"}, {"demo"}, {"version"}, {"judge", "--help"}} {
		var stderr strings.Builder
		assert.Equal(t, statusFailure, run(args, strings.NewReader(""), full{}, &stderr), args)
		assert.Equal(t, "tailgap: standard output can't be written: no space left\n", stderr.String())
	}
}

func TestDemo(t *testing.T) {
	stdout, stderr, status := tailgap("", "demo")
	assert.Equal(t, string(demo.CSV()), stdout)
	assert.Empty(t, stderr)
	assert.Equal(t, statusDone, status)

	path := filepath.Join(t.TempDir(), "demo.csv")
	_, _, status = tailgap("", "demo", "--out", path)
	assert.Equal(t, statusDone, status)
	assert.Equal(t, stdout, read(t, path))
}

func TestPage(t *testing.T) {
	path := filepath.Join(t.TempDir(), "page.html")
	write := func(page func() ([]byte, error), out string) (stdout, stderr string, status int) {
		var outs, errs strings.Builder
		p := &program{stdout: &outs, stderr: &errs, page: page, terminal: terminal}
		status = p.run(t.Context(), []string{"page", "--out", out})
		return outs.String(), errs.String(), status
	}
	_, stderr, status := write(func() ([]byte, error) { return nil, web.ErrNoPage }, path)
	assert.Equal(t, statusFailure, status)
	assert.Equal(t, "tailgap: this build carries no page; make build makes one that does\n", stderr)
	assert.NoFileExists(t, path)

	carried := func() ([]byte, error) { return []byte("<!doctype html>"), nil }
	stdout, stderr, status := write(carried, path)
	assert.Equal(t, statusDone, status)
	assert.Empty(t, stdout+stderr)
	assert.Equal(t, "<!doctype html>", read(t, path))

	stdout, _, _ = write(carried, "-")
	assert.Equal(t, "<!doctype html>", stdout)
}
