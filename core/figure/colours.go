package figure

import "strings"

// Palette is the colours of a figure, as CSS writes them. Inlined figures
// take the page's custom properties of the same names (--paper, --ink, ...)
// and fall back to Light.
type Palette struct {
	Paper    string // the ground
	Ink      string // text and grips
	Soft     string // lesser text and lines
	Rule     string // grid lines
	Plum     string // the curve, and the gap that it makes
	Moss     string // the counted scores, and where the curve can be trusted
	Corridor string // the tolerance
}

// The two palettes. Text stands out from what is behind it by at least 4.5
// to 1, marks from the paper by at least 3 to 1 (WCAG 2.2, 1.4.3 and 1.4.11).
var (
	Light = Palette{Paper: "#fbfaf7", Ink: "#23202a", Soft: "#625e69", Rule: "#d9d5ce", Plum: "#6b2a5b", Moss: "#56702b", Corridor: "#e9e4d7"}
	Dark  = Palette{Paper: "#1b191f", Ink: "#ece8ee", Soft: "#aea8b4", Rule: "#3a3640", Plum: "#d58fc2", Moss: "#a9c46c", Corridor: "#2f2b36"}
)

// How strongly the tinted surfaces cover what is behind them.
const (
	bandTint = "0.12" // the band
	areaTint = "0.22" // the curve's share beyond the cutoff
	barTint  = "0.28" // counted scores short of the cutoff
	spanTint = "0.07" // the scores of a stretch
	edgeTint = "0.6"  // the band's edges
)

// rules are the style of everything drawn; {names} are replaced by colours.
const rules = `.tailgap text{font:13px/1 Charter,"Iowan Old Style","Source Serif 4",Georgia,serif;fill:{ink}}` +
	`.tailgap.small text{font-size:12px}` +
	`.tailgap .halo{paint-order:stroke;stroke:{paper};stroke-width:4px;stroke-linejoin:round}` +
	`.tailgap .soft{fill:{soft}}` +
	`.tailgap .strong{font-weight:700}` +
	`.tailgap .title{font-size:22px;font-weight:700}` +
	`.tailgap .lead{font-size:15px}` +
	`.tailgap .plum{fill:{plum}}` +
	`.tailgap .moss{fill:{moss}}` +
	`.tailgap .inverse{fill:{paper}}` +
	`.tailgap .paper{fill:{paper}}` +
	`.tailgap .grid{stroke:{rule};stroke-width:.7}` +
	`.tailgap .zero{stroke:{soft};stroke-width:1.2}` +
	`.tailgap .corridor{fill:{corridor}}` +
	`.tailgap .edge{fill:none;stroke:{soft};stroke-width:1;stroke-dasharray:2 3}` +
	`.tailgap .band{fill:{plum};fill-opacity:` + bandTint + `;stroke:{plum};stroke-width:.8;stroke-opacity:` + edgeTint + `}` +
	`.tailgap .gap{fill:none;stroke:{plum};stroke-width:2.4;stroke-linejoin:round;stroke-linecap:round}` +
	`.tailgap .thin{stroke-width:1.4}` +
	`.tailgap .span{fill:{ink};fill-opacity:` + spanTint + `}` +
	`.tailgap .trusted{fill:{moss}}` +
	`.tailgap .trivial{fill:{paper};stroke:{moss};stroke-width:1.4}` +
	`.tailgap .pole{stroke:{ink};stroke-width:1.2}` +
	`.tailgap .selected{stroke-width:2.4}` +
	`.tailgap .aside{stroke:{soft};stroke-dasharray:5 4}` +
	`.tailgap .flag{fill:{paper};stroke:{ink};stroke-width:1.2}` +
	`.tailgap .solid{fill:{ink}}` +
	`.tailgap .mark{fill:none;stroke:{ink};stroke-width:1.8;stroke-linecap:round;stroke-linejoin:round}` +
	`.tailgap .lightmark{stroke:{paper}}` +
	`.tailgap .hatch{stroke:{ink};stroke-width:1.4}` +
	`.tailgap .whisker{fill:none;stroke:{plum};stroke-width:4}` +
	`.tailgap .over{stroke:{plum};stroke-width:2}` +
	`.tailgap .dot{fill:{paper};stroke:{plum};stroke-width:2.2}` +
	`.tailgap .full{fill:{plum}}` +
	`.tailgap .bar{fill:{moss};fill-opacity:` + barTint + `}` +
	`.tailgap .beyond{fill:{moss}}` +
	`.tailgap .skyline{fill:none;stroke:{moss};stroke-width:1}` +
	`.tailgap .limits{fill:{plum};fill-opacity:` + bandTint + `}` +
	`.tailgap .limit{fill:none;stroke:{plum};stroke-width:.8;stroke-opacity:` + edgeTint + `}` +
	`.tailgap .link{fill:none;stroke:{moss};stroke-width:1;stroke-opacity:` + edgeTint + `}` +
	`.tailgap .share{fill:{plum};fill-opacity:` + areaTint + `}`

var (
	inlineRules     = coloured(rules, inlined(Light))
	standaloneRules = coloured(rules, Light) + "@media (prefers-color-scheme:dark){" + coloured(rules, Dark) + "}"
)

// inlined is the page's custom properties, with a palette to fall back to.
func inlined(p Palette) Palette {
	return Palette{
		Paper: "var(--paper," + p.Paper + ")", Ink: "var(--ink," + p.Ink + ")", Soft: "var(--soft," + p.Soft + ")",
		Rule: "var(--rule," + p.Rule + ")", Plum: "var(--plum," + p.Plum + ")", Moss: "var(--moss," + p.Moss + ")",
		Corridor: "var(--corridor," + p.Corridor + ")",
	}
}

func coloured(rules string, p Palette) string {
	return strings.NewReplacer("{paper}", p.Paper, "{ink}", p.Ink, "{soft}", p.Soft, "{rule}", p.Rule,
		"{plum}", p.Plum, "{moss}", p.Moss, "{corridor}", p.Corridor).Replace(rules)
}

// InlineStyle is the style element's text in a figure that is not Standalone.
// A page whose policy pins its styles by their digests has to pin it too.
func InlineStyle() string { return inlineRules }
