// Package browser tests the finished page in a real Chromium: what it shows
// against what the command says, and that nothing leaves it. Its tests need
// dist/tailgap.html and bin/tailgap, which make test builds before it.
package browser
