package resample

import (
	"slices"

	"tailgap/core/gap"
	"tailgap/core/sample"
)

// cells are what a resample counts people in, runs of distinct scores that
// every region of the plan has wholly inside or wholly outside: in the direct
// form each score, in the binned form what lies between two thresholds. All
// goroutines share them; nothing in them changes.
type cells struct {
	drawer drawer
	first  []int // the score that each cell begins with, and an end; nil: cells are scores
	means  []powers
	spread []spread // of the scores in each cell; nil: cells are scores
	rest   residual
}

// powers of a score in standard units, or their means over the people of a cell.
type powers struct{ u1, u2, u3, u4 float64 }

// outermostCells are the scores at each end that stay cells of their own: what
// few people do far out, no normal distribution does.
const outermostCells = 50

func newCells(plan *Plan) *cells {
	if first := edges(plan); binnedIsFaster(plan.Table.Counts, len(first)-1) {
		return binned(plan.Table, first)
	}
	return direct(plan.Table)
}

// direct makes a cell of each score.
func direct(table gap.Table) *cells {
	c := &cells{drawer: newDrawer(table.Counts), means: make([]powers, len(table.U))}
	for i, u := range table.U {
		c.means[i] = powersOf(u)
	}
	return c
}

func powersOf(u float64) powers { return powers{u, u * u, u * u * u, u * u * u * u} }

// edges are the distinct scores with which a cell of the binned form begins,
// ascending, and the number of scores.
func edges(plan *Plan) []int {
	distinct := len(plan.Table.U)
	all := []int{0, distinct}
	for i := range min(outermostCells, distinct) {
		all = append(all, i+1, distinct-i-1)
	}
	for _, r := range plan.Regions {
		all = append(all, r.From, r.To)
	}
	slices.Sort(all)
	return slices.Compact(all)
}

// binned parts the scores into cells at the edges.
func binned(table gap.Table, first []int) *cells {
	c := &cells{first: first}
	people := sample.Counts{N: table.Counts.N}
	var rest residual
	for i := range len(first) - 1 {
		u, count := table.U[first[i]:first[i+1]], table.Counts.Count[first[i]:first[i+1]]
		cell := describe(u, count)
		people.Count = append(people.Count, cell.people)
		c.means, c.spread = append(c.means, cell.means), append(c.spread, cell.spread)
		rest.add(cell.rest)
	}
	c.drawer, c.rest = newDrawer(people), rest.root()
	return c
}

// cell is the index of the cell that begins with a score, or of the end.
func (c *cells) cell(score int) int {
	if c.first == nil {
		return score
	}
	i, _ := slices.BinarySearch(c.first, score)
	return i
}

// What things cost, in index draws (of one person among few).
const (
	costOfScore  = 3 // adding up the people of one score or cell
	costOfSpread = 8 // spreading the people of one cell
)

// binnedIsFaster is true where a resample of so many cells costs less than
// half of one of all scores; from close calls the direct form comes out.
func binnedIsFaster(counts sample.Counts, cells int) bool {
	scores, people := len(counts.Count), counts.N
	_, direct := fastest(people, scores)
	_, binned := fastest(people, cells)
	return 2*(binned+cells*(costOfScore+costOfSpread)) < direct+scores*costOfScore
}
