package browser

import (
	"os"
	"path/filepath"
	"slices"
	"testing"
	"time"

	"github.com/chromedp/chromedp"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// A witness that hears nothing proves nothing: here is a page that does all
// the page must never do.
const talkative = `<!doctype html><img src="http://127.0.0.1:47613/picture"><script>
fetch("http://127.0.0.1:47613/at-once").catch(() => {});
try { new WebSocket("ws://127.0.0.1:47613/socket") } catch {}
const source = 'fetch("http://127.0.0.1:47613/from-worker").catch(() => {})';
new Worker(URL.createObjectURL(new Blob([source], {type: "text/javascript"})));
console.error("on purpose");
</script>`

func TestWitnessHearsEveryRequest(t *testing.T) {
	path := filepath.Join(t.TempDir(), "talkative.html")
	require.NoError(t, os.WriteFile(path, []byte(talkative), 0o644))
	p := newTab(t, "file://"+path)
	p.do(chromedp.Navigate(p.file))
	var requests, complaints []string
	require.Eventually(t, func() bool {
		r, c := ear.heard()
		requests, complaints = append(requests, r...), append(complaints, c...)
		return len(foreign(requests, p.file)) >= 4 && slices.Contains(complaints, "page console: [{on purpose}]")
	}, patience, 20*time.Millisecond)
	assert.Contains(t, requests, "page "+p.file)
	assert.ElementsMatch(t, []string{
		"page http://127.0.0.1:47613/picture", "page http://127.0.0.1:47613/at-once",
		"page ws://127.0.0.1:47613/socket", "worker http://127.0.0.1:47613/from-worker",
	}, foreign(requests, p.file))
}
