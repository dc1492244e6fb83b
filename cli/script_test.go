package main

import (
	"bytes"
	"errors"
	"flag"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"golang.org/x/tools/txtar"
)

var update = flag.Bool("update", false, "write what comes out into the golden files")

const scripts = "../testdata/cli"

// TestScripts replays the scripts in testdata/cli. A script is a
// txtar archive: its files are laid out in a folder of their own, and what
// stands before them is what a terminal shows. Lines that begin with $ are
// run; under each stands what must come out: stdout as it is, stderr behind
// "! ", and the exit status. # is a comment.
func TestScripts(t *testing.T) {
	paths, err := filepath.Glob(filepath.Join(scripts, "*.txtar"))
	require.NoError(t, err)
	require.NotEmpty(t, paths)
	for _, path := range paths {
		t.Run(strings.TrimSuffix(filepath.Base(path), ".txtar"), func(t *testing.T) {
			path, err := filepath.Abs(path)
			require.NoError(t, err)
			archive, err := txtar.ParseFile(path)
			require.NoError(t, err)
			t.Chdir(t.TempDir())
			for _, file := range archive.Files {
				require.NoError(t, os.MkdirAll(filepath.Dir(file.Name), 0o777))
				require.NoError(t, os.WriteFile(file.Name, file.Data, 0o666))
			}
			replayed := replay(t, string(archive.Comment))
			if *update {
				archive.Comment = []byte(replayed)
				require.NoError(t, os.WriteFile(path, txtar.Format(archive), 0o666))
				return
			}
			// One command at a time, to show no more than what differs.
			want, got := strings.Split(string(archive.Comment), "\n$ "), strings.Split(replayed, "\n$ ")
			require.Len(t, got, len(want))
			for i := range want {
				assert.Equal(t, want[i], got[i])
			}
		})
	}
}

// replay runs the commands of a script and returns it with what came out.
func replay(t *testing.T, script string) string {
	t.Helper()
	var out strings.Builder
	for line := range strings.Lines(script) {
		command, isCommand := strings.CutPrefix(line, "$ ")
		switch {
		case isCommand:
			stdout, stderr, status := shell(t, strings.TrimSpace(command))
			out.WriteString(line)
			out.WriteString(behind("", stdout) + behind("! ", stderr))
			fmt.Fprintf(&out, "exit %d\n\n", status)
		case strings.HasPrefix(line, "#"):
			out.WriteString(line)
		}
	}
	return out.String()
}

func behind(mark, text string) string {
	var out strings.Builder
	for line := range strings.Lines(text) {
		out.WriteString(strings.TrimRight(mark+strings.TrimSuffix(line, "\n"), " ") + "\n")
	}
	return out.String()
}

// shell runs a command: tailgap, with < FILE for its standard input, or one
// of cat FILE and ls.
func shell(t *testing.T, command string) (stdout, stderr string, status int) {
	t.Helper()
	words := shellWords(t, command)
	switch words[0] {
	case "cat":
		text, err := os.ReadFile(words[1])
		require.NoError(t, err)
		return string(text), "", 0
	case "ls":
		entries, err := os.ReadDir(".")
		require.NoError(t, err)
		for _, entry := range entries {
			stdout += entry.Name() + "\n"
		}
		return stdout, "", 0
	}
	require.Equal(t, "tailgap", words[0])
	args, input := words[1:], ""
	if n := len(args); n > 1 && args[n-2] == "<" {
		text, err := os.ReadFile(args[n-1])
		require.NoError(t, err)
		args, input = args[:n-2], string(text)
	}
	return tailgap(input, args...)
}

// tailgap runs the command in this process.
func tailgap(input string, args ...string) (stdout, stderr string, status int) {
	var out, errs bytes.Buffer
	status = run(args, strings.NewReader(input), &out, &errs)
	return out.String(), errs.String(), status
}

// shellWords splits a command line at spaces outside single quotes.
func shellWords(t *testing.T, command string) []string {
	t.Helper()
	var words []string
	for rest := strings.TrimSpace(command); rest != ""; rest = strings.TrimSpace(rest) {
		word, after, err := nextWord(rest)
		require.NoError(t, err, command)
		words, rest = append(words, word), after
	}
	return words
}

func nextWord(text string) (word, rest string, err error) {
	quoted := false
	for i, r := range text {
		switch {
		case r == '\'':
			quoted = !quoted
		case r == ' ' && !quoted:
			return word, text[i:], nil
		default:
			word += string(r)
		}
	}
	if quoted {
		err = errors.New("a quote is not closed")
	}
	return word, "", err
}
