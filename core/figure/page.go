package figure

// InlineStyle is the style element's text in a figure that is not Standalone.
// A page whose policy pins its styles by their digests has to pin it too.
func InlineStyle() string { return inlineRules }
