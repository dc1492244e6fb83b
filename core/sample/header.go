package sample

import "fmt"

// Header says whether the first row of a file names its columns.
type Header string

// The ways to say it; HeaderAuto looks at the row.
const (
	HeaderAuto Header = "auto"
	HeaderYes  Header = "yes"
	HeaderNo   Header = "no"
)

// UnmarshalText reads "auto", "yes" or "no".
func (h *Header) UnmarshalText(text []byte) error {
	switch Header(text) {
	case HeaderAuto, HeaderYes, HeaderNo:
		*h = Header(text)
		return nil
	}
	return fmt.Errorf("the header setting %.40q can't be read; write auto, yes or no", text)
}
