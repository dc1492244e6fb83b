package words

import (
	"strings"
	"testing"
	"unicode"
	"unicode/utf8"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"
)

func TestName(t *testing.T) {
	for _, c := range []struct{ name, expected string }{
		{"vocabulary", "vocabulary"}, {"Wörter pro Minute", "Wörter pro Minute"}, {"語彙", "語彙"},
		{"", "(no name)"}, {" \t\r\n", "(no name)"}, {"two\nlines\r\n of\ttext", "two lines of text"},
		{"\x1b[31mred\x1b[0m", "�[31mred�[0m"}, {"\x1b]0;title\x07", "�]0;title�"}, {"a\u202eb\u200bc\u0085d", "a�b�c d"}, {"bad\xff", "bad�"},
		{strings.Repeat("x", 40), strings.Repeat("x", 40)}, {strings.Repeat("é", 41), strings.Repeat("é", 39) + "…"},
	} {
		assert.Equal(t, c.expected, Name(c.name), "%q", c.name)
	}
}

func TestNameIsAlwaysHarmless(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		name := Name(rapid.String().Draw(t, "name") + string(rapid.SliceOf(rapid.Byte()).Draw(t, "bytes")))
		assert.NotEmpty(t, name)
		assert.LessOrEqual(t, utf8.RuneCountInString(name), 40)
		for _, r := range name {
			assert.True(t, r == ' ' || unicode.IsPrint(r), "%q", name)
		}
	})
}
