package resample

import (
	"encoding/binary"
	"errors"
	"math"
)

// The binary form of a part, little-endian: its format, the plan's
// fingerprint, the blocks from and to, how many values are kept for each
// place and how many places there are; then the values, place by place.
const (
	partFormat = "tgpart01"
	partHeader = len(partFormat) + 8 + 4*4
)

// MarshalBinary implements encoding.BinaryMarshaler. It fails for a part that
// RunBlocks didn't make.
func (p Part) MarshalBinary() ([]byte, error) {
	if len(p.kept) == 0 {
		return nil, errors.New("an empty part can't be handed on")
	}
	count := len(p.kept[0])
	data := make([]byte, 0, partHeader+8*count*len(p.kept))
	data = append(data, partFormat...)
	data = binary.LittleEndian.AppendUint64(data, p.plan)
	for _, number := range []int{p.from, p.to, count, len(p.kept)} {
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
	from, to, count, places := number(0), number(1), number(2), number(3)
	// count and places are below 2³²: their product fits, eight times it may not
	if from > to || to > math.MaxInt32 || places == 0 || len(body)%8 != 0 || count*places != uint64(len(body)/8) || count == 0 && places > 1<<24 {
		return wrong
	}
	part := Part{plan: binary.LittleEndian.Uint64(header), from: int(from), to: int(to), kept: make([][]float64, places)}
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
