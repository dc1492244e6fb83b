package browser

import (
	"fmt"
	"os"
	"path/filepath"
	"testing"

	cdp "github.com/chromedp/cdproto/browser"
	"github.com/chromedp/cdproto/input"
	"github.com/chromedp/chromedp"
	"github.com/chromedp/chromedp/kb"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/cutoff"
	"tailgap/core/demo"
	"tailgap/core/figure"
	"tailgap/core/report"
)

func TestPageShowsHostileNamesAsText(t *testing.T) {
	const name = `<img src=x onerror=alert(1)>`
	p := openPage(t, 1280)
	p.load(fileWith(t, "<b>bold<b>.csv", `"`+name+`","</script><script>alert(2)</script>"`+"\n3,1\n4,2\n4,3\n6,5\n7,8\n"))
	p.until(`document.querySelectorAll(".column").length === 2`)
	p.tick(name)
	p.settled()
	p.cutoff(">=6")
	p.settled()
	assert.Contains(t, get[string](p, `document.querySelector("#slot-data").textContent`), name)
	assert.Contains(t, get[string](p, `document.querySelector("#sweep svg title").textContent`), name)
	assert.Zero(t, get[int](p, `document.querySelectorAll("img, b, main script").length`))
}

func TestPageShowsOneScoreAtATime(t *testing.T) {
	p := openPage(t, 1280)
	path := fileWith(t, "intakes.csv", intakes())
	p.load(path)
	p.until(`document.querySelectorAll(".column").length === 4`)
	p.tick("seconds")
	p.tick("errors")
	p.settled()
	p.cutoff(">=12")
	p.settled()
	assert.Equal(t, []string{"errors", "seconds"}, get[[]string](p, `Array.from(document.querySelectorAll("[data-result]"), b => b.innerText)`))
	both := judge(t, path, "--score", "errors", "--score", "seconds", "--cutoff", ">=12")
	p.shows(both)
	p.do(chromedp.Click(`[data-result="1"]`, chromedp.ByQuery))
	p.shownNow()
	assert.Contains(t, get[string](p, `document.querySelector("#sweep svg title").textContent`), "seconds")
	both.at = 1
	p.shows(both)
}

// Cards and editors must fit into any width without the page moving sideways.
func TestPageFitsEveryWidth(t *testing.T) {
	for _, width := range []int{360, 700, 768, 1024, 1600} {
		t.Run(fmt.Sprint(width), func(t *testing.T) {
			p := openPage(t, width)
			p.cutoff("20..25")
			p.cutoff("<5")
			p.settled()
			p.do(chromedp.Click("#shape summary", chromedp.ByQuery))
			for _, slot := range []string{"data", "curve", "cutoff-2", "too-high", "heads", "more", "add"} {
				p.open(slot)
				if slot == "curve" {
					p.click("curve-given") // the widest it gets
				}
				p.shownNow()
				assert.LessOrEqual(t, get[int](p, `document.documentElement.scrollWidth`), width, slot)
			}
			boxes := get[[][]float64](p, `Array.from(document.querySelectorAll("#cards article"), e => {
				const b = e.getBoundingClientRect(); return [b.left, b.top, b.right, b.bottom]; })`)
			require.Len(t, boxes, 4)
			for i, a := range boxes {
				for _, b := range boxes[:i] {
					assert.False(t, a[0] < b[2] && b[0] < a[2] && a[1] < b[3] && b[1] < a[3], "two cards overlap at %d", width)
				}
			}
		})
	}
}

func TestPageHangsEachCardUnderItsGrip(t *testing.T) {
	p := openPage(t, 1280)
	gaps := get[[]float64](p, `Array.from(document.querySelectorAll("#cards article"), (card, i) => {
		const c = card.getBoundingClientRect();
		const tie = document.querySelectorAll(".tie")[i].getBoundingClientRect();
		return (c.left + c.right) / 2 - (tie.left + tie.right) / 2; })`)
	for _, gap := range gaps {
		assert.InDelta(t, 0, gap, 1.5, "px")
	}
	require.Len(t, gaps, 2)
}

func TestPageWorksByKeyboard(t *testing.T) {
	p := openPage(t, 1280)
	focused := func() string { return get[string](p, `document.activeElement.id`) }
	p.do(chromedp.Evaluate(`document.body.focus()`, nil), chromedp.KeyEvent(kb.Tab), chromedp.KeyEvent(kb.Tab), chromedp.KeyEvent(kb.Tab))
	assert.Equal(t, "slot-cutoff-0", focused())
	p.do(chromedp.KeyEvent(kb.Enter))
	p.shownNow()
	assert.Equal(t, "from-cutoff-0", focused(), "the number first; its side is before it")
	p.do(chromedp.KeyEvent(kb.Tab, chromedp.KeyModifiers(input.ModifierShift)))
	assert.Equal(t, "side-cutoff-0", focused())
	p.do(chromedp.KeyEvent(kb.Tab))
	assert.Equal(t, "from-cutoff-0", focused())
	p.do(chromedp.Evaluate(`document.activeElement.select()`, nil), chromedp.KeyEvent("8"), chromedp.KeyEvent(kb.Enter))
	p.settled()
	assert.Equal(t, "at 8 or below", get[string](p, `document.getElementById("slot-cutoff-0").innerText`))
	p.do(chromedp.KeyEvent(kb.Escape))
	p.shownNow()
	assert.Equal(t, "slot-cutoff-0", focused(), "and back to where it was opened")
	assert.Zero(t, get[int](p, `document.querySelectorAll(".editor").length`))
}

func TestPageOpensTheShapeByKeyboard(t *testing.T) {
	p := openPage(t, 1280)
	open := func() bool { return get[bool](p, `document.getElementById("shape").open`) }
	assert.False(t, open())
	p.do(chromedp.Focus("#shape summary", chromedp.ByQuery), chromedp.KeyEvent(kb.Enter))
	p.until(`document.getElementById("shape").open`)
	p.open("cutoff-0")
	p.write("from-cutoff-0", "9")
	p.settled()
	assert.True(t, open(), "it stays open when the answer changes")
	assert.Contains(t, get[string](p, `document.getElementById("shape").innerText`), "At 9 or below")
	assert.Contains(t, get[string](p, `document.querySelector("#worm svg title").textContent`), "vocabulary")
}

func TestPageAsksAQuestionFileOfTheScoresThatFollow(t *testing.T) {
	p := openPage(t, 1280)
	q := ask.NewQuestion()
	q.Scores, q.Missing, q.Seed, q.Replicates = []string{"errors"}, []string{"-9"}, 5, 1500
	for _, text := range []string{">=12", "3..5"} {
		c, err := cutoff.Parse(text)
		require.NoError(t, err)
		q.Cutoffs = append(q.Cutoffs, c)
	}
	text, err := ask.WriteQuestion(q)
	require.NoError(t, err)
	plan, path := fileWith(t, "plan.json", string(text)), fileWith(t, "intakes.csv", intakes())
	p.do(chromedp.Click("#take-away summary", chromedp.ByQuery), chromedp.SetUploadFiles("#open-question", []string{plan}, chromedp.ByQuery))
	p.until(`document.querySelector("#slot-data ~ .trouble")`)
	assert.Contains(t, get[string](p, `document.querySelector("#slot-data ~ .trouble").innerText`), `There is no column "errors"; the columns are: `)
	p.load(path)
	p.until(`document.getElementById("slot-data").innerText.includes("errors scores in intakes.csv")`)
	p.settled()
	assert.True(t, get[bool](p, `document.getElementById("column-2").checked`))
	p.shows(judge(t, path, "--question", plan))
}

func TestPageGivesAndTakesQuestions(t *testing.T) {
	p := openPage(t, 1280)
	folder := t.TempDir()
	p.do(cdp.SetDownloadBehavior(cdp.SetDownloadBehaviorBehaviorAllow).WithDownloadPath(folder).WithEventsEnabled(true))
	p.open("heads")
	p.write("heads", "250")
	p.settled()
	p.do(chromedp.Click("#take-away summary", chromedp.ByQuery))
	for _, id := range []string{"save-question", "save-json", "save-csv", "save-text", "save-figure", "save-worm"} {
		p.click(id)
	}
	saved := func(name string) []byte {
		path := filepath.Join(folder, name)
		require.Eventually(t, func() bool { info, err := os.Stat(path); return err == nil && info.Size() > 0 }, patience, patience/1000, name)
		text, err := os.ReadFile(path)
		require.NoError(t, err)
		return text
	}
	q, err := ask.ReadQuestion(saved("tailgap-question.json"))
	require.NoError(t, err)
	want := demo.Question()
	*want.Heads = 250
	assert.Equal(t, want, q)
	answer, err := report.ReadJSON(saved("tailgap-answer.json"))
	require.NoError(t, err)
	assert.Equal(t, want, answer.Question)
	assert.Equal(t, report.Text(answer), string(saved("tailgap.txt")))
	csv, err := report.CSV(answer)
	require.NoError(t, err)
	assert.Equal(t, string(csv), string(saved("tailgap.csv")))
	assert.Contains(t, string(saved("tailgap.svg")), "DEMO")
	assert.Equal(t, figure.WormSheet(answer), string(saved("tailgap-worm.svg")))

	q.Heads, q.TooHigh, q.Seed = nil, nil, 9
	text, err := ask.WriteQuestion(q)
	require.NoError(t, err)
	p.do(chromedp.SetUploadFiles("#open-question", []string{fileWith(t, "plan.json", string(text))}, chromedp.ByQuery))
	p.until(`document.getElementById("slot-heads").innerText === "any number of people"`)
	p.settled()
	p.shows(judge(t, "--demo", "--question", fileWith(t, "plan.json", string(text))))

	p.do(chromedp.SetUploadFiles("#open-question", []string{fileWith(t, "plan.json", `{"format":"tailgap/question/9"}`)}, chromedp.ByQuery))
	p.until(`document.querySelector("#take-away .trouble")`)
	assert.Contains(t, get[string](p, `document.querySelector("#take-away .trouble").innerText`), "tailgap/question/9")
}
