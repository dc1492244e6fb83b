// Package curve has the curves a share can be read from.
package curve

// Given is a curve with a stated mean and SD, for instance from a manual.
type Given struct {
	Mean float64 `json:"mean"`
	SD   float64 `json:"sd"`
}
