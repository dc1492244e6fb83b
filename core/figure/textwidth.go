package figure

import "strings"

// widths of the printable ASCII characters in hundredths of the text size, as
// measured in DejaVu Serif: the widest face that the figures' font list is
// likely to meet, so that a label takes no more room than is kept for it.
var widths = [...]uint8{
	32, 40, 46, 84, 64, 95, 89, 27, 39, 39, 50, 84, 32, 34, 32, 34, // space to /
	64, 64, 64, 64, 64, 64, 64, 64, 64, 64, 34, 34, 84, 84, 84, 54, // 0 to ?
	100, 72, 73, 77, 80, 73, 69, 80, 87, 40, 40, 75, 66, 102, 88, 82, // @ to O
	67, 82, 75, 69, 67, 84, 72, 103, 71, 66, 69, 39, 34, 39, 84, 50, // P to _
	50, 60, 64, 56, 64, 59, 37, 64, 64, 32, 31, 61, 32, 95, 64, 60, // ` to o
	64, 64, 48, 51, 40, 64, 56, 86, 56, 56, 53, 64, 34, 64, 84, // p to ~
}

// bolder is how much wider bold text runs.
const bolder = 1.12

// textWidth estimates the width in px of a line of plain text.
func textWidth(text string, size float64) float64 {
	sum := 0
	for _, r := range text {
		sum += runeWidth(r)
	}
	return float64(sum) * size / 100
}

func runeWidth(r rune) int {
	switch {
	case r >= ' ' && r <= '~':
		return int(widths[r-' '])
	case r == '\u00a0' || r == '\u202f' || r == '·':
		return 32
	case r < 0x530: // Latin, Greek and Cyrillic letters
		return 80
	case r >= 0x2190 && r <= 0x22ff, r >= 0x2010 && r <= 0x2027: // arrows, signs, dashes
		return 90
	}
	return 105
}

// shorten cuts text to a width, with an ellipsis where something was cut.
func shorten(text string, size, width float64) string {
	if textWidth(text, size) <= width {
		return text
	}
	room := width - textWidth("…", size)
	sum := 0.0
	for i, r := range text {
		sum += float64(runeWidth(r)) * size / 100
		if sum > room {
			return strings.TrimSpace(text[:i]) + "…"
		}
	}
	return text
}

// wrap breaks text into lines of at most a width; a word longer than that is
// shortened.
func wrap(text string, size, width float64) []string {
	var lines []string
	line := ""
	for _, word := range strings.Fields(text) {
		switch longer := strings.TrimSpace(line + " " + word); {
		case textWidth(longer, size) <= width:
			line = longer
		case line == "":
			lines = append(lines, shorten(word, size, width))
		default:
			lines = append(lines, line)
			line = shorten(word, size, width)
		}
	}
	if line != "" {
		lines = append(lines, line)
	}
	return lines
}
