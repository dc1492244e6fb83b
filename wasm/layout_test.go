package main

import (
	"slices"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"
)

func TestHangPutsCardsUnderTheirGrips(t *testing.T) {
	const half = cardWidth / 2
	tests := []struct {
		name   string
		grips  []float64
		column float64
		want   []float64
	}{
		{"alone", []float64{500}, 1160, []float64{500 - half}},
		{"far apart", []float64{200, 800}, 1160, []float64{200 - half, 800 - half}},
		{"at the edges", []float64{0, 1160}, 1160, []float64{0, 1160 - cardWidth}},
		{"two in one place part evenly", []float64{500, 500}, 1160, []float64{500 - cardWidth - cardGap/2, 500 + cardGap/2}},
		{"in any order", []float64{800, 200}, 1160, []float64{800 - half, 200 - half}},
		{"too many", []float64{1, 2, 3, 4, 5}, 1160, nil},
		{"none", nil, 1160, nil},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			assert.InDeltaSlice(t, test.want, hang(test.grips, test.column, cardWidth), 1e-9)
		})
	}
}

func TestHungCardsNeverOverlapAndStayInTheColumn(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		column := rapid.Float64Range(stacked, 1600).Draw(t, "column")
		width := rapid.SampledFrom([]float64{cardWidth, cardWide}).Draw(t, "width")
		grips := rapid.SliceOfN(rapid.Float64Range(0, column), 1, 8).Draw(t, "grips")
		left := hang(grips, column, width)
		if left == nil {
			if float64(len(grips))*(width+cardGap)-cardGap <= column {
				t.Fatal("they fit into one row")
			}
			return
		}
		for i := range grips {
			for j := range grips {
				if grips[i] < grips[j] && left[i] >= left[j] {
					t.Fatal("the cards' order is not the grips'")
				}
			}
		}
		sorted := slices.Sorted(slices.Values(left))
		if sorted[0] < -1e-9 || sorted[len(sorted)-1]+width > column+1e-9 {
			t.Fatal("a card leaves the column")
		}
		for i := 1; i < len(sorted); i++ {
			if sorted[i]-sorted[i-1] < width+cardGap-1e-9 {
				t.Fatal("two cards are too near")
			}
		}
	})
}

// The fit of a monotone sequence in least squares, worked out by hand.
func TestRising(t *testing.T) {
	tests := []struct{ x, want []float64 }{
		{[]float64{1, 2, 3}, []float64{1, 2, 3}},
		{[]float64{3, 2, 1}, []float64{2, 2, 2}},
		{[]float64{1, 3, 2, 4}, []float64{1, 2.5, 2.5, 4}},
		{[]float64{4, 1, 2, 9}, []float64{7.0 / 3, 7.0 / 3, 7.0 / 3, 9}},
	}
	for _, test := range tests {
		assert.InDeltaSlice(t, test.want, rising(test.x), 1e-12)
	}
}

func TestTiesRunFromEachPoleToItsCard(t *testing.T) {
	svg := ties([][]float64{{100, 140}, {700}}, []float64{0, 600}, 1000, cardWidth, 1)
	assert.Equal(t, 3, strings.Count(svg, "<path"))
	assert.Contains(t, svg, `d="M100.0 0C`)
	assert.Contains(t, svg, "118.0 26.0")
	assert.Equal(t, 1, strings.Count(svg, `class="tie selected"`))
}
