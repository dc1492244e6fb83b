package figure_test

import (
	"flag"
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/figure"
)

var update = flag.Bool("update", false, "write the golden files anew")

// golden compares with, or writes, a file under testdata/golden. Look at the
// figures before committing new ones.
func golden(t *testing.T, name, got string) {
	t.Helper()
	path := filepath.Join("..", "..", "testdata", "golden", "figure-"+name+".svg")
	if *update {
		require.NoError(t, os.MkdirAll(filepath.Dir(path), 0o755))
		require.NoError(t, os.WriteFile(path, []byte(got), 0o644))
		return
	}
	want, err := os.ReadFile(path)
	require.NoError(t, err)
	assert.True(t, string(want) == got, "%s differs from the figure drawn now; run with -update, and look at it", path)
}

func TestGolden(t *testing.T) {
	sweeps := map[string]struct {
		answer string
		sweep  int
		o      figure.Options
	}{
		"sweep-wide":     {"vocabulary", 1, figure.Options{Width: 1100, Selected: 1}},
		"sweep-narrow":   {"vocabulary", 0, figure.Options{Width: 320, Selected: 0}},
		"sweep-jumps":    {"minutes", 0, figure.Options{Width: 900, Selected: -1}},
		"sweep-everyone": {"everyone", 0, figure.Options{Width: 700, Height: 300, Selected: -1}},
		"sweep-twenty":   {"twenty", 0, figure.Options{Width: 360, Selected: 1, Standalone: true}},
		"sweep-crowd":    {"crowd", 0, figure.Options{Width: 640, Selected: 2, Prefix: "crowd"}},
	}
	for name, s := range sweeps {
		t.Run(name, func(t *testing.T) {
			a := recipes[s.answer].answer()
			golden(t, name, figure.Sweep(a.Question, a.Results[0], a.Results[0].Sweeps[s.sweep], s.o))
		})
	}
	counted := map[string]struct {
		answer string
		cutoff int
		o      figure.Options
	}{
		"counted-wide":    {"vocabulary", 0, figure.Options{Width: 1100}},
		"counted-narrow":  {"vocabulary", 1, figure.Options{Width: 320}},
		"counted-jumps":   {"minutes", 0, figure.Options{Width: 900, Standalone: true}},
		"counted-stretch": {"everyone", 0, figure.Options{Width: 700, Height: 200}},
		"counted-fine":    {"fine", 0, figure.Options{Width: 900}},
	}
	for name, c := range counted {
		t.Run(name, func(t *testing.T) {
			a := recipes[c.answer].answer()
			golden(t, name, figure.Counted(a.Question, a.Results[0], a.Results[0].Cutoffs[c.cutoff], c.o))
		})
	}
	for _, name := range []string{"vocabulary", "minutes", "everyone"} {
		t.Run("sheet-"+name, func(t *testing.T) {
			golden(t, "sheet-"+name, figure.Sheet(recipes[name].answer()))
		})
	}
}
