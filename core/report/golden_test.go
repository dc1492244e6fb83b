package report

import (
	"flag"
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
)

var update = flag.Bool("update", false, "write the golden files anew")

const golden = "../../testdata/golden"

var answers = map[string]func() ask.Answer{
	"fitted":    fitted,
	"given":     given,
	"everyone":  everyone,
	"half-step": halfStep,
	"of-count":  partOfCount,
	"hostile":   hostile,
}

// checkGolden compares what is written with the golden file of that name.
func checkGolden(t *testing.T, name string, written []byte) {
	t.Helper()
	path := filepath.Join(golden, "report-"+name)
	if *update {
		require.NoError(t, os.MkdirAll(golden, 0o755))
		require.NoError(t, os.WriteFile(path, written, 0o644))
	}
	expected, err := os.ReadFile(path)
	require.NoError(t, err)
	assert.Equal(t, string(expected), string(written), "%s; if this is meant, run the test with -update", path)
}

func TestGolden(t *testing.T) {
	for name, made := range answers {
		t.Run(name, func(t *testing.T) {
			a := made()
			checkGolden(t, name+".txt", []byte(Text(a)))
			csv, err := CSV(a)
			require.NoError(t, err)
			checkGolden(t, name+".csv", csv)
			json, err := JSON(a)
			require.NoError(t, err)
			checkGolden(t, name+".json", json)
		})
	}
}
