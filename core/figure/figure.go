// Package figure draws an Answer as SVG, once, for the page, the report and
// the command.
package figure
