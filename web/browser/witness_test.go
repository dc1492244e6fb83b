package browser

import (
	"context"
	"encoding/json"
	"fmt"
	"slices"
	"strings"
	"sync"

	"github.com/chromedp/cdproto"
	"github.com/chromedp/cdproto/target"
	"github.com/chromedp/chromedp"
	"github.com/go-json-experiment/json/jsontext"
)

// witness listens to the browser over a connection of its own. Every page and
// every worker is stopped at birth until the witness listens to it, so that
// it hears of each request from the first byte on.
type witness struct {
	conn   *chromedp.Conn
	lastID int64
	ready  chan struct{} // closed when it has begun to listen

	mu         sync.Mutex
	requests   []string // "page file:///..."
	complaints []string // of the console, the policy, uncaught errors
}

// newWitness begins to listen at the browser's own address.
func newWitness(ctx context.Context, address string) (*witness, error) {
	conn, err := chromedp.DialContext(ctx, address)
	if err != nil {
		return nil, err
	}
	w := &witness{conn: conn, ready: make(chan struct{})}
	if err := w.attach(ctx, ""); err != nil {
		return nil, err
	}
	go w.listen(ctx)
	<-w.ready
	return w, nil
}

const autoAttach = `{"autoAttach":true,"waitForDebuggerOnStart":true,"flatten":true}`

// attach asks for the children of a session, all held until they are heard.
func (w *witness) attach(ctx context.Context, session target.SessionID) error {
	return w.tell(ctx, session, "Target.setAutoAttach", autoAttach)
}

func (w *witness) tell(ctx context.Context, session target.SessionID, method, params string) error {
	w.lastID++
	return w.conn.Write(ctx, &cdproto.Message{ID: w.lastID, SessionID: session, Method: cdproto.MethodType(method), Params: jsontext.Value(params)})
}

// listen is the witness's only reader; what it tells, it tells from here.
func (w *witness) listen(ctx context.Context) {
	kinds := map[target.SessionID]string{}
	for {
		var m cdproto.Message
		if err := w.conn.Read(ctx, &m); err != nil {
			return // the browser is gone
		}
		if m.ID == 1 {
			close(w.ready)
		}
		if m.Method == "Target.attachedToTarget" {
			var event struct {
				SessionID  target.SessionID
				TargetInfo struct{ Type string }
			}
			w.read(m, &event)
			kinds[event.SessionID] = event.TargetInfo.Type
			w.hearOut(ctx, event.SessionID)
			continue
		}
		if kind := kinds[m.SessionID]; kind != "browser_ui" { // the browser's own windows
			w.note(kind, m)
		}
	}
}

// hearOut listens to a new page or worker and then lets it run. What one of
// the two doesn't have, it refuses, which does no harm.
func (w *witness) hearOut(ctx context.Context, session target.SessionID) {
	for _, method := range []string{"Network.enable", "Runtime.enable", "Log.enable", "Audits.enable"} {
		w.tell(ctx, session, method, `{}`)
	}
	w.attach(ctx, session)
	w.tell(ctx, session, "Runtime.runIfWaitingForDebugger", `{}`)
}

func (w *witness) read(m cdproto.Message, into any) {
	if err := json.Unmarshal(m.Params, into); err != nil {
		w.complain("the witness can't read %s: %v", m.Method, err)
	}
}

func (w *witness) complain(format string, args ...any) {
	w.mu.Lock()
	defer w.mu.Unlock()
	w.complaints = append(w.complaints, fmt.Sprintf(format, args...))
}

func (w *witness) request(kind, address string) {
	w.mu.Lock()
	defer w.mu.Unlock()
	w.requests = append(w.requests, kind+" "+address)
}

// note takes down requests of every sort, and whatever the console, the
// policy or an error nobody caught has to say.
func (w *witness) note(kind string, m cdproto.Message) {
	var event struct {
		Request   struct{ URL string }
		URL       string
		Type      string
		Args      []struct{ Value any }
		Entry     struct{ Level, Text, URL string }
		Exception struct {
			Text      string
			Exception struct{ Description string }
		} `json:"exceptionDetails"`
		Issue struct{ Code string }
	}
	switch m.Method {
	case "Network.requestWillBeSent":
		w.read(m, &event)
		w.request(kind, event.Request.URL)
	case "Network.webSocketCreated", "Network.webTransportCreated":
		w.read(m, &event)
		w.request(kind, event.URL)
	case "Runtime.consoleAPICalled":
		w.read(m, &event)
		if event.Type == "error" || event.Type == "warning" || event.Type == "assert" {
			w.complain("%s console: %v", kind, event.Args)
		}
	case "Runtime.exceptionThrown":
		w.read(m, &event)
		w.complain("%s: %s %s", kind, event.Exception.Text, event.Exception.Exception.Description)
	case "Log.entryAdded":
		w.read(m, &event)
		if event.Entry.Level == "error" || event.Entry.Level == "warning" {
			w.complain("%s log: %s %s", kind, event.Entry.Text, event.Entry.URL)
		}
	case "Audits.issueAdded":
		w.read(m, &event)
		if event.Issue.Code == "ContentSecurityPolicyIssue" {
			w.complain("%s: %s", kind, m.Params)
		}
	}
}

// heard is what was requested and complained about since it was last asked.
func (w *witness) heard() (requests, complaints []string) {
	w.mu.Lock()
	defer w.mu.Unlock()
	requests, complaints = slices.Clone(w.requests), slices.Clone(w.complaints)
	w.requests, w.complaints = nil, nil
	return requests, complaints
}

// foreign are the requests for anything but the file itself and its own
// blob: and data: addresses.
func foreign(requests []string, file string) []string {
	return slices.DeleteFunc(slices.Clone(requests), func(r string) bool {
		_, address, _ := strings.Cut(r, " ")
		return address == file || strings.HasPrefix(address, "blob:") || strings.HasPrefix(address, "data:")
	})
}
