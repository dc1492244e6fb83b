package figure

import "strconv"

// grip draws a cutoff's pole (both poles of a stretch) down to the figure's
// lower edge, and opens the group that belongs to the cutoff.
func (p *plot) grip(l flag, bottomOfFlags float64) {
	class := "pole"
	if l.index == p.options.Selected {
		class += " selected"
	}
	if _, out := p.frame.pin(l.cutoff.At); l.aside || out != 0 {
		class += " aside"
	}
	p.line(class, l.pole, p.flagTop(l, bottomOfFlags)+flagHeight, l.pole, p.height)
	for _, end := range ends(l.cutoff) {
		if x, out := p.frame.pin(end); out == 0 && x != l.pole {
			p.line(class, x, p.top, x, p.height)
		}
	}
}

// poles are the px at which the cutoffs' poles stand.
func (d *sweepDrawing) poles() []float64 {
	var at []float64
	for _, l := range d.flags {
		at = append(at, l.pole)
		for _, end := range ends(l.cutoff) {
			if x, out := d.frame.pin(end); out == 0 && x != l.pole {
				at = append(at, x)
			}
		}
	}
	return at
}

func (p *plot) flagTop(l flag, bottomOfFlags float64) float64 {
	return bottomOfFlags - float64(l.row)*flagRow - flagHeight
}

// flag draws a cutoff's label. The verdict is told by its word, where there
// is room, and by its mark: a tick on paper, a cross on ink, or a hatching.
func (p *plot) flag(l flag, bottomOfFlags float64) {
	top := p.flagTop(l, bottomOfFlags)
	p.raw(`<g class="grip" data-cutoff="` + strconv.Itoa(l.index) + `">`)
	class, text := "flag", ""
	if l.index == p.options.Selected {
		class += " selected"
	}
	switch {
	case l.aside:
		class, text = "paper", "soft"
	case l.verdict == "fails":
		class += " solid"
		text = "inverse"
	}
	p.rect(class, l.left, top, l.width, flagHeight)
	at := l.left + 6
	if l.verdict != "" {
		p.mark(l.verdict, l.left+3, top+3.5)
		at += markWidth
	}
	p.raw("<text")
	if text != "" {
		p.raw(` class="` + text + `"`)
	}
	p.attribute("x", at)
	p.attribute("y", top+flagHeight/2+0.35*p.size)
	p.raw(`><tspan class="strong">`)
	p.escape(l.name)
	p.raw("</tspan>")
	if l.word != "" {
		p.escape(" " + l.word)
	}
	p.raw("</text></g>")
}

// mark draws a verdict's sign in a square of 14 px.
func (p *plot) mark(verdict string, x, y float64) {
	switch verdict {
	case "holds":
		p.raw(`<path class="mark" d="`)
		p.points([]point{{x + 3, y + 7.5}, {x + 6, y + 11}, {x + 12, y + 3}}, 'M')
	case "fails":
		p.raw(`<path class="mark lightmark" d="`)
		p.points([]point{{x + 3, y + 3}, {x + 11, y + 11}}, 'M')
		p.points([]point{{x + 11, y + 3}, {x + 3, y + 11}}, 'M')
	default:
		p.raw(`<path class="hatch" d="`)
		p.points([]point{{x + 1, y + 6}, {x + 6, y + 1}}, 'M')
		p.points([]point{{x + 1, y + 13}, {x + 13, y + 1}}, 'M')
		p.points([]point{{x + 8, y + 13}, {x + 13, y + 8}}, 'M')
	}
	p.raw(`"/>`)
}
