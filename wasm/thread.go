package main

import (
	"encoding/json"

	"github.com/maxence-charriere/go-app/v9/pkg/app"
)

// thread is a running worker as the page sees it.
type thread interface {
	// post sends a request, with the file it is about unless the worker has
	// that one already.
	post(r request, with *file)
	// stop ends the worker at once, whatever it is doing.
	stop()
}

// file is a file in the browser's hands: the page passes it on and never
// looks inside.
type file struct {
	name string
	blob app.Value
}

// browserThread is a Web Worker.
type browserThread struct {
	worker app.Value
	closes []app.Func
}

// startThread starts a worker; receive gets everything it says.
func startThread(receive func(reply)) thread {
	t := &browserThread{worker: app.Window().Call("tailgapWorker")}
	t.on("message", func(event app.Value) {
		var r reply
		if err := json.Unmarshal([]byte(event.Get("data").String()), &r); err != nil {
			r = reply{Kind: sayBroken, Error: err.Error()}
		}
		receive(r)
	})
	t.on("error", func(event app.Value) {
		receive(reply{Kind: sayBroken, Error: event.Get("message").String()})
	})
	return t
}

func (t *browserThread) on(event string, do func(app.Value)) {
	handler := app.FuncOf(func(_ app.Value, args []app.Value) any {
		do(args[0])
		return nil
	})
	t.worker.Call("addEventListener", event, handler)
	t.closes = append(t.closes, handler)
}

func (t *browserThread) post(r request, with *file) {
	text, err := json.Marshal(r)
	if err != nil {
		app.Log(err)
		return
	}
	message := map[string]any{"text": string(text)}
	if with != nil {
		message["name"], message["file"] = with.name, with.blob
	}
	t.worker.Call("postMessage", message)
}

func (t *browserThread) stop() {
	t.worker.Call("terminate")
	for _, handler := range t.closes {
		handler.Release()
	}
}
