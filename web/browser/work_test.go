package browser

import (
	"fmt"
	"testing"

	"github.com/chromedp/chromedp"
	"github.com/stretchr/testify/assert"
)

// watched keeps the workers that the page starts and says how many are left.
const watched = `globalThis.workers = []; { const Plain = Worker; Worker = class extends Plain {
	constructor(source) { super(source); this.runs = true; workers.push(this); }
	terminate() { super.terminate(); this.runs = false; }
}; }`

func cores(n int) string {
	return fmt.Sprintf(`Object.defineProperty(navigator, "hardwareConcurrency", {value: %d})`, n)
}

// saved is what the page hands out for a click on a button.
const saved = `{ const address = URL.createObjectURL; URL.createObjectURL = file => {
	if (file.type === "application/json") file.text().then(text => globalThis.handedOut = text);
	return address.call(URL, file);
}; }`

func TestPageAnswersTheSameWithAnyNumberOfWorkers(t *testing.T) {
	answers := map[int]string{}
	for _, n := range []int{1, 2, 5} {
		t.Run(fmt.Sprint(n), func(t *testing.T) {
			p := openPage(t, 1280, cores(n), watched, saved)
			p.open("more")
			p.write("replicates", "150000")
			p.settled()
			assert.Equal(t, n, get[int](p, `workers.length`))
			p.do(chromedp.Evaluate(`document.getElementById("save-json").click()`, nil))
			p.until(`globalThis.handedOut`)
			answers[n] = get[string](p, `handedOut`)
			p.shows(judge(t, "--demo", "--replicates", "150000"))
		})
	}
	assert.Contains(t, answers[1], `"replicates": 150000`)
	assert.Equal(t, answers[1], answers[2])
	assert.Equal(t, answers[1], answers[5])
}

func TestPageStopsAllItsWorkers(t *testing.T) {
	p := openPage(t, 1280, cores(3), watched)
	p.open("more")
	p.write("replicates", "1000000")
	p.until(`workers.length === 3 && document.getElementById("progress")?.value > 0`)
	t.Logf("stopped three workers after %.0f ms", p.cancels())
	assert.Zero(t, get[int](p, `workers.filter(w => w.runs).length`))
}

// What goes wrong with one of the workers is said; nobody waits for it.
func TestPageSaysWhenAWorkerFails(t *testing.T) {
	p := openPage(t, 1280, cores(2), watched, `{ const say = Worker.prototype.postMessage; Worker.prototype.postMessage = function(message, given) {
		say.call(this, globalThis.garble && message.text?.includes('"kind":"blocks"') && this !== workers[0] ? {...message, text: "{"} : message, given ?? []);
	}; }`)
	before := p.all("#cards article")
	p.do(chromedp.Evaluate(`globalThis.garble = true`, nil))
	p.open("more")
	p.write("replicates", "1000000")
	p.until(`document.querySelector("#work .trouble")`)
	assert.Contains(t, get[string](p, `document.querySelector("#work .trouble").innerText`), "The page's worker has stopped")
	assert.Zero(t, get[int](p, `workers.filter(w => w.runs).length`))
	assert.Equal(t, before, p.all("#cards article"))
	p.do(chromedp.Evaluate(`globalThis.garble = false`, nil))
	p.write("replicates", "1000")
	p.settled()
	p.shows(judge(t, "--demo", "--replicates", "1000"))
}

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
