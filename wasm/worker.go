package main

import (
	"encoding/json"
	"errors"

	"github.com/maxence-charriere/go-app/v9/pkg/app"
)

// runWorker serves the page that started this worker, and never returns.
func runWorker() {
	line := newPageLine(app.Window())
	b := newBench()
	for { // one message after the other, in the order they came
		r, parcels := b.serve(line.hear(), line)
		line.say(r, parcels...)
	}
}

// pageLine is a worker's connection with the page. A message, either way, is
// {text, parcels}: a request or reply, and what goes with it.
type pageLine struct {
	self     app.Value
	messages chan app.Value
}

func newPageLine(self app.Value) *pageLine {
	l := &pageLine{self, make(chan app.Value, 64)}
	self.Set("onmessage", app.FuncOf(func(_ app.Value, args []app.Value) any {
		l.messages <- args[0].Get("data")
		return nil
	}))
	early := self.Get("tailgapEarly")
	for i := range early.Length() {
		l.messages <- early.Index(i).Get("data")
	}
	return l
}

// hear waits for the next message.
func (l *pageLine) hear() (m message) {
	data := <-l.messages
	if m.err = json.Unmarshal([]byte(data.Get("text").String()), &m.request); m.err != nil {
		return m
	}
	parcels := data.Get("parcels")
	for i := range parcels.Length() {
		parcel := parcels.Index(i)
		if parcel.Get("arrayBuffer").Truthy() { // a file
			content, err := bytesOf(parcel)
			if err != nil {
				m.err = errors.New("the file " + m.Name + " can't be read: " + err.Error())
				return m
			}
			m.parcels = append(m.parcels, content)
		} else {
			m.parcels = append(m.parcels, bytesIn(parcel))
		}
	}
	return m
}

// say tells the page something. A reply that can't be encoded says so.
func (l *pageLine) say(r reply, parcels ...[]byte) {
	text, err := json.Marshal(r)
	if err != nil {
		text, _ = json.Marshal(reply{ID: r.ID, Kind: r.Kind, Error: err.Error()})
	}
	arrays, buffers := make([]any, len(parcels)), make([]any, len(parcels))
	for i, parcel := range parcels {
		array := arrayOf(parcel)
		arrays[i], buffers[i] = array, array.Get("buffer")
	}
	l.self.Call("postMessage", map[string]any{"text": string(text), "parcels": list(arrays...)}, list(buffers...))
}
