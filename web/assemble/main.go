// Command assemble builds the page: template, style, loader, Go's runtime for
// the browser and the packed program, in one HTML file that needs nothing
// else and whose own policy lets nothing connect.
package main

import (
	"flag"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
)

func main() {
	wasm := flag.String("wasm", "", "the program, built for js/wasm")
	parts := flag.String("parts", "web", "the folder with template.html, style.css and loader.js")
	out := flag.String("out", filepath.Join("dist", "tailgap.html"), "the page to write")
	flag.Parse()
	if err := run(*wasm, *parts, *out); err != nil {
		fmt.Fprintln(os.Stderr, "assemble:", err)
		os.Exit(1)
	}
}

func run(wasm, folder, out string) error {
	p, err := gather(wasm, folder)
	if err != nil {
		return err
	}
	page, err := assemble(p)
	if err != nil {
		return err
	}
	if err := os.MkdirAll(filepath.Dir(out), 0o755); err != nil {
		return err
	}
	return os.WriteFile(out, page, 0o644)
}

// gather reads the parts from the folder, the program, and the runtime that
// belongs to the Go that built it.
func gather(wasm, folder string) (p parts, err error) {
	root, err := exec.Command("go", "env", "GOROOT").Output()
	if err != nil {
		return p, fmt.Errorf("asking go for its root: %w", err)
	}
	for _, part := range []struct {
		path string
		into *string
	}{
		{filepath.Join(folder, "template.html"), &p.template},
		{filepath.Join(folder, "style.css"), &p.style},
		{filepath.Join(folder, "loader.js"), &p.loader},
		{filepath.Join(strings.TrimSpace(string(root)), "lib", "wasm", "wasm_exec.js"), &p.runtime},
		{wasm, &p.program},
	} {
		text, err := os.ReadFile(part.path)
		if err != nil {
			return p, err
		}
		*part.into = string(text)
	}
	return p, nil
}
