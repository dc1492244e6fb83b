package figure

import (
	"math"

	"tailgap/core/words"
)

// ticks returns the multiples of a round step (1, 2 or 5 times a power of
// ten) in low..high, ascending: with the smallest step that gives no more
// than most of them and is no smaller than least. There may be none.
func ticks(low, high float64, most int, least float64) []float64 {
	if !(high > low) || math.IsInf(high-low, 0) || most < 1 {
		return nil
	}
	slack := 1e-9 * (high - low) // a tick at an end belongs to it, whatever rounding did
	exponent := int(math.Floor(math.Log10((high-low)/float64(most)))) - 1
	for ; exponent < 308; exponent++ {
		for _, lead := range [...]float64{1, 2, 5} {
			step := scaled(lead, exponent)
			if step < least*(1-1e-9) || step == 0 {
				continue
			}
			first, last := math.Ceil((low-slack)/step), math.Floor((high+slack)/step)
			if !(last-first < float64(most)) {
				continue
			}
			var values []float64
			for i := range int(last-first) + 1 {
				values = append(values, scaled((first+float64(i))*lead, exponent)+0)
			}
			return values
		}
	}
	return nil
}

// scaled is whole·10^exponent, rounded once, so that 3 times 0.1 prints 0.3.
func scaled(whole float64, exponent int) float64 {
	if exponent < 0 {
		return whole / math.Pow10(-exponent)
	}
	return whole * math.Pow10(exponent)
}

// scoreTicks are the ticks of a frame and their labels, about one for each 70
// px (50 in a narrow figure) and never so many that labels touch. A label that
// would stick out of the figure, which is width px wide, is empty.
func scoreTicks(f Frame, step *float64, size, width float64) ([]float64, []string) {
	least := 0.0
	if step != nil {
		least = *step
	}
	each := 70.0
	if width < narrow {
		each = 50
	}
	for most := int((f.Right-f.Left)/each) + 1; most > 0; most-- {
		values := ticks(f.Low, f.High, most, least)
		labels := make([]string, len(values))
		fits, reached := true, math.Inf(-1)
		for i, value := range values {
			label := words.Number(value)
			half := textWidth(label, size) / 2
			left, right := f.X(value)-half, f.X(value)+half
			if left < 2 || right > width-2 {
				continue
			}
			labels[i] = label
			fits = fits && left >= reached
			reached = right + 10
		}
		if fits {
			return values, labels
		}
	}
	return nil, nil
}

// signed prints points with their sign, as a table does: "+4", "0", "-0.5".
func signed(points float64) string {
	if points > 0 {
		return "+" + words.Number(points)
	}
	return words.Number(points)
}
