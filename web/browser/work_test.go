package browser

import (
	"testing"

	"github.com/chromedp/chromedp"
	"github.com/stretchr/testify/assert"
)

// dropMany drops a file of a million scores on the page.
const dropMany = `{ const rows = ["id,score"];
	for (let i = 0; i < 1000000; i++) rows.push(i + "," + (40 + (i * 7919) % 23 - (i * 104729) % 17));
	const carried = new DataTransfer();
	carried.items.add(new File([rows.join("\n")], "many.csv"));
	document.body.dispatchEvent(new DragEvent("drop", {dataTransfer: carried, bubbles: true, cancelable: true})); }`

// cancels presses the button and says how long the page took to show it.
func (p *page) cancels() (ms float64) {
	p.Helper()
	p.do(chromedp.WaitVisible("#cancel", chromedp.ByQuery))
	p.do(chromedp.Evaluate(`globalThis.stoppedAfter = 0; { const begun = performance.now();
		const seen = new MutationObserver(() => { stoppedAfter = performance.now() - begun; seen.disconnect(); });
		seen.observe(document.getElementById("work"), {attributeFilter: ["data-state"]});
		document.getElementById("cancel").click(); }`, nil))
	p.until(`stoppedAfter > 0`)
	return get[float64](p, `stoppedAfter`)
}

func (p *page) bar() string {
	p.Helper()
	return get[string](p, `document.querySelector(".gauge").innerText`)
}

// A file can be let go of while the page takes it in, while its columns are
// looked for and while it is read. The first two are over so soon that they
// have to be held up.
func TestPageCancelsWhileAFileIsOpened(t *testing.T) {
	p := openPage(t, 1280)
	before := p.all("#cards article")
	untouched := func() {
		t.Helper()
		assert.Equal(t, "done", get[string](p, `document.getElementById("work").dataset.state`))
		assert.Contains(t, get[string](p, `document.getElementById("slot-data").innerText`), "demo.csv")
		assert.Zero(t, get[int](p, `document.querySelectorAll("#findings.old, .trouble, .gauge").length`))
		assert.Equal(t, before, p.all("#cards article"))
	}
	p.do(chromedp.Evaluate(`globalThis.taken = Blob.prototype.arrayBuffer; Blob.prototype.arrayBuffer = () => new Promise(() => {})`, nil), chromedp.Evaluate(dropMany, nil))
	p.do(chromedp.WaitVisible("#cancel", chromedp.ByQuery))
	assert.Contains(t, p.bar(), "Opening many.csv")
	t.Logf("stopped taking it in after %.0f ms", p.cancels())
	untouched()

	p.do(chromedp.Evaluate(`Blob.prototype.arrayBuffer = taken; globalThis.told = Worker.prototype.postMessage; Worker.prototype.postMessage = () => {}`, nil), chromedp.Evaluate(dropMany, nil))
	p.do(chromedp.WaitVisible("#cancel", chromedp.ByQuery))
	assert.Contains(t, p.bar(), "Opening many.csv")
	t.Logf("stopped looking at its columns after %.0f ms", p.cancels())
	untouched()

	p.do(chromedp.Evaluate(`Worker.prototype.postMessage = told`, nil), chromedp.Evaluate(dropMany, nil))
	p.until(`document.querySelectorAll(".column").length === 2`)
	p.tick("score")
	p.until(`document.querySelector(".gauge")?.innerText.includes("Reading many.csv") && document.getElementById("progress").value > 0`)
	t.Logf("stopped reading it after %.0f ms", p.cancels())
	assert.Equal(t, "stopped", get[string](p, `document.getElementById("work").dataset.state`))
	assert.Contains(t, get[string](p, `document.getElementById("old").innerText`), "demo.csv")
	assert.Equal(t, before, p.all("#cards article"))

	p.click("ask-again")
	p.settled()
	assert.Contains(t, get[string](p, `document.getElementById("reading").innerText`), "1,000,000 usable scores in 1,000,000 rows")
}
