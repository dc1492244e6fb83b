package main

import (
	"bytes"
	"compress/gzip"
	"crypto/sha256"
	"encoding/base64"
	"fmt"
	"strings"

	"tailgap/core/figure"
)

// limit is the largest page that is still easily kept, mailed and opened.
const limit = 4_000_000

// icon is the tab's picture: a curve's tail and a cutoff.
const icon = `data:image/svg+xml,%3Csvg xmlns='http://www.w3.org/2000/svg' viewBox='0 0 16 16'%3E%3Cpath d='M1 13C5 13 4 3 7 3s2 10 8 10' fill='none' stroke='%238a3f77' stroke-width='2'/%3E%3Cpath d='M11 2v12' stroke='%2356702b' stroke-width='2'/%3E%3C/svg%3E`

// parts are the texts a page is made of.
type parts struct {
	template, style, loader, runtime, program string
}

// assemble puts the parts into the template. It is an error when a part would
// end its element early, when the template has a hole nobody fills, or when
// the page grows past its limit.
func assemble(p parts) ([]byte, error) {
	for name, part := range map[string]string{"style": p.style, "loader": p.loader, "runtime": p.runtime} {
		if lower := strings.ToLower(part); strings.Contains(lower, "</script") || strings.Contains(lower, "</style") || strings.Contains(lower, "<!--") {
			return nil, fmt.Errorf("the %s would end its element before its own end", name)
		}
	}
	packed, err := pack(p.program)
	if err != nil {
		return nil, err
	}
	page := p.template
	for _, fill := range [][2]string{
		{"{{policy}}", policy(p)}, {"{{icon}}", icon}, {"{{style}}", p.style},
		{"{{loader}}", p.loader}, {"{{runtime}}", p.runtime}, {"{{wasm}}", packed},
	} {
		if strings.Count(page, fill[0]) != 1 {
			return nil, fmt.Errorf("the template should have %s once, and has it %d times", fill[0], strings.Count(page, fill[0]))
		}
		page = strings.Replace(page, fill[0], fill[1], 1)
	}
	if len(page) > limit {
		return nil, fmt.Errorf("the page has %d bytes, over its limit of %d", len(page), limit)
	}
	return []byte(page), nil
}

// policy allows what the page is made of, each part by its digest, the
// program, and workers made from the page itself. Nothing may connect.
func policy(p parts) string {
	return strings.Join([]string{
		"default-src 'none'",
		"script-src " + pin(p.runtime) + " " + pin(p.loader) + " 'wasm-unsafe-eval'",
		"style-src " + pin(p.style) + " " + pin(figure.InlineStyle()),
		"img-src data: blob:",
		"worker-src blob:",
		"connect-src 'none'",
		"form-action 'none'",
		"base-uri 'none'",
	}, "; ")
}

// pin is the digest by which a policy knows a text.
func pin(text string) string {
	sum := sha256.Sum256([]byte(text))
	return "'sha256-" + base64.StdEncoding.EncodeToString(sum[:]) + "'"
}

func pack(program string) (string, error) {
	var packed bytes.Buffer
	w, err := gzip.NewWriterLevel(&packed, gzip.BestCompression)
	if err != nil {
		return "", err
	}
	if _, err := w.Write([]byte(program)); err != nil {
		return "", err
	}
	if err := w.Close(); err != nil {
		return "", err
	}
	return base64.StdEncoding.EncodeToString(packed.Bytes()), nil
}
