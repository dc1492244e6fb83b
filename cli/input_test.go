package main

import (
	"bytes"
	"context"
	"io"
	"math/rand/v2"
	"os"
	"strings"
	"testing"
	"testing/iotest"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestReadAheadChangesNothing(t *testing.T) {
	text := make([]byte, 3*aheadSize+17)
	for i := range text {
		text[i] = byte(rand.IntN(256))
	}
	for name, from := range map[string]io.Reader{
		"whole":       bytes.NewReader(text),
		"halves":      iotest.HalfReader(bytes.NewReader(text)),
		"byte":        iotest.OneByteReader(bytes.NewReader(text[:1000])),
		"end at once": iotest.DataErrReader(bytes.NewReader(text)),
		"empty":       strings.NewReader(""),
	} {
		t.Run(name, func(t *testing.T) {
			want := text
			switch name {
			case "byte":
				want = text[:1000]
			case "empty":
				want = []byte{}
			}
			got, err := io.ReadAll(ahead(t.Context(), from))
			require.NoError(t, err)
			assert.True(t, bytes.Equal(want, got))
		})
	}
	require.NoError(t, iotest.TestReader(ahead(t.Context(), bytes.NewReader(text[:5000])), text[:5000]))
	_, err := io.ReadAll(ahead(t.Context(), iotest.ErrReader(os.ErrClosed)))
	assert.ErrorIs(t, err, os.ErrClosed)
}

// A pipe that stays silent doesn't keep a cancelled run.
func TestReadAheadIsCancelled(t *testing.T) {
	silent, writer := io.Pipe()
	defer writer.Close()
	ctx, cancel := context.WithCancel(t.Context())
	reader := ahead(ctx, silent)
	go cancel()
	_, err := reader.Read(make([]byte, 10))
	assert.ErrorIs(t, err, context.Canceled)
}

func TestSilentPipeIsCancelled(t *testing.T) {
	silent, writer := io.Pipe()
	defer writer.Close()
	ctx, cancel := context.WithCancel(t.Context())
	var stdout, stderr strings.Builder
	p := &program{stdin: silent, stdout: &stdout, stderr: &stderr, terminal: terminal}
	go cancel()
	assert.Equal(t, statusFailure, p.run(ctx, []string{"judge", "-"}))
	assert.Equal(t, "tailgap: stopped before the answer was ready; nothing was written\n", stderr.String())
}

func TestOpenKnowsTheSize(t *testing.T) {
	a, b := file(t, "a", "12345"), file(t, "b", "678")
	p := &program{stdin: strings.NewReader("")}
	read := int64(0)
	watch := func(n int64) { read = n }

	in, err := p.open(t.Context(), []string{a, b}, watch)
	require.NoError(t, err)
	defer in.close()
	assert.Equal(t, int64(8), in.size)
	for _, source := range in.sources {
		_, err := io.ReadAll(source.Reader)
		require.NoError(t, err)
	}
	assert.Equal(t, int64(8), read, "counted over all files")

	in, err = p.open(t.Context(), []string{a, "-"}, watch)
	require.NoError(t, err)
	defer in.close()
	assert.Zero(t, in.size, "a pipe has no size")
}
