package main

import (
	"bytes"
	"compress/gzip"
	"crypto/sha256"
	"encoding/base64"
	"io"
	"math/rand/v2"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// small is a page's parts in miniature, with the real template.
func small(t *testing.T) parts {
	t.Helper()
	template, err := os.ReadFile(filepath.Join("..", "template.html"))
	require.NoError(t, err)
	return parts{template: string(template), style: "p{}", loader: "start()", runtime: "class Go {}", program: "\x00asm and so on"}
}

func TestAssembledPageHoldsItsParts(t *testing.T) {
	p := small(t)
	page, err := assemble(p)
	require.NoError(t, err)
	text := string(page)
	assert.NotContains(t, text, "{{")
	assert.Contains(t, text, "<style>p{}</style>")
	assert.Contains(t, text, `<script id="runtime">class Go {}</script>`)
	assert.Contains(t, text, "<script>start()</script>")

	packed := regexp.MustCompile(`id="wasm">([^<]*)<`).FindStringSubmatch(text)
	require.NotNil(t, packed)
	raw, err := base64.StdEncoding.DecodeString(packed[1])
	require.NoError(t, err)
	r, err := gzip.NewReader(bytes.NewReader(raw))
	require.NoError(t, err)
	program, err := io.ReadAll(r)
	require.NoError(t, err)
	assert.Equal(t, p.program, string(program))
}

func TestPolicyLetsNothingButThePartsIn(t *testing.T) {
	p := small(t)
	page, err := assemble(p)
	require.NoError(t, err)
	policy := regexp.MustCompile(`Content-Security-Policy" content="([^"]*)"`).FindStringSubmatch(string(page))
	require.NotNil(t, policy)
	rules := map[string]string{}
	for _, rule := range strings.Split(policy[1], "; ") {
		name, sources, _ := strings.Cut(rule, " ")
		rules[name] = sources
	}
	digest := func(part string) string {
		sum := sha256.Sum256([]byte(part))
		return "'sha256-" + base64.StdEncoding.EncodeToString(sum[:]) + "'"
	}
	assert.Equal(t, "'none'", rules["default-src"])
	assert.Equal(t, "'none'", rules["connect-src"])
	assert.Equal(t, "blob:", rules["worker-src"])
	assert.Equal(t, []string{digest(p.runtime), digest(p.loader), "'wasm-unsafe-eval'"}, strings.Fields(rules["script-src"]))
	assert.Contains(t, strings.Fields(rules["style-src"]), digest(p.style))
	assert.NotContains(t, policy[1], "unsafe-inline")
	assert.NotContains(t, policy[1], "'unsafe-eval'")
	assert.NotContains(t, policy[1], "http")
}

func TestAssembleRefuses(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 1))
	noise := make([]byte, limit)
	for i := range noise {
		noise[i] = byte(random.Uint32())
	}
	tests := []struct {
		name   string
		change func(p *parts)
		want   string
	}{
		{"a script that ends early", func(p *parts) { p.loader = "'</SCRIPT>'" }, "before its own end"},
		{"a style that ends early", func(p *parts) { p.style = "/* </style> */" }, "before its own end"},
		{"a template without a hole", func(p *parts) { p.template = strings.Replace(p.template, "{{wasm}}", "", 1) }, "{{wasm}} once, and has it 0 times"},
		{"too large a program", func(p *parts) { p.program = string(noise) }, "over its limit"},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			p := small(t)
			test.change(&p)
			_, err := assemble(p)
			assert.ErrorContains(t, err, test.want)
		})
	}
}
