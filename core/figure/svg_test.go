package figure_test

import (
	"encoding/xml"
	"io"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/figure"
)

// line is a text element with the box that it takes up.
type line struct {
	text                     string
	left, top, right, bottom float64
}

// drawn is what the tests read back from an SVG.
type drawn struct {
	width, height float64
	lines         []line
	grips         []line // boxes of the cutoffs' poles and flags
	ids           []string
	references    []string // url(#...) and aria-labelledby
	title, desc   string
	classes       map[string]int
	cutoffs       []string // data-cutoff of the grips
	raw           string
}

// read parses an SVG and fails the test if it is not well-formed, repeats an
// id, refers to one that isn't there, or holds a number that is none.
func read(t require.TestingT, svg string) drawn {
	d := drawn{classes: map[string]int{}, raw: svg}
	decoder := xml.NewDecoder(strings.NewReader(svg))
	var offsets []struct{ x, y float64 }
	var x, y float64
	var text *line
	var anchor string
	var inside string
	bold := false
	size := 13.0
	for {
		token, err := decoder.Token()
		if err == io.EOF {
			break
		}
		require.NoError(t, err)
		switch e := token.(type) {
		case xml.StartElement:
			attributes := map[string]string{}
			for _, a := range e.Attr {
				attributes[a.Name.Local] = a.Value
				assert.NotContains(t, a.Value, "NaN")
				assert.NotContains(t, a.Value, "Inf")
				if _, reference, found := strings.Cut(a.Value, "url(#"); found {
					d.references = append(d.references, strings.TrimSuffix(reference, ")"))
				}
			}
			assert.NotContains(t, attributes, "style", "a page's policy may let no style attribute in")
			for class := range strings.FieldsSeq(attributes["class"]) {
				d.classes[class]++
			}
			if id, found := attributes["id"]; found {
				d.ids = append(d.ids, id)
			}
			if labelled := attributes["aria-labelledby"]; labelled != "" {
				d.references = append(d.references, strings.Fields(labelled)...)
			}
			if cutoff, found := attributes["data-cutoff"]; found {
				d.cutoffs = append(d.cutoffs, cutoff)
			}
			switch e.Name.Local {
			case "svg":
				offsets = append(offsets, struct{ x, y float64 }{x, y})
				x, y = x+number(t, attributes["x"]), y+number(t, attributes["y"])
				if len(offsets) == 1 {
					d.width, d.height = number(t, attributes["width"]), number(t, attributes["height"])
					if strings.Contains(attributes["class"], "small") {
						size = 12
					}
				}
			case "line", "rect":
				if box, of := gripBox(t, e.Name.Local, attributes); of {
					d.grips = append(d.grips, line{left: x + box.left, top: y + box.top, right: x + box.right, bottom: y + box.bottom})
				}
			case "text":
				at := size
				if strings.Contains(attributes["class"], "title") {
					at = 22
				}
				px, py := x+number(t, attributes["x"]), y+number(t, attributes["y"])
				text = &line{left: px, right: px, top: py - 0.75*at, bottom: py + 0.2*at}
				anchor = attributes["text-anchor"]
				bold = strings.Contains(attributes["class"], "strong") || strings.Contains(attributes["class"], "title")
			case "tspan":
				bold = strings.Contains(attributes["class"], "strong")
			case "title", "desc":
				inside = e.Name.Local
			}
		case xml.CharData:
			switch {
			case text != nil:
				width := figure.TextWidth(string(e), (text.bottom-text.top)/0.95)
				if bold {
					width *= figure.Bolder
				}
				text.text += string(e)
				text.right += width
			case inside == "title":
				d.title += string(e)
			case inside == "desc":
				d.desc += string(e)
			}
		case xml.EndElement:
			switch e.Name.Local {
			case "svg":
				x, y = offsets[len(offsets)-1].x, offsets[len(offsets)-1].y
				offsets = offsets[:len(offsets)-1]
			case "tspan":
				bold = false
			case "text":
				width := text.right - text.left
				switch anchor {
				case "middle":
					text.left, text.right = text.left-width/2, text.right-width/2
				case "end":
					text.left, text.right = text.left-width, text.left
				}
				d.lines = append(d.lines, *text)
				text = nil
			default:
				inside = ""
			}
		}
	}
	seen := map[string]bool{}
	for _, id := range d.ids {
		assert.False(t, seen[id], "id %q stands twice", id)
		seen[id] = true
	}
	for _, reference := range d.references {
		assert.True(t, seen[reference], "nothing has the id %q", reference)
	}
	return d
}

// gripBox is the box of a line or rectangle that is a cutoff's pole or flag.
func gripBox(t require.TestingT, element string, attributes map[string]string) (box line, of bool) {
	of = slices.ContainsFunc(strings.Fields(attributes["class"]), func(class string) bool { return class == "pole" || class == "flag" || class == "paper" })
	at := func(name string) float64 { return number(t, attributes[name]) }
	switch {
	case !of || attributes["y"] == "0": // the paper of a whole figure
		return box, false
	case element == "line":
		return line{left: at("x1"), top: at("y1"), right: at("x2"), bottom: at("y2")}, true
	}
	return line{left: at("x"), top: at("y"), right: at("x") + at("width"), bottom: at("y") + at("height")}, true
}

func number(t require.TestingT, text string) float64 {
	if text == "" {
		return 0
	}
	value, err := strconv.ParseFloat(text, 64)
	require.NoError(t, err)
	return value
}

func (l line) overlaps(other line) bool {
	return l.left < other.right && other.left < l.right && l.top < other.bottom && other.top < l.bottom
}

// legible fails where two lines of text overlap, where one leaves the figure
// or where a cutoff's pole or flag crosses the title of a sweep's axis.
func (d drawn) legible(t require.TestingT) {
	assert.NotEmpty(t, d.lines)
	for i, a := range d.lines {
		assert.True(t, a.left >= 0 && a.right <= d.width+0.5 && a.top >= 0 && a.bottom <= d.height,
			"%q leaves the figure: %.1f to %.1f of %.1f, %.1f to %.1f of %.1f", a.text, a.left, a.right, d.width, a.top, a.bottom, d.height)
		for _, b := range d.lines[:i] {
			assert.False(t, a.overlaps(b), "%q and %q overlap", a.text, b.text)
		}
		if !strings.HasPrefix(a.text, "gap in points") {
			continue
		}
		for _, b := range d.grips {
			b.left, b.right = b.left-1, b.right+1 // a pole has no width but its stroke's
			assert.False(t, a.overlaps(b), "a cutoff at %.0f px crosses %q", b.left+1, a.text)
		}
	}
}

// all draws every figure of an answer.
func (m recipe) all(o figure.Options) []string {
	a := m.answer()
	drawn := []string{figure.Sheet(a)}
	for _, r := range a.Results {
		for _, s := range r.Sweeps {
			drawn = append(drawn, figure.Sweep(a.Question, r, s, o))
		}
		for _, f := range r.Cutoffs {
			drawn = append(drawn, figure.Counted(a.Question, r, f, o))
		}
	}
	return drawn
}

func TestEveryFigureIsWellFormedAndLegible(t *testing.T) {
	for name, m := range recipes {
		t.Run(name, func(t *testing.T) {
			assert.NotEmpty(t, read(t, m.all(figure.Options{Width: 700, Selected: 0})[1]).grips)
			for _, width := range []int{0, 320, 360, 480, 700, 1100, 1600} {
				for _, svg := range m.all(figure.Options{Width: width, Selected: 0}) {
					read(t, svg).legible(t)
				}
			}
		})
	}
}
