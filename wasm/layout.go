package main

import (
	"cmp"
	"math"
	"slices"
	"strconv"
	"strings"
)

// Sizes of the cards that hang under the sweep, in px.
const (
	cardWidth = 236.0
	cardWide  = 316.0 // where there is room for all of them
	cardGap   = 22.0
	stacked   = 700 // a narrower column stacks its cards
	tieHeight = 26.0
)

// hang places cards of a width under their grips: as near to them as can be
// (least squares) without overlap and within the column. It returns each
// card's left edge, or nil when the cards don't fit into one row.
//
// In order of the grips this is an isotonic regression (pool adjacent
// violators: Barlow et al. 1972) of what is left of the grips' places after
// the room that the cards before them take.
func hang(grips []float64, column, width float64) []float64 {
	n := len(grips)
	if n == 0 || float64(n)*(width+cardGap)-cardGap > column {
		return nil
	}
	order := make([]int, n)
	for i := range order {
		order[i] = i
	}
	slices.SortStableFunc(order, func(a, b int) int { return cmp.Compare(grips[a], grips[b]) })
	taken := func(rank int) float64 { return float64(rank) * (width + cardGap) }
	wanted := make([]float64, n)
	for rank, i := range order {
		wanted[rank] = grips[i] - width/2 - taken(rank)
	}
	left := make([]float64, n)
	last := column - width - taken(n-1) // the rightmost place, after what is taken
	for rank, x := range rising(wanted) {
		left[order[rank]] = math.Min(math.Max(x, 0), last) + taken(rank)
	}
	return left
}

// rising is the non-decreasing sequence nearest to x in least squares.
func rising(x []float64) []float64 {
	type block struct {
		sum   float64
		count int
	}
	mean := func(b block) float64 { return b.sum / float64(b.count) }
	var blocks []block
	for _, v := range x {
		blocks = append(blocks, block{v, 1})
		for n := len(blocks); n > 1 && mean(blocks[n-2]) > mean(blocks[n-1]); n = len(blocks) {
			blocks[n-2] = block{blocks[n-2].sum + blocks[n-1].sum, blocks[n-2].count + blocks[n-1].count}
			blocks = blocks[:n-1]
		}
	}
	fitted := make([]float64, 0, len(x))
	for _, b := range blocks {
		for range b.count {
			fitted = append(fitted, mean(b))
		}
	}
	return fitted
}

// ties draws a line from each pole of a grip, at the top, to the middle of its
// card.
func ties(poles [][]float64, left []float64, column, width float64, selected int) string {
	var b strings.Builder
	px := func(x float64) string { return strconv.FormatFloat(x, 'f', 1, 64) }
	b.WriteString(`<svg xmlns="http://www.w3.org/2000/svg" class="ties" aria-hidden="true" width="` + px(column) +
		`" height="` + px(tieHeight) + `" viewBox="0 0 ` + px(column) + ` ` + px(tieHeight) + `">`)
	for i := range poles {
		middle, class := left[i]+width/2, "tie"
		if i == selected {
			class = "tie selected"
		}
		for _, pole := range poles[i] {
			b.WriteString(`<path class="` + class + `" d="M` + px(pole) + ` 0C` + px(pole) + ` ` + px(tieHeight*0.7) + ` ` +
				px(middle) + ` ` + px(tieHeight*0.3) + ` ` + px(middle) + ` ` + px(tieHeight) + `"/>`)
		}
	}
	b.WriteString(`</svg>`)
	return b.String()
}
