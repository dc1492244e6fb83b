// Package web carries the finished page inside the command.
package web

import (
	"embed"
	"errors"
)

// ErrNoPage says that the command was built before the page was made.
var ErrNoPage = errors.New("this build carries no page; make build makes one that does")

// A folder, not the page itself: it must build on a fresh clone too.
//
//go:embed built
var built embed.FS

// Page is the page, one HTML file, or ErrNoPage.
func Page() ([]byte, error) {
	page, err := built.ReadFile("built/tailgap.html")
	if err != nil {
		return nil, ErrNoPage
	}
	return page, nil
}
