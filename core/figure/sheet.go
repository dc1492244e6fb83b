package figure

import (
	"strconv"

	"tailgap/core/ask"
	"tailgap/core/words"
)

// Measures of a sheet in px.
const (
	sheetWidth  = 960
	sheetMargin = 32.0
	lineHeight  = 20.0
)

// Sheet is the whole answer on one standalone SVG: for each result the sweep
// of each side in use and, cutoff by cutoff, what was found in a sentence
// with the counted scores against the curve. It says DEMO when the answer
// came from the demo.
func Sheet(a ask.Answer) string {
	return newSheet(a, "How far the curve is from the count", (*sheet).result)
}

// WormSheet is a standalone SVG with the worm plot of each result, and what
// the shape of its scores does to the gaps. It says DEMO likewise.
func WormSheet(a ask.Answer) string {
	return newSheet(a, "What the shape of the scores does", (*sheet).shape)
}

func newSheet(a ask.Answer, title string, result func(s *sheet, index int, r ask.Result)) string {
	s := &sheet{canvas: canvas{prefix: "sheet"}, q: a.Question, y: sheetMargin}
	if a.Demo {
		s.paragraph("strong", words.Demo())
	}
	for i, r := range a.Results {
		if i > 0 {
			s.y += 28
			s.line("zero", sheetMargin, s.y-14, sheetWidth-sheetMargin, s.y-14)
		}
		result(s, i, r)
	}
	s.y += 10
	s.sentences(append(a.General(), words.Cautions()...))
	s.paragraph("soft", words.Method(a))
	return drawing{width: sheetWidth, height: s.y + 12, title: titled(a, title), description: sentences(s.said...), body: s.String()}.
		document(Options{Width: sheetWidth, Standalone: true, Prefix: "sheet"})
}

// sheet is a sheet in the making: y is where the next thing goes, said what
// its description will say.
type sheet struct {
	canvas
	q    ask.Question
	y    float64
	said []string
}

// titled is a sheet's title, with the scores that it is about.
func titled(a ask.Answer, title string) string {
	for i, r := range a.Results {
		if i == 0 {
			title += ": "
		} else {
			title += ", "
		}
		title += words.Name(r.Score)
	}
	if a.Demo {
		title = "DEMO. " + title
	}
	return title
}

// paragraph writes text in lines, and into the description.
func (s *sheet) paragraph(class, text string) {
	if text == "" {
		return
	}
	size := textWide * bolder
	for _, line := range wrap(text, size, sheetWidth-2*sheetMargin) {
		s.y += lineHeight
		s.text(class, "start", sheetMargin, s.y-6, line)
	}
	s.said = append(s.said, text)
}

// sentences writes what must be borne in mind, a paragraph for each text.
func (s *sheet) sentences(texts []string) {
	for _, text := range texts {
		s.paragraph("soft", sentences(words.Capital(text)))
	}
}

// head says what a result is about.
func (s *sheet) head(r ask.Result) {
	s.y += 34
	s.text("title", "start", sheetMargin, s.y-8, words.Name(r.Score))
	s.said = append(s.said, words.Name(r.Score))
	s.paragraph("", sentences(words.Capital(words.Curve(r))))
	s.paragraph("soft", sentences(words.Capital(words.Sample(r))))
	s.sentences(r.Warnings)
}

// shape draws a result's worm and says what its shape does.
func (s *sheet) shape(index int, r ask.Result) {
	s.head(r)
	if worm, ok := drawWorm(s.q, r, Options{Width: sheetWidth - 2*sheetMargin, Selected: -1, Prefix: "sheet-" + strconv.Itoa(index)}); ok {
		s.y += 14
		s.place(worm)
		s.paragraph("soft", words.ReadWorm())
	}
	for _, text := range append(words.Worm(s.q, r), words.Shape(s.q, r)...) {
		s.paragraph("", text)
	}
	s.paragraph("soft", words.Normality(r))
	if words.Tested(r) {
		s.paragraph("soft", words.NoAnswer())
	}
}

func (s *sheet) result(index int, r ask.Result) {
	s.head(r)
	drawn := map[int]bool{}
	for i, sweep := range r.Sweeps {
		prefix := "sheet-" + strconv.Itoa(index) + "-" + strconv.Itoa(i)
		s.y += 14
		s.place(drawSweep(s.q, r, sweep, Options{Width: sheetWidth - 2*sheetMargin, Selected: -1, Prefix: prefix}))
		for _, text := range words.Trusted(s.q, r, sweep) {
			s.paragraph("", text)
		}
		for j, f := range r.Cutoffs {
			if onSweep(f, sweep) && !drawn[j] {
				drawn[j] = true
				s.finding(r, f, prefix+"-"+strconv.Itoa(j))
			}
		}
	}
}

// finding writes one cutoff's sentence and draws its figure.
func (s *sheet) finding(r ask.Result, f ask.Finding, prefix string) {
	s.y += 20
	s.paragraph("strong", words.Sentence(s.q, f))
	if verdict := words.Verdict(s.q, f); verdict != "" {
		s.paragraph("strong", sentences(words.Capital(verdict)))
	}
	s.paragraph("soft", words.OtherReading(s.q, f))
	s.paragraph("soft", sentences(words.Capital(words.Settle(s.q, f))))
	s.sentences(f.Notes)
	s.y += 12
	s.place(drawCounted(s.q, r, f, Options{Width: sheetWidth - 2*sheetMargin, Selected: -1, Prefix: prefix}))
}

// place sets a drawing into the sheet.
func (s *sheet) place(d drawing) {
	s.raw("<svg")
	s.attribute("x", sheetMargin)
	s.attribute("y", s.y)
	s.attribute("width", d.width)
	s.attribute("height", d.height)
	s.raw(">" + d.body + "</svg>")
	s.y += d.height
}
