package browser

import (
	"fmt"
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"github.com/chromedp/chromedp"
	"github.com/chromedp/chromedp/kb"
	"github.com/stretchr/testify/require"
)

// What a person does at the page.

// open opens a slot's editor.
func (p *page) open(slot string) {
	p.Helper()
	if !get[bool](p, fmt.Sprintf(`document.getElementById("slot-%s").ariaExpanded === "true"`, slot)) {
		p.click("slot-" + slot)
	}
	p.do(chromedp.WaitVisible("#editor-"+slot, chromedp.ByQuery))
}

func (p *page) click(id string) {
	p.Helper()
	p.do(chromedp.Click("#"+id, chromedp.ByQuery))
}

// write types a text into a field, in place of what is there, and leaves it.
func (p *page) write(id, text string) {
	p.Helper()
	p.do(chromedp.Focus("#"+id, chromedp.ByQuery),
		chromedp.Evaluate(fmt.Sprintf(`document.getElementById(%q).select()`, id), nil),
		chromedp.KeyEvent(kb.Backspace), chromedp.KeyEvent(text), chromedp.KeyEvent(kb.Tab))
}

// choose takes an option of a list.
func (p *page) choose(id, value string) {
	p.Helper()
	p.do(chromedp.Evaluate(fmt.Sprintf(`{ const list = document.getElementById(%q);
		list.value = %q; list.dispatchEvent(new Event("change", {bubbles: true})); }`, id, value), nil))
}

// cutoff adds a cutoff, written as the command would have it.
func (p *page) cutoff(text string) {
	p.Helper()
	before := get[int](p, `document.querySelectorAll("[id^=slot-cutoff-]").length`)
	p.open("add")
	p.write("from-add", text)
	p.until(fmt.Sprintf(`document.querySelectorAll("[id^=slot-cutoff-]").length === %d`, before+1))
}

// load gives the page a file.
func (p *page) load(path string) {
	p.Helper()
	p.open("data")
	p.do(chromedp.SetUploadFiles("#file", []string{path}, chromedp.ByQuery))
}

// tick ticks or unticks a box.
func (p *page) tick(label string) {
	p.Helper()
	p.do(chromedp.Click(fmt.Sprintf(`//label[normalize-space(.)=%q]//input`, label), chromedp.BySearch))
}

// fileWith writes a file for a test.
func fileWith(t *testing.T, name, text string) string {
	t.Helper()
	path := filepath.Join(t.TempDir(), name)
	require.NoError(t, os.WriteFile(path, []byte(text), 0o644))
	return path
}

// intakes is a made-up file: 300 people with a whole-number score that piles
// up at the lower end and one measured in hundredths, some cells without.
func intakes() string {
	random := rand.New(rand.NewPCG(20260301, 7))
	var text strings.Builder
	text.WriteString("person,errors,seconds,site\n")
	for i := range 300 {
		errors, seconds := math.Floor(6*random.ExpFloat64()), 40+9*random.NormFloat64()
		cell := strconv.FormatFloat(errors, 'f', 0, 64)
		switch {
		case i%41 == 7:
			cell = ""
		case i%53 == 9:
			cell = "-9"
		}
		fmt.Fprintf(&text, "p%03d,%s,%.2f,%s\n", i, cell, seconds, []string{"north", "south"}[i%2])
	}
	return text.String()
}
