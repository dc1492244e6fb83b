package figure_test

import (
	"math"
	"regexp"
	"strconv"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/figure"
)

type colour [3]float64 // sRGB, 0..1

func parse(t *testing.T, hex string) (c colour) {
	t.Helper()
	require.Len(t, hex, 7)
	for i := range c {
		value, err := strconv.ParseUint(hex[1+2*i:3+2*i], 16, 8)
		require.NoError(t, err)
		c[i] = float64(value) / 255
	}
	return c
}

// over is a tint over a ground, blended as browsers do.
func (c colour) over(ground colour, tint string) (blend colour) {
	alpha, _ := strconv.ParseFloat(tint, 64)
	for i := range blend {
		blend[i] = alpha*c[i] + (1-alpha)*ground[i]
	}
	return blend
}

// luminance and contrast are the relative luminance and the contrast ratio of
// WCAG 2.2.
func (c colour) luminance() float64 {
	sum := 0.0
	for i, weight := range [...]float64{0.2126, 0.7152, 0.0722} {
		linear := c[i] / 12.92
		if c[i] > 0.04045 {
			linear = math.Pow((c[i]+0.055)/1.055, 2.4)
		}
		sum += weight * linear
	}
	return sum
}

func contrast(a, b colour) float64 {
	x, y := a.luminance(), b.luminance()
	return (max(x, y) + 0.05) / (min(x, y) + 0.05)
}

// Black on white is 21 to 1; #777 on white, 4.48, is the well-known grey that
// just fails.
func TestContrast(t *testing.T) {
	assert.InDelta(t, 21, contrast(parse(t, "#000000"), parse(t, "#ffffff")), 1e-9)
	assert.InDelta(t, 4.48, contrast(parse(t, "#777777"), parse(t, "#ffffff")), 0.005)
}

func TestColoursStandOut(t *testing.T) {
	for mode, p := range map[string]figure.Palette{"light": figure.Light, "dark": figure.Dark} {
		t.Run(mode, func(t *testing.T) {
			paper, ink, soft := parse(t, p.Paper), parse(t, p.Ink), parse(t, p.Soft)
			plum, moss, corridor := parse(t, p.Plum), parse(t, p.Moss), parse(t, p.Corridor)
			grounds := map[string]colour{
				"paper": paper, "corridor": corridor,
				"band": plum.over(paper, figure.BandTint), "band over corridor": plum.over(corridor, figure.BandTint),
				"stretch": ink.over(paper, figure.SpanTint),
			}
			for name, ground := range grounds {
				assert.GreaterOrEqual(t, contrast(ink, ground), 4.5, "ink on %s", name)
				assert.GreaterOrEqual(t, contrast(plum, ground), 4.5, "plum text on %s", name)
				assert.GreaterOrEqual(t, contrast(moss, ground), 3.0, "a trusted stretch on %s", name)
			}
			assert.GreaterOrEqual(t, contrast(soft, paper), 4.5, "soft text, which stands outside the field")
			assert.GreaterOrEqual(t, contrast(moss, paper), 4.5, "moss text on paper")
			assert.GreaterOrEqual(t, contrast(soft, corridor), 3.0, "the tolerance's edges")
			assert.GreaterOrEqual(t, contrast(paper, ink), 4.5, "the text of a flag that fails")
			edge := plum.over(paper, figure.EdgeTint)
			assert.GreaterOrEqual(t, contrast(edge, paper), 3.0, "the band's edge")
			assert.GreaterOrEqual(t, contrast(plum, moss.over(paper, figure.BarTint)), 3.0, "the curve over the bars")
			beyond := plum.over(moss, figure.AreaTint)
			assert.GreaterOrEqual(t, contrast(beyond, moss.over(paper, figure.BarTint)), 3.0, "bars beyond the cutoff beside the others")
		})
	}
}

func TestTextIsNeverTiny(t *testing.T) {
	sizes := regexp.MustCompile(`font(?:-size)?:(\d+)px`).FindAllStringSubmatch(figure.Rules, -1)
	require.NotEmpty(t, sizes)
	for _, size := range sizes {
		px, err := strconv.Atoi(size[1])
		require.NoError(t, err)
		assert.GreaterOrEqual(t, px, 12)
	}
}
