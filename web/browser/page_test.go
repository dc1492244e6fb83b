package browser

import (
	"path/filepath"
	"testing"

	"github.com/chromedp/chromedp"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestPageOpensWithTheDemoWorkedOut(t *testing.T) {
	p := openPage(t, 1280)
	t.Logf("the demo's answer stood after %.0f ms", get[float64](p, `performance.now()`))
	p.shows(judge(t, "--demo"))
	assert.Contains(t, get[string](p, `document.querySelector("header").innerText`), "DEMO")
	assert.Equal(t, 3, get[int](p, `document.querySelectorAll("#sweep svg, #counted svg, #worm svg").length`))
	assert.Zero(t, get[int](p, `localStorage.length + sessionStorage.length + document.cookie.length`))
}

func TestPageJudgesAFileAsTheCommandDoes(t *testing.T) {
	p := openPage(t, 1280)
	path := fileWith(t, "intakes.csv", intakes())
	p.load(path)
	p.until(`document.querySelectorAll(".column").length === 4`)
	assert.Contains(t, get[string](p, `document.getElementById("old").innerText`), "demo.csv", "the demo's answer is not passed off as the file's")
	p.tick("errors")
	p.settled()
	p.cutoff(">=12")
	p.cutoff("<2")
	p.cutoff("3..5")
	p.settled()
	p.shows(judge(t, path, "--score", "errors", "--cutoff", ">=12", "--cutoff", "<2", "--cutoff", "3..5"))

	p.open("more")
	p.write("missing", "-9")
	p.open("too-high")
	p.write("size-too-high", "3")
	p.open("too-low")
	p.choose("unit-too-low", "%count")
	p.write("size-too-low", "60")
	p.open("heads")
	p.write("heads", "1200")
	p.settled()
	asked := []string{path, "--score", "errors", "--missing=-9", "--cutoff", ">=12", "--cutoff", "<2", "--cutoff", "3..5",
		"--too-high", "3pt", "--too-low", "60%count", "--heads", "1200"}
	p.shows(judge(t, asked...))

	p.open("more")
	p.click("half-step")
	p.write("seed", "77")
	p.write("replicates", "3000")
	p.write("level", "0.9")
	p.settled()
	p.shows(judge(t, append(asked, "--half-step", "--seed", "77", "--replicates", "3000", "--level", "0.9")...))

	p.open("curve")
	p.click("curve-given")
	p.write("mean", "5.5")
	p.write("sd", "5")
	p.settled()
	given := append(asked, "--half-step", "--seed", "77", "--replicates", "3000", "--level", "0.9", "--mean", "5.5", "--sd", "5")
	p.shows(judge(t, given...))
	p.write("norm-n", "1e3")
	p.until(`document.querySelector("#editor-curve .trouble")`)
	assert.Contains(t, get[string](p, `document.querySelector("#editor-curve .trouble").innerText`), `"1e3" is no number of norm people`)
	p.write("norm-n", "1,870")
	p.settled()
	assert.Equal(t, "the normal curve with mean 5.5 and SD 5, norms from 1,870 people", get[string](p, `document.querySelector("#slot-curve").innerText`))
	given = append(given, "--norm-n", "1870")
	p.shows(judge(t, given...))
	p.open("more")
	p.click("everyone")
	p.settled()
	p.shows(judge(t, append(given, "--everyone")...))
}

func TestPageFollowsACutoff(t *testing.T) {
	p := openPage(t, 1280)
	p.open("cutoff-0")
	p.write("from-cutoff-0", "9")
	p.settled()
	p.shows(judge(t, "--demo", "--score", "vocabulary", "--missing", "99,-9", "--cutoff", "<=9", "--cutoff", ">=30",
		"--too-high", "1pt", "--too-low", "2pt", "--heads", "4000"))
	assert.Contains(t, get[string](p, `document.querySelector("[role=status].unseen").textContent`), "At 9 or below: ", "it is also said aloud")

	p.choose("side-cutoff-0", "..")
	p.do(chromedp.WaitVisible("#to-cutoff-0", chromedp.ByQuery))
	p.write("to-cutoff-0", "14")
	p.settled()
	assert.Equal(t, []string{"9..14", ">=30"}, get[[]string](p, `Array.from(document.querySelectorAll("#table tr.judged"), r => r.dataset.cutoff)`))

	p.write("from-cutoff-0", "nine")
	p.until(`document.querySelector("#editor-cutoff-0 .trouble")`)
	p.shownNow()
	assert.Contains(t, get[string](p, `document.querySelector("#editor-cutoff-0 .trouble").innerText`), `"nine" can't be read`)
	assert.Zero(t, get[int](p, `document.querySelectorAll("#findings.old").length`), "the question is still the one that was answered")

	p.click("remove-cutoff-0")
	p.settled()
	assert.Equal(t, []string{">=30"}, get[[]string](p, `Array.from(document.querySelectorAll("#table tr.judged"), r => r.dataset.cutoff)`))
}

func TestPageCancelsLongWork(t *testing.T) {
	p := openPage(t, 1280)
	before := p.all("#cards article")
	p.open("more")
	p.write("replicates", "1000000")
	p.do(chromedp.WaitVisible("#cancel", chromedp.ByQuery))
	p.until(`document.getElementById("progress").value > 0`)
	assert.Equal(t, before, p.all("#cards article"), "the last answer stays")
	p.click("cancel")
	p.until(`document.getElementById("work").dataset.state === "stopped"`)
	assert.Contains(t, get[string](p, `document.getElementById("old").innerText`), "earlier question")
	assert.Equal(t, 5, get[int](p, `document.querySelectorAll("#take-away button:disabled").length`), "an old answer is not taken away for the new one")
	assert.Equal(t, 1, get[int](p, `document.querySelectorAll("#findings.old").length`))
	assert.Equal(t, before, p.all("#cards article"))

	p.click("ask-again")
	p.do(chromedp.WaitVisible("#cancel", chromedp.ByQuery))
	p.write("replicates", "1000") // an edit during the work restarts it
	p.settled()
	p.shows(judge(t, "--demo", "--replicates", "1000"))
}

func TestPageSaysWhatIsWrongWithAFile(t *testing.T) {
	p := openPage(t, 1280)
	before := p.all("#cards article")
	p.load(fileWith(t, "picture.csv", "\x89PNG\r\n\x1a\n\x00\x00\x00\rIHDR\x00<b>"))
	p.until(`document.querySelector("#editor-data .trouble")`)
	sentence := get[string](p, `document.querySelector("#editor-data .trouble").textContent`)
	assert.Regexp(t, `^[A-Z].*text.*\.$`, sentence)
	assert.Equal(t, before, p.all("#cards article"))
	assert.Zero(t, get[int](p, `document.querySelectorAll("#findings.old").length`), "the demo is still there, and still answered")

	p.load(fileWith(t, "words.csv", "name\nAda\nBen\n"))
	p.until(`document.querySelector("#work").dataset.state === "failed"`)
	assert.Regexp(t, `usable score`, get[string](p, `document.querySelector("#editor-data .trouble").textContent`))
	assert.Contains(t, get[string](p, `document.getElementById("old").innerText`), "demo.csv")
}

func TestPageTakesAPaste(t *testing.T) {
	p := openPage(t, 1280)
	p.open("data")
	const pasted = "score\tminutes\n3\t10\n5\t12\n6\t9\n4\t11\n7\t30\n5\t14\n"
	p.do(chromedp.Evaluate(`{ const carried = new DataTransfer(); carried.setData("text/plain", `+"`"+pasted+"`"+`);
		document.getElementById("paste").dispatchEvent(new ClipboardEvent("paste", {clipboardData: carried, bubbles: true, cancelable: true})); }`, nil))
	p.until(`document.querySelectorAll(".column").length === 2`)
	p.tick("minutes")
	p.settled()
	p.cutoff(">=14")
	p.settled()
	p.shows(judge(t, fileWith(t, "pasted.tsv", pasted), "--score", "minutes", "--cutoff", ">=14"))
}

func TestPageTakesADrop(t *testing.T) {
	p := openPage(t, 1280)
	p.do(chromedp.Evaluate(`{ const carried = new DataTransfer();
		carried.items.add(new File(["7\n8\n8\n9\n12\n"], "five people.txt", {type: "text/plain"}));
		for (const type of ["dragover", "drop"]) {
			document.querySelector("#sweep svg").dispatchEvent(new DragEvent(type, {dataTransfer: carried, bubbles: true, cancelable: true}));
		} }`, nil))
	p.until(`document.getElementById("slot-data").innerText.includes("five people.txt")`)
	p.settled()
	p.cutoff("<=8")
	p.settled()
	p.shows(judge(t, fileWith(t, "five people.txt", "7\n8\n8\n9\n12\n"), "--cutoff", "<=8"))
}

func TestPageSaysThatABrowserIsTooOld(t *testing.T) {
	path, err := filepath.Abs(pageFile)
	require.NoError(t, err)
	p := newTab(t, "file://"+path)
	p.before(`delete globalThis.DecompressionStream`)
	p.do(chromedp.Navigate(p.file))
	p.until(`document.querySelector(".trouble")`)
	assert.Contains(t, get[string](p, `document.querySelector(".trouble").innerText`), "too old for this page")
	assert.Zero(t, get[int](p, `document.querySelectorAll("#start").length`), "it doesn't go on saying that it loads")
}
