// Package figure draws an Answer as SVG, once, for the page, the report and
// the command: the sweep of a gap over the score range, the counted scores
// against the curve at one cutoff, and a sheet of all of them.
//
// Coordinates are printed with one decimal, so that the same Answer gives the
// same bytes natively and as WebAssembly. Text is never scaled: a figure is
// drawn anew for each width. Where room is short, labels are left out before
// they overlap; what they say is in the figure's description in any case.
package figure

import (
	"strings"

	"tailgap/core/ask"
)

// Options says how a figure is drawn.
type Options struct {
	Width      int    // px; drawn as 300 if less and as 10,000 if more
	Height     int    // px; 0, or less than the figure needs: what it needs
	Standalone bool   // a file of its own: light and dark colours and a background of its own, instead of the page's
	Selected   int    // index of the cutoff in hand among Result.Cutoffs; -1: none
	Prefix     string // starts every id, unique in a page, letters, digits and hyphens; empty: "figure"
}

// Sizes in px that both figures share.
const (
	narrowest = 300
	widest    = 10_000
	narrow    = 560 // below it the text is smaller and the labels shorter
	textWide  = 13.0
	textSmall = 12.0
)

func (o Options) width() float64 { return float64(min(max(o.Width, narrowest), widest)) }

func (o Options) small() bool { return o.Width < narrow }

func (o Options) textSize() float64 {
	if o.small() {
		return textSmall
	}
	return textWide
}

func (o Options) prefix() string {
	if o.Prefix == "" {
		return "figure"
	}
	return o.Prefix
}

// drawing is a finished figure before it is wrapped as an SVG document.
type drawing struct {
	width, height float64
	title         string
	description   string
	body          string
}

// document wraps a drawing as an SVG element that stands in a page or alone.
func (d drawing) document(o Options) string {
	c := &canvas{prefix: o.prefix()}
	c.raw(`<svg xmlns="http://www.w3.org/2000/svg" class="tailgap`)
	if o.small() {
		c.raw(` small`)
	}
	c.raw(`" role="img" aria-labelledby="`)
	c.escape(c.prefix + "-title " + c.prefix + "-description")
	c.raw(`"`)
	c.attribute("width", d.width)
	c.attribute("height", d.height)
	c.raw(` viewBox="0 0 `)
	c.number(d.width)
	c.raw(" ")
	c.number(d.height)
	c.raw(`">`)
	c.described("title", d.title)
	c.described("desc", d.description)
	if o.Standalone {
		c.raw("<style>" + standaloneRules + "</style>")
		c.rect("paper", 0, 0, d.width, d.height)
	} else {
		c.raw("<style>" + inlineRules + "</style>")
	}
	c.raw(d.body)
	c.raw("</svg>")
	return c.String()
}

// described writes a title or desc element with the id that the figure's
// aria-labelledby names.
func (c *canvas) described(element, text string) {
	id := c.prefix + "-title"
	if element == "desc" {
		id = c.prefix + "-description"
	}
	c.raw("<" + element + ` id="`)
	c.escape(id)
	c.raw(`">`)
	c.escape(text)
	c.raw("</" + element + ">")
}

// sentences joins what is there into one paragraph.
func sentences(parts ...string) string {
	var said []string
	for _, part := range parts {
		if part = strings.TrimSpace(part); part != "" {
			if !strings.HasSuffix(part, ".") {
				part += "."
			}
			said = append(said, part)
		}
	}
	return strings.Join(said, " ")
}

// verdictOf is the verdict at a cutoff, empty without a tolerance.
func verdictOf(f ask.Finding) string {
	if f.Verdict == nil {
		return ""
	}
	return *f.Verdict
}

// whole is the sweep, or one without thresholds if its columns are not all
// as long as they should be.
func whole(s ask.Sweep) ask.Sweep {
	n := len(s.Threshold)
	if len(s.CurveShare) != n || len(s.CountedShare) != n || len(s.GapPoints) != n {
		return ask.Sweep{Side: s.Side}
	}
	return s
}
