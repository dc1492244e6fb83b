package words

import "tailgap/core/ask"

// SignedEffect prints for a table what a part of a gap, or a feature of the
// scores, comes to at a cutoff: "-4.5" points, no finer than its interval or
// the gap itself is printed.
func SignedEffect(f ask.Finding, e ask.Effect) string {
	decimals, _ := named{f, e}.decimals()
	return signedPoints(e.Points, decimals)
}

// SignedEffectLimits prints the interval of SignedEffect: "-6.0 to -3.0"; empty
// where there is none.
func SignedEffectLimits(f ask.Finding, e ask.Effect) string {
	if e.Low == nil || e.High == nil {
		return ""
	}
	decimals, _ := named{f, e}.decimals()
	return signedPoints(*e.Low, decimals) + " to " + signedPoints(*e.High, decimals)
}
