package report

import (
	"strings"
	"testing"
	"unicode"
	"unicode/utf8"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"tailgap/core/words"
)

func TestTextFitsTheTerminal(t *testing.T) {
	for name, made := range answers {
		for _, line := range strings.Split(Text(made()), "\n") {
			assert.LessOrEqual(t, utf8.RuneCountInString(line), columns, "%s: %s", name, line)
			assert.Equal(t, strings.TrimRight(line, " "), line, name)
		}
	}
}

func TestTextSaysDemoOnTop(t *testing.T) {
	assert.True(t, strings.HasPrefix(Text(fitted()), "DEMO"))
	assert.NotContains(t, Text(given()), "DEMO")
}

func TestTextEndsWithTheCautions(t *testing.T) {
	for _, made := range answers {
		text := strings.Join(strings.Fields(Text(made())), " ")
		for _, caution := range words.Cautions() {
			assert.Contains(t, text, caution)
		}
	}
}

// Nothing that came from outside reaches the terminal as more than text.
func TestTextIsHarmless(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		nasty := rapid.StringOf(rapid.RuneFrom([]rune("\x1b\x07\r\n\b\u009b\u202e[]0;31mab"))).Draw(t, "text")
		a := fitted()
		r := &a.Results[0]
		r.Score, r.Group, r.Curve.Kind = nasty, &nasty, nasty
		r.Sample.Dropped[0].Reason, r.Sample.Dropped[0].First = nasty, nasty
		r.Sample.StepSource, r.Sample.RangeSource = nasty, nasty
		r.Warnings, a.Warnings, a.Suppressed = []string{nasty}, []string{nasty}, []string{nasty}
		r.Cutoffs[0].Notes, r.Cutoffs[0].Method, a.Program = []string{nasty}, nasty, nasty
		r.Cutoffs[0].Verdict, r.Cutoffs[0].HalfStep.Verdict = &nasty, &nasty
		for _, c := range Text(a) {
			assert.True(t, c == '\n' || c == ' ' || unicode.IsPrint(c), "%q", c)
		}
	})
}

func TestWrapped(t *testing.T) {
	long := strings.Repeat("x", 90)
	assert.Equal(t, "\n", wrapped("", "", ""))
	assert.Equal(t, "Note: a b\n", wrapped("Note: ", "  ", " a\nb "))
	assert.Equal(t, "a\n"+long+"\nb\n", wrapped("", "", "a "+long+" b"))
	exactly := strings.Repeat("y", columns-2)
	assert.Equal(t, "z "+exactly+"\n", wrapped("", "", "z "+exactly))
	assert.Equal(t, "- zz\n  "+exactly+"\n", wrapped("- ", "  ", "zz "+exactly))
}

func TestTable(t *testing.T) {
	assert.Equal(t, "cutoff  gap\n>=7      +1\nabc\n", table([]string{"cutoff", "gap", "heads"}, [][]string{{">=7", "+1", ""}, {"abc", "", ""}}))
}
