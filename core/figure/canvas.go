package figure

import (
	"math"
	"strconv"
	"strings"
	"unicode/utf8"
)

// point is a place on the page, in px from the top left.
type point struct{ x, y float64 }

// canvas collects SVG text. Elements carry a class and no colour: the rules
// in colours.go give it.
type canvas struct {
	strings.Builder
	prefix string // starts every id
}

func (c *canvas) raw(markup string) { c.WriteString(markup) }

// outermost keeps coordinates printable whatever is asked for.
const outermost = 1e6

// number prints a coordinate with at most one decimal and never "-0".
func (c *canvas) number(x float64) {
	switch {
	case !(x > -outermost): // NaN too
		x = -outermost
	case x > outermost:
		x = outermost
	}
	tenths := int64(math.Floor(x*10 + 0.5))
	var digits [16]byte
	c.Write(appendTenths(digits[:0], tenths))
}

func appendTenths(text []byte, tenths int64) []byte {
	if tenths < 0 {
		text = append(text, '-')
		tenths = -tenths
	}
	text = strconv.AppendInt(text, tenths/10, 10)
	if tenths%10 != 0 {
		text = append(text, '.', byte('0'+tenths%10))
	}
	return text
}

func (c *canvas) attribute(name string, x float64) {
	c.raw(" " + name + `="`)
	c.number(x)
	c.raw(`"`)
}

// escape writes text as XML character data or an attribute's value. What XML
// can't hold, and the marks that turn the direction of the text after them,
// become the replacement character.
func (c *canvas) escape(text string) {
	for _, r := range text {
		switch {
		case r == '&':
			c.raw("&amp;")
		case r == '<':
			c.raw("&lt;")
		case r == '>':
			c.raw("&gt;")
		case r == '"':
			c.raw("&#34;")
		case r == '\'':
			c.raw("&#39;")
		case r == '\t' || r == '\n' || r == '\r':
			c.raw(" ")
		case r < ' ' || r == 0x7f || r == 0xfffe || r == 0xffff,
			r >= 0x202a && r <= 0x202e, r >= 0x2066 && r <= 0x2069:
			c.WriteRune(utf8.RuneError)
		default:
			c.WriteRune(r)
		}
	}
}

func (c *canvas) open(element, class string) {
	c.raw("<" + element + ` class="` + class + `"`)
}

func (c *canvas) line(class string, x1, y1, x2, y2 float64) {
	c.open("line", class)
	c.attribute("x1", x1)
	c.attribute("y1", y1)
	c.attribute("x2", x2)
	c.attribute("y2", y2)
	c.raw("/>")
}

// rect writes a rectangle; one without extent is left out.
func (c *canvas) rect(class string, x, y, width, height float64) {
	if !(width > 0) || !(height > 0) {
		return
	}
	c.open("rect", class)
	c.attribute("x", x)
	c.attribute("y", y)
	c.attribute("width", width)
	c.attribute("height", height)
	c.raw("/>")
}

func (c *canvas) circle(class string, x, y, radius float64) {
	c.open("circle", class)
	c.attribute("cx", x)
	c.attribute("cy", y)
	c.attribute("r", radius)
	c.raw("/>")
}

// path writes a line through points.
func (c *canvas) path(class string, through []point) {
	if len(through) < 2 {
		return
	}
	c.open("path", class)
	c.raw(` d="`)
	c.points(through, 'M')
	c.raw(`"/>`)
}

// area writes the surface between two lines.
func (c *canvas) area(class string, upper, lower []point) {
	if len(upper) < 2 || len(lower) < 2 {
		return
	}
	back := make([]point, len(lower))
	for i, p := range lower {
		back[len(lower)-1-i] = p
	}
	c.open("path", class)
	c.raw(` d="`)
	c.points(upper, 'M')
	c.points(back, 'L')
	c.raw(`Z"/>`)
}

// points writes a path's points, leaving out those in the middle of a level
// or upright line, and writing only the coordinate that changes.
func (c *canvas) points(through []point, command byte) {
	for i, p := range through {
		if i > 0 && i < len(through)-1 {
			before, after := through[i-1], through[i+1]
			if before.x == p.x && p.x == after.x && (p.y-before.y)*(after.y-p.y) >= 0 ||
				before.y == p.y && p.y == after.y {
				continue
			}
		}
		switch {
		case i > 0 && through[i-1].y == p.y:
			c.WriteByte('H')
			c.number(p.x)
		case i > 0 && through[i-1].x == p.x:
			c.WriteByte('V')
			c.number(p.y)
		default:
			c.WriteByte(command)
			c.number(p.x)
			c.WriteByte(' ')
			c.number(p.y)
		}
		command = 'L'
	}
}

// text writes a line of text with its baseline at y; anchor is "start",
// "middle" or "end".
func (c *canvas) text(class, anchor string, x, y float64, text string) {
	c.raw("<text")
	if class != "" {
		c.raw(` class="` + class + `"`)
	}
	if anchor != "start" {
		c.raw(` text-anchor="` + anchor + `"`)
	}
	c.attribute("x", x)
	c.attribute("y", y)
	c.raw(">")
	c.escape(text)
	c.raw("</text>")
}
