package figure

// For the tests, which stand outside the package like everyone else.
var (
	TextWidth = textWidth
	Ticks     = ticks
	Shorten   = shorten
	Wrap      = wrap
)

// The style of everything drawn, and the tints it is drawn with.
const (
	Rules    = rules
	BandTint = bandTint
	AreaTint = areaTint
	SpanTint = spanTint
	EdgeTint = edgeTint
	BarTint  = barTint
	Bolder   = bolder
)
