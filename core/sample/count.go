package sample

import (
	"context"
	"math/bits"
	"slices"
)

// CountContext is Count for many scores: it returns the context's error soon
// after the context ends. progress, which may be nil, is told how much of the
// work is done; it never goes back, and ends at the total.
func CountContext(ctx context.Context, scores []float64, progress func(done, total int)) (Counts, error) {
	runs := (len(scores) + atOnce - 1) / atOnce
	rounds := bits.Len(uint(max(1, runs) - 1)) // of merging, two tables at a time
	c := counting{ctx: ctx, progress: progress, total: len(scores) * (1 + rounds)}
	tables := make([]Counts, 0, max(1, runs))
	for run := range slices.Chunk(scores, atOnce) {
		tables = append(tables, tallied(run))
		if err := c.did(len(run)); err != nil {
			return Counts{}, err
		}
	}
	for len(tables) > 1 {
		left := tables[:0]
		for pair := range slices.Chunk(tables, 2) {
			table := pair[0]
			if len(pair) == 2 {
				var err error
				if table, err = c.merge(pair[0], pair[1]); err != nil {
					return Counts{}, err
				}
			}
			left = append(left, table)
		}
		tables = left
	}
	if len(tables) == 0 {
		return Counts{}, ctx.Err()
	}
	return tables[0], c.did(c.total - c.done)
}

// atOnce is how many scores are sorted, or merged, without a look at the
// context: for a few milliseconds.
const atOnce = 1 << 15

// counting is how far a count is, in scores looked at.
type counting struct {
	ctx         context.Context
	progress    func(done, total int)
	done, total int
}

func (c *counting) did(scores int) error {
	c.done += scores
	if c.progress != nil && scores > 0 && c.ctx.Err() == nil {
		c.progress(c.done, c.total)
	}
	return c.ctx.Err()
}

// fewInRun is the number of distinct scores up to which looking them up is
// faster than sorting a run.
const fewInRun = atOnce / 16

// tallied is the count table of a run of scores.
func tallied(scores []float64) Counts {
	tally := make(map[float64]int)
	for _, score := range scores {
		if tally[score]++; len(tally) > fewInRun {
			return sorted(scores)
		}
	}
	table := Counts{Score: make([]float64, 0, len(tally)), Count: make([]int, len(tally)), N: len(scores)}
	for score := range tally {
		table.Score = append(table.Score, score+0) // +0 turns -0 into 0
	}
	slices.Sort(table.Score)
	for i, score := range table.Score {
		table.Count[i] = tally[score]
	}
	return table
}

// sorted is the same for scores of which many are different.
func sorted(scores []float64) Counts {
	inOrder := slices.Clone(scores)
	for i := range inOrder {
		inOrder[i] += 0
	}
	slices.Sort(inOrder)
	table := Counts{N: len(inOrder)}
	for from := 0; from < len(inOrder); {
		to := from + 1
		for to < len(inOrder) && inOrder[to] == inOrder[from] {
			to++
		}
		table.add(inOrder[from], to-from)
		from = to
	}
	return table
}

// merge is the table of the people of two tables.
func (c *counting) merge(a, b Counts) (Counts, error) {
	table := Counts{N: a.N + b.N}
	table.Score = make([]float64, 0, len(a.Score)+len(b.Score))
	table.Count = make([]int, 0, len(a.Score)+len(b.Score))
	for i, j, looked := 0, 0, 0; i < len(a.Score) || j < len(b.Score); {
		switch {
		case j == len(b.Score) || i < len(a.Score) && a.Score[i] < b.Score[j]:
			table.add(a.Score[i], a.Count[i])
			i++
		case i == len(a.Score) || b.Score[j] < a.Score[i]:
			table.add(b.Score[j], b.Count[j])
			j++
		default:
			table.add(a.Score[i], a.Count[i]+b.Count[j])
			i, j = i+1, j+1
		}
		if i+j-looked >= atOnce {
			if err := c.did(i + j - looked); err != nil {
				return Counts{}, err
			}
			looked = i + j
		}
	}
	return table, nil
}

func (c *Counts) add(score float64, count int) {
	c.Score = append(c.Score, score)
	c.Count = append(c.Count, count)
}
