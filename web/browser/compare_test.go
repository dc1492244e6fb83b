package browser

import (
	"bytes"
	"encoding/json"
	"math"
	"os/exec"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/report"
	"tailgap/core/words"
)

// commanded is what the command answers: as the core reads it, and as plain
// JSON; at says which of the results is looked at.
type commanded struct {
	ask.Answer
	plain []plainResult
	at    int
}

type plainResult struct {
	Cutoffs []map[string]any
	Shape   struct{ Cutoffs []map[string]any }
}

// judge asks the command.
func judge(t *testing.T, args ...string) commanded {
	t.Helper()
	cmd := exec.Command(command, append([]string{"judge", "--format", "json"}, args...)...)
	var out, failures bytes.Buffer
	cmd.Stdout, cmd.Stderr = &out, &failures
	err := cmd.Run()
	if cmd.ProcessState.ExitCode() < 3 { // 3 and 4 are verdicts
		require.NoError(t, err, failures.String())
	}
	answer, err := report.ReadJSON(out.Bytes())
	require.NoError(t, err)
	var plain struct{ Results []plainResult }
	require.NoError(t, json.Unmarshal(out.Bytes(), &plain))
	return commanded{answer, plain.Results, 0}
}

// leaves are the values of a JSON object by their paths, without what is null.
func leaves(prefix string, object map[string]any, into map[string]any) map[string]any {
	for name, value := range object {
		switch v := value.(type) {
		case map[string]any:
			leaves(prefix+name+".", v, into)
		case nil, []any:
		default:
			into[prefix+name] = v
		}
	}
	return into
}

// field is a printed value as the page has it.
type field struct{ Field, Value, Text string }

// shownAt is a card or a row of the table.
type shownAt struct {
	Cutoff, Reading, Text string
	Fields                []field
}

const readAll = `Array.from(document.querySelectorAll(%q), e => ({
	Cutoff: e.dataset.cutoff, Reading: e.dataset.reading ?? "", Text: e.textContent,
	Fields: Array.from(e.querySelectorAll("[data-field]"), f => ({Field: f.dataset.field, Value: f.dataset.value, Text: f.textContent})),
}))`

func (p *page) all(selector string) []shownAt {
	p.Helper()
	return get[[]shownAt](p, strings.Replace(readAll, "%q", strconv.Quote(selector), 1))
}

// shows holds everything that the page prints against the command's answer:
// every number exactly (as far as WebAssembly and the machine agree), and
// every text as core/words has it.
func (p *page) shows(c commanded) {
	p.Helper()
	r := c.Results[c.at]
	cards, rows := p.all("#cards article"), p.all("#table tbody tr")
	slices.SortStableFunc(cards, func(a, b shownAt) int { return index(r, a.Cutoff) - index(r, b.Cutoff) })
	require.Len(p, cards, len(r.Cutoffs))
	for i, f := range r.Cutoffs {
		exact := leaves("", c.plain[c.at].Cutoffs[i], map[string]any{})
		assert.Equal(p, f.Cutoff.String(), cards[i].Cutoff)
		p.holds(cards[i], exact, cardTexts(c.Question, f))
		p.says(cards[i].Text, words.Capital(f.Cutoff.Words()), words.Limits(f.Reading), words.HeadLimits(f),
			words.Capital(words.Reason(c.Question, f)), words.Capital(words.Settle(c.Question, f)), words.OtherReading(c.Question, f))
		for _, note := range f.Notes {
			p.says(cards[i].Text, words.Line(words.Capital(note)))
		}
		mine := slices.DeleteFunc(slices.Clone(rows), func(row shownAt) bool { return row.Cutoff != f.Cutoff.String() })
		p.tells(mine, exact, c.Question, f)
	}
	reading := get[string](p, `document.querySelector("#reading").textContent`)
	p.says(reading, words.Capital(words.Sample(r)), words.Capital(words.Moments(r)), words.Capital(words.Scale(r)), words.Capital(words.Curve(r)), words.Method(c.Answer))
	warnings := get[[]string](p, `Array.from(document.querySelectorAll("#findings:has(#warnings ~ #sweep) #warnings li"), w => w.textContent)`)
	require.Len(p, warnings, len(r.Warnings), "they stand above what was found")
	for i, warning := range r.Warnings {
		assert.Equal(p, words.Line(words.Capital(warning))+".", warnings[i])
	}
	stretches := []string{words.Worst(r)}
	for _, sweep := range r.Sweeps {
		stretches = append(stretches, words.Trusted(c.Question, r, sweep)...)
	}
	p.says(get[string](p, `document.querySelector("#stretches").textContent`), stretches...)
	p.showsShape(c, r)
}

// showsShape holds what the page says of the shape of the scores against the
// command's answer: every part of every gap, the sentences and the tests.
func (p *page) showsShape(c commanded, r ask.Result) {
	p.Helper()
	said := words.Shape(c.Question, r)
	require.NotEmpty(p, said)
	said = append(said, words.Normality(r), words.ReadWorm())
	said = append(said, words.Worm(c.Question, r)...)
	text := get[string](p, `document.querySelector("#shape").textContent`)
	p.says(text, said...)
	assert.Equal(p, words.Tested(r), strings.Contains(text, words.NoAnswer()))
	p.says(get[string](p, `document.querySelector("#worm svg desc").textContent`), words.Worm(c.Question, r)...)

	rows := p.all("#shape tbody tr")
	for i, f := range r.Cutoffs {
		exact := leaves("", c.plain[c.at].Shape.Cutoffs[i], map[string]any{})
		texts := map[string]string{"gap_points": words.SignedGapOf(f.Reading)}
		limits := []string{}
		for name, effect := range effectsOf(r.Shape.Cutoffs[i].Effects) {
			if effect != nil {
				texts[name+".points"] = words.SignedEffect(f, *effect)
				limits = append(limits, words.SignedEffectLimits(f, *effect))
			}
		}
		seen, printed := map[string]bool{}, ""
		for _, row := range rows {
			if row.Cutoff == f.Cutoff.String() {
				p.holds(row, exact, texts)
				printed += row.Text
				for _, one := range row.Fields {
					seen[one.Field] = true
				}
			}
		}
		p.says(printed, limits...)
		for name := range exact {
			if name != "cutoff" && !strings.HasPrefix(name, "quantile") { // the figure has these
				assert.True(p, seen[name], "the shape at %s lacks %s", f.Cutoff, name)
			}
		}
	}
}

// effectsOf are the effects by their names in JSON.
func effectsOf(e ask.Effects) map[string]*ask.Effect {
	return map[string]*ask.Effect{
		"mean_and_sd": e.MeanAndSD, "half_step": e.HalfStep, "asymmetry": e.Asymmetry, "rest": e.Rest,
		"floor": e.Floor, "ceiling": e.Ceiling, "heaps": e.Heaps, "extremes": e.Extremes, "farthest": e.Farthest,
	}
}

func index(r ask.Result, cutoff string) int {
	return slices.IndexFunc(r.Cutoffs, func(f ask.Finding) bool { return f.Cutoff.String() == cutoff })
}

func (p *page) says(text string, parts ...string) {
	p.Helper()
	for _, part := range parts {
		assert.Contains(p, text, part)
	}
}

// tells holds the table's rows of one cutoff against the answer: together
// they have every number there is.
func (p *page) tells(rows []shownAt, exact map[string]any, q ask.Question, f ask.Finding) {
	p.Helper()
	seen := map[string]bool{}
	for _, row := range rows {
		reading := f.Reading
		switch row.Reading {
		case "half_step":
			reading = *f.HalfStep
		case "without_half_step":
			reading = f.WithoutHalfStep
		}
		texts := rowTexts(row.Reading, reading)
		if row.Reading == "" {
			for name, text := range judgedTexts(f) {
				texts[name] = text
			}
		}
		p.holds(row, exact, texts)
		p.says(row.Text, words.SignedLimits(reading))
		for _, one := range row.Fields {
			seen[one.Field] = true
		}
	}
	judged := "half_step." // the reading that stands on top as well
	if !q.HalfStep {
		judged = "without_half_step."
	}
	for name := range exact {
		if name != "cutoff" && name != "method" && !strings.HasPrefix(name, judged) {
			assert.True(p, seen[name], "the table of %s lacks %s", f.Cutoff, name)
		}
	}
}

// holds compares each printed value of a card or row with the command's, and
// its text with what core/words makes of the command's.
func (p *page) holds(at shownAt, exact map[string]any, texts map[string]string) {
	p.Helper()
	require.NotEmpty(p, at.Fields)
	for _, one := range at.Fields {
		want, there := exact[one.Field]
		switch value := want.(type) {
		case float64:
			got, err := strconv.ParseFloat(one.Value, 64)
			require.NoError(p, err)
			assert.InDelta(p, value, got, math.Max(1e-12, 1e-10*math.Abs(value)), "%s %s", at.Cutoff, one.Field)
		case string:
			assert.Equal(p, value, one.Value, "%s %s", at.Cutoff, one.Field)
		default:
			assert.False(p, there)
			assert.Equal(p, "null", one.Value, "%s %s is not in the answer", at.Cutoff, one.Field)
		}
		if text, known := texts[one.Field]; known {
			assert.Equal(p, text, one.Text, "%s %s", at.Cutoff, one.Field)
		} else {
			assert.Empty(p, one.Text, "%s %s is printed, and nobody knows how it should be", at.Cutoff, one.Field)
		}
	}
}

// cardTexts is how a card prints its fields.
func cardTexts(q ask.Question, f ask.Finding) map[string]string {
	texts := map[string]string{
		"curve_share": words.Share(f.CurveShare), "counted_share": words.Share(f.CountedShare), "counted": words.Count(f.Counted),
		"gap_points": words.Capital(words.GapOf(f.Reading)), "ratio": words.Capital(words.Ratio(f)), "heads.gap": words.Capital(words.Heads(q, f)),
	}
	if f.Verdict != nil {
		texts["verdict"] = *f.Verdict
	}
	return texts
}

// rowTexts is how a row prints one way of reading the curve.
func rowTexts(prefix string, r ask.Reading) map[string]string {
	if prefix != "" {
		prefix += "."
	}
	texts := map[string]string{
		prefix + "z": words.Z(r.Z), prefix + "curve_share": words.Share(r.CurveShare), prefix + "gap_points": words.SignedGapOf(r),
	}
	if r.ZTo != nil {
		texts[prefix+"z_to"] = words.Z(*r.ZTo)
	}
	if r.Verdict != nil {
		texts[prefix+"verdict"] = *r.Verdict
	}
	return texts
}

// judgedTexts is how the row of the judged reading prints the rest.
func judgedTexts(f ask.Finding) map[string]string {
	texts := map[string]string{
		"counted_share": words.Share(f.CountedShare), "counted": words.Count(f.Counted),
		"ratio": "none counted", "heads.gap": words.SignedHeads(f),
	}
	if f.Ratio != nil {
		texts["ratio"] = words.RatioNumber(*f.Ratio)
	}
	if f.PeopleToSettle != nil {
		texts["people_to_settle"] = words.SettleNumber(*f.PeopleToSettle)
	}
	return texts
}
