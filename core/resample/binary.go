package resample

import (
	"encoding/binary"
	"errors"
	"math"
)

// The binary form of a part, little-endian: its format, the plan's
// fingerprint, how many ranges of blocks it has, how many values are kept for
// each place and how many places there are; then the ranges, from and to, and
// the values, place by place.
const (
	partFormat = "tgpart02"
	partHeader = len(partFormat) + 8 + 3*4
	// mostEmpty is how many places without a value are read. What a place takes
	// is not in the bytes then to bound it.
	mostEmpty = 1 << 16
)

// MarshalBinary implements encoding.BinaryMarshaler. It fails for a part that
// no Maker made.
func (p Part) MarshalBinary() ([]byte, error) {
	if len(p.kept) == 0 {
		return nil, errors.New("an empty part can't be handed on")
	}
	count := len(p.kept[0])
	data := make([]byte, 0, partHeader+8*len(p.blocks)+8*count*len(p.kept))
	data = append(data, partFormat...)
	data = binary.LittleEndian.AppendUint64(data, p.plan)
	numbers := []int{len(p.blocks), count, len(p.kept)}
	for _, each := range p.blocks {
		numbers = append(numbers, each[0], each[1])
	}
	for _, number := range numbers {
		data = binary.LittleEndian.AppendUint32(data, uint32(number))
	}
	for _, values := range p.kept {
		for _, x := range values {
			data = binary.LittleEndian.AppendUint64(data, math.Float64bits(x))
		}
	}
	return data, nil
}

// UnmarshalBinary implements encoding.BinaryUnmarshaler. It refuses what is no
// part; Merge refuses a part that is of another plan.
func (p *Part) UnmarshalBinary(data []byte) error {
	wrong := errors.New("these bytes are no part of replicates")
	if len(data) < partHeader || string(data[:len(partFormat)]) != partFormat {
		return wrong
	}
	header, body := data[len(partFormat):partHeader], data[partHeader:]
	number := func(i int) uint64 { return uint64(binary.LittleEndian.Uint32(header[8+4*i:])) }
	ranges, count, places := number(0), number(1), number(2)
	// count and places are below 2³²: their product fits, eight times it may not
	if places == 0 || len(body)%8 != 0 || ranges > uint64(len(body)/8) || count*places != uint64(len(body)/8)-ranges || count == 0 && places > mostEmpty {
		return wrong
	}
	part := Part{plan: binary.LittleEndian.Uint64(header), kept: make([][]float64, places)}
	for range ranges {
		from, to := binary.LittleEndian.Uint32(body), binary.LittleEndian.Uint32(body[4:])
		part.blocks, body = append(part.blocks, [2]int{int(from), int(to)}), body[8:]
	}
	if !part.blocks.within(math.MaxInt32) {
		return wrong
	}
	for i := range part.kept {
		part.kept[i] = make([]float64, count)
		for j := range part.kept[i] {
			x := math.Float64frombits(binary.LittleEndian.Uint64(body))
			if !(x >= 0 && x <= math.MaxFloat64) {
				return wrong
			}
			part.kept[i][j], body = x, body[8:]
		}
	}
	*p = part
	return nil
}
