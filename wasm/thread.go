package main

import (
	"encoding/json"

	"github.com/maxence-charriere/go-app/v9/pkg/app"
)

// thread is what computes, as the desk sees it.
type thread interface {
	// post sends a request, with the file it is about unless the thread has
	// that one already.
	post(r request, with *file)
	// stop ends the thread at once, whatever it is doing.
	stop()
}

// file is a file that the page has in memory.
type file struct {
	name string
	blob parcel
}

// mostWorkers is how many workers there are at most: each takes memory.
const mostWorkers = 8

// startCrew starts as many workers as the machine has cores, the first of them
// now; receive gets what they say to the desk.
func startCrew(receive func(reply)) thread {
	cores := app.Window().Get("navigator").Get("hardwareConcurrency")
	most := 1
	if cores.Truthy() {
		most = min(cores.Int(), mostWorkers)
	}
	return newCrew(startWorker, most, receive)
}

// webWorker is a worker of the browser.
type webWorker struct {
	worker app.Value
	closes []app.Func
}

// startWorker starts a worker; receive gets everything it says.
func startWorker(receive func(reply, []parcel)) hand {
	w := &webWorker{worker: app.Window().Call("tailgapWorker")}
	w.on("message", func(event app.Value) {
		data := event.Get("data")
		var r reply
		if err := json.Unmarshal([]byte(data.Get("text").String()), &r); err != nil {
			r = reply{Kind: sayBroken, Error: err.Error()}
		}
		parcels := make([]parcel, data.Get("parcels").Length())
		for i := range parcels {
			parcels[i] = data.Get("parcels").Index(i)
		}
		receive(r, parcels)
	})
	w.on("error", func(event app.Value) {
		receive(reply{Kind: sayBroken, Error: event.Get("message").String()}, nil)
	})
	return w
}

func (w *webWorker) on(event string, do func(app.Value)) {
	handler := app.FuncOf(func(_ app.Value, args []app.Value) any {
		do(args[0])
		return nil
	})
	w.worker.Call("addEventListener", event, handler)
	w.closes = append(w.closes, handler)
}

func (w *webWorker) post(r request, with ...parcel) {
	text, err := json.Marshal(r)
	if err != nil {
		app.Log(err)
		return
	}
	parcels, given := make([]any, len(with)), []any{}
	for i, p := range with {
		parcels[i] = p
		if r.Kind == askMerge { // nobody else wants them: they need not be copied
			given = append(given, p.(app.Value).Get("buffer"))
		}
	}
	w.worker.Call("postMessage", map[string]any{"text": string(text), "parcels": list(parcels...)}, list(given...))
}

func (w *webWorker) stop() {
	w.worker.Call("terminate")
	for _, handler := range w.closes {
		handler.Release()
	}
}
