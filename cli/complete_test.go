package main

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
)

func TestCompletionScripts(t *testing.T) {
	for _, shell := range []string{"bash", "zsh", "fish", "powershell"} {
		stdout, stderr, status := tailgap("", "completion", shell)
		assert.Equal(t, statusDone, status)
		assert.Empty(t, stderr)
		assert.Contains(t, stdout, "tailgap")
		assert.Greater(t, len(stdout), 1000)
	}
}

// What the shell is told: the words to offer, then what to do besides.
func TestCompletion(t *testing.T) {
	scores := file(t, "scores.csv", "site,reading,spelling\nNorth,1,2\nMill,3,4\n")
	const noFiles, anyFile, onlyExtension = ":4", ":0", ":8"
	for _, c := range []struct {
		name string
		line []string
		want []string
	}{
		{"commands", []string{"j"}, []string{"judge", noFiles}},
		{"files", []string{"judge", "sc"}, []string{anyFile}},
		{"formats", []string{"judge", "--format", ""}, []string{"text", "json", "csv", noFiles}},
		{"header", []string{"judge", "--header", ""}, []string{"auto", "yes", "no", noFiles}},
		{"columns of the file", []string{"judge", scores, "--score", ""}, []string{"reading", "spelling", noFiles}},
		{"column begun", []string{"judge", scores, "--score", "sp"}, []string{"spelling", noFiles}},
		{"columns of the demo", []string{"judge", "--demo", "--score", "voc"}, []string{"vocabulary", noFiles}},
		{"no file yet", []string{"judge", "--score", ""}, []string{noFiles}},
		{"no such file", []string{"judge", "nowhere.csv", "--score", ""}, []string{noFiles}},
		{"figure", []string{"judge", "--figure", ""}, []string{"svg", onlyExtension}},
		{"worm", []string{"judge", "--worm", ""}, []string{"svg", onlyExtension}},
		{"no files after version", []string{"version", ""}, []string{noFiles}},
	} {
		t.Run(c.name, func(t *testing.T) {
			stdout, _, status := tailgap("", append([]string{"__complete"}, c.line...)...)
			assert.Equal(t, statusDone, status)
			var got []string
			for line := range strings.Lines(stdout) {
				word, _, _ := strings.Cut(strings.TrimSpace(line), "\t")
				got = append(got, word)
			}
			assert.Equal(t, c.want, got)
		})
	}
}
