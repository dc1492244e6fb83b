package resample

import (
	"cmp"
	"slices"
)

// blocks are ranges of blocks of replicates, each from (in) to (out).
type blocks [][2]int

// joined is the same blocks in order, with ranges that meet made one. Ranges
// that overlap stay apart.
func (b blocks) joined() (joined blocks) {
	sorted := slices.SortedFunc(slices.Values(b), func(x, y [2]int) int { return cmp.Or(x[0]-y[0], x[1]-y[1]) })
	for _, next := range sorted {
		last := len(joined) - 1
		switch {
		case next[0] == next[1]:
		case last >= 0 && joined[last][1] == next[0]:
			joined[last][1] = next[1]
		default:
			joined = append(joined, next)
		}
	}
	return joined
}

// within is true for ranges that are joined, apart from each other, and among
// so many blocks.
func (b blocks) within(total int) bool {
	end := -1
	for _, each := range b {
		if each[0] <= end || each[1] <= each[0] {
			return false
		}
		end = each[1]
	}
	return end <= total
}

// replicates is how many replicates are in some blocks, of which the last may
// be short.
func (p Plan) replicates(made blocks) int {
	all := 0
	for _, each := range made {
		all += max(0, min(each[1]*blockSize, p.Replicates)-each[0]*blockSize)
	}
	return all
}
