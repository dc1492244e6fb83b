package resample

import (
	"context"
	"encoding/binary"
	"math/rand/v2"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"
)

// split cuts the plan's blocks at places drawn by rapid, some of them equal.
func split(t *rapid.T, plan Plan) (ends []int) {
	ends = rapid.SliceOfN(rapid.IntRange(0, plan.Blocks()), 0, 5).Draw(t, "ends")
	ends = append(ends, 0, plan.Blocks())
	slices.Sort(ends)
	return ends
}

// made is a part of the blocks from (in) to (out).
func made(t require.TestingT, plan Plan, from, to int) Part {
	maker := NewMaker(plan)
	require.NoError(t, maker.Make(context.Background(), from, to, nil))
	part, err := maker.Part()
	require.NoError(t, err)
	return part
}

// Any split of the blocks over makers, in any order, gives what one run gives;
// also when the parts went through bytes.
func TestPartsMergeIntoTheRun(t *testing.T) {
	few := planFor(wholeNumbers(100), 1)
	rapid.Check(t, func(t *rapid.T) {
		plan := few
		plan.Replicates = rapid.IntRange(200, 900).Draw(t, "replicates")
		plan.Level = rapid.SampledFrom([]float64{0.5, 0.9, 0.95, 0.99}).Draw(t, "level")
		plan.Weights = []float64{1, 1.2}
		want, err := Run(context.Background(), plan, nil)
		require.NoError(t, err)

		ends := split(t, plan)
		makers := []*Maker{NewMaker(plan), NewMaker(plan), NewMaker(plan)}
		order := make([]int, len(ends)-1)
		for i := range order {
			order[i] = i
		}
		for _, i := range rapid.Permutation(order).Draw(t, "order") {
			told := 0
			maker := rapid.SampledFrom(makers).Draw(t, "maker")
			require.NoError(t, maker.Make(context.Background(), ends[i], ends[i+1], func(done int) { told = done }))
			assert.Equal(t, plan.replicates(blocks{{ends[i], ends[i+1]}}), told)
		}
		var parts []Part
		for _, maker := range makers {
			made, err := maker.Part()
			require.NoError(t, err)
			data, err := made.MarshalBinary()
			require.NoError(t, err)
			var part Part
			require.NoError(t, part.UnmarshalBinary(data))
			parts = append(parts, part)
		}
		rand.Shuffle(len(parts), func(i, j int) { parts[i], parts[j] = parts[j], parts[i] })
		got, err := Merge(plan, parts)
		require.NoError(t, err)
		assert.Equal(t, want, got)
	})
}

// What was stopped in the middle of a range can't be told from what wasn't,
// so that no part is made of it.
func TestMakerThatWasStoppedGivesNoPart(t *testing.T) {
	plan := planFor(wholeNumbers(100), 1)
	plan.Replicates = 640
	maker := NewMaker(plan)
	ctx, stop := context.WithCancel(context.Background())
	err := maker.Make(ctx, 0, 10, func(done int) {
		if done == 128 {
			stop()
		}
	})
	assert.ErrorIs(t, err, context.Canceled)
	_, err = maker.Part()
	assert.ErrorContains(t, err, "not finished")
}

func TestMergeRefusesWhatDoesNotFit(t *testing.T) {
	plan := planFor(wholeNumbers(100), 1)
	plan.Replicates = 640
	require.Equal(t, 10, plan.Blocks())
	first, second := made(t, plan, 0, 4), made(t, plan, 4, 10)
	_, err := Merge(plan, []Part{second, first})
	require.NoError(t, err)

	other := func(change func(p *Plan)) Part {
		p := plan
		change(&p)
		return made(t, p, 4, 10)
	}
	short := second
	short.kept = slices.Clone(short.kept)
	short.kept[3] = short.kept[3][1:]
	for name, c := range map[string]struct {
		parts []Part
		error string
	}{
		"none":             {nil, "every one of the 10 blocks"},
		"one missing":      {[]Part{first}, "every one of the 10 blocks"},
		"a gap":            {[]Part{first, made(t, plan, 5, 10)}, "every one of the 10 blocks"},
		"an overlap":       {[]Part{first, made(t, plan, 3, 10)}, "every one of the 10 blocks"},
		"twice":            {[]Part{first, second, second}, "every one of the 10 blocks"},
		"another seed":     {[]Part{first, other(func(p *Plan) { p.Seed++ })}, "other replicates"},
		"another level":    {[]Part{first, other(func(p *Plan) { p.Level = 0.9 })}, "other replicates"},
		"other weights":    {[]Part{first, other(func(p *Plan) { p.Weights = []float64{1.1} })}, "other replicates"},
		"more replicates":  {[]Part{first, other(func(p *Plan) { p.Replicates++ })}, "other replicates"},
		"other people":     {[]Part{first, other(func(p *Plan) { *p = planFor(wholeNumbers(101), 1); p.Replicates = 640 })}, "other replicates"},
		"another place":    {[]Part{first, other(func(p *Plan) { p.Regions = slices.Clone(p.Regions); p.Regions[2] = p.Regions[3] })}, "other replicates"},
		"a part cut short": {[]Part{first, short}, "other replicates"},
		"an empty part":    {[]Part{first, second, {}}, "other replicates"},
	} {
		_, err := Merge(plan, c.parts)
		assert.ErrorContains(t, err, c.error, name)
	}
	for _, range_ := range [][2]int{{-1, 3}, {4, 3}, {0, 11}} {
		err := NewMaker(plan).Make(context.Background(), range_[0], range_[1], nil)
		assert.ErrorContains(t, err, "of 10", range_)
	}
}

// What is read from bytes is written as the same bytes, and never more is
// taken into memory than the bytes hold.
func FuzzPart(f *testing.F) {
	plan := planFor(wholeNumbers(10), 1)
	plan.Replicates, plan.Level = 200, 0.99
	whole, err := made(f, plan, 0, plan.Blocks()).MarshalBinary()
	require.NoError(f, err)
	f.Add(whole)
	f.Add(whole[:partHeader])
	f.Add([]byte{})
	f.Fuzz(func(t *testing.T, data []byte) {
		var part Part
		if part.UnmarshalBinary(data) != nil {
			return
		}
		again, err := part.MarshalBinary()
		require.NoError(t, err)
		assert.Equal(t, data, again)
		if _, err := Merge(plan, []Part{part}); err == nil {
			assert.Equal(t, part.plan, plan.fingerprint())
		}
	})
}

func TestPartsRefuseOtherBytes(t *testing.T) {
	plan := planFor(wholeNumbers(10), 1)
	plan.Replicates, plan.Level = 200, 0.99
	good, err := made(t, plan, 0, 2).MarshalBinary()
	require.NoError(t, err)
	for name, change := range map[string]func(data []byte) []byte{
		"nothing":           func([]byte) []byte { return nil },
		"another format":    func(data []byte) []byte { data[7]++; return data },
		"cut short":         func(data []byte) []byte { return data[:len(data)-1] },
		"a value too few":   func(data []byte) []byte { return data[:len(data)-8] },
		"more than it says": func(data []byte) []byte { return append(data, make([]byte, 8)...) },
		"not a number":      func(data []byte) []byte { copy(data[len(data)-2:], "\xff\xff"); return data },
		"from after to":     func(data []byte) []byte { data[partHeader] = 3; return data },
		"too many ranges":   func(data []byte) []byte { data[16] = 255; return data },
		"places of nothing": func(data []byte) []byte {
			data = data[:partHeader]
			binary.LittleEndian.PutUint32(data[16:], 0)
			binary.LittleEndian.PutUint32(data[20:], 0)
			binary.LittleEndian.PutUint32(data[24:], mostEmpty+1)
			return data
		},
	} {
		var part Part
		assert.Error(t, part.UnmarshalBinary(change(slices.Clone(good))), name)
		assert.Equal(t, Part{}, part, name)
	}
	_, err = Part{}.MarshalBinary()
	assert.Error(t, err)
}
