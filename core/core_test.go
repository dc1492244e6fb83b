// Package core_test guards what holds for every room of core.
package core_test

import (
	"go/parser"
	"go/token"
	"io/fs"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// allowed lists, by module, what core may import from outside the standard
// library and itself.
var allowed = []string{"tailgap/core/", "gonum.org/v1/gonum/"}

// barred are the parts of the standard library that reach outside the program.
var barred = []string{"os", "net", "syscall", "time", "plugin", "runtime/debug", "log", "io/ioutil", "embed", "unsafe", "math/rand", "crypto/rand", "database/sql"}

// core computes and nothing else: no files, network, clock or page.
func TestCoreImportsNothingThatReachesOutside(t *testing.T) {
	files := 0
	err := filepath.WalkDir(".", func(path string, entry fs.DirEntry, err error) error {
		if err != nil || entry.IsDir() || !strings.HasSuffix(path, ".go") || strings.HasSuffix(path, "_test.go") {
			return err
		}
		files++
		source, err := os.ReadFile(path)
		require.NoError(t, err)
		parsed, err := parser.ParseFile(token.NewFileSet(), path, source, parser.ImportsOnly)
		require.NoError(t, err)
		for _, spec := range parsed.Imports {
			name, err := strconv.Unquote(spec.Path.Value)
			require.NoError(t, err)
			assert.Truef(t, mayImport(name), "%s imports %s", path, name)
		}
		return nil
	})
	require.NoError(t, err)
	assert.Greater(t, files, 20)
}

func mayImport(name string) bool {
	for _, bar := range barred {
		if name == bar || bar != "math/rand" && strings.HasPrefix(name, bar+"/") {
			return false
		}
	}
	if first, _, _ := strings.Cut(name, "/"); !strings.Contains(first, ".") && first != "tailgap" {
		return true // the standard library
	}
	for _, prefix := range allowed {
		if strings.HasPrefix(name, prefix) {
			return true
		}
	}
	return false
}

func TestMayImport(t *testing.T) {
	for name, may := range map[string]bool{
		"fmt": true, "math/rand/v2": true, "math/rand": false, "os": false, "os/exec": false, "net/http": false, "syscall/js": false, "time": false,
		"tailgap/core/gap": true, "tailgap/cli": false, "gonum.org/v1/gonum/stat/distuv": true, "github.com/maxence-charriere/go-app/v9/pkg/app": false,
	} {
		assert.Equal(t, may, mayImport(name), name)
	}
}
