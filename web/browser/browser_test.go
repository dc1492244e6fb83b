package browser

import (
	"context"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	tab "github.com/chromedp/cdproto/page"
	"github.com/chromedp/cdproto/runtime"
	"github.com/chromedp/chromedp"
	"github.com/stretchr/testify/require"
)

// What the tests drive, as make builds it.
var (
	pageFile = filepath.Join("..", "..", "dist", "tailgap.html")
	command  = filepath.Join("..", "..", "bin", "tailgap")
)

// The one browser of all tests, and who listens to it.
var (
	chromium context.Context
	ear      *witness
)

func TestMain(m *testing.M) {
	status, err := run(m)
	if err != nil {
		fmt.Fprintln(os.Stderr, "the page can't be tested:", err)
		status = 1
	}
	os.Exit(status)
}

func run(m *testing.M) (int, error) {
	for _, needed := range []string{pageFile, command} {
		if _, err := os.Stat(needed); err != nil {
			return 0, fmt.Errorf("%w; make build makes it", err)
		}
	}
	folder, err := os.MkdirTemp("", "chromium")
	if err != nil {
		return 0, err
	}
	defer os.RemoveAll(folder)
	ctx, stop := context.WithCancel(context.Background())
	defer stop()
	chromium, stop = start(ctx, folder)
	defer stop()
	if err := chromedp.Run(chromium); err != nil {
		return 0, fmt.Errorf("Chromium doesn't start: %w", err)
	}
	address, err := listening(folder)
	if err != nil {
		return 0, err
	}
	if ear, err = newWitness(ctx, address); err != nil {
		return 0, err
	}
	return m.Run(), nil
}

// start prepares a Chromium that has nothing of anybody's and does nothing on
// its own account.
func start(ctx context.Context, folder string) (context.Context, context.CancelFunc) {
	path := os.Getenv("TAILGAP_CHROMIUM")
	if path == "" {
		path = "/usr/bin/chromium"
	}
	ctx, stopAllocator := chromedp.NewExecAllocator(ctx,
		chromedp.ExecPath(path), chromedp.Headless, chromedp.NoSandbox, chromedp.DisableGPU, chromedp.NoFirstRun,
		chromedp.UserDataDir(folder),
		chromedp.Flag("disable-quic", true), chromedp.Flag("disable-background-networking", true),
		chromedp.Flag("disable-component-update", true), chromedp.Flag("disable-sync", true),
	)
	quiet := func(string, ...any) {} // chromedp doesn't know the workers that the witness attends to
	ctx, stopBrowser := chromedp.NewContext(ctx, chromedp.WithErrorf(quiet))
	return ctx, func() { stopBrowser(); stopAllocator() }
}

// listening is where the browser listens, as it has written down itself.
func listening(folder string) (string, error) {
	text, err := os.ReadFile(filepath.Join(folder, "DevToolsActivePort"))
	if err != nil {
		return "", err
	}
	port, path, _ := strings.Cut(strings.TrimSpace(string(text)), "\n")
	return "ws://127.0.0.1:" + port + path, nil
}

// patience is how long anything on a page may take before a test gives up.
const patience = 45 * time.Second

// page is a tab with the page in it.
type page struct {
	*testing.T
	ctx  context.Context
	file string // the page's address
}

// openPage opens the page in a tab of its own, once the scripts have run there,
// and waits for the demo's answer. When the test is over, nothing may have been requested but the file
// and its own blobs, and nothing complained about.
func openPage(t *testing.T, width int, scripts ...string) *page {
	t.Helper()
	path, err := filepath.Abs(pageFile)
	require.NoError(t, err)
	p := newTab(t, "file://"+path)
	for _, script := range scripts {
		p.before(script)
	}
	p.do(chromedp.EmulateViewport(int64(width), 900), chromedp.Navigate(p.file))
	p.settled()
	t.Cleanup(func() {
		requests, complaints := ear.heard()
		require.Contains(t, requests, "page "+p.file, "the witness has listened from the start")
		require.Empty(t, foreign(requests, p.file), "requests to elsewhere")
		require.Empty(t, complaints)
	})
	return p
}

// newTab is an empty tab.
func newTab(t *testing.T, file string) *page {
	t.Helper()
	ear.heard()
	ctx, stop := chromedp.NewContext(chromium)
	ctx, stopClock := context.WithTimeout(ctx, 4*patience)
	t.Cleanup(func() { stopClock(); stop() })
	require.NoError(t, chromedp.Run(ctx)) // the tab lives as long as the context of its first run
	return &page{T: t, ctx: ctx, file: file}
}

func (p *page) do(actions ...chromedp.Action) {
	p.Helper()
	ctx, stop := context.WithTimeout(p.ctx, patience)
	defer stop()
	if err := chromedp.Run(ctx, actions...); err != nil {
		require.NoError(p, err, "the page says:\n%s", p.text())
	}
}

// before has a script run in the tab before any page does.
func (p *page) before(script string) {
	p.Helper()
	p.do(chromedp.ActionFunc(func(ctx context.Context) error {
		_, err := tab.AddScriptToEvaluateOnNewDocument(script).Do(ctx)
		return err
	}))
}

// text is what can be read on the page, for a test that fails.
func (p *page) text() (text string) {
	ctx, stop := context.WithTimeout(p.ctx, 2*time.Second)
	defer stop()
	if err := chromedp.Run(ctx, chromedp.Evaluate(`document.body.innerText`, &text)); err != nil {
		return err.Error()
	}
	return text
}

// get evaluates JavaScript on the page.
func get[V any](p *page, script string) (value V) {
	p.Helper()
	p.do(chromedp.Evaluate(script, &value))
	return value
}

// until waits for a JavaScript condition.
func (p *page) until(condition string) {
	p.Helper()
	err := chromedp.Run(p.ctx, chromedp.Poll(condition, nil, chromedp.WithPollingInterval(20*time.Millisecond), chromedp.WithPollingTimeout(patience)))
	if err != nil {
		require.NoError(p, err, "waiting for %s on a page that says:\n%s", condition, p.text())
	}
}

// settled waits until the newest question is answered and shown.
func (p *page) settled() {
	p.Helper()
	p.shownNow()
	p.until(`document.querySelector('#findings') && !document.querySelector('#findings.old') &&
		document.querySelector('#work').dataset.state === 'done'`)
}

// shownNow waits until what was done so far is shown: the page shows changes
// at its next frame, on timers that were set before this one.
func (p *page) shownNow() {
	p.Helper()
	p.do(chromedp.Evaluate(`new Promise(done => setTimeout(done, 60))`, nil, func(e *runtime.EvaluateParams) *runtime.EvaluateParams {
		return e.WithAwaitPromise(true)
	}))
}
